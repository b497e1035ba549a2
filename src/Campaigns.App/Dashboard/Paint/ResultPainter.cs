using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints what came out of an experiment, and a line on each thing below that may change how it is read.</summary>
internal static class ResultPainter
{
    /// <summary>Plan, test, p and verdict.</summary>
    public static void Result(DetailSheet sheet, ExperimentResult result, CampaignHeading heading)
    {
        PlannedExperiment plan = result.Plan;
        sheet.Line(plan.Title.Length > 0 ? $"{plan.Code}: {plan.Title}" : plan.Code, Ink.Heading);
        string unit = plan.Unit.Length > 0 ? $" ({plan.Unit})" : "";
        if (plan.Response.Length > 0)
        {
            sheet.Line("response: " + plan.Response + unit, Ink.Quiet);
        }

        sheet.Line($"test: {GroupTestRegistry.Find(plan.Test)?.Name ?? plan.Test}; follow-up: {FollowUpRegistry.Find(plan.FollowUp)?.Name ?? plan.FollowUp}", Ink.Quiet);
        if (result is { Statistic: { } statistic, P: { } p })
        {
            sheet.Line(StatisticText(statistic, result.Df1, result.Df2));
            sheet.Line($"p {NumberText.P(p)}" + (result.AdjustedP is { } adjusted ? $", adjusted {NumberText.P(adjusted)}" : ""));
        }

        if (OnlineText.Decision(result.Entry) is { } decision)
        {
            sheet.Line(decision);
        }

        if (result.Family is { Name.Length: > 0 } family)
        {
            sheet.Line($"family {family.Name}: level {FamilyText.Level(family.Level)}" + (family.Waits is { } waits ? $", {(family.IsOpen ? "open" : "closed")}, {waits}" : ""), Ink.Quiet);
        }

        string held = string.Join(", ", heading.Held);
        (string sign, string sentence, Ink ink) = result.Survives switch
        {
            true => (sheet.Glyphs.Survivor, $"survives ({held})", Ink.Survivor),
            false => (sheet.Glyphs.Other, $"does not survive ({held})", Ink.Text),
            null => (sheet.Glyphs.Open, result.Status.Sentence(), Ink.Open),
        };
        sheet.Marked(sign, sentence, ink);
    }

    /// <summary>Arrangements, units, deviations, exclusions, checks and comparisons, a line each where there is something to say.</summary>
    public static void Glance(DetailSheet sheet, ExperimentDetail detail, CampaignStanding standing)
    {
        if (detail.Result.Resampling is { } resampling)
        {
            sheet.Line(ResamplingText.Sentence(resampling));
            if (ResamplingText.TooCoarse(resampling, standing.FamilyOf(detail.Result), detail.Result.GivenLevel) is { } warning)
            {
                sheet.Marked(sheet.Glyphs.Warns, warning, Ink.Warning);
            }
        }

        if (detail.Analysis.UnitsNote is { } note)
        {
            // Averaged specimens are a fact; values that look like unmarked readings are a warning.
            sheet.Marked(detail.Analysis.Specimens is null ? sheet.Glyphs.Warns : sheet.Glyphs.Between, note, detail.Analysis.Specimens is null ? Ink.Warning : Ink.Text);
        }

        if (detail.Result.Confirmation is { } confirmation)
        {
            (string sign, Ink ink) = confirmation.IsReplicated switch { true => (sheet.Glyphs.Survivor, Ink.Survivor), false => (sheet.Glyphs.Other, Ink.Text), null => (sheet.Glyphs.Open, Ink.Open) };
            sheet.Marked(sign, ConfirmationText.Sentence(detail.Result), ink);
        }

        foreach (string clause in detail.Result.Amendments)
        {
            sheet.Marked(sheet.Glyphs.Warns, ExperimentWording.Deviation(clause), Ink.Warning);
        }

        string[] warned = [.. detail.Analysis.Checks.Where(c => c.Finding.Verdict == CheckVerdict.Warns).Select(c => c.Name)];
        if (warned.Length > 0)
        {
            sheet.Marked(sheet.Glyphs.Warns, $"{(warned.Length == 1 ? "1 check warns" : DetailSheet.Whole(warned.Length) + " checks warn")}: {string.Join("; ", warned)}. More below.", Ink.Warning);
        }

        if (detail.Comparisons.Count > 0)
        {
            int claimed = detail.Comparisons.Count(c => c.Survives == true);
            sheet.Marked(claimed > 0 ? sheet.Glyphs.Survivor : sheet.Glyphs.Other, $"{DetailSheet.Whole(claimed)} of {DetailSheet.Whole(detail.Comparisons.Count)} comparisons claimed", claimed > 0 ? Ink.Survivor : Ink.Text);
        }
    }

    /// <summary>A statistic with its degrees of freedom.</summary>
    public static string StatisticText(double statistic, double? df1, double? df2) => $"statistic {DetailSheet.Number(statistic)}" + (df1, df2) switch
    {
        ({ } first, { } second) => $" on {Freedom(first)} and {Freedom(second)} degrees of freedom",
        ({ } first, null) => $" on {Freedom(first)} degrees of freedom",
        _ => "",
    };

    /// <summary>A test outcome in a clause.</summary>
    public static string OutcomeText(TestOutcome outcome) => outcome is Tested t
        ? $"{StatisticText(t.Statistic, t.Df1, t.Df2)}, p {NumberText.P(t.P)}"
        : ExperimentStatusWords.Of(((NotTestable)outcome).Reason).Sentence();

    private static string Freedom(double df) => df == Math.Floor(df) ? NumberText.RoundTrip(df) : DetailSheet.Number(df);
}
