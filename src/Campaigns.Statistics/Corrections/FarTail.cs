namespace Campaigns.Statistics.Corrections;

/// <summary>Adjusted p-values far below the range of doubles, through the procedure's own computation on rescaled windows of the logarithms.</summary>
/// <remarks>
/// Method. For tiny p-values every procedure here is homogeneous: multiply all p-values by a factor and the adjusted ones follow. So a stretch of logarithms is shifted into
/// the middle of the doubles' range and adjusted there. P-values smaller by more than any factor that a correction can bring (below 10^12) act as 0, larger ones as 1.
/// One run of the procedure a window, each at least 500 units of ln p wide.
/// </remarks>
internal static class FarTail
{
    /// <summary>ln p to which the smallest p-value of a window is shifted: ln 10^-265, 25 powers of ten above where smaller ones turn into 0.</summary>
    private const double Anchor = -610.185063642639;

    /// <summary>Width of ln p that one window answers for: up to 10^-48.</summary>
    private const double Width = 500;

    /// <summary>Shifted ln p above which p-values act as 1: ln 10^-33, 15 powers of ten above the last one answered for.</summary>
    private const double Ceiling = -75.9853069;

    /// <summary>Shifted ln p below which p-values act as 0: ln 10^-290.</summary>
    private const double Floor = -667.749692;

    /// <summary>A procedure on ascending p-values.</summary>
    public delegate void Procedure(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted);

    /// <summary>The logarithms of the adjusted p-values of the family's tail.</summary>
    /// <param name="family">The ranked family.</param>
    /// <param name="procedure">The correction.</param>
    /// <param name="logs">Takes one logarithm for each rank of the tail; negative infinity for p = 0.</param>
    public static void Logs(RankedFamily family, Procedure procedure, Span<double> logs)
    {
        double[] scaled = new double[family.Count];
        double[] adjusted = new double[family.Count];
        double lowest = double.NegativeInfinity;
        int rank = 0;
        while (rank < logs.Length)
        {
            double first = family.Log(rank);
            if (double.IsNegativeInfinity(first))
            {
                logs[rank++] = first;
                continue;
            }

            double shift = first - Anchor;
            FillWindow(family, rank, shift, scaled);
            procedure(scaled, family.FamilySize, adjusted);
            for (; rank < logs.Length && family.Log(rank) - first <= Width; rank++)
            {
                double raw = family.Log(rank);
                double moved = shift + Math.Log(adjusted[rank]);

                // Rounding the logarithm must not move an adjusted p-value to the other side of its p-value.
                double log = adjusted[rank] == scaled[rank] ? raw : adjusted[rank] > scaled[rank] ? Math.Min(0, Math.Max(raw, moved)) : Math.Min(raw, moved);

                // Two windows round differently; the order holds across them all the same.
                lowest = Math.Max(lowest, log);
                logs[rank] = lowest;
            }
        }
    }

    /// <summary>Puts right the doubles whose p-values had lost digits, or everything, at the lower end of the range.</summary>
    /// <param name="values">Adjusted p-values as doubles, ascending; corrected in place.</param>
    /// <param name="logs">The logarithms of the first of them.</param>
    public static void Restore(Span<double> values, ReadOnlySpan<double> logs)
    {
        for (int rank = 0; rank < logs.Length; rank++)
        {
            double fromLog = Math.Exp(logs[rank]);

            // Where both agree, the one that was rounded once stays.
            if (Math.Abs(fromLog - values[rank]) > (1e-9 * values[rank]) + double.Epsilon)
            {
                values[rank] = fromLog;
            }
        }
    }

    private static void FillWindow(RankedFamily family, int anchorRank, double shift, Span<double> scaled)
    {
        int rank = anchorRank - 1;
        for (; rank >= 0 && family.Log(rank) - shift >= Floor; rank--)
        {
            scaled[rank] = Math.Exp(family.Log(rank) - shift);
        }

        scaled[..(rank + 1)].Clear();
        for (rank = anchorRank; rank < scaled.Length && family.Log(rank) - shift <= Ceiling; rank++)
        {
            scaled[rank] = Math.Exp(family.Log(rank) - shift);
        }

        scaled[rank..].Fill(1);
    }
}
