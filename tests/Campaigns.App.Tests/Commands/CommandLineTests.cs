namespace Campaigns.App.Tests.Commands;

public sealed class CommandLineTests : IDisposable
{
    private readonly Workplace _place = new();

    public static TheoryData<string> Commands => new(CommandNames());

    public void Dispose() => _place.Dispose();

    private static IEnumerable<string> CommandNames()
    {
        using var place = new Workplace();
        return [.. place.Run("[suggest:10]", "campaigns ").Out.Split('\n').Where(w => w.Length > 0 && char.IsLetter(w[0]))];
    }

    [Fact]
    public void The_commands_of_a_whole_job_are_there() =>
        Assert.Superset(
            new HashSet<string>(["run", "start", "plan", "seal", "load", "test", "review", "results", "survivors", "corrections", "adjust", "size", "risk", "bound", "overall", "list", "show", "export", "dashboard", "upgrade", "completion"]),
            new HashSet<string>(CommandNames()));

    [Theory]
    [MemberData(nameof(Commands))]
    public void The_help_of_every_command_ends_with_an_example_of_it(string command)
    {
        string help = _place.Run(command, "--help").Well().Out;
        string[] lines = help.TrimEnd().Split('\n');
        Assert.Equal("Example:", lines[^2].Trim());
        Assert.StartsWith($"  campaigns {command}", lines[^1], StringComparison.Ordinal);
        Assert.DoesNotContain("System.", help, StringComparison.Ordinal);
        Assert.Contains(command == "report" ? "--format <html|markdown>" : "--format <table|csv|json>", help, StringComparison.Ordinal);
    }

    [Theory]
    [MemberData(nameof(Commands))]
    public void Examples_parse(string command)
    {
        string example = _place.Run(command, "--help").Out.TrimEnd().Split('\n')[^1].Trim();
        string[] words = [.. example.Split('>')[0].Split('"').SelectMany((part, i) => i % 2 == 1 ? [part] : part.Split(' ', StringSplitOptions.RemoveEmptyEntries)).Skip(1)];
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("none", "none.db");
        Assert.NotEqual(2, _place.Run(words).Code);
    }

    [Theory]
    [MemberData(nameof(Commands))]
    public void A_command_typed_with_two_letters_swapped_is_suggested(string command)
    {
        string mistyped = command[1..2] + command[..1] + command[2..];
        _place.Run(mistyped).Refused(2, $"There is no command '{mistyped}' (did you mean '{command}'?); 'campaigns --help' lists the commands.");
    }

    [Fact]
    public void No_command_and_unknown_words_are_wrong_usage()
    {
        _place.Run().Refused(2, "A command is missing", "'campaigns --help'");
        _place.Run("quxquux").Refused(2, "There is no command 'quxquux'; ");
        _place.Run("--hlep").Refused(2, "'--hlep'", "did you mean '--help'?");
        _place.Run("results", "A", "B").Refused(2, "'B' is too much for 'campaigns results'");
        _place.Run("results").Refused(2, "CODE", "'campaigns results --help'");
        _place.Run("export", "A").Refused(2, "--out");
        _place.Run("list", "@file").Refused(2, "'@file' is too much");
    }

    [Theory]
    [InlineData("--fromat", "csv", "--format")]
    [InlineData("--catlog", "x.db", "--catalog")]
    [InlineData("--topp", "3", "--top")]
    [InlineData("--fromat=csv", "", "--format")]
    public void A_mistyped_option_is_suggested_and_never_taken_for_a_name(string option, string value, string meant)
    {
        string[] rest = value.Length > 0 ? [option, value] : [option];
        _place.Run(["results", .. rest]).Refused(2, $"There is no option '{option.Split('=')[0]}' (did you mean '{meant}'?)");
        _place.Run(["results", "A", .. rest]).Refused(2, $"(did you mean '{meant}'?)");
        _place.Run(["load", "A", .. rest]).Refused(2, $"(did you mean '{meant}'?)");
    }

    [Theory]
    [InlineData("--top takes a whole number from 0", "results", "A", "--top", "-1")]
    [InlineData("--top takes a whole number from 0", "results", "A", "--top", "ten")]
    [InlineData("--top takes a whole number from 0", "results", "A", "--top", "1.5")]
    [InlineData("--top takes a whole number from 0", "results", "A", "--top", "99999999999")]
    [InlineData("--format takes table, csv or json, not 'xml'", "list", "--format", "xml")]
    [InlineData("(did you mean 'json'?)", "list", "--format", "jsn")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "NaN")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "1e999")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "0")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "1")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "-0.05")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "0,05")]
    [InlineData("--level takes a number between 0 and 1", "start", "A", "--level", "")]
    [InlineData("--level takes a number between 0 and 1", "adjust", "p.csv", "--level", "5")]
    [InlineData("--error-rate takes familywise or false-discovery", "start", "A", "--error-rate", "fdr")]
    [InlineData("(did you mean 'holm'?)", "start", "A", "--correction", "hulm")]
    [InlineData("--follow-up takes", "start", "A", "--follow-up", "pairs")]
    [InlineData("--test takes", "start", "A", "--test", "anova")]
    [InlineData("A campaign's code has 1 to 60", "start", "")]
    [InlineData("A campaign's code has 1 to 60", "start", "A B")]
    [InlineData("A campaign's code has 1 to 60", "start", "../A")]
    [InlineData("A campaign's code has 1 to 60", "start", "Prüfung")]
    [InlineData("CODE must not be empty", "results", " ")]
    [InlineData("--catalog must not be empty", "list", "--catalog", "")]
    [InlineData("--out must not be empty", "export", "A", "--out", "")]
    [InlineData("--amend must not be empty", "load", "A", "f.csv", "--amend", " ")]
    [InlineData("FILE must not be empty", "load", "A", "")]
    [InlineData("FILE must not be empty", "plan", "A", "")]
    [InlineData("--decimal takes point or comma", "load", "A", "f.csv", "--decimal", ",")]
    [InlineData("--separator takes comma, semicolon or tab", "load", "A", "f.csv", "--separator", ";")]
    [InlineData("--family takes planned or tested", "review", "A", "--family", "all")]
    [InlineData("--family-size takes a whole number from 1", "adjust", "p.csv", "--family-size", "0")]
    [InlineData("--family-size takes a whole number from 1", "adjust", "p.csv", "--family-size", "1e9")]
    [InlineData("SHELL takes bash, zsh or fish", "completion", "sh")]
    public void Values_that_mean_nothing_are_refused_with_what_may_be_typed(string sentence, params string[] arguments)
    {
        _place.Run(arguments).Refused(2, sentence);
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void Names_of_columns_that_we_do_not_have_are_wrong_usage()
    {
        _place.Run("start", "A").Well();
        string file = _place.Write("m.csv", Workplace.TwoExperiments);
        _place.Run("load", "A", file, "--columns", "valeu=Reading").Refused(2, "--columns: ", "did you mean value?");
        _place.Run("load", "A", file, "--columns", "").Refused(2, "--columns: ");
    }

    [Fact]
    public void The_suggest_directive_completes_commands_options_and_words()
    {
        Assert.Contains("results\n", Suggested("campaigns res"), StringComparison.Ordinal);
        Assert.Contains("--format\n", Suggested("campaigns results --fo"), StringComparison.Ordinal);
        Assert.Equal("csv\njson\ntable\n", Suggested("campaigns results --format "));
        Assert.Contains("holm-sidak\n", Suggested("campaigns start A --correction "), StringComparison.Ordinal);
        Assert.Equal("bash\nfish\nzsh\n", string.Concat(Suggested("campaigns completion ").Split('\n').Where(w => w.Length > 0 && w[0] != '-').Order(StringComparer.Ordinal).Select(w => w + "\n")));
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void The_version_is_told() => Assert.Matches(@"^\d+\.\d+\.\d+", _place.Run("--version").Well().Out);

    [Fact]
    public void Help_may_stand_beside_anything()
    {
        Assert.Contains("Example:", _place.Run("results", "--help").Well().Out, StringComparison.Ordinal);
        Assert.Contains("Commands:", _place.Run("-h").Well().Out, StringComparison.Ordinal);
        Assert.DoesNotContain("\n                              Example", _place.Run("--help").Well().Out, StringComparison.Ordinal);
    }

    private string Suggested(string line) => _place.Run($"[suggest:{line.Length}]", line).Well().Out;
}
