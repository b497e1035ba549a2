namespace Campaigns.Catalog.Rows;

/// <summary>A line of the table group_sets: an ordered list of groups, shared by all experiments of a campaign that compare just these.</summary>
public sealed class GroupSetRow
{
    /// <summary>Key within the catalog.</summary>
    public long Id { get; set; }

    /// <summary>The campaign.</summary>
    public long CampaignId { get; set; }
}

/// <summary>A line of the table groups: one group in a set.</summary>
public sealed class GroupRow
{
    /// <summary>The set.</summary>
    public long GroupSetId { get; set; }

    /// <summary>Place in the set, from 0; packed measurements refer to it.</summary>
    public int Position { get; set; }

    /// <summary>The group's name.</summary>
    public string Label { get; set; } = "";
}
