using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Wording;

/// <summary>What is said about the families of a campaign, the same on paper and on screen.</summary>
internal static class FamilyText
{
    private const int LongestLevel = 8;

    /// <summary>What is corrected how, and what that holds: a line for the one family of a campaign, or one for each family and what they hold together.</summary>
    public static IEnumerable<string> Lines(CampaignOverview standing)
    {
        Campaign campaign = standing.Campaign;
        if (campaign.JudgedFamilies.Count == 0)
        {
            ErrorProcedure correction = FamilyVerdict.ProcedureOf(campaign);
            return [FormattableString.Invariant($"{correction.Name} at {campaign.Level} over a family of {standing.FamilySize} ({standing.TestedCount} with a result; the others count as p = 1). {correction.Guarantee}"), .. Warnings(standing)];
        }

        return [.. standing.Families.Select(f => Line(campaign, f)), .. Guarantees(standing), Together(standing), .. Warnings(standing)];
    }

    /// <summary>For example "Family main: Holm at 0.03 over 12 planned, 10 tested; open."</summary>
    public static string Line(Campaign campaign, FamilyStanding family)
    {
        string gate = family.Waits is { } waits ? $" ({waits})" : "";
        string state = family.IsOpen ? $"open{gate}" : $"closed{gate}, so that none of its experiments survives before, and every adjusted p is 1";
        string others = family.Tested == family.Planned ? "" : family.Size == family.Planned ? " (the others count as p = 1)" : " (interim: the others are not counted)";
        return FormattableString.Invariant($"Family {family.Name}: {ProcedureOf(campaign, family).Name} at {Level(family.Level)} over {family.Planned} planned, {family.Tested} tested{others}; {state}.");
    }

    /// <summary>What each procedure promises for the family in which it is used.</summary>
    public static IEnumerable<string> Guarantees(CampaignOverview standing) =>
        standing.Families.Select(f => ProcedureOf(standing.Campaign, f)).DistinctBy(p => p.Key).Select(p => $"{p.Name}, in its family: {char.ToLowerInvariant(p.Guarantee[0])}{p.Guarantee[1..]}");

    /// <summary>What the families hold together.</summary>
    public static string Together(CampaignOverview standing)
    {
        Campaign campaign = standing.Campaign;
        if (campaign.ErrorRate != ErrorRate.Familywise)
        {
            return standing.Families.Any(f => ProcedureOf(campaign, f).Controls == ErrorRate.PerTest)
                ? "A family without a correction holds no rate, so that nothing is held over all families together."
                : "Each family holds a false discovery rate of its own: rates held in families do not bound the share of false ones among all their survivors together.";
        }

        return standing.Families.All(f => ProcedureOf(campaign, f).Controls == ErrorRate.Familywise)
            ? $"Over all families together the probability of at least one false survivor is at most {campaign.Level}, where what each procedure assumes holds: their levels add up to no more, where a family that waits for all of another to survive shares that one's level."
            : "Not every family is corrected by a procedure that holds the familywise error rate, so that nothing is held over all families together.";
    }

    /// <summary>A warning for every family whose procedure does not cover experiments that share a control, batch or instrument, or needs more experiments.</summary>
    public static IEnumerable<string> Warnings(CampaignOverview standing) => Warnings(standing.Campaign, standing.Families);

    /// <summary>A warning for every family whose procedure does not cover experiments that share a control, batch or instrument, or needs more experiments.</summary>
    public static IEnumerable<string> Warnings(Campaign campaign, IReadOnlyList<FamilyStanding> families) =>
        families.SelectMany(f => (string?[])[SharedControls.Warning(ProcedureOf(campaign, f), f.Name, f.Sharing), FewExperiments.Warning(ProcedureOf(campaign, f), f.Name, f.Planned)]).OfType<string>();

    /// <summary>The procedures of a campaign by name, each once, for example "Holm and Hommel, in 3 families".</summary>
    public static string Procedures(Campaign campaign)
    {
        if (campaign.JudgedFamilies.Count == 0)
        {
            return FamilyVerdict.ProcedureOf(campaign).Name;
        }

        string[] names = [.. campaign.JudgedFamilies.Select(f => FamilyVerdict.ProcedureOf(campaign, f).Name).Distinct(StringComparer.Ordinal)];
        string all = names.Length == 1 ? names[0] : $"{string.Join(", ", names[..^1])} and {names[^1]}";
        return FormattableString.Invariant($"{all}, in {campaign.JudgedFamilies.Count} {(campaign.JudgedFamilies.Count == 1 ? "family" : "families")}");
    }

    /// <summary>That the planned experiments of a table are without those that left their family; empty where none did.</summary>
    public static IEnumerable<string> WithoutLeavers(CampaignOverview standing) => standing.Withdrawn.Left == 0 ? []
        : [$"Planned leaves out {Counted.Of(standing.Withdrawn.Left, "experiment")} that left {Counted.Word(standing.Withdrawn.Left, "its", "their")} family, withdrawn before any data."];

    /// <summary>A level as it was typed, or a share of one with four digits.</summary>
    public static string Level(SignificanceLevel level) => level.ToString() is { Length: <= LongestLevel } typed ? typed : NumberText.Screen(level.Value, 4);

    private static ErrorProcedure ProcedureOf(Campaign campaign, FamilyStanding family) =>
        CorrectionRegistry.Find(family.Correction) ?? FamilyVerdict.ProcedureOf(campaign);
}
