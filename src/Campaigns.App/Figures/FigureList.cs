namespace Campaigns.App.Figures;

/// <summary>Every kind of figure, in one list.</summary>
internal static class FigureList
{
    /// <summary>What is drawn of an experiment where nothing else is asked for.</summary>
    public const string UsualOfExperiment = ObservationsFigure.Key;

    /// <summary>What is drawn of a campaign where nothing else is asked for.</summary>
    public const string UsualOfCampaign = "ranking";

    /// <summary>All kinds.</summary>
    public static IReadOnlyList<FigureKind> All { get; } =
    [
        new(ObservationsFigure.Key, "every value by group, with mean and interval", true, s => ObservationsFigure.Of(s.Standing, s.Detail(), s.Observations())),
    ];

    /// <summary>The kind of a key; null where there is none.</summary>
    public static FigureKind? Find(string key) => All.FirstOrDefault(k => k.Key == key);
}
