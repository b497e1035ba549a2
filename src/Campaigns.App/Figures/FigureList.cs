namespace Campaigns.App.Figures;

/// <summary>Every kind of figure, in one list.</summary>
internal static class FigureList
{
    /// <summary>What is drawn of an experiment where nothing else is asked for.</summary>
    public const string UsualOfExperiment = ObservationsFigure.Key;

    /// <summary>What is drawn of a campaign where nothing else is asked for.</summary>
    public const string UsualOfCampaign = RankingFigure.Key;

    /// <summary>All kinds.</summary>
    public static IReadOnlyList<FigureKind> All { get; } =
    [
        new(ObservationsFigure.Key, "every value by group, with mean and interval", true, s => ObservationsFigure.Of(s.Standing, s.Detail(), s.Observations())),
        new(ComparisonsFigure.Key, "differences between groups with intervals", true, s => ComparisonsFigure.Of(s.Standing, s.Detail())),
        new(SurvivorsFigure.Key, "survivors with the size of their effects", false, s => SurvivorsFigure.Of(s.Standing)),
        new(RankingFigure.Key, "p-values in order of their size, with boundaries", false, s => RankingFigure.Of(s.Standing)),
        new(HistogramFigure.Key, "how the p-values spread, with the share of true nulls", false, s => HistogramFigure.Of(s.Standing)),
        new(RiskFigure.Key, "the risk of a false positive as tests add up", false, s => RiskFigure.Of(s.Standing, s.Risk())),
        new(CorrectionsFigure.Key, "survivors under every correction", false, s => CorrectionsFigure.Of(s.Standing)),
        new(ReviewsFigure.Key, "survivors from review to review", false, s => ReviewsFigure.Of(s.Standing, s.Reviews())),
    ];

    /// <summary>The kind of a key; null where there is none.</summary>
    public static FigureKind? Find(string key) => All.FirstOrDefault(k => k.Key == key);
}
