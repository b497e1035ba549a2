namespace Campaigns.Domain;

/// <summary>A campaign as it would stand with one thing of its plan changed.</summary>
/// <param name="Kind">What is changed: sealed (nothing), level, family or correction.</param>
/// <param name="Changed">To what it is changed, in a clause; empty where nothing is.</param>
/// <param name="SurvivorCount">Experiments that would survive.</param>
/// <param name="Gained">Codes of those that do not survive as sealed, in the plan's order.</param>
/// <param name="Lost">Codes of those that survive only as sealed, in the plan's order.</param>
public sealed record PlanScenario(string Kind, string Changed, int SurvivorCount, IReadOnlyList<string> Gained, IReadOnlyList<string> Lost);
