namespace Campaigns.Domain;

/// <summary>How far an experiment has come when its plan is to be amended.</summary>
/// <param name="HasData">Whether it has data.</param>
/// <param name="IsTested">Whether it was tested.</param>
public readonly record struct ExperimentProgress(bool HasData, bool IsTested);

/// <summary>What an amendment may change in a sealed plan.</summary>
/// <remarks>
/// What decides over other experiments (weight, family, shared control, what a confirmation confirms) is fixed by the seal for ever: chosen after results were seen, it would hold no error rate.
/// What decides over the experiment alone may change until its own test, its groups until its own data. The rest describes. An experiment may be added: its family grows, which costs the others.
/// </remarks>
public static class AmendmentRule
{
    private static readonly string[] Never = ["weight", "family", "confirms", "shared_control"];
    private static readonly string[] UntilTested = ["control", "test", "follow_up"];

    /// <summary>What stands against a change of an experiment, a sentence for each field.</summary>
    /// <param name="before">Its plan as it stands, groups that came with the data left out.</param>
    /// <param name="after">Its plan as it is to be.</param>
    /// <param name="progress">How far it has come.</param>
    public static IEnumerable<string> Problems(PlannedExperiment before, PlannedExperiment after, ExperimentProgress progress)
    {
        ArgumentNullException.ThrowIfNull(after);
        foreach ((string field, string? was, string? asked) in PlanFields.Differences(before, after))
        {
            string what = $"{after.Code}: {field} stays {(was is null ? "empty" : $"'{was}'")}{(asked is null ? "" : $", not '{asked}'")}";
            if (Never.Contains(field))
            {
                yield return $"{what}: it decides over other experiments too, and the seal fixed it before their results. Open a new campaign for another.";
            }
            else if (field == "groups" && progress.HasData)
            {
                yield return $"{what}: the experiment has data, which are stored by its groups. Add a new experiment for other groups.";
            }
            else if (UntilTested.Contains(field) && progress.IsTested)
            {
                yield return $"{what}: the experiment was tested, and a test that is chosen after its result is no planned test. Add a new experiment, with new data.";
            }
        }
    }

    /// <summary>What stands against adding an experiment.</summary>
    /// <param name="campaign">The sealed campaign.</param>
    /// <param name="added">The experiment.</param>
    public static IEnumerable<string> Problems(Campaign campaign, PlannedExperiment added)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(added);
        string families = string.Join(", ", campaign.Families.Select(f => f.Name));
        if (campaign.Families.Count == 0 && added.Family is not null)
        {
            yield return $"{added.Code}: the sealed plan of '{campaign.Code}' has one family without a name, so a new experiment cannot name '{added.Family}'. Leave the family out, or open a new campaign.";
        }
        else if (campaign.Families.Count > 0 && campaign.Families.All(f => f.Name != (added.Family ?? "")))
        {
            yield return $"{added.Code}: {(added.Family is null ? "it names no family" : $"the sealed plan has no family '{added.Family}'")}; a new experiment joins one that was sealed: {families}.";
        }
    }
}
