using System.Text;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Loading;

/// <summary>Makes a planned experiment of the current row of a plan file.</summary>
internal sealed class PlanRow
{
    private const int LongestText = 1000;

    // A list of groups is one field of many names, each of which is checked on its own.
    private const int LongestList = 1 << 16;

    private readonly DelimitedFile _file;
    private readonly Dictionary<string, int> _places;
    private readonly DecimalMark _mark;
    private readonly NameText _names = new();
    private readonly NameText _texts = new(LongestText);
    private readonly NameText _lists = new(LongestList);
    private bool _isSound;

    public PlanRow(DelimitedFile file, Dictionary<string, int> places, DecimalMark mark)
    {
        _file = file;
        _places = places;
        _mark = mark;
    }

    /// <summary>The experiment's code in the row last made; empty where it has none.</summary>
    public string Code { get; private set; } = "";

    /// <summary>Makes the experiment, or reports all that is wrong with the row and gives null.</summary>
    public PlannedExperiment? Make(PlanDefaults defaults, KnownKeys known)
    {
        _isSound = true;
        Code = Text("experiment", _names);
        if (Code.Length == 0 && _isSound)
        {
            Refuse("experiment", "empty-name", "the field is empty: every row of a plan names its experiment.");
        }

        string[] groups = Groups();
        PlannedExperiment experiment = new()
        {
            Code = Code,
            Title = Text("title", _texts),
            Response = Text("response", _texts),
            Unit = Text("unit", _texts),
            Groups = groups,
            Control = Control(groups),
            Test = Key("test", known.Tests, defaults.Test),
            FollowUp = Key("follow_up", known.FollowUps, defaults.FollowUp),
            Replicates = Replicates(),
            SmallestEffect = Number("smallest_effect", allowZero: false),
            AssumedStandardDeviation = Number("assumed_sd", allowZero: false),
            Weight = Number("weight", allowZero: true),
            Family = Name("family"),
            Confirms = Name("confirms"),
            SharedControl = Name("shared_control"),
        };
        CheckFollowUp(experiment);
        return _isSound ? experiment : null;
    }

    /// <summary>A follow-up that the experiment's design cannot feed would only be found out after the data.</summary>
    private void CheckFollowUp(PlannedExperiment experiment)
    {
        if (!_isSound || FollowUpRegistry.Find(experiment.FollowUp) is not { } followUp)
        {
            return;
        }

        if (followUp.NeedsControl && experiment.Control is null)
        {
            Refuse("control", "missing-control", $"the follow-up {followUp.Key} holds every group against the control: name it, or plan another follow-up.");
        }

        if (!followUp.WorksWithinBlocks && GroupTestRegistry.Find(experiment.Test)?.UsesBlocks == true)
        {
            Refuse("follow_up", "follow-up-within-blocks", $"{followUp.Key} uses the variance of each group alone, which groups compared within blocks do not have: plan another follow-up for the test {experiment.Test}.");
        }
    }

    /// <summary>Reports a problem of a column in the current row.</summary>
    public void Refuse(string column, string code, string text)
    {
        _file.Report(_places[column], code, text);
        _isSound = false;
    }

    private ReadOnlySpan<byte> Field(string column) => _places[column] < 0 ? default : AsciiText.Trim(_file.Field(_places[column]));

    private string Text(string column, NameText cleaner)
    {
        NameFault? fault = cleaner.Clean(Field(column), out ReadOnlySpan<byte> text);
        if (fault is not null)
        {
            Refuse(column, fault.Code, fault.Text);
        }

        return Encoding.UTF8.GetString(text);
    }

    private string? Name(string column) => Text(column, _names) is { Length: > 0 } name ? name : null;

    private string[] Groups()
    {
        string text = Text("groups", _lists);
        if (text.Length == 0)
        {
            return [];
        }

        string[] groups = [.. text.Split('|').Select(g => g.Trim())];
        HashSet<string> seen = new(StringComparer.Ordinal);
        if (groups.Length < 2)
        {
            Refuse("groups", "too-few-groups", $"{ShownText.Quote(text)} is one group: name at least two, separated by |.");
        }

        foreach (string group in groups)
        {
            if (group.Length == 0)
            {
                Refuse("groups", "empty-name", $"{ShownText.Quote(text)} has an empty group: name each one between the | signs.");
            }
            else if (_names.Clean(Encoding.UTF8.GetBytes(group), out _) is NameFault fault)
            {
                Refuse("groups", fault.Code, fault.Text);
            }
            else if (!seen.Add(group))
            {
                Refuse("groups", "duplicate-group", $"{ShownText.Quote(group)} is named twice: name each group once.");
            }
        }

        return groups;
    }

    private string? Control(string[] groups)
    {
        string control = Text("control", _names);
        if (control.Length == 0)
        {
            return null;
        }

        if (groups.Length > 0 && !groups.Contains(control, StringComparer.Ordinal))
        {
            string near = Nearest.Of(control, groups) is string nearest ? $" (did you mean {ShownText.Quote(nearest)}?)" : "";
            Refuse("control", "unknown-control", $"{ShownText.Quote(control)} is none of the groups{near}: name one of them.");
        }

        return control;
    }

    private string Key(string column, IReadOnlyCollection<string> known, string fallback)
    {
        string key = Text(column, _names).ToLowerInvariant();
        if (key.Length == 0)
        {
            return fallback;
        }

        if (!known.Contains(key))
        {
            string kind = column == "test" ? "test" : "follow-up";
            Refuse(column, $"unknown-{kind}", KnownKeys.Unknown(key, kind, known));
        }

        return key;
    }

    private int? Replicates()
    {
        ReadOnlySpan<byte> field = Field("replicates");
        if (DecimalText.IsMissing(field))
        {
            return null;
        }

        if (IntegerText.TryParse(field, out long replicates) && replicates is >= 2 and <= int.MaxValue)
        {
            return (int)replicates;
        }

        Refuse("replicates", "bad-replicates", $"{ShownText.Quote(field)} is no number of replicates: write a whole number from 2 on.");
        return null;
    }

    private double? Number(string column, bool allowZero)
    {
        ReadOnlySpan<byte> field = Field(column);
        NumberReading reading = DecimalText.Parse(field, _mark, out ParsedDecimal value);
        if (reading == NumberReading.Missing)
        {
            return null;
        }

        if (reading != NumberReading.Number)
        {
            Refuse(column, NumberRefusal.Code(reading), NumberRefusal.Explain(reading, field));
            return null;
        }

        double number = value.ToDouble();
        if (number > 0 || (allowZero && number == 0))
        {
            return number;
        }

        Refuse(column, "out-of-range", $"{ShownText.Quote(field)} is out of range: write a number {(allowZero ? "from 0 on" : "above 0")}.");
        return null;
    }
}
