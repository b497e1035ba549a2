using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>adjust: corrections on a column of p-values.</summary>
internal sealed class AdjustVerb : Verb
{
    private readonly Argument<string> _file = new("FILE") { Description = "A table with a header and a column of p-values." };
    private readonly Option<string> _column = new("--column") { Description = "The column of p-values.", HelpName = "NAME", DefaultValueFactory = _ => "p" };
    private readonly Option<string?> _corrections = new("--correction") { Description = "Keys of the corrections, separated by commas (else all).", HelpName = "KEY,KEY" };
    private readonly Option<int?> _familySize = new("--family-size") { Description = "Hypotheses in the family, those without a p-value included (else the rows of the file).", HelpName = "N" };
    private readonly Option<double> _level = new("--level") { Description = "The level at which survivors are counted for people.", HelpName = "NUMBER", DefaultValueFactory = _ => 0.05 };

    public override Command Build() => new("adjust", Describe("Corrections on a column of p-values in a file; needs no catalog. Rows without a p-value count in the family as p = 1.",
        "adjust pvalues.csv --correction holm,bh --format csv"))
    {
        _file, _column, _corrections, _familySize, _level, SharedOptions.DecimalMark, SharedOptions.Separator,
    };

    public override int Run(Session session)
    {
        double level = session.Get(_level);
        if (!(level > 0 && level < 1))
        {
            throw new UsageException("--level takes a number between 0 and 1, both excluded, for example 0.05.");
        }

        Correction[] corrections = Chosen(session);
        DelimitedFileOptions reading = SharedOptions.Reading(session, []);
        DelimitedTable table = DelimitedTable.Read(session.Get(_file), reading);
        (int[] rows, PValue[] p) = ReadPValues(session, table, reading.DecimalMark);
        int familySize = FamilySize(session, table.RowCount, p.Length);
        var family = RankedFamily.Of(p, familySize);
        PValue[][] adjusted = [.. corrections.Select(c => c.Adjust(family))];
        session.Print(Table(table, corrections, rows, adjusted, familySize, new SignificanceLevel(level)));
        return ExitCode.Done;
    }

    private Correction[] Chosen(Session session)
    {
        string? keys = session.Typed.GetValue(_corrections);
        if (keys is null)
        {
            return [.. CorrectionRegistry.All];
        }

        return [.. keys.Split(',', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries).Distinct(StringComparer.Ordinal).Select(key =>
            CorrectionRegistry.Find(key) ?? throw new UsageException(
                $"There is no correction '{key}'{(Nearest.Of(key, CorrectionRegistry.All.Select(c => c.Key)) is { } near ? $"; did you mean '{near}'?" : ".")} Known are {string.Join(", ", CorrectionRegistry.All.Select(c => c.Key))}."))];
    }

    private int FamilySize(Session session, int rows, int given)
    {
        if (session.Typed.GetValue(_familySize) is not { } size)
        {
            if (given < rows)
            {
                session.Host.Notice(FormattableString.Invariant($"Note: {rows - given} row(s) have no p-value; they count as p = 1 in the family of {rows}. --family-size sets another size."));
            }

            return rows;
        }

        return size >= given
            ? size
            : throw new UsageException(FormattableString.Invariant($"--family-size {size} is smaller than the {given} p-values of the file; a family counts every hypothesis."));
    }

    private (int[] Rows, PValue[] P) ReadPValues(Session session, DelimitedTable table, DecimalMark mark)
    {
        int column = -1;
        if (table.Problems.IsEmpty)
        {
            column = table.FindColumn(session.Get(_column));
            if (column < 0)
            {
                throw new RefusedException($"The file '{table.Name}' has no column '{session.Get(_column)}'; it has {string.Join(", ", table.Headers)}. --column names another.");
            }
        }

        var rows = new List<int>();
        var values = new List<PValue>();
        for (int row = 0; column >= 0 && row < table.RowCount; row++)
        {
            ReadOnlySpan<byte> cell = table.CellUtf8(row, column);
            if (DecimalText.IsMissing(cell))
            {
                continue;
            }

            if (PValueText.TryParse(cell, mark, out PValue p, out string reason))
            {
                rows.Add(row);
                values.Add(p);
            }
            else
            {
                table.Problems.Add(new ImportProblem(table.Name, table.Line(row), session.Get(_column), "p-value", reason));
            }
        }

        return table.Problems.IsEmpty
            ? ([.. rows], [.. values])
            : throw new RefusedException(FormattableString.Invariant($"The file '{session.Get(_file)}' was refused. Problems: {table.Problems.Count}."), [.. table.Problems.Sentences()]);
    }

    private static RowTable Table(DelimitedTable table, Correction[] corrections, int[] rows, PValue[][] adjusted, int familySize, SignificanceLevel level)
    {
        Column[] columns =
        [
            .. table.Headers.Select(h => new Column(h, h)),
            .. corrections.Select(c => new Column(c.Key, c.Key, true)),
        ];
        return new RowTable(columns, Rows())
        {
            Below =
            [
                FormattableString.Invariant($"Family of {familySize}. At {level}: ") + string.Join(", ", corrections.Select((c, i) => FormattableString.Invariant($"{c.Key} {adjusted[i].Count(level.Rejects)}"))) + " survive.",
                .. corrections.Select(c => $"{c.Key}: {c.Name}. {c.Guarantee}"),
            ],
            WhenEmpty = "The file has no rows.",
        };

        IEnumerable<Cell[]> Rows()
        {
            for (int row = 0, next = 0; row < table.RowCount; row++)
            {
                bool given = next < rows.Length && rows[next] == row;
                var cells = new Cell[columns.Length];
                for (int c = 0; c < table.Headers.Count; c++)
                {
                    cells[c] = Cell.Text(table.Cell(row, c));
                }

                for (int c = 0; given && c < corrections.Length; c++)
                {
                    cells[table.Headers.Count + c] = Cell.P(adjusted[c][next]);
                }

                next += given ? 1 : 0;
                yield return cells;
            }
        }
    }
}
