using System.Globalization;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>Anchors of experiments: of their places, since their names may hold anything.</summary>
internal static class Anchors
{
    /// <summary>Where an experiment stands in full.</summary>
    public static string Of(ExperimentResult result) => string.Create(CultureInfo.InvariantCulture, $"experiment-{result.Position}");

    /// <summary>The anchors of the experiments that stand in full, by their codes.</summary>
    public static IReadOnlyDictionary<string, string> InFull(ReportData data) =>
        data.InFull.ToDictionary(e => e.Detail.Result.Plan.Code, e => Of(e.Detail.Result), StringComparer.Ordinal);
}
