using Campaigns.Catalog;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;

namespace Campaigns.App.Dashboard;

/// <summary>The checks of the survivors of a campaign: those are what is carried forward, and checks cost reading every value.</summary>
/// <param name="Checked">Survivors whose checks were made.</param>
/// <param name="Warning">Those of them in which a check warns, in the plan's order, with what warns.</param>
public sealed record SurvivorChecks(int Checked, IReadOnlyList<(string Experiment, IReadOnlyList<CheckLine> Warnings)> Warning)
{
    private const int Often = 16;

    /// <summary>Makes the checks one experiment after the other.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="read">Reads an experiment of it in full.</param>
    /// <param name="progress">Told now and then how far it is.</param>
    /// <param name="stop">Ends it between two experiments.</param>
    /// <exception cref="OperationCanceledException">It was stopped.</exception>
    public static SurvivorChecks Of(CampaignStanding standing, Func<CampaignStanding, string, ExperimentDetail> read, Action<WorkProgress> progress, CancellationToken stop)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(read);
        ArgumentNullException.ThrowIfNull(progress);
        ExperimentResult[] survivors = [.. standing.Experiments.Where(e => e.Survives == true)];
        List<(string, IReadOnlyList<CheckLine>)> warning = [];
        for (int i = 0; i < survivors.Length; i++)
        {
            stop.ThrowIfCancellationRequested();
            if (i % Often == 0)
            {
                progress(new WorkProgress("checking", i, survivors.Length, "survivors"));
            }

            string code = survivors[i].Plan.Code;
            CheckLine[] warnings = [.. read(standing, code).Analysis.Checks.Where(c => c.Finding.Verdict == CheckVerdict.Warns)];
            if (warnings.Length > 0)
            {
                warning.Add((code, warnings));
            }
        }

        return new SurvivorChecks(survivors.Length, warning);
    }
}
