using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>Counts the hypotheses of a campaign family by family, one experiment after another in the plan's order.</summary>
public sealed class FamilyTally
{
    private readonly Campaign _campaign;
    private readonly Dictionary<string, int> _places = new(StringComparer.Ordinal);
    private readonly Part[] _parts;
    private readonly bool _takesWeights;
    private readonly bool _countsSharing;
    private readonly List<PValue> _p = [];
    private readonly List<int> _familyOf = [];
    private readonly List<double> _weights = [];
    private (string? Name, int Place) _last;

    /// <summary>Begins with nothing.</summary>
    /// <param name="campaign">Its families, once they are sealed, and its corrections.</param>
    public FamilyTally(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        _campaign = campaign;
        Family[] families = campaign.JudgedFamilies.Count == 0 ? [new Family("")] : [.. campaign.JudgedFamilies];
        _parts = [.. families.Select(f => new Part(f))];
        for (int i = 0; i < families.Length; i++)
        {
            _places.Add(families[i].Name, i);
        }

        _takesWeights = TakesWeights(campaign);
        _countsSharing = CountsSharing(campaign);
    }

    /// <summary>Whether a campaign's experiments must be gone through one by one; the count alone does for one family that neither weighs nor minds shared controls.</summary>
    public static bool IsNeeded(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return campaign.JudgedFamilies.Count > 0 || TakesWeights(campaign) || CountsSharing(campaign);
    }

    /// <summary>Adds an experiment.</summary>
    /// <param name="family">Its family by the plan.</param>
    /// <param name="weight">Its weight by the plan; null counts as 1.</param>
    /// <param name="sharedControl">What it shares with others; null for nothing.</param>
    /// <param name="p">Its p-value; null without a result.</param>
    /// <exception cref="RefusedException">The plan names no such family.</exception>
    public void Add(string? family, double? weight, string? sharedControl, PValue? p)
    {
        int place = _campaign.JudgedFamilies.Count == 0 ? 0 : PlaceOf(family ?? "");
        Part part = _parts[place];
        part.Planned++;
        if (p is { } given)
        {
            part.Tested++;
            _p.Add(given);
            _familyOf.Add(place);
            _weights.Add(weight ?? 1);
        }
        else
        {
            part.WeightOfRest += weight ?? 1;
        }

        if (_countsSharing && sharedControl is not null)
        {
            part.Shared.Add(sharedControl);
        }
    }

    /// <summary>The members counted so far.</summary>
    /// <param name="testedOnly">Whether only those with a p-value are counted.</param>
    public FamilyMembers Members(bool testedOnly) => new()
    {
        P = _p.ToArray(),
        Families = [.. _parts.Select(part => new FamilyCount(part.Family, part.Planned, testedOnly ? part.Tested : part.Planned)
        {
            WeightOfRest = _takesWeights && !testedOnly ? part.WeightOfRest : 0,
            Sharing = SharedControls.Count(part.Shared),
        })],
        FamilyOf = _parts.Length > 1 ? _familyOf.ToArray() : default,
        Weights = _takesWeights ? _weights.ToArray() : default(ReadOnlyMemory<double>),
    };

    private static bool TakesWeights(Campaign campaign) => Procedures(campaign).Any(p => p is Correction { NeedsWeights: true });

    private static bool CountsSharing(Campaign campaign) => Procedures(campaign).Any(SharedControls.AreNotCoveredBy);

    private static IEnumerable<ErrorProcedure> Procedures(Campaign campaign) => campaign.JudgedFamilies.Count == 0
        ? [FamilyVerdict.ProcedureOf(campaign)]
        : campaign.JudgedFamilies.Select(f => FamilyVerdict.ProcedureOf(campaign, f));

    private int PlaceOf(string name)
    {
        if (_last.Name != name)
        {
            _last = (name, _places.TryGetValue(name, out int place)
                ? place
                : throw new RefusedException($"An experiment of '{_campaign.Code}' is in the family '{name}', which its sealed plan does not have."));
        }

        return _last.Place;
    }

    private sealed class Part(Family family)
    {
        public Family Family => family;

        public int Planned { get; set; }

        public int Tested { get; set; }

        public double WeightOfRest { get; set; }

        public List<string> Shared { get; } = [];
    }
}
