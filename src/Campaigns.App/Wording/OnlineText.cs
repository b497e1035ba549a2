using Campaigns.App.Output;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Wording;

/// <summary>Procedures that decide as experiments arrive, in words.</summary>
internal static class OnlineText
{
    /// <summary>The settings of a stream in one phrase, for example "shape jm over 40 experiments, initial wealth 0.025".</summary>
    public static string Of(OnlineSettings settings)
    {
        string horizon = settings.Horizon is { } last ? FormattableString.Invariant($"over {last} experiments") : "without end";
        return $"shape {settings.Shape} {horizon}{Part("initial wealth", settings.InitialWealth)}{Part("lambda", settings.Lambda)}{Part("tau", settings.Tau)}";

        static string Part(string name, double? value) => value is { } given ? $", {name} {NumberText.RoundTrip(given)}" : "";
    }
}
