using Campaigns.App.Output;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>What people read around the table of a planned campaign.</summary>
internal static class SizeCampaignText
{
    private const int MostSentences = 3;

    public static IEnumerable<string> Above(SizeCampaignQuestion question, IReadOnlyList<SizeCampaignAnswer> answers)
    {
        yield return Campaign(answers);
        SizeCampaignAnswer[] told = answers.Count <= MostSentences ? [.. answers] : [answers.FirstOrDefault(a => a.Correction is BenjaminiHochberg) ?? answers[0]];
        foreach (SizeCampaignAnswer answer in told)
        {
            yield return (told.Length < answers.Count ? "For example: " : "") + Sentence(question, answer);
        }
    }

    public static IEnumerable<string> Below(SizeCampaignQuestion question, IReadOnlyList<SizeCampaignAnswer> answers)
    {
        yield return "Survivors: expected number, true ones with and false ones without a real effect. Found: the share of the real effects that survives on average. Any true, any false: probability of at least one such survivor. False share: expected share of false ones among the survivors, 0 where none survives. Exact for this number of experiments, unless simulated.";
        if (answers.FirstOrDefault(a => !a.Expected.IsExact) is { } drawn)
        {
            string keys = string.Join(", ", answers.Where(a => !a.Expected.IsExact).Select(a => a.Correction.Key).Distinct(StringComparer.Ordinal));
            yield return FormattableString.Invariant($"Simulated: {keys}, {drawn.Expected.Errors!.Draws} campaigns drawn with seed {question.Campaign.Seed}; +- is the standard error of the share found, csv and json have that of every value.")
                + (question.AsksReplicates ? " Their replicates are the least at which the estimate reaches what was wanted; one more or less may be as right." : "");
        }

        foreach (string sentence in answers.Where(a => a.Correction is BenjaminiHochberg).SelectMany(Vast).Distinct(StringComparer.Ordinal).Take(MostSentences))
        {
            yield return sentence;
        }

        yield return "Assumed: every real effect is as large as the one given, all others are none; independent experiments, each with the F test of normally distributed values, the same standard deviation in every group, and specimens, not repeated readings, counted as observations. No guarantee for an effect that was guessed: if the true ones are smaller, fewer are found.";
        yield return "Choose the correction now and seal it: what is compared here holds for a choice made before the data.";
    }

    /// <summary>A probability or a share, never a rounded 1 for what is less; what was seen in none or in all of n draws is bounded by 3/n, which leaves 5 % of doubt.</summary>
    /// <param name="value">In [0, 1].</param>
    /// <param name="draws">Campaigns that were drawn; null for an exact value.</param>
    public static string Probability(double value, int? draws) =>
        value > 0.9999 ? ">" + NumberText.Screen(Math.Min(0.9999, 1 - (3.0 / (draws ?? int.MaxValue))), 4)
        : value == 0 && draws is { } none ? "<" + NumberText.Screen(3.0 / none, 2)
        : NumberText.Screen(value, 4);

    private static string Campaign(IReadOnlyList<SizeCampaignAnswer> answers)
    {
        SizeCampaignAnswer first = answers[0];
        CampaignDesign campaign = first.Campaign;
        string many = answers.Select(a => a.Campaign.ShareReal).Distinct().Count() > 1 ? "some of them with a real effect"
            : campaign.Real.Number is { } number ? FormattableString.Invariant($"{number} of them with a real effect")
            : FormattableString.Invariant($"each with a real effect with probability {NumberText.RoundTrip(campaign.ShareReal)}, so {Number(campaign.ExpectedReal)} of them on average");
        string effect = answers.Select(a => a.Effect).Distinct().Count() > 1 ? "" : $" of f = {SizeTable.Text(first.Effect)}{Apart(first)}";
        string design = answers.Select(a => a.Campaign.Experiment).Distinct().Count() > 1 ? FormattableString.Invariant($"{campaign.Experiment.GroupCount} groups")
            : first.Replicates is { } n ? FormattableString.Invariant($"{campaign.Experiment.GroupCount} groups of {n} observations, {campaign.Experiment.Observations * campaign.Experiments} observations in the whole campaign")
            : FormattableString.Invariant($"{campaign.Experiment.GroupCount} groups, {campaign.Experiment.Observations} observations, {campaign.Experiment.Observations * campaign.Experiments} in the whole campaign");
        return FormattableString.Invariant($"{campaign.Experiments} experiments, {many}{effect}. Each experiment: {design}.");
    }

    private static string Apart(SizeCampaignAnswer answer) =>
        answer.LargestDifference is { } apart and > 0 ? $" (two means up to {SizeTable.Text(apart)} apart)" : "";

    private static string Sentence(SizeCampaignQuestion question, SizeCampaignAnswer answer)
    {
        CampaignExpectation expected = answer.Expected;
        double real = answer.Campaign.ExpectedReal;
        string found = real > 0
            ? $"of {Number(real)} real effects about {Number(expected.TrueSurvivors)} would be found ({Percent(expected.ShareFound!.Value)})"
            : "there is no real effect to find";
        string replicates = question.AsksReplicates
            ? FormattableString.Invariant($" with {answer.Replicates} replicates in each group, {answer.Campaign.Experiment.Observations * answer.Campaign.Experiments} observations in all")
                + (answer.Replicates > 2 ? ", and one replicate less in each group does not reach what was wanted" : "")
            : "";
        return $"{answer.Correction.Name} at level {answer.Level}: {found}{replicates}; about {Number(expected.Survivors)} survivors are expected, {Number(expected.FalseSurvivors)} of them false. At least one true survivor: probability {Probability(expected.AnyTrue, expected.Errors?.Draws)}; at least one false one: {Probability(expected.AnyFalse, expected.Errors?.Draws)}.";
    }

    /// <summary>The approximation for vast campaigns, never without what it lacks.</summary>
    private static IEnumerable<string> Vast(SizeCampaignAnswer answer)
    {
        if (answer.Expected.ShareFound is not { } found || answer.LargeCampaignTrue is not { } vast)
        {
            yield break;
        }

        (CampaignDesign campaign, SignificanceLevel level) = (answer.Campaign, answer.Level);
        string where = answer.Replicates is { } n ? FormattableString.Invariant($"with {n} replicates ") : "";
        if (LargeCampaign.SizeHelps(campaign, level))
        {
            bool isNear = Math.Abs(answer.Expected.TrueSurvivors - vast) < 0.01 * vast;
            yield return $"If vast: {where}in ever larger campaigns of this kind bh finds {Percent(vast / campaign.ExpectedReal)} of the real effects, in this one {Percent(found)}."
                + (isNear ? "" : $" Taken for this campaign, that approximation has {Number(vast)} true survivors instead of {Number(answer.Expected.TrueSurvivors)}: it leaves out that a lucky survivor lowers the bar for the next.");
            yield break;
        }

        double slope = LargeCampaign.SlopeAtZero(campaign.Experiment, campaign.Noncentrality);
        string enough = answer.Replicates is not null && LeastReplicates(answer) is { } least ? FormattableString.Invariant($" From {least} replicates on size helps.") : " Larger effects or more observations would change that.";
        yield return $"If vast: {where}a larger campaign does not help under bh; the larger it is, the smaller the share of real effects found, down to none. A real effect is at most {Number(slope)} times as likely to pass a strict level as a false one, and more than {Number(LargeCampaign.CriticalSlope(campaign, level))} times would be needed.{enough}";
    }

    private static int? LeastReplicates(SizeCampaignAnswer answer)
    {
        (CampaignDesign campaign, int groups) = (answer.Campaign, answer.Campaign.Experiment.GroupCount);
        return CampaignReplicates.Smallest(n =>
        {
            var design = OneWayDesign.Balanced(groups, n);
            return LargeCampaign.SizeHelps(new CampaignDesign(campaign.Experiments, campaign.Real, design, Math.Min(double.MaxValue, OneWayPower.Noncentrality(design, answer.Effect))), answer.Level);
        });
    }

    private static string Number(double value) => SizeTable.Text(value, 3);

    /// <summary>Never a rounded 0 % or 100 % for what is neither.</summary>
    private static string Percent(double share) =>
        share > 0.9995 && share < 1 ? "more than 99.9 %" : share == 0 ? "none" : $"{SizeTable.Text(100 * share, 3)} %";
}
