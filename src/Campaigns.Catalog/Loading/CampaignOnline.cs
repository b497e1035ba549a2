using Campaigns.Domain;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Loading;

/// <summary>What a campaign's own file says of its online procedure: horizon, shape, initialWealth, lambda, tau.</summary>
internal static class CampaignOnline
{
    /// <summary>The keys of the object that only an online procedure takes.</summary>
    public static IReadOnlyList<string> Keys { get; } = ["horizon", "shape", "initialWealth", "lambda", "tau"];

    /// <summary>Reads them, and refuses what does not fit the procedure.</summary>
    /// <param name="json">The file.</param>
    /// <param name="correction">The key that it names.</param>
    /// <param name="level">Its level.</param>
    /// <returns>Null where the file says nothing.</returns>
    public static OnlineOptions? Read(CampaignJson json, string correction, SignificanceLevel level)
    {
        string[] given = [.. Keys.Where(json.Has)];
        OnlineProcedure? procedure = OnlineRegistry.Find(correction);
        if (procedure is null)
        {
            foreach (string key in given)
            {
                json.Refuse(key, "not-online", $"\"{key}\" belongs to procedures that decide as experiments arrive ({string.Join(", ", OnlineRegistry.All.Select(p => p.Key))}), and \"correction\" names none of them: leave it out.");
            }

            return null;
        }

        var options = new OnlineOptions(
            Horizon(json), Shape(json), Number(json, "initialWealth"), Number(json, "lambda"), Number(json, "tau"));
        try
        {
            OnlineVerdict.Settings(procedure, level, options, planned: 1);
        }
        catch (RefusedException error)
        {
            json.Refuse(given.Length > 0 ? given[0] : "correction", "bad-online-setting", error.Message);
        }

        return given.Length == 0 ? null : options;
    }

    private static int? Horizon(CampaignJson json)
    {
        if (!json.Has("horizon"))
        {
            return null;
        }

        if (json.IsText("horizon"))
        {
            if (json.Line("horizon", 100) != "none")
            {
                json.Refuse("horizon", "bad-horizon", "\"horizon\" is a number of experiments or \"none\": correct it.");
            }

            return 0;
        }

        return (int)json.Number("horizon", 1, n => n >= 1 && n <= OnlineSettings.LongestHorizon && n == Math.Floor(n), FormattableString.Invariant($"a horizon is a whole number of experiments from 1 to {OnlineSettings.LongestHorizon}, or \"none\""));
    }

    private static string? Shape(CampaignJson json) =>
        json.Has("shape") ? json.Key("shape", "shape", [.. SpendingShape.All.Select(s => s.Key)], SpendingShape.All[0].Key) : null;

    private static double? Number(CampaignJson json, string key) =>
        json.Has(key) ? json.Number(key, 0.5, n => n is >= 0 and <= 1, "it lies between 0 and 1") : null;
}
