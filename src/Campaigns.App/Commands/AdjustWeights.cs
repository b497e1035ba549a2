using System.CommandLine;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>The weights of the hypotheses of adjust: a column of its file.</summary>
internal sealed class AdjustWeights
{
    public Option<string?> Column { get; } = TypedOptions.NotBlank(new Option<string?>("--weights")
    {
        Description = "The column of weights, fixed before the data, for the weighted corrections: 0 or more, on any scale; rows without a p-value need one too.",
        HelpName = "COLUMN",
    });

    /// <summary>The corrections that are shown where none is chosen: with weights all of them.</summary>
    public IReadOnlyList<Correction> Usual(Session session) => session.Typed.GetValue(Column) is null ? CorrectionRegistry.FromPAlone : CorrectionRegistry.All;

    /// <summary>Refuses corrections that need weights where none are named, and weights that none of the chosen takes.</summary>
    /// <exception cref="UsageException">They do not fit.</exception>
    public void RefuseMismatch(Session session, IReadOnlyList<Correction> corrections)
    {
        if (session.Typed.GetValue(Column) is null && corrections.FirstOrDefault(c => c.NeedsWeights) is { } weighted)
        {
            throw new UsageException($"The correction '{weighted.Key}' needs a weight for every hypothesis: name their column with --weights COLUMN.");
        }

        if (session.Typed.GetValue(Column) is not null && !corrections.Any(c => c.NeedsWeights))
        {
            throw new UsageException("None of the chosen corrections takes weights: leave out --weights, or choose weighted-bonferroni, weighted-holm or weighted-bh.");
        }
    }

    /// <summary>The family, with weights where a column is named.</summary>
    /// <param name="session">What was typed.</param>
    /// <param name="table">The file.</param>
    /// <param name="mark">Its decimal mark.</param>
    /// <param name="rows">The rows that have a p-value, ascending.</param>
    /// <param name="p">Their p-values.</param>
    /// <param name="familySize">Hypotheses in the family.</param>
    /// <exception cref="RefusedException">A weight is missing or none, or all are 0.</exception>
    public RankedFamily Family(Session session, DelimitedTable table, DecimalMark mark, int[] rows, PValue[] p, int familySize)
    {
        if (session.Typed.GetValue(Column) is not { } name)
        {
            return RankedFamily.Of(p, familySize);
        }

        if (familySize != table.RowCount)
        {
            throw new UsageException(FormattableString.Invariant(
                $"With --weights every hypothesis of the family is a row with its weight: leave out --family-size, and give what was planned and not tested as rows without a p-value (the file has {table.RowCount} rows)."));
        }

        double[] weights = Read(table, mark, name);
        double[] tested = [.. rows.Select(row => weights[row])];
        if (weights.All(w => w == 0))
        {
            throw new RefusedException($"All weights in column '{name}' of '{table.Name}' are 0: at least one must be positive.");
        }

        var given = rows.ToHashSet();
        return RankedFamily.Of(p, familySize, tested, weights.Where((_, row) => !given.Contains(row)).Sum());
    }

    private static double[] Read(DelimitedTable table, DecimalMark mark, string name)
    {
        int column = table.FindColumn(name);
        double[] weights = new double[table.RowCount];
        for (int row = 0; row < weights.Length; row++)
        {
            ReadOnlySpan<byte> cell = table.CellUtf8(row, column);
            NumberReading reading = DecimalText.Parse(cell, mark, out ParsedDecimal number);
            weights[row] = reading == NumberReading.Number ? number.ToDouble() : 0;
            string? reason =
                reading == NumberReading.Missing ? "The weight is missing: write 0 for a hypothesis that may never survive, 1 for an ordinary one."
                : reading != NumberReading.Number ? NumberRefusal.Explain(reading, cell)
                : weights[row] < 0 ? FormattableString.Invariant($"A weight is 0 or more, not {weights[row]:R}.")
                : null;
            if (reason is not null)
            {
                table.Problems.Add(new ImportProblem(table.Name, table.Line(row), name, "weight", reason));
            }
        }

        return table.Problems.IsEmpty
            ? weights
            : throw new RefusedException(FormattableString.Invariant($"The file '{table.Name}' was refused. Problems: {table.Problems.Count}."), [.. table.Problems.Sentences()]);
    }
}
