namespace Campaigns.Domain;

/// <summary>Placeholder until the real one is merged.</summary>
public static class Nearest
{
    /// <summary>Placeholder.</summary>
    public static string? Of(string word, IEnumerable<string> candidates) => candidates.FirstOrDefault(c => c == word);
}
