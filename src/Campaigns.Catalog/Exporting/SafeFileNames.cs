using System.Globalization;
using System.Text;

namespace Campaigns.Catalog.Exporting;

/// <summary>Names for files that are written into one folder, made of names that came with data: each is a plain name on every system, and no two are the same.</summary>
public sealed class SafeFileNames
{
    private const int LongestInBytes = 180;
    private const int MostCharacters = 4096;
    private const string Forbidden = "/\\:*?\"<>|";

    /// <summary>Names of devices, which one system opens whatever their ending and folder.</summary>
    private static readonly HashSet<string> Devices = new(
        ["CON", "PRN", "AUX", "NUL", "CONIN$", "CONOUT$", "CLOCK$", .. "0123456789\u00B9\u00B2\u00B3".SelectMany(c => (string[])[$"COM{c}", $"LPT{c}"])],
        StringComparer.OrdinalIgnoreCase);

    private readonly HashSet<string> _used = new(StringComparer.OrdinalIgnoreCase);

    /// <summary>Begins a folder.</summary>
    /// <param name="taken">Names that the program itself uses in it.</param>
    public SafeFileNames(params ReadOnlySpan<string> taken)
    {
        foreach (string name in taken)
        {
            _used.Add(name);
        }
    }

    /// <summary>The name to write under: that of the data as far as it is safe; where it was given out already, with -2, -3 and so on before its ending.</summary>
    /// <param name="name">The name as it came, of any length and content.</param>
    public string For(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        string safe = Safe(name);
        string ending = Ending(safe);
        string stem = safe[..^ending.Length];
        string free = safe;
        for (int i = 2; !_used.Add(free); i++)
        {
            free = string.Create(CultureInfo.InvariantCulture, $"{stem}-{i}{ending}");
        }

        return free;
    }

    private static string Safe(string name)
    {
        // Composed, since some file systems take two spellings of the same letters for one name.
        string plain = Plain(name).Normalize(NormalizationForm.FormC).Trim();
        string ending = Ending(plain);
        plain = Cut(plain[..^ending.Length], LongestInBytes - Encoding.UTF8.GetByteCount(ending)) + ending;
        if (plain.Length > 0 && plain[^1] is '.' or ' ')
        {
            plain = plain.TrimEnd('.', ' ') + "_";
        }

        // Hidden files, options of commands and the home folder begin with these.
        if (plain.Length > 0 && plain[0] is '.' or '-' or '~')
        {
            plain = "_" + plain[1..];
        }

        return plain.Length == 0 ? "file" : Devices.Contains(plain.Split('.')[0].TrimEnd()) ? "_" + plain : plain;
    }

    private static string Plain(string name)
    {
        var text = new StringBuilder();
        foreach (Rune rune in name.EnumerateRunes())
        {
            text.Append(IsPlain(rune) ? rune.ToString() : "_");
            if (text.Length > MostCharacters)
            {
                break;
            }
        }

        return text.ToString();
    }

    private static bool IsPlain(Rune rune) =>
        rune != Rune.ReplacementChar
        && !(rune.IsAscii && Forbidden.Contains((char)rune.Value, StringComparison.Ordinal))
        && Rune.GetUnicodeCategory(rune) is not (UnicodeCategory.Control or UnicodeCategory.Format or UnicodeCategory.Surrogate or UnicodeCategory.LineSeparator
            or UnicodeCategory.ParagraphSeparator or UnicodeCategory.OtherNotAssigned or UnicodeCategory.PrivateUse);

    private static string Ending(string name)
    {
        int dot = name.LastIndexOf('.');
        return dot > 0 && name.Length - dot is > 1 and <= 9 ? name[dot..] : "";
    }

    private static string Cut(string text, int bytes)
    {
        int length = 0;
        foreach (Rune rune in text.EnumerateRunes())
        {
            bytes -= rune.Utf8SequenceLength;
            if (bytes < 0)
            {
                break;
            }

            length += rune.Utf16SequenceLength;
        }

        return text[..length];
    }
}
