using System.Text;
using System.Text.Json;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>The members of one flat JSON object with the places where they stand, so that every refusal can name line and column.</summary>
internal sealed class CampaignJson
{
    private const int DeepestNesting = 8;

    private readonly string _name;
    private readonly byte[] _json;
    private readonly ImportProblems _problems;
    private readonly Dictionary<string, Member> _members = new(StringComparer.Ordinal);

    public CampaignJson(string name, byte[] json, ImportProblems problems)
    {
        _name = name;
        _json = json;
        _problems = problems;
    }

    /// <summary>Reads the object; members of unknown or repeated names, and broken JSON, become problems.</summary>
    /// <returns>Whether it was read to the end.</returns>
    public bool TryReadObject(IReadOnlyList<string> keys)
    {
        Utf8JsonReader reader = new(_json, new JsonReaderOptions { CommentHandling = JsonCommentHandling.Disallow, MaxDepth = DeepestNesting });
        try
        {
            reader.Read();
            if (reader.TokenType != JsonTokenType.StartObject)
            {
                RefuseAt(reader.TokenStartIndex, "not-an-object", "is no JSON object: write {\"code\": \"...\", ...}.");
                return false;
            }

            while (reader.Read() && reader.TokenType == JsonTokenType.PropertyName)
            {
                ReadMember(ref reader, keys);
                if (_problems.Count >= ImportProblems.MostKept)
                {
                    // Whatever follows, the file is refused; placing every problem of a huge file would take minutes.
                    return false;
                }
            }

            // Reading on finds anything that follows the object.
            reader.Read();
            return true;
        }
        catch (JsonException e)
        {
            long line = (e.LineNumber ?? 0) + 1;
            int start = StartOfLine(line);
            int column = Columns(start, start + (int)(e.BytePositionInLine ?? 0));
            Add(line, column, "bad-json", "is no valid JSON from here on (comments, trailing commas and single quotation marks are not allowed): correct it.");
        }
        catch (InvalidOperationException)
        {
            // Half of a surrogate pair, written as an escape, has no text.
            RefuseAt(reader.TokenStartIndex, "bad-text", "has an escape that stands for no character: correct it.");
        }

        return false;
    }

    /// <summary>Whether the object has a member.</summary>
    public bool Has(string key) => _members.ContainsKey(key);

    /// <summary>Whether the object has a member and it is a text.</summary>
    public bool IsText(string key) => _members.TryGetValue(key, out Member? member) && member.Text is not null;

    /// <summary>A text of one line; empty where there is none.</summary>
    public string Line(string key, int longest) => Text(key, longest, c => char.IsControl(c) || c is '\u2028' or '\u2029');

    /// <summary>A text that may have line breaks; empty where there is none.</summary>
    public string Text(string key, int longest) => Text(key, longest, c => char.IsControl(c) && c is not ('\n' or '\r' or '\t'));

    /// <summary>The key of a procedure, in lower case.</summary>
    public string Key(string key, string kind, IReadOnlyCollection<string> known, string fallback)
    {
        if (!_members.ContainsKey(key))
        {
            return fallback;
        }

        string text = Line(key, 100).Trim().ToLowerInvariant();
        if (IsText(key) && !known.Contains(text))
        {
            Refuse(key, $"unknown-{kind.Replace(' ', '-')}", KnownKeys.Unknown(text, kind, known));
        }

        return text;
    }

    /// <summary>A number within a range.</summary>
    public double Number(string key, double fallback, Func<double, bool> isInRange, string rule)
    {
        if (!_members.TryGetValue(key, out Member? member))
        {
            return fallback;
        }

        if (member.Number is not double number)
        {
            Refuse(key, "wrong-type", $"\"{key}\" is {member.Kind}: write a number.");
            return fallback;
        }

        if (!isInRange(number))
        {
            Refuse(key, "out-of-range", $"\"{key}\" is out of range: {rule}.");
            return fallback;
        }

        return number;
    }

    /// <summary>Adds a problem of a member's value, or of the whole file where there is no such member.</summary>
    public void Refuse(string key, string code, string text)
    {
        if (_members.TryGetValue(key, out Member? member))
        {
            RefuseAt(member.At, code, text);
        }
        else
        {
            _problems.Add(new ImportProblem(_name, 0, "", code, text));
        }
    }

    private string Text(string key, int longest, Func<char, bool> isRefused)
    {
        if (!_members.TryGetValue(key, out Member? member))
        {
            return "";
        }

        if (member.Text is not string text)
        {
            Refuse(key, "wrong-type", $"\"{key}\" is {member.Kind}: write a text in quotation marks.");
            return "";
        }

        if (text.Any(isRefused))
        {
            Refuse(key, "control-character", $"\"{key}\" has a control character: take it out.");
        }
        else if (text.EnumerateRunes().Count() > longest && key != "code")
        {
            Refuse(key, "text-too-long", FormattableString.Invariant($"\"{key}\" is longer than {longest} characters: shorten it."));
        }

        return Composition.Compose(text.Trim());
    }

    private void ReadMember(ref Utf8JsonReader reader, IReadOnlyList<string> keys)
    {
        long at = reader.TokenStartIndex;
        string key = reader.GetString()!;
        reader.Read();
        long valueAt = reader.TokenStartIndex;
        double number = 0;
        Member member = reader.TokenType switch
        {
            JsonTokenType.String => new Member(valueAt, "a text", reader.GetString(), null),
            JsonTokenType.Number => new Member(valueAt, "a number", null, reader.TryGetDouble(out number) ? number : double.PositiveInfinity),
            JsonTokenType.True or JsonTokenType.False => new Member(valueAt, "a truth value", null, null),
            JsonTokenType.Null => new Member(valueAt, "null", null, null),
            JsonTokenType.StartArray => new Member(valueAt, "a list", null, null),
            _ => new Member(valueAt, "an object", null, null),
        };
        reader.Skip();
        if (!keys.Contains(key))
        {
            string near = Nearest.Of(key, keys) is string nearest ? $" (did you mean \"{nearest}\"?)" : "";
            RefuseAt(at, "unknown-key", $"{ShownText.Quote(key)} is no key of a campaign{near}: the keys are {string.Join(", ", keys)}.");
        }
        else if (!_members.TryAdd(key, member))
        {
            RefuseAt(at, "duplicate-key", $"\"{key}\" stands there twice: keep one.");
        }
    }

    private void RefuseAt(long at, string code, string text)
    {
        int end = (int)Math.Min(at, _json.Length);
        int start = _json.AsSpan(0, end).LastIndexOf((byte)'\n') + 1;
        Add(_json.AsSpan(0, end).Count((byte)'\n') + 1, Columns(start, end), code, text);
    }

    private void Add(long line, int column, string code, string text) =>
        _problems.Add(new ImportProblem(_name, line, FormattableString.Invariant($"{column}"), code, text));

    private int StartOfLine(long line)
    {
        int start = 0;
        for (long i = 1; i < line; i++)
        {
            start += _json.AsSpan(start).IndexOf((byte)'\n') + 1;
        }

        return start;
    }

    // Characters before the place, and one: people count columns in characters, from 1.
    private int Columns(int start, int end)
    {
        end = Math.Min(end, _json.Length);
        return Encoding.UTF8.GetString(_json.AsSpan(start, end - start)).EnumerateRunes().Count() + 1;
    }

    private sealed record Member(long At, string Kind, string? Text, double? Number);
}
