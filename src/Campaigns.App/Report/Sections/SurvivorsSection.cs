using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>The survivors with effect, and the comparisons claimed inside them.</summary>
internal sealed class SurvivorsSection : ReportSection
{
    public override string Anchor => "survivors";

    public override string Title => "Survivors";

    public override bool Concerns(ReportData data) => data.Overview.TestedCount > 0 || data.Survivors.Listed.Count > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        IReadOnlyDictionary<string, string> links = Anchors.InFull(data);
        yield return new FigureBlock(SurvivorsFigure.Of(data.Standing));
        RowTable rows = SurvivorTables.Rows(data.Survivors);
        rows = rows with { Columns = [.. rows.Columns.Select(WithEtaSquared)], Below = [.. Meanings(data), .. rows.Below] };
        yield return TableBlock.Of("Survivors, the smallest p first", rows).WithoutEmptyColumns() with { Links = links };
        if (data.Survivors.Listed.Count > 0)
        {
            IEnumerable<ExperimentComparison> claimed = data.Survivors.Listed.SelectMany(e => data.Survivors.Comparisons[e.Plan.Code]).Where(c => c.Survives == true);
            RowTable claims = SurvivorTables.Claims(data.Survivors);
            claims = claims with { Above = [], Below = [.. SelectedWording.WithoutInterval(claimed), .. claims.Below] };
            yield return TableBlock.Of("Comparisons claimed inside the survivors", claims).WithoutEmptyColumns() with { Links = links };
        }
    }

    /// <summary>A page has room for what a terminal leaves to files: eta squared with the interval that the figure draws.</summary>
    private static Column WithEtaSquared(Column column) => column.Name switch
    {
        "eta_squared" => column with { Heading = "eta squared" },
        "eta_squared_lower" => column with { Heading = "eta squared lower" },
        "eta_squared_upper" => column with { Heading = "eta squared upper" },
        _ => column,
    };

    private static IEnumerable<string> Meanings(ReportData data)
    {
        if (data.Survivors.Listed.Count > 0)
        {
            yield return "Eta squared: the share of the variation that lies between groups; its lower and upper end, from the noncentral F law, account for the selection of the survivors and assume equal spreads.";
        }

        foreach (string sentence in SelectedWording.WithoutGapInterval(data.Survivors).Concat(SelectedWording.WithoutEffectInterval(data.Standing, data.Survivors.Listed)))
        {
            yield return sentence;
        }
    }
}
