namespace Campaigns.Catalog.Loading;

/// <summary>What an experiment gets whose row in the plan names none.</summary>
/// <param name="Test">Key of the test.</param>
/// <param name="FollowUp">Key of the follow-up procedure.</param>
public sealed record PlanDefaults(string Test, string FollowUp);
