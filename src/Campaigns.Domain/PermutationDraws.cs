using System.Security.Cryptography;
using System.Text;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>How many random arrangements a permutation test draws in a campaign, and from which seed: fixed by the plan, so that nobody draws until the result pleases.</summary>
public static class PermutationDraws
{
    private const int Fewest = 99_999;
    private const int Most = 9_999_999;

    /// <summary>Expected arrangements as extreme as the strictest threshold of the campaign: enough that the p-value there is known to about a fifth of itself.</summary>
    private const int WantedBeyondThreshold = 20;

    /// <summary>Draws a test: 99,999, or ten or a hundred times as many where the campaign's strictest threshold, level over family size, asks for more.</summary>
    /// <param name="level">The campaign's level.</param>
    /// <param name="familySize">Its hypotheses.</param>
    public static int Count(SignificanceLevel level, int familySize)
    {
        long draws = Fewest;
        while (draws < Most && (draws + 1) * level.Value / Math.Max(1, familySize) < WantedBeyondThreshold)
        {
            draws = (draws * 10) + 9;
        }

        return (int)draws;
    }

    /// <summary>Draws a test in a campaign of families: as many as the strictest of their thresholds asks for.</summary>
    /// <param name="families">Its families.</param>
    public static int Count(IReadOnlyList<FamilyStanding> families)
    {
        ArgumentNullException.ThrowIfNull(families);
        return families.Max(f => Count(f.Level, f.Planned));
    }

    /// <summary>The seed of an experiment: the first 64 bits of SHA-256 of the campaign's and the experiment's names, so that it is the same on every day and on every machine.</summary>
    /// <param name="campaign">Code of the campaign.</param>
    /// <param name="experiment">Code of the experiment.</param>
    public static ulong Seed(string campaign, string experiment)
    {
        byte[] hash = SHA256.HashData(Encoding.UTF8.GetBytes($"{campaign}\n{experiment}"));
        return System.Buffers.Binary.BinaryPrimitives.ReadUInt64BigEndian(hash);
    }

    /// <summary>The seed where a whole campaign is permuted at once: as that of an experiment, without one.</summary>
    /// <param name="campaign">Code of the campaign.</param>
    public static ulong Seed(string campaign) => Seed(campaign, "");
}
