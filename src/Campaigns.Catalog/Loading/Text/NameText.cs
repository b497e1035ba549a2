using System.Diagnostics.CodeAnalysis;
using System.Text;
using Campaigns.Catalog.Exporting;

namespace Campaigns.Catalog.Loading;

/// <summary>The names of experiments, groups, specimens and blocks as they are kept: trimmed, composed, without control characters, of bounded length.</summary>
/// <remarks>Remembers what it has cleaned, so that a column of names outside ASCII costs one look-up a row.</remarks>
internal sealed class NameText
{
    /// <summary>The most characters in a name.</summary>
    public const int Longest = 200;

    private const int MostRemembered = 1 << 16;
    private const int LongestRemembered = 1000;

    private readonly int _longest;

    private readonly Dictionary<byte[], Cleaned> _seen = new(new BytesComparer());
    private readonly Dictionary<byte[], Cleaned>.AlternateLookup<ReadOnlySpan<byte>> _bySpan;

    /// <param name="longest">The most characters that are accepted.</param>
    public NameText(int longest = Longest)
    {
        _longest = longest;
        _bySpan = _seen.GetAlternateLookup<ReadOnlySpan<byte>>();
    }

    /// <summary>Names that were given another spelling of the same letters (Unicode normal form C), as first met; for a notice.</summary>
    public HashSet<string> Respelled { get; } = [];

    /// <summary>Cleans a name.</summary>
    /// <param name="field">UTF-8 as read.</param>
    /// <param name="name">The name, UTF-8; empty where the field is blank or refused.</param>
    /// <returns>Null, or the code and the sentence of a refusal.</returns>
    public NameFault? Clean(ReadOnlySpan<byte> field, out ReadOnlySpan<byte> name)
    {
        name = Unguarded(AsciiText.Trim(field));
        if (name.Length <= _longest && AsciiText.IsPlain(name))
        {
            return null;
        }

        if (!_bySpan.TryGetValue(name, out Cleaned cleaned))
        {
            cleaned = CleanNew(name);
            if (_seen.Count == MostRemembered)
            {
                _seen.Clear();
            }

            if (name.Length <= LongestRemembered)
            {
                _bySpan[name] = cleaned;
            }
        }

        name = cleaned.Name;
        return cleaned.Fault;
    }

    /// <summary>A text without the apostrophe that keeps spreadsheets from taking it for a formula.</summary>
    private static ReadOnlySpan<byte> Unguarded(ReadOnlySpan<byte> name) => name.IsEmpty || name[0] != '\'' ? name : AsciiText.Trim(SpreadsheetText.Restored(name));

    private Cleaned CleanNew(ReadOnlySpan<byte> field)
    {
        string text = Encoding.UTF8.GetString(field).Trim();
        if (text.FirstOrDefault(c => char.IsControl(c) || c is '\u2028' or '\u2029') is char control and not '\0')
        {
            return Refuse(
                "control-character",
                FormattableString.Invariant($"{ShownText.Quote(field)} has a control character or line break (U+{(int)control:X4}): take it out."));
        }

        string composed = Composition.Compose(text);
        if (composed.EnumerateRunes().Count() > _longest)
        {
            return Refuse("name-too-long", FormattableString.Invariant($"{ShownText.Quote(field)} is longer than {_longest} characters: shorten it."));
        }

        if (composed != text && Respelled.Count < ImportProblems.MostKept)
        {
            Respelled.Add(composed);
        }

        return new Cleaned(Encoding.UTF8.GetBytes(composed), null);
    }

    private static Cleaned Refuse(string code, string text) => new([], new NameFault(code, text));

    private readonly record struct Cleaned(byte[] Name, NameFault? Fault);

    private sealed class BytesComparer : IEqualityComparer<byte[]>, IAlternateEqualityComparer<ReadOnlySpan<byte>, byte[]>
    {
        public bool Equals(byte[]? x, byte[]? y) => x.AsSpan().SequenceEqual(y);

        public int GetHashCode([DisallowNull] byte[] obj) => GetHashCode(obj.AsSpan());

        public byte[] Create(ReadOnlySpan<byte> alternate) => alternate.ToArray();

        public bool Equals(ReadOnlySpan<byte> alternate, byte[] other) => alternate.SequenceEqual(other);

        public int GetHashCode(ReadOnlySpan<byte> alternate)
        {
            HashCode hash = default;
            hash.AddBytes(alternate);
            return hash.ToHashCode();
        }
    }
}
