using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>adjust: corrections on a column of p-values.</summary>
internal sealed class AdjustVerb : Verb
{
    private readonly Argument<string> _file = TypedOptions.NotBlank(new Argument<string>("FILE") { Description = "A table with a header and a column of p-values." });
    private readonly Option<string> _column = TypedOptions.NotBlank(new Option<string>("--column") { Description = "The column of p-values.", HelpName = "NAME", DefaultValueFactory = _ => "p" });
    private readonly Option<string?> _corrections = new("--correction") { Description = "Keys of the corrections, separated by commas (else all that the file allows).", HelpName = "KEY,KEY" };
    private readonly Option<int?> _familySize = TypedOptions.WholeOrNone("--family-size", 1, "Hypotheses in the family, those without a p-value included (else the rows of the file).");
    private readonly Option<double> _level = TypedOptions.Level("The level of online procedures, and at which survivors are counted for people.");
    private readonly StreamOptions _online = new();
    private readonly AdjustWeights _weights = new();
    private readonly Option<bool> _qValues = new("--q-values") { Description = "A column of Storey's q-values, with the estimated share of true nulls." };

    public override Command Build() => _online.AddTo(new("adjust", Describe("Corrections on a column of p-values in a file; needs no catalog. Rows without a p-value count in the family as p = 1.",
        "adjust pvalues.csv --correction holm,bh --format csv"))
    {
        _file, _column, _corrections, _familySize, _level, _weights.Column, _qValues, SharedOptions.DecimalMark, SharedOptions.Separator,
    });

    public override int Run(Session session)
    {
        ErrorProcedure[] procedures = Chosen(session);
        OnlineProcedure[] online = [.. procedures.OfType<OnlineProcedure>()];
        var level = new SignificanceLevel(session.Get(_level));
        DelimitedFileOptions reading = SharedOptions.Reading(session, []);
        DelimitedTable table = DelimitedTable.Read(session.Get(_file), reading);
        RefuseRepeatedNames(session, table, procedures);
        (int[] rows, PValue[] p) = ReadPValues(session, table, reading.DecimalMark);
        TellOfBlankLines(session, table);
        int familySize = FamilySize(session, table.RowCount, p.Length, procedures);
        OnlineSettings[] settings = _online.Settings(session, online, level, Math.Max(1, familySize));
        RankedFamily family = _weights.Family(session, table, reading.DecimalMark, rows, p, familySize);
        AdjustQValues? qValues = session.Get(_qValues) ? new AdjustQValues(p) : null;
        string[] cautions = [.. AdaptiveText.Cautions(procedures, p.Length)];
        if (session.Format != RowFormat.Table)
        {
            // Rows alone go to scripts; the table has these sentences below it.
            string[] told = [.. session.Typed.GetValue(_corrections) is null ? [] : cautions, .. qValues?.Sentences ?? []];
            Array.ForEach(told, sentence => session.Host.Notice($"Note: {sentence}"));
        }

        AdjustColumns[] added =
        [
            .. procedures.Select(one => one is OnlineProcedure arriving
                ? AdjustColumns.Of(arriving, settings[Array.IndexOf(online, arriving)], p)
                : AdjustColumns.Of((Correction)one, family, level)),
        ];
        session.Print(Table(table, added, rows, familySize, level, qValues, cautions, table.FindColumn(session.Get(_column))));
        return ExitCode.Done;
    }

    /// <summary>In a file of one column a blank line may be meant as a hypothesis without a p-value, which would make the family larger.</summary>
    private static void TellOfBlankLines(Session session, DelimitedTable table)
    {
        const int headerLines = 1;
        long blank = table.RowCount == 0 || table.Headers.Count > 1 ? 0 : table.Line(table.RowCount - 1) - headerLines - table.RowCount;
        if (blank > 0)
        {
            session.Host.Notice(FormattableString.Invariant($"Note: {Counted.Of(blank, "blank line")} {Counted.Word(blank, "was passed over and is", "were passed over and are")} not counted in the family; write NA for a hypothesis that has no p-value."));
        }
    }

    private ErrorProcedure[] Chosen(Session session)
    {
        string? keys = session.Typed.GetValue(_corrections);
        if (keys is null)
        {
            return [.. _weights.Usual(session)];
        }

        ErrorProcedure[] chosen = [.. keys.Split(',', StringSplitOptions.TrimEntries).Distinct(StringComparer.Ordinal).Select(key => (ErrorProcedure?)CorrectionRegistry.Find(key) ?? OnlineRegistry.Find(key) ?? throw NoCorrection(key))];
        _weights.RefuseMismatch(session, [.. chosen.OfType<Correction>()]);
        return chosen;
    }

    private static UsageException NoCorrection(string key)
    {
        string[] known = [.. CorrectionRegistry.All.Select(c => c.Key), .. StreamOptions.Keys];
        string near = Nearest.Of(key, known) is { } nearest ? $" (did you mean '{nearest}'?)" : "";
        return new UsageException($"There is no correction '{key}'{near}; known are {string.Join(", ", known)}.");
    }

    /// <summary>Two columns of one name could not be told apart in what is written: none may be named as a correction, and for JSON none twice.</summary>
    private void RefuseRepeatedNames(Session session, DelimitedTable table, ErrorProcedure[] procedures)
    {
        IEnumerable<string> taken = procedures.SelectMany(AdjustColumns.Names).Concat(session.Get(_qValues) ? [AdjustQValues.Column] : []);
        string? repeated = table.Headers.FirstOrDefault(h => taken.Contains(h, StringComparer.Ordinal))
            ?? (session.Format == RowFormat.Json ? table.Headers.GroupBy(h => h, StringComparer.Ordinal).FirstOrDefault(g => g.Count() > 1)?.Key : null);
        if (repeated is not null)
        {
            throw new RefusedException($"The output would have two columns '{repeated}': rename the one of '{table.Name}', or choose other corrections with --correction.");
        }
    }

    private int FamilySize(Session session, int rows, int given, ErrorProcedure[] procedures)
    {
        if (session.Typed.GetValue(_familySize) is not { } size)
        {
            if (given < rows)
            {
                string batch = procedures.Any(c => c is Correction) ? FormattableString.Invariant($"; {Counted.Word(rows - given, "it counts", "they count")} as p = 1 in the family of {rows}. --family-size sets another size.") : ".";
                string online = procedures.Any(c => c is OnlineProcedure) ? $" In an online procedure {Counted.Word(rows - given, "it takes no step, and its", "they take no step, and their")} cells stay empty." : "";
                session.Host.Notice(FormattableString.Invariant($"Note: {Counted.Of(rows - given, "row")} {Counted.Word(rows - given, "has", "have")} no p-value{batch}{online}"));
            }

            return rows;
        }

        return size >= given
            ? size
            : throw new UsageException(FormattableString.Invariant($"--family-size {size} is smaller than the {given} p-values of the file; a family counts every hypothesis, so give {given} or more."));
    }

    private (int[] Rows, PValue[] P) ReadPValues(Session session, DelimitedTable table, DecimalMark mark)
    {
        int column = table.Problems.IsEmpty ? table.FindColumn(session.Get(_column)) : -1;
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

    private static RowTable Table(DelimitedTable table, AdjustColumns[] added, int[] rows, int familySize, SignificanceLevel level, AdjustQValues? qValues, string[] cautions, int pColumn)
    {
        Column[] columns =
        [
            .. table.Headers.Select((h, i) => new Column(h, SafeText.Escape(h), i == pColumn)),
            .. added.SelectMany(a => a.Columns),
            .. qValues is null ? [] : new[] { new Column(AdjustQValues.Column, AdjustQValues.Column, true) },
        ];
        return new RowTable(columns, Rows())
        {
            Below =
            [
                FormattableString.Invariant($"Family of {familySize}. At {level}: ") + string.Join(", ", added.Select(a => FormattableString.Invariant($"{a.Key} {a.Survivors}"))) + " survive.",
                .. added.Select(a => a.Note),
                .. cautions,
                .. qValues?.Sentences ?? [],
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

                if (given)
                {
                    int place = next++;
                    added.SelectMany(a => a.Cells(place)).ToArray().CopyTo(cells, table.Headers.Count);
                    if (qValues is not null)
                    {
                        cells[^1] = Cell.P(qValues.At(place));
                    }
                }

                yield return cells;
            }
        }
    }
}
