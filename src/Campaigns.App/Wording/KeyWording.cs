using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Wording;

/// <summary>Procedures by their names, with the key in brackets that a plan or a command takes.</summary>
internal static class KeyWording
{
    /// <summary>A test, for example "Welch's F (welch)".</summary>
    /// <param name="key">Its key; one that is not known is given as it is.</param>
    public static string Test(string key) => GroupTestRegistry.Find(key) is { } test ? Named(test.Name, key) : key;

    /// <summary>A follow-up, for example "Dunnett (dunnett)".</summary>
    /// <param name="key">Its key; one that is not known is given as it is.</param>
    public static string FollowUp(string key) => FollowUpRegistry.Find(key) is { } followUp ? Named(followUp.Name, key)
        : key == FollowUpRegistry.None ? "no comparisons (none)"
        : key;

    /// <summary>A name with its key behind it.</summary>
    public static string Named(string name, string key) => $"{name} ({key})";
}
