namespace Campaigns.Statistics.Planning;

/// <summary>A procedure as a simulation needs it: which experiments of a family survive.</summary>
/// <param name="pValues">One p-value an experiment, in the order of the plan.</param>
/// <param name="survives">Takes whether each survives; all false on entry.</param>
/// <remarks>It is called from several threads at once, and must remember nothing.</remarks>
public delegate void FamilyDecision(ReadOnlySpan<double> pValues, Span<bool> survives);
