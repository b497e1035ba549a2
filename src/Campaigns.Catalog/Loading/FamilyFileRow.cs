using System.Text;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Loading;

/// <summary>Makes a family of the current row of a file of families.</summary>
internal sealed class FamilyFileRow(DelimitedFile file, Dictionary<string, int> places, DecimalMark mark)
{
    private readonly NameText _names = new();
    private bool _isSound;

    /// <summary>The name in the row last made; empty where it has none.</summary>
    public string Name { get; private set; } = "";

    /// <summary>Makes the family, or reports all that is wrong with the row and gives null.</summary>
    public Family? Make(KnownKeys known)
    {
        _isSound = true;
        Name = Text("family");
        if (Name.Length == 0 && _isSound)
        {
            Refuse("family", "empty-name", "the field is empty: every row names its family.");
        }

        string? opensAfter = Text("opens_after") is { Length: > 0 } other ? other : null;
        Family family = new(Name)
        {
            Correction = Correction(known),
            Level = Level(),
            OpensAfter = opensAfter,
            Gate = Gate(opensAfter),
        };
        return _isSound ? family : null;
    }

    /// <summary>Reports a problem of a column in the current row.</summary>
    public void Refuse(string column, string code, string text)
    {
        file.Report(places[column], code, text);
        _isSound = false;
    }

    private ReadOnlySpan<byte> Field(string column) => places[column] < 0 ? default : AsciiText.Trim(file.Field(places[column]));

    private string Text(string column)
    {
        if (_names.Clean(Field(column), out ReadOnlySpan<byte> text) is { } fault)
        {
            Refuse(column, fault.Code, fault.Text);
        }

        return Encoding.UTF8.GetString(text);
    }

    private string? Correction(KnownKeys known)
    {
        string key = Text("correction").ToLowerInvariant();
        if (key.Length == 0 || CorrectionRegistry.Find(key) is not null)
        {
            return key.Length == 0 ? null : key;
        }

        string[] batch = [.. CorrectionRegistry.All.Select(c => c.Key)];
        if (known.Corrections.Contains(key))
        {
            Refuse("correction", "online-in-family", $"{ShownText.Quote(key)} decides as experiments arrive, over a whole campaign and never inside a family: use one of {string.Join(", ", batch)}.");
        }
        else
        {
            Refuse("correction", "unknown-correction", KnownKeys.Unknown(key, "correction", batch));
        }

        return null;
    }

    private SignificanceLevel? Level()
    {
        ReadOnlySpan<byte> field = Field("level");
        NumberReading reading = DecimalText.Parse(field, mark, out ParsedDecimal value);
        if (reading == NumberReading.Missing)
        {
            return null;
        }

        if (reading != NumberReading.Number)
        {
            Refuse("level", NumberRefusal.Code(reading), NumberRefusal.Explain(reading, field));
            return null;
        }

        if (value.ToDouble() is > 0 and < 1)
        {
            return new SignificanceLevel(value.ToDouble());
        }

        Refuse("level", "out-of-range", $"{ShownText.Quote(field)} is out of range: a level lies between 0 and 1, both excluded, such as 0.02.");
        return null;
    }

    private FamilyGate Gate(string? opensAfter)
    {
        string word = Text("opens_when").ToLowerInvariant();
        if (word is not ("" or "any" or "all"))
        {
            Refuse("opens_when", "unknown-gate", $"{ShownText.Quote(word)} is no condition: write any (when one experiment of the other family survives) or all (when every one does).");
        }
        else if (word == "all" && opensAfter is null)
        {
            Refuse("opens_when", "gate-without-family", "the row says when it opens and not after which family: name one in opens_after, or leave both empty.");
        }

        return word == "all" ? FamilyGate.AllSurvive : FamilyGate.AnySurvives;
    }
}
