using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>The level of each family of a campaign, so that the campaign as a whole holds what it names as its goal.</summary>
/// <remarks>
/// Familywise. A family that is open from the start, or that waits for any experiment of another to survive, costs its level: by the union bound the costs add up.
/// A family that waits for all of another to survive costs nothing beyond it: if the other holds a true null, its gate opens only where that null was rejected, which is an error that the other
/// has paid for already; if it holds none, it makes no error itself, and its level is free for those behind the gate. So, with S the costs of the families directly behind a gate,
///   cost(f) = max(level(f), S over gates "all") + S over gates "any",
/// and the costs of the families open from the start add up to at most the campaign's level. An "any" gate may be opened by a true effect while the other family's level is still at stake: hence the sum.
/// Testing in a fixed sequence at full level: W. Maurer, L. A. Hothorn and W. Lehmacher (1995), Multiple comparisons in drug clinical trials and preclinical assays, in J. Vollmar (editor),
/// Biometrie in der chemisch-pharmazeutischen Industrie 6:3-18; P. H. Westfall and A. Krishen (2001), Journal of Statistical Planning and Inference 99:25-40 (both cited from memory).
/// The recursion over trees of families is our own, from these two cases and the union bound; a simulation holds it.
/// Families that say no level share equally what is left: of the campaign's level those that cost their own, of the other family's level those that wait for all of it.
/// False discovery. Each family holds its own rate, the campaign's unless it says a lower one, closed families claiming nothing; rates held in families do not hold for all survivors together.
/// </remarks>
public static class FamilyLevels
{
    /// <summary>What rounding may add to a sum of shares, relative.</summary>
    private const decimal Rounding = 1e-12m;

    /// <summary>The levels, in the order of the families.</summary>
    /// <param name="campaign">Error rate and level.</param>
    /// <param name="families">Families whose gates are sound: each waits on another of them, and none in a circle.</param>
    /// <exception cref="RefusedException">They cost more than the campaign's level, or leave nothing for one that says none.</exception>
    public static IReadOnlyList<SignificanceLevel> Of(Campaign campaign, IReadOnlyList<Family> families)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(families);
        return campaign.ErrorRate == ErrorRate.Familywise ? Familywise(campaign, families) : [.. families.Select(f => FalseDiscovery(campaign, f))];
    }

    private static SignificanceLevel FalseDiscovery(Campaign campaign, Family family) => family.Level is { } level && level.Value > campaign.Level.Value
        ? throw new RefusedException($"The family '{family.Name}' asks for a false discovery rate of {level}, above the campaign's {campaign.Level}: lower it, or start the campaign at a higher level.")
        : family.Level ?? campaign.Level;

    private static IReadOnlyList<SignificanceLevel> Familywise(Campaign campaign, IReadOnlyList<Family> families)
    {
        var shares = new Shares(families);
        var pool = (decimal)campaign.Level.Value;
        decimal cost = shares.Share([.. Enumerable.Range(0, families.Count).Where(i => families[i].OpensAfter is null)], pool, $"The campaign's level {campaign.Level}");
        return cost <= pool * (1 + Rounding)
            ? shares.Levels
            : throw new RefusedException(FormattableString.Invariant($"The families ask for {(double)cost:0.######} together, more than the campaign's level {campaign.Level}: lower their levels, leave some empty, or let a family wait for all of another (opens_when all), which then costs nothing of its own."));
    }

    /// <summary>Levels as they are dealt out; sums of levels are sums of the decimals that were typed.</summary>
    private sealed class Shares(IReadOnlyList<Family> families)
    {
        private readonly SignificanceLevel?[] _levels = new SignificanceLevel?[families.Count];

        public IReadOnlyList<SignificanceLevel> Levels => [.. _levels.Select((level, i) => level
            ?? throw new RefusedException($"The family '{families[i].Name}' waits on itself over others: let one of them be open from the start."))];

        /// <summary>Deals a level out to families and to all that add to their cost.</summary>
        /// <returns>What they cost together.</returns>
        public decimal Share(IReadOnlyList<int> starts, decimal pool, string source)
        {
            List<int> bearers = [.. starts];
            for (int i = 0; i < bearers.Count; i++)
            {
                bearers.AddRange(Behind(bearers[i], FamilyGate.AnySurvives));
            }

            decimal cost = bearers.Where(f => families[f].Level is not null).Sum(f => Cost(f, families[f].Level!.Value));
            int[] silent = [.. bearers.Where(f => families[f].Level is null)];
            if (silent.Length == 0)
            {
                return cost;
            }

            decimal share = (pool - cost) / silent.Length;
            if (share <= pool * Rounding)
            {
                throw new RefusedException($"{source} is used up by the families that name a level, and nothing is left for '{families[silent[0]].Name}': give it a level and lower theirs.");
            }

            return cost + silent.Sum(f => Cost(f, new SignificanceLevel((double)share)));
        }

        private decimal Cost(int family, SignificanceLevel level)
        {
            _levels[family] = level;
            int[] behind = [.. Behind(family, FamilyGate.AllSurvive)];
            return behind.Length == 0
                ? (decimal)level.Value
                : Math.Max((decimal)level.Value, Share(behind, (decimal)level.Value, $"The level {level} of the family '{families[family].Name}', on which others wait,"));
        }

        private IEnumerable<int> Behind(int family, FamilyGate gate) =>
            Enumerable.Range(0, families.Count).Where(i => families[i].OpensAfter == families[family].Name && families[i].Gate == gate);
    }
}
