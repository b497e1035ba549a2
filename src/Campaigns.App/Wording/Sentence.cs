namespace Campaigns.App.Wording;

/// <summary>Parts of sentences at their places.</summary>
internal static class Sentence
{
    /// <summary>A text as the beginning of a sentence.</summary>
    /// <param name="text">At least one character.</param>
    public static string Start(string text) => char.ToUpperInvariant(text[0]) + text[1..];
}
