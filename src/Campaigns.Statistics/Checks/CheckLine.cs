namespace Campaigns.Statistics.Checks;

/// <summary>One check of an experiment with what it found.</summary>
/// <param name="Key">The check's frozen key.</param>
/// <param name="Name">Its name in the field's words.</param>
/// <param name="Finding">What it saw.</param>
public sealed record CheckLine(string Key, string Name, CheckFinding Finding);
