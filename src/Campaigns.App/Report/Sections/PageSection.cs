using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

namespace Campaigns.App.Report.Sections;

/// <summary>The one page: what survives and by how much, what was risked, what to be careful about. It fits a sheet of paper, whatever the campaign.</summary>
internal sealed class PageSection : ReportSection
{
    private const int LettersOfTitle = 55;
    private const int LettersOfLead = 80;
    private const double LeadHeight = 1.25;

    /// <summary>Lines of headings, notes, caution and record, of the table's frame and of a figure.</summary>
    private const double FixedLines = 12.5;
    private const int TableFrame = 5;
    private const int FigureLines = 14;

    /// <summary>Lines that survivors leave to cautions, where these need so many.</summary>
    private const int CautionLines = 9;
    private const int LongestName = 60;
    private const int LongestPurpose = 380;
    private const int LongestSentence = 760;
    private const int LongestCaution = 330;
    private const int LettersOfName = 54;
    private const int LettersOfGroups = 34;
    private const double RowHeight = 0.86;
    private const double RowFrame = 0.3;

    public override string Anchor => "summary";

    public override string Title => "On one page";

    public override bool IsPage => true;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        var room = new SheetRoom();
        room.Take(FixedLines + (2 * SheetRoom.Of(data.Standing.Campaign.Title, LettersOfTitle)));
        string lead = Shorten(Lead(data), LongestSentence);
        room.Take(SheetRoom.Of(lead, LettersOfLead) * LeadHeight);
        if (data.Standing.Campaign.Purpose is { Length: > 0 } purpose)
        {
            string asked = Shorten($"Purpose: {purpose}", LongestPurpose);
            room.Take(SheetRoom.Of(asked) + RowFrame);
            yield return new Paragraph(asked);
        }

        yield return new Paragraph(lead, Tone.Lead);
        string[] risked = [.. Risked(data).Select(s => Shorten(s, LongestSentence))];
        room.Take(risked.Sum(s => SheetRoom.Of(s)));
        if (data.Survivors.Listed.Count > 0)
        {
            yield return Survivors(data, room);
        }

        string[] careful = [.. Careful(data, room)];
        yield return new Heading(1, "risked", "What was risked");
        yield return new BulletList(risked);
        if (data.Overview.TestedCount > 1 && room.Left >= FigureLines)
        {
            yield return new FigureBlock(RiskFigure.Of(data.Standing, data.RiskCurve)) { WithNotes = false };
        }

        yield return new Heading(1, "careful", "What to be careful about");
        yield return new BulletList(careful);
        yield return new Paragraph(CampaignText.Caution, Tone.Note);
        yield return new Paragraph(LedgerText.HeadLine(data.Head), Tone.Note);
    }

    private static string Lead(ReportData data) => data.Overview.TestedCount == 0 && data.Survivors.Listed.Count == 0
        ? $"Nothing has a result yet. Goal: {CampaignText.Goal(data.Overview.Campaign)}."
        : data.Survivors.Listed.Count == 0
            ? FormattableString.Invariant($"None of {Counted.Of(data.Overview.TestedCount, "tested experiment")} survives ({CampaignText.Goal(data.Overview.Campaign)}): no difference shown, which is not the same as no difference.")
            : $"{SurvivorTables.Counted(data.Overview)} {Counted.Word(data.Overview.SurvivorCount, "survives", "survive")} ({CampaignText.Goal(data.Overview.Campaign)}).";

    private static TableBlock Survivors(ReportData data, SheetRoom room)
    {
        room.Take(TableFrame);
        double kept = Math.Min(CautionLines, CautionsSection.All(data).Sum(c => SheetRoom.Of(Shorten(c, LongestCaution))) + 1);
        List<ExperimentResult> shown = [];
        List<Cell[]> rows = [];
        foreach (ExperimentResult survivor in data.Survivors.Listed)
        {
            Cell[] row = Row(data.Survivors, survivor);
            double lines = LinesOf(row);
            if (rows.Count > 0 && room.Left < lines + kept)
            {
                break;
            }

            room.Take(lines);
            shown.Add(survivor);
            rows.Add(row);
        }

        return new TableBlock(
            shown.Count < data.Overview.SurvivorCount
                ? FormattableString.Invariant($"What survives, and by how much: the {shown.Count} of {data.Overview.SurvivorCount} with the smallest p; the other {data.Overview.SurvivorCount - shown.Count} stand under Survivors")
                : "What survives, and by how much",
            [
                new("experiment", "experiment"), new("groups", "largest difference claimed"), new("difference", "difference", true), new("unit", "unit"), new("selected_lower", "from", true),
                new("selected_upper", "to", true), new("adjusted_p", "adjusted p", true),
            ],
            rows)
        {
            Links = shown.Select(e => (Name: NameOf(e), Anchor: Anchors.InFull(data).GetValueOrDefault(e.Plan.Code))).Where(l => l.Anchor is not null).DistinctBy(l => l.Name).ToDictionary(l => l.Name, l => l.Anchor!, StringComparer.Ordinal),
            MaySort = false,
            AsCards = true,
            Below = ["From, to: the interval of the difference, which accounts for the selection of the survivors; none where the follow-up gives none for these two groups, as said under Survivors. Differences of what was selected look larger than they are."],
        };
    }

    private static Cell[] Row(SurvivorData survivors, ExperimentResult e)
    {
        Cell named = Cell.Text(NameOf(e));
        Cell unit = Cell.Text(Shorten(e.Plan.Unit, LongestName)), p = Cell.P(e.AdjustedP);
        if (survivors.Leading(e) is { } leading)
        {
            return
            [
                named, Cell.Text($"{Shorten(leading.GroupB, LongestName)} less {Shorten(leading.GroupA, LongestName)}"), Rounded(leading.Comparison.Difference), unit,
                Rounded(leading.SelectedInterval?.Lower), Rounded(leading.SelectedInterval?.Upper), p,
            ];
        }

        WidestGap? gap = survivors.Gaps.GetValueOrDefault(e.Plan.Code);
        Interval? interval = gap is null ? null : SurvivorData.OfGap(gap, survivors.Comparisons[e.Plan.Code]);
        return
        [
            named, Cell.Text(gap is null ? null : $"no pair claimed; widest gap: {Shorten(gap.Highest, LongestName)} less {Shorten(gap.Lowest, LongestName)}"), Rounded(gap?.Difference), unit,
            Rounded(interval?.Lower), Rounded(interval?.Upper), p,
        ];
    }

    private static string NameOf(ExperimentResult e) =>
        e.Plan.Title.Length > 0 ? $"{Shorten(e.Plan.Code, LongestName)}: {Shorten(e.Plan.Title, LongestName)}" : Shorten(e.Plan.Code, LongestName);

    /// <summary>Three digits carry what a decision needs; the full record has the others.</summary>
    private static Cell Rounded(double? value) => value is { } given && Math.Abs(given) < double.MaxValue ? Cell.Shown(given, v => NumberText.Screen(v, 3)) : Cell.Empty;

    private static IEnumerable<string> Risked(ReportData data)
    {
        CampaignOverview overview = data.Overview;
        yield return $"{Sentence.Start(CampaignText.Goal(overview.Campaign))}, over {Counted.Of(overview.FamilySize, "experiment")}. {RiskTable.Held(overview)}";
        yield return RiskTable.Sentences(overview)[0];
        if (RiskTable.MayBeFalse(data.Risk) is { Count: > 0 } sentences)
        {
            yield return string.Join(" ", sentences);
        }
    }

    /// <summary>Cautions as far as there is room, at least one.</summary>
    private static IEnumerable<string> Careful(ReportData data, SheetRoom room)
    {
        IReadOnlyList<string> all = CautionsSection.All(data);
        if (all.Count == 0)
        {
            room.Take(SheetRoom.Of(CautionText.Nothing));
            yield return CautionText.Nothing;
            yield break;
        }

        for (int i = 0; i < all.Count; i++)
        {
            string caution = Shorten(all[i], LongestCaution);
            int lines = SheetRoom.Of(caution);
            if (i > 0 && room.Left < lines + 1)
            {
                yield return FormattableString.Invariant($"{all.Count - i} more stand under Cautions.");
                yield break;
            }

            room.Take(lines);
            yield return caution;
        }
    }

    /// <summary>Lines of a row, whose first two columns may be wrapped.</summary>
    private static double LinesOf(Cell[] row) => Math.Max(SheetRoom.Of(row[0].AsText, LettersOfName), SheetRoom.Of(row[1].AsText, LettersOfGroups)) * RowHeight + RowFrame;

    /// <summary>A text as far as there is room for it, cut between words; all of it stands in the full record.</summary>
    private static string Shorten(string text, int longest)
    {
        if (text.Length <= longest)
        {
            return text;
        }

        int end = text.LastIndexOf(' ', longest - 1);
        end = end > longest / 2 ? end : char.IsHighSurrogate(text[longest - 2]) ? longest - 2 : longest - 1;
        return text[..end].TrimEnd() + "\u2026";
    }
}
