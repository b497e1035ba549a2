namespace Campaigns.Catalog;

/// <summary>How far a long piece of work has come.</summary>
/// <param name="What">What is being done, in a few words.</param>
/// <param name="Done">Units done.</param>
/// <param name="Total">Units in all; 0 where that is not known.</param>
/// <param name="Unit">The unit, in the plural.</param>
/// <param name="Rows">Rows of a file done so far, where the unit is another; 0 where there are none to count.</param>
public readonly record struct WorkProgress(string What, long Done, long Total, string Unit, long Rows = 0);
