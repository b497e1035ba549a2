using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What only the page of the ranking shows: the family, a level that is looked at, the boundaries beside the sealed one, and every correction side by side.</summary>
/// <param name="model">The dashboard.</param>
/// <remarks>Everything is read from the campaign as it was last loaded, when it is first asked for.</remarks>
public sealed class RankingModel(DashboardModel model)
{
    private static readonly Correction[] WithBoundary = [.. CorrectionRegistry.All.Where(c => c.BoundaryAt(1, 1, 0.5) is not null)];
    private readonly HashSet<string> _drawn = [];
    private readonly Dictionary<int, Ranking> _rankings = [];
    private int _edition = -1;
    private string _campaign = "";
    private int _family;
    private int _seen = -1;
    private FamilyMembers? _members;
    private LevelLadder? _ladder;
    private PHistogram? _histogram;
    private Reckoning<SideBySide>? _outcomes;
    private LevelExploration? _exploration;
    private int _pointed;

    /// <summary>The campaign as it stands.</summary>
    public CampaignStanding Standing => model.Standing;

    /// <summary>The family shown; the one family of a campaign without named ones.</summary>
    public FamilyStanding Family => Standing.Families[Math.Min(FamilyPlace, Standing.Families.Count - 1)];

    /// <summary>Place of the family shown, from 0.</summary>
    public int FamilyPlace
    {
        get
        {
            Follow();
            return _family;
        }
    }

    /// <summary>The ranked p-values of the family shown.</summary>
    public Ranking Ranking
    {
        get
        {
            int place = FamilyPlace;
            if (!_rankings.TryGetValue(place, out Ranking? ranking))
            {
                ranking = Standing.Families.Count > 1 ? new Ranking(Standing, model.Find(Family.Correction), Family) : model.Ranking;
                _rankings.Add(place, ranking);
            }

            return ranking;
        }
    }

    /// <summary>Rank of the selected experiment in the family shown; 0 where it has none.</summary>
    public int Rank => Ranking.RankOf(model.SelectedPosition);

    /// <summary>Whether the selected experiment is marked.</summary>
    public bool IsSelectedMarked => model.Marks.Has(model.SelectedPosition);

    /// <summary>The level that is looked at; null while the sealed one is.</summary>
    public LevelExploration? Exploration
    {
        get
        {
            Follow();
            return _exploration;
        }
    }

    /// <summary>The levels that can be looked at.</summary>
    public LevelLadder Ladder => _ladder ??= new LevelLadder(Standing.Campaign.Level.Value);

    /// <summary>Why no other level can be looked at, in a sentence; null where one can.</summary>
    public string? WhyNoExploration =>
        Standing.TestedCount == 0 ? "Nothing is tested yet: no level would change anything."
        : Ranking.IsOnline ? "Each experiment was given its level as it started; another level would have given others from the first on, so none is looked at."
        : CorrectionRegistry.Find(Standing.Campaign.Correction) is null ? $"This program knows no correction named {Standing.Campaign.Correction}: another level cannot be looked at."
        : null;

    /// <summary>The boundary of the family shown at the level that is looked at; null without one.</summary>
    public BoundaryLine? ExploredLine =>
        Exploration is { } explored && Ranking is { HasBoundary: true } ranking && CorrectionRegistry.Find(Family.Correction) is { } correction
            ? new BoundaryLine(correction, ranking.FamilySize, explored.Families[FamilyPlace].Level)
            : null;

    /// <summary>The boundaries drawn beside the sealed one, at the family's sealed level, with their signs.</summary>
    public IReadOnlyList<(string Sign, BoundaryLine Line)> Beside
    {
        get
        {
            Ranking ranking = Ranking;
            SignificanceLevel level = Family.Level;
            return ranking.FamilySize == 0 ? []
                : [.. WithBoundary.Where(c => _drawn.Contains(c.Key) && c.Key != Family.Correction && LetterOf(c.Key) is not null)
                    .Select(c => (LetterOf(c.Key)!, new BoundaryLine(c, ranking.FamilySize, level)))];
        }
    }

    /// <summary>The p-values of the whole campaign in bars.</summary>
    public PHistogram Histogram
    {
        get
        {
            Follow();
            return _histogram ??= new PHistogram(Standing);
        }
    }

    /// <summary>Every correction side by side, reckoned when it is first asked for; null where the program does not know the sealed one.</summary>
    public Reckoning<SideBySide>? Outcomes
    {
        get
        {
            Follow();
            CampaignStanding standing = Standing;
            return KnownCorrections.Are(standing.Campaign) ? _outcomes ??= new(() => SideBySide.Of(standing), standing.Experiments.Count) : null;
        }
    }

    /// <summary>Place in <see cref="Rows"/> that the keys act on, from 0.</summary>
    public int Pointed => Math.Min(_pointed, Math.Max(0, Rows.Count - 1));

    /// <summary>The corrections with what survives under each, the sealed one first.</summary>
    public IReadOnlyList<CorrectionRow> Rows
    {
        get
        {
            if (Outcomes is not { } reckoning)
            {
                return [];
            }

            if (reckoning.Result is { } beside)
            {
                return [.. beside.Outcomes.Select(o => Row(o.Key, o.Procedure, o.IsSealed, o.Survivors))];
            }

            ErrorProcedure own = FamilyVerdict.ProcedureOf(Standing.Campaign);
            return [Row(own.Key, own, true, Standing.SurvivorCount), .. CorrectionRegistry.FromPAlone.Where(c => c.Key != own.Key).Select(c => Row(c.Key, c, false, null))];
        }
    }

    /// <summary>Experiments that survive under some corrections of the campaign's kind and not under others; null while that is reckoned.</summary>
    public int? Hanging => Outcomes?.Result?.Hanging;

    /// <summary>Shows another family and selects its smallest p-value.</summary>
    /// <param name="step">1 for the next, -1 for the one before.</param>
    public void TurnFamily(int step)
    {
        int count = Standing.Families.Count;
        _family = (FamilyPlace + step + count) % count;
        if (Ranking.Count > 0)
        {
            _seen = Ranking.PositionAt(1);
            model.SelectPosition(_seen);
        }
    }

    /// <summary>Looks at another level of the ladder.</summary>
    /// <param name="steps">Up, or down where negative.</param>
    public void MoveLevel(int steps) => LookAt(Ladder.From((Exploration?.Level ?? Standing.Campaign.Level).Value, steps));

    /// <summary>Looks at a level; at the sealed one the exploration ends.</summary>
    /// <param name="level">In (0, 1).</param>
    public void LookAt(double level)
    {
        Follow();
        if (WhyNoExploration is null)
        {
            _members ??= FamilyMembers.Of(Standing.Campaign, Standing.Experiments);
            _exploration = level == Standing.Campaign.Level.Value ? null : LevelExploration.Of(Standing, _members, new SignificanceLevel(level));
        }
    }

    /// <summary>Points at another correction.</summary>
    /// <param name="step">Down, or up where negative.</param>
    public void Point(int step) => _pointed = Rows.Count == 0 ? 0 : (Pointed + step + Rows.Count) % Rows.Count;

    /// <summary>Points at a correction.</summary>
    /// <param name="place">Its place in <see cref="Rows"/>, from 0; others are passed over.</param>
    public void PointAt(int place) => _pointed = place >= 0 && place < Rows.Count ? place : _pointed;

    /// <summary>Draws the boundary of the correction pointed at, or no more; one that has none is passed over.</summary>
    public void TurnPointed()
    {
        if (Rows.Count > 0 && Rows[Pointed] is { Letter: not null } row && !_drawn.Remove(row.Key))
        {
            _drawn.Add(row.Key);
        }
    }

    /// <summary>The sign of a boundary: letters follow each other without a gap over the corrections that have one, without the sealed one, whose sign is its own.</summary>
    private string? LetterOf(string key)
    {
        string? sealedKey = Standing.Families.Count > 1 ? null : Family.Correction;
        int place = Array.FindIndex([.. WithBoundary.Where(c => c.Key != sealedKey)], c => c.Key == key);
        return place < 0 ? null : ((char)('a' + place)).ToString();
    }

    private CorrectionRow Row(string key, ErrorProcedure procedure, bool isSealed, int? survivors)
    {
        bool isOwn = procedure.Key == Family.Correction;
        string? letter = isSealed || isOwn ? null : LetterOf(procedure.Key);
        return new CorrectionRow(key, procedure, isSealed, letter, letter is not null && _drawn.Contains(procedure.Key), survivors);
    }

    // The family follows the experiment that was selected elsewhere; what was read of another edition is out of date.
    private void Follow()
    {
        if (_edition != model.Edition)
        {
            _edition = model.Edition;
            _rankings.Clear();
            (_members, _ladder, _histogram, _outcomes, _exploration, _seen) = (null, null, null, null, null, -1);
            if (_campaign != Standing.Campaign.Code)
            {
                (_campaign, _family, _pointed) = (Standing.Campaign.Code, 0, 0);
                _drawn.Clear();
                _drawn.UnionWith(["none", "bonferroni", "holm", "bh"]);
            }

            _family = Math.Min(_family, Standing.Families.Count - 1);
        }

        if (_seen != model.SelectedPosition)
        {
            _seen = model.SelectedPosition;
            if (Standing.Families.Count > 1 && model.Selected is { } selected)
            {
                string name = Standing.FamilyOf(selected).Name;
                _family = Math.Max(0, Standing.Families.ToList().FindIndex(f => f.Name == name));
            }
        }
    }
}
