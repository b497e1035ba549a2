using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>What a plan may name as confirmed: another experiment that was registered earlier, and that confirms none itself.</summary>
internal sealed class ConfirmsRule(Catalog catalog, StoredCampaign stored)
{
    /// <summary>Looks at a plan that was just written, inside its transaction.</summary>
    /// <param name="plan">The experiments registered.</param>
    /// <exception cref="RefusedException">One of them names what it may not; all such are listed.</exception>
    public void Check(IReadOnlyList<PlannedExperiment> plan)
    {
        if (plan.All(e => e.Confirms is null))
        {
            return;
        }

        HashSet<long> confirmed = Confirmed();
        using var known = new ConfirmedExperiments(catalog);
        string[] problems = [.. plan.Where(e => e.Confirms is not null).Select(e => Problem(e, known, confirmed)).OfType<string>()];
        if (problems.Length > 0)
        {
            throw new RefusedException(FormattableString.Invariant($"The plan of '{stored.Campaign.Code}' was refused because of its column confirms; nothing was changed. Problems: {problems.Length}."), problems);
        }
    }

    private string? Problem(PlannedExperiment experiment, ConfirmedExperiments known, HashSet<long> confirmed)
    {
        string reference = experiment.Confirms!;
        ConfirmedExperiment own = known.Find(stored.Id, experiment.Code)!;
        if (known.Find(stored.Id, reference) is not { } first)
        {
            return $"{experiment.Code}: there is no experiment '{reference}' to confirm{Hint(reference, known)}; name one of this campaign, or CAMPAIGN/EXPERIMENT of another campaign in this catalog.";
        }

        return first.Id == own.Id ? $"{experiment.Code}: an experiment cannot confirm itself; name the earlier one."
            : first.Confirms is not null && known.Find(first.CampaignId, first.Confirms) is { } origin ? $"{experiment.Code}: '{reference}' confirms '{Name(origin)}' itself; name '{Name(origin)}', so that every confirmation is held against the first experiment."
            : confirmed.Contains(own.Id) ? $"{experiment.Code}: it is confirmed by another experiment, so it cannot confirm '{reference}'; let that one name '{reference}'."
            : first.CampaignId == own.CampaignId && first.Id > own.Id ? $"{experiment.Code}: '{reference}' is registered after it; put the row of the experiment that is confirmed above the row of the one that confirms it."
            : null;
    }

    /// <summary>As a plan of this campaign would name it.</summary>
    private string Name(ConfirmedExperiment experiment) => experiment.CampaignId == stored.Id ? experiment.Code : $"{experiment.Campaign}/{experiment.Code}";

    private string Hint(string reference, ConfirmedExperiments known)
    {
        (string campaign, string code) = ConfirmedExperiments.Split(reference) is { } parts && known.HasCampaign(parts.Campaign) ? parts : (stored.Campaign.Code, reference);
        string[] codes = [.. new PlanStore(catalog).Codes(new CampaignStore(catalog).Get(campaign).Id).Values];
        return Nearest.Of(code, codes) is { } near ? $" (did you mean '{(campaign == stored.Campaign.Code ? near : $"{campaign}/{near}")}'?)" : "";
    }

    /// <summary>Keys of all experiments of the catalog that are confirmed by another.</summary>
    private HashSet<long> Confirmed()
    {
        using var known = new ConfirmedExperiments(catalog);
        using SqliteStatement select = catalog.Prepare("SELECT campaign_id, confirms FROM experiments INDEXED BY ix_experiments_confirms WHERE confirms IS NOT NULL");
        var confirmed = new HashSet<long>();
        while (select.Read())
        {
            if (known.Find(select.Integer(0), select.Text(1)) is { } first)
            {
                confirmed.Add(first.Id);
            }
        }

        return confirmed;
    }
}
