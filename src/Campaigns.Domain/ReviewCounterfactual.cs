using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What two reviews would have decided, had one thing been as in the other: the way to tell which of the things that changed made the difference.</summary>
/// <remarks>
/// Weights, families and what is shared were fixed by the seal, so that p-values and sizes are all that can differ.
/// Each question that concerns all experiments is judged once, O(m log m); one about a single experiment's own p-value, once for that experiment.
/// </remarks>
/// <param name="campaign">Level, correction, families; sealed, so the same in both.</param>
/// <param name="before">The earlier review.</param>
/// <param name="after">The later one.</param>
internal sealed class ReviewCounterfactual(Campaign campaign, ReviewedFamily before, ReviewedFamily after)
{
    private IReadOnlyList<bool>? _beforeAtLaterSize;
    private IReadOnlyList<bool>? _afterAtEarlierSize;

    /// <summary>Whether an experiment on a line of both survives in the later review with its own p-value of the earlier one.</summary>
    public bool LaterWithOwnP(int placeBefore, int placeAfter) => Judge(WithOwnP(placeBefore, placeAfter))[placeAfter];

    /// <summary>Whether an experiment of the earlier review survives with all p-values of that review, in families of the later size.</summary>
    public bool EarlierAtLaterSize(int placeBefore) => (_beforeAtLaterSize ??= Judge(Sized(before.Members, after.Members)))[placeBefore];

    /// <summary>Whether an experiment survives with its own p-value of the earlier review among those of the later one, in families of the earlier size.</summary>
    public bool LaterAtEarlierSize(int placeBefore, int placeAfter, bool otherP) => otherP
        ? Judge(Sized(WithOwnP(placeBefore, placeAfter), before.Members))[placeAfter]
        : (_afterAtEarlierSize ??= Judge(Sized(after.Members, before.Members)))[placeAfter];

    /// <summary>Members in families of another review's size, never smaller than their tested experiments are many; the weight of those without a p-value follows the other's total.</summary>
    private static FamilyMembers Sized(FamilyMembers members, FamilyMembers size)
    {
        double[] weights = WeightsOf(members);
        double[] otherWeights = WeightsOf(size);
        int[] tested = TestedOf(members);
        return members with
        {
            Families = [.. members.Families.Select((f, i) => f with
            {
                Planned = Math.Max(size.Families[i].Planned, tested[i]),
                Size = Math.Max(size.Families[i].Size, tested[i]),
                WeightOfRest = Math.Max(0, size.Families[i].WeightOfRest + otherWeights[i] - weights[i]),
            })],
        };
    }

    private static int[] TestedOf(FamilyMembers members)
    {
        var tested = new int[members.Families.Count];
        if (members.FamilyOf.IsEmpty)
        {
            tested[0] = members.P.Length;
            return tested;
        }

        foreach (int family in members.FamilyOf.Span)
        {
            tested[family]++;
        }

        return tested;
    }

    private static double[] WeightsOf(FamilyMembers members)
    {
        var sums = new double[members.Families.Count];
        for (int i = 0; i < members.Weights.Length; i++)
        {
            sums[members.FamilyOf.IsEmpty ? 0 : members.FamilyOf.Span[i]] += members.Weights.Span[i];
        }

        return sums;
    }

    private FamilyMembers WithOwnP(int placeBefore, int placeAfter)
    {
        PValue[] p = after.Members.P.ToArray();
        p[placeAfter] = before.Members.P.Span[placeBefore];
        return after.Members with { P = p };
    }

    private IReadOnlyList<bool> Judge(FamilyMembers members) => FamilyVerdict.Judge(campaign, members).Survives;
}
