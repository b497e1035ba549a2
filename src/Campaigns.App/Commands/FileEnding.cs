namespace Campaigns.App.Commands;

/// <summary>The ending of a file's name says what is in it: a page named .pdf, or a drawing named .png, opens nowhere.</summary>
internal static class FileEnding
{
    private static readonly string[] Known = [".html", ".htm", ".md", ".svg", ".pdf", ".doc", ".docx", ".odt", ".rtf", ".png", ".jpg", ".jpeg", ".gif", ".xls", ".xlsx", ".csv", ".json"];

    /// <summary>Refuses a name that promises another kind of content.</summary>
    /// <param name="file">The file to be written.</param>
    /// <param name="what">What will be in it, and what to do instead, as a sentence.</param>
    /// <param name="endings">The endings that fit, in small letters with the dot; one that says nothing of a kind (panel.v2) fits always.</param>
    /// <exception cref="UsageException">The ending is another one.</exception>
    public static void Fits(string file, string what, params string[] endings)
    {
        string ending = Path.GetExtension(file);
        if (Known.Contains(ending, StringComparer.OrdinalIgnoreCase) && !endings.Contains(ending, StringComparer.OrdinalIgnoreCase))
        {
            throw new UsageException($"The file '{file}' is named {ending}, and nothing was written. {what}");
        }
    }
}
