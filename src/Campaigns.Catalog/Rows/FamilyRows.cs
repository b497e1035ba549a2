namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table families: a family of a campaign's plan with what it says for itself; a campaign of one family has none.</summary>
public sealed class FamilyRow
{
    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }

    /// <summary>Place among the campaign's families, from 1.</summary>
    public int Position { get; set; }

    /// <summary>The name by which experiments of the plan name it; unique in the campaign.</summary>
    public string Name { get; set; } = "";

    /// <summary>Key of its correction; null for the campaign's.</summary>
    public string? Correction { get; set; }

    /// <summary>Its level, in (0, 1); null for what the campaign gives it.</summary>
    public double? Level { get; set; }

    /// <summary>Name of the family on which it waits; null where it is open from the start.</summary>
    public string? OpensAfter { get; set; }

    /// <summary>"any": it opens when one experiment of that family survives; "all": when every one does.</summary>
    public string OpensWhen { get; set; } = "any";
}

/// <summary>A line of the table review_families: a family as a review found it; a review of a campaign of one family has none.</summary>
public sealed class ReviewFamilyRow
{
    /// <summary>The review.</summary>
    public long ReviewId { get; set; }

    /// <summary>Place among the campaign's families, from 1.</summary>
    public int Position { get; set; }

    /// <summary>The family's name.</summary>
    public string Name { get; set; } = "";

    /// <summary>Key of the correction applied.</summary>
    public string Correction { get; set; } = "";

    /// <summary>Level applied.</summary>
    public double Level { get; set; }

    /// <summary>Hypotheses counted.</summary>
    public int FamilySize { get; set; }

    /// <summary>Hypotheses planned.</summary>
    public int PlannedCount { get; set; }

    /// <summary>Experiments with a result.</summary>
    public int TestedCount { get; set; }

    /// <summary>Survivors.</summary>
    public int SurvivorCount { get; set; }

    /// <summary>Whether the family was open.</summary>
    public bool IsOpen { get; set; }
}
