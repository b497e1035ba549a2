using System.CommandLine;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Planning;

namespace Campaigns.App.Commands;

/// <summary>The options of size that describe a whole campaign.</summary>
internal sealed class SizeCampaignOptions
{
    private const int MostExperiments = 1_000_000;
    private const int UsualDraws = 2_000;

    private readonly Option<int?> _experiments = TypedOptions.WholeOrNone("--campaign", 1, "Experiments of a whole campaign: says what every correction finds in it.");
    private readonly Option<double[]?> _shares = NumberLists.Reals("--share-real", "P,...", "With --campaign: the probability with which an experiment has the effect.", 0, 1);
    private readonly Option<int[]?> _numbers = NumberLists.Wholes("--real", "N,...", "With --campaign: the fixed number of experiments that have the effect, instead of a share.", 0, MostExperiments);
    private readonly Option<double[]?> _wanted = NumberLists.Reals("--wanted", "P,...", "With --campaign: the share of the real effects that is to be found; gives the replicates.", 0, 1);
    private readonly Option<string?> _corrections = new("--correction") { Description = "With --campaign: keys of the corrections, separated by commas (else all batch corrections that need no weights; online procedures are drawn when named).", HelpName = "KEY,KEY" };
    private readonly Option<int?> _draws = TypedOptions.WholeOrNone("--draws", 100, "With --campaign: campaigns to draw where no exact law is known (else 2000).");
    private readonly Option<int?> _seed = TypedOptions.WholeOrNone("--seed", 0, "With --campaign: seed of the drawn campaigns (else 1).");

    private IEnumerable<Option> All => [_experiments, _shares, _numbers, _wanted, _corrections, _draws, _seed];

    public void AddTo(Command command)
    {
        foreach (Option option in All)
        {
            command.Add(option);
        }
    }

    /// <summary>The campaign that was typed; null where none was.</summary>
    public SizeCampaign? Read(Session session)
    {
        if (session.Typed.GetValue(_experiments) is not { } experiments)
        {
            return All.FirstOrDefault(o => session.Typed.GetResult(o) is not null) is { } stray
                ? throw new UsageException($"{stray.Name} describes a whole campaign; give its experiments with --campaign, or leave {stray.Name} out.")
                : null;
        }

        if (experiments > MostExperiments)
        {
            throw new UsageException(FormattableString.Invariant($"--campaign takes a whole number from 1 to {MostExperiments}."));
        }

        return new SizeCampaign(
            experiments,
            Real(NumberLists.Given(session, _shares), NumberLists.Given(session, _numbers), experiments),
            NumberLists.Given(session, _wanted) ?? [],
            Chosen(session.Typed.GetValue(_corrections)),
            session.Typed.GetValue(_draws) ?? UsualDraws,
            session.Typed.GetValue(_seed) ?? 1);
    }

    private static IReadOnlyList<RealEffects> Real(double[]? shares, int[]? numbers, int experiments)
    {
        if (shares is null == numbers is null)
        {
            throw new UsageException("How many of the effects are real is to be given once: as a share with --share-real, for example 0.3, or as a number with --real.");
        }

        return numbers?.FirstOrDefault(n => n > experiments) is int more and > 0
            ? throw new UsageException(FormattableString.Invariant($"--real {more} is more than the {experiments} experiments of --campaign."))
            : [.. shares?.Select(RealEffects.OfShare) ?? numbers!.Select(RealEffects.OfNumber)];
    }

    private static IReadOnlyList<ErrorProcedure> Chosen(string? keys)
    {
        if (keys is null)
        {
            return CorrectionRegistry.FromPAlone;
        }

        string[] typed = keys.Split(',', StringSplitOptions.TrimEntries);
        ErrorProcedure[] known = [.. CorrectionRegistry.FromPAlone, .. OnlineRegistry.All];
        foreach (string key in typed.Where(k => known.All(c => c.Key != k)))
        {
            string[] names = [.. known.Select(c => c.Key)];
            string near = Nearest.Of(key, names) is { } nearest ? $" (did you mean '{nearest}'?)" : "";
            throw new UsageException($"There is no correction '{key}' to plan with{near}; known are {string.Join(", ", names)}.");
        }

        return [.. known.Where(c => typed.Contains(c.Key, StringComparer.Ordinal))];
    }
}
