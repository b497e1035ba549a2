using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>What one procedure adds to the rows of adjust.</summary>
/// <param name="Key">The procedure.</param>
/// <param name="Columns">Its columns.</param>
/// <param name="Cells">The cells of a p-value, by its place among the p-values of the file.</param>
/// <param name="Survivors">How many survive.</param>
/// <param name="Note">Its name and guarantee, for people.</param>
internal sealed record AdjustColumns(string Key, IReadOnlyList<Column> Columns, Func<int, Cell[]> Cells, int Survivors, string Note)
{
    /// <summary>The names of the columns that a procedure adds.</summary>
    public static string[] Names(ErrorProcedure procedure) => procedure is OnlineProcedure ? [procedure.Key + "_level", procedure.Key + "_survives"] : [procedure.Key];

    /// <summary>A correction's adjusted p-values.</summary>
    public static AdjustColumns Of(Correction correction, RankedFamily family, SignificanceLevel level)
    {
        PValue[] adjusted = correction.Adjust(family);
        return new AdjustColumns(
            correction.Key, [new Column(correction.Key, correction.Key, true)], i => [Cell.P(adjusted[i])], adjusted.Count(level.Rejects), $"{correction.Key}: {correction.Name}. {correction.Guarantee}");
    }

    /// <summary>Levels and decisions of a stream in which the p-values arrive one after another in the order of the file.</summary>
    public static AdjustColumns Of(OnlineProcedure procedure, OnlineSettings settings, PValue[] p)
    {
        OnlineStream stream = procedure.Start(settings);
        var decided = new (double Level, bool Survives)[p.Length];
        for (int i = 0; i < p.Length; i++)
        {
            OnlineLevel given = stream.Register();
            decided[i] = (given.Level, stream.Report(given.Position, p[i]));
        }

        string[] names = Names(procedure);
        int nothing = decided.Count(d => d.Level == 0);
        string late = settings.Horizon < p.Length
            ? FormattableString.Invariant($" {p.Length - settings.Horizon} of the p-values come after the horizon of {settings.Horizon}; {nothing} of them have the level 0 and cannot survive.")
            : "";
        return new AdjustColumns(
            procedure.Key,
            [new Column(names[0], names[0], true), new Column(names[1], names[1])],
            i => [Cell.Number(decided[i].Level), Cell.Truth(decided[i].Survives)],
            stream.Rejections,
            $"{procedure.Key}: {procedure.Name}, {OnlineText.Of(settings)}, in the order of the rows, which must be that in which the experiments started.{late} {procedure.Guarantee}");
    }
}
