namespace Campaigns.Torture.Outgoing;

/// <summary>One experiment as the rules say that it stands, kept beside the program.</summary>
internal sealed class HeldExperiment(string code, string? family)
{
    public string Code { get; } = code;

    public string? Family { get; } = family;

    public int Replicates { get; set; } = 3;

    /// <summary>Values in each group.</summary>
    public int Values { get; set; }

    /// <summary>Whether its values allow a test.</summary>
    public bool IsTestable { get; set; } = true;

    /// <summary>Whether a test of it stands.</summary>
    public bool IsCurrent { get; set; }

    public bool WasEverTested { get; set; }

    public bool IsWithdrawn { get; set; }

    public bool Left { get; set; }

    /// <summary>File and line of the value that is left out; null where none is.</summary>
    public (string File, long Line)? Excluded { get; set; }

    /// <summary>A value of it that may be left out.</summary>
    public (string File, long Line)? FirstValue { get; set; }

    public bool HasData => Values > 0;

    /// <summary>Whether the next test takes it: all planned values are there, or it was tested before.</summary>
    public bool IsDue => HasData && !IsWithdrawn && !IsCurrent && (Values >= Replicates || WasEverTested);

    public string Status => IsWithdrawn ? "withdrawn" : IsCurrent ? (IsTestable ? "tested" : "constant-response")
        : !HasData ? "planned" : Values >= Replicates || WasEverTested ? "ready" : "incomplete";
}

/// <summary>Adjusted p-values straight from the definitions, one family at a time.</summary>
internal static class FamilyOracle
{
    /// <param name="correction">bonferroni, holm or bh.</param>
    /// <param name="p">The p-values at hand.</param>
    /// <param name="size">Hypotheses of the family; those without a p-value count as 1.</param>
    public static double[] Adjust(string correction, double[] p, int size)
    {
        int[] order = [.. Enumerable.Range(0, p.Length).OrderBy(i => p[i])];
        var adjusted = new double[p.Length];
        for (int i = 0; i < order.Length; i++)
        {
            adjusted[order[i]] = Math.Min(1, correction switch
            {
                "bonferroni" => size * p[order[i]],
                "holm" => Enumerable.Range(0, i + 1).Max(j => (size - j) * p[order[j]]),
                _ => Enumerable.Range(i, order.Length - i).Min(j => size * p[order[j]] / (j + 1)),
            });
        }

        return adjusted;
    }
}
