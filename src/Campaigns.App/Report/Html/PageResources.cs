using System.Security.Cryptography;
using System.Text;

namespace Campaigns.App.Report.Html;

/// <summary>The style and the script that every page carries inside itself, and the policy that lets these run and nothing else.</summary>
internal static class PageResources
{
    /// <summary>How a page looks: screens light and dark, telephones, paper.</summary>
    public static string Style { get; } = Read("report.css");

    /// <summary>What sorts tables.</summary>
    public static string Script { get; } = Read("report.js");

    /// <summary>A policy under which a browser fetches nothing, sends nothing, and runs and applies only these two texts, by their digests.</summary>
    public static string Policy { get; } =
        $"default-src 'none'; style-src '{Digest(Style)}'; script-src '{Digest(Script)}'; base-uri 'none'; form-action 'none'";

    private static string Digest(string text) => $"sha256-{Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(text)))}";

    private static string Read(string name)
    {
        using Stream stream = typeof(PageResources).Assembly.GetManifestResourceStream($"Campaigns.App.Report.Html.{name}")
            ?? throw new InvalidOperationException($"The program was built without '{name}'.");
        using var reader = new StreamReader(stream, Encoding.UTF8);
        return reader.ReadToEnd().ReplaceLineEndings("\n");
    }
}
