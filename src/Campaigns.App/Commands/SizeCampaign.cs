using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;

namespace Campaigns.App.Commands;

/// <summary>What was typed of a whole campaign.</summary>
/// <param name="Experiments">Experiments in it.</param>
/// <param name="Real">How many of them have a real effect; a row each.</param>
/// <param name="Wanted">Shares of the real effects that are to be found; empty where replicates are given.</param>
/// <param name="Corrections">The corrections, in the order in which people see them.</param>
/// <param name="Draws">Campaigns to draw where no exact law is known.</param>
/// <param name="Seed">Their seed.</param>
internal sealed record SizeCampaign(int Experiments, IReadOnlyList<RealEffects> Real, IReadOnlyList<double> Wanted, IReadOnlyList<ErrorProcedure> Corrections, int Draws, int Seed);
