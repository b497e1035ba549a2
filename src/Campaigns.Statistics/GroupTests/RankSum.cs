namespace Campaigns.Statistics.GroupTests;

/// <summary>How many values a group holds, and twice the sum of their midranks.</summary>
internal struct RankSum
{
    public long Count;
    public long Doubled;
}
