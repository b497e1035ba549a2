using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Tests.Commands;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Dashboard.Actions;

public sealed class ActionRunTests : IDisposable
{
    private readonly ActionPlace _place = new();

    public static TheoryData<char, string[], string[]> Deeds => new()
    {
        { 'l', ["file=week-02.csv"], ["load", "mini", "week-02.csv"] },
        { 'l', ["file=late.csv", "decimal mark=comma", "separator=semicolon", "columns=value=Reading", "amend because=found a sheet"], ["load", "mini", "late.csv", "--decimal", "comma", "--separator", "semicolon", "--columns", "value=Reading", "--amend", "found a sheet"] },
        { 't', ["incomplete=tested too"], ["test", "mini", "--incomplete"] },
        { 'v', ["family=tested ones alone"], ["review", "mini", "--family", "tested"] },
        { 'w', ["experiments=E3, E1", "reason=resin no longer made"], ["withdraw", "mini", "E3", "E1", "--reason", "resin no longer made"] },
        { 'x', ["experiment=E1", "line=4", "reason=panel dropped"], ["exclude", "mini", "E1", "--line", "4", "--reason", "panel dropped"] },
        { 'x', ["experiment=E2", "line=9 of week-01.csv", "reason=panel dropped"], ["exclude", "mini", "E2", "--line", "9", "--file", "week-01.csv", "--reason", "panel dropped"] },
    };

    public void Dispose() => _place.Dispose();

    [Theory]
    [MemberData(nameof(Deeds))]
    public void A_preview_changes_no_byte_and_what_is_carried_out_is_what_the_command_does(char key, string[] fields, string[] command)
    {
        _place.Place.Write("week-02.csv", "experiment,group,value\nE3,a,1\nE3,a,2\nE3,b,2\nE3,b,4\n");
        _place.Place.Write("late.csv", "experiment;group;Reading\nE1;a;1,05\n");
        if (key == 't')
        {
            _place.Place.Run("load", ActionPlace.Code, _place.Place.Write("short.csv", "experiment,group,value\nE3,a,1\nE3,a,2\nE3,b,2\n")).Well();
        }

        string before = _place.Digest, copy = _place.Copy();
        using ActionRun run = _place.Begin(key, [.. fields.Select(f => f.Split('=', 2)).Select(f => (f[0], f[0] == "file" ? _place.Place.At(f[1]) : f[1]))]);
        _place.Enter(run);
        Assert.True(run.Stage == ActionStage.Preview, string.Join('\n', run.Sentences));
        Assert.Equal(before, _place.Digest);
        Assert.Equal("The record names as who did it: Ada (account lab).", run.Sentences[^1]);

        _place.Enter(run);
        Assert.True(run.Stage == ActionStage.Done, string.Join('\n', run.Sentences));
        Ran ran = _place.Place.Run([.. command.Select(w => w.EndsWith(".csv", StringComparison.Ordinal) && key == 'l' ? _place.Place.At(w) : w), "--catalog", copy, "--as", "Ada"]).Well();
        Assert.Equal(ActionPlace.DigestOf(copy), _place.Digest);
        string said = Flat(ran.Out + ran.Error).Replace("'campaigns test mini'", "key t", StringComparison.Ordinal).Replace("'campaigns review mini'", "key v", StringComparison.Ordinal);
        string[] ofDashboard = ["The page Experiments", "Key t tests what", "Results and survivors count this from now on; key v"];
        Assert.All(run.Sentences.Where(s => !ofDashboard.Any(o => s.StartsWith(o, StringComparison.Ordinal))), s => Assert.Contains(Flat(s), said, StringComparison.OrdinalIgnoreCase));
        Assert.True(run.Next());
    }

    [Fact]
    public void The_preview_of_a_test_holds_no_result_and_names_what_is_left_alone()
    {
        using ActionPlace place = new(isTested: false);
        place.Place.Run("load", ActionPlace.Code, place.Place.Write("short.csv", "experiment,group,value\nE3,a,1\n")).Well();
        using ActionRun run = place.Enter(place.Begin('t'));
        Assert.Equal(
            [
                "2 experiments of mini will be tested: E1, E2. Each is closed to more data from then on.",
                "Short of planned values: 1 (E3); left alone, and open to more data.",
                "No result is shown before: whoever tests has decided to test.",
                "The record names as who did it: Ada (account lab).",
            ],
            run.Sentences);
        place.Enter(run);
        Assert.Equal(["Tested 2 experiments of mini; 1 left alone because planned values are missing.", "Results and survivors count this from now on; key v takes it into a review."], run.Sentences);
        Assert.Equal(2, place.Model.Standing.TestedCount);
    }

    [Fact]
    public void The_preview_of_a_file_holds_it_against_the_plan()
    {
        string file = _place.Place.Write("w2.csv", "experiment,group,value\nE3,a,1\nE3,a,1.1\nE3,b,9\nE3,b,9.1\nE4,a,1\nE4,a,2\nE4,a,3\n");
        using ActionRun run = _place.Enter(_place.Begin('l', ("file", file)));
        Assert.Equal(
            [
                "w2.csv will be loaded: 7 rows for 2 experiments.",
                "In the file: 2 of 4 planned experiments: E3, E4.",
                "Complete with it: 1 (E3).",
                "Short of planned values even with it: 1 (E4: 2 of 4 planned replicates, 1 of 2 groups in the file).",
                "The record names as who did it: Ada (account lab).",
            ],
            run.Sentences);
        _place.Enter(run);
        Assert.Equal("Key t tests what is complete.", run.Sentences[^1]);

        string one = _place.Place.Write("w3.csv", "experiment,group,value\nE4,b,1\nE4,b,2\n");
        using ActionRun rest = _place.Enter(_place.Begin('l', ("file", one)));
        Assert.Contains("Complete with it: 1 (E4).", rest.Sentences);
        using ActionPlace place = new();
        using ActionRun first = place.Enter(place.Begin('l', ("file", place.Place.Write("w4.csv", "experiment,group,value\nE3,a,1\n"))));
        Assert.Contains("Planned and without any value from any file: 1 (E4).", first.Sentences);
        using ActionRun wrong = place.Enter(place.Begin('l', ("file", place.Place.Write("w5.csv", "experiment,group,value\nE9,a,1\n"))));
        Assert.Equal(ActionStage.Refused, wrong.Stage);
        Assert.Contains(wrong.Sentences, s => s.Contains("is no experiment of the campaign 'mini'", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData('l')]
    [InlineData('t')]
    [InlineData('v')]
    [InlineData('w')]
    [InlineData('x')]
    public void A_catalog_that_cannot_be_written_is_told_before_anything_is_promised(char key)
    {
        _place.Place.Run("load", ActionPlace.Code, _place.Place.Write("w2.csv", "experiment,group,value\nE3,a,1\nE3,a,1.1\nE3,b,9\nE3,b,9.1\n")).Well();
        ActionDesk reading = new(_ => Catalog.Catalog.OpenReadOnly(_place.Place.Catalog, _place.Place.Clock), _place.Desk.Actor, _place.Place.Clock);
        using ActionRun run = new(ActionList.Of(key)!, _place.Model, reading);
        for (int i = 0; i < run.Fields.Count; i++)
        {
            if (run.Fields[i] is { Words.Count: 0, Text.Length: 0 })
            {
                run.Type(i, run.Fields[i].Name == "line" ? "4" : "as asked");
            }
        }

        _place.Enter(run);
        Assert.Equal(ActionStage.Refused, run.Stage);
        string sentence = Assert.Single(run.Sentences);
        Assert.Contains("cannot be written: the file or its folder is read-only for you.", sentence, StringComparison.Ordinal);
        Assert.Contains("work on a copy of your own", sentence, StringComparison.Ordinal);
        using ActionRun report = new(ActionList.Of('o')!, _place.Model, reading);
        report.Type(0, _place.Place.At("read.html"));
        Assert.Equal(ActionStage.Preview, _place.Enter(report).Stage);
    }

    [Fact]
    public void The_preview_of_a_review_names_gained_and_lost_and_why()
    {
        _place.Place.Run("load", ActionPlace.Code, _place.Place.Write("w2.csv", "experiment,group,value\nE3,a,1\nE3,a,1.1\nE3,b,9\nE3,b,9.1\n")).Well();
        _place.Place.Run("withdraw", ActionPlace.Code, "E1", "--reason", "wrong resin").Well();
        _place.Place.Run("test", ActionPlace.Code).Well();
        using ActionRun run = _place.Enter(_place.Begin('v'));
        Assert.StartsWith("Review 2 of mini will hold: 1 of ", run.Sentences[0], StringComparison.Ordinal);
        Assert.Equal("Between review 1 and review 2: 1 gained, 1 lost, 0 survive in both.", run.Sentences[1]);
        Assert.Equal("Gained: E3, first tested since the earlier review.", run.Sentences[2]);
        Assert.Equal("Lost: E1, withdrawn (wrong resin).", run.Sentences[3]);
        _place.Enter(run);
        Assert.StartsWith("Review 2 of mini: 1 of ", run.Sentences[0], StringComparison.Ordinal);
        using ActionRun again = _place.Enter(_place.Begin('v'));
        Assert.False(again.HasEffect);
        Assert.True(again.Next());
    }

    [Fact]
    public void The_preview_of_a_withdrawal_tells_the_family_and_never_what_survives()
    {
        using ActionRun run = _place.Enter(_place.Begin('w', ("experiments", "E4, E1"), ("reason", "resin no longer made")));
        Assert.Contains("The family has 4 hypotheses now, and will have 3.", run.Sentences);
        Assert.Contains("Experiments withdrawn with data, which stay in the family and count with p = 1: 0 now, 1 then.", run.Sentences);
        Assert.Contains("Review 1 is kept as it is, and is out of date from then on.", run.Sentences);
        Assert.Contains(run.Sentences, s => s.Contains("came after them", StringComparison.Ordinal));
        Assert.DoesNotContain(run.Sentences, s => s.Contains("surviv", StringComparison.OrdinalIgnoreCase));
        _place.Enter(run);
        Assert.Equal(ExperimentStatus.Withdrawn, _place.Model.Standing.Experiments[0].Status);

        _place.Model.SelectPosition(0);
        using ActionRun back = _place.Begin('w', ("reason", "found more"));
        Assert.Equal(("E1", "take in again"), (back.Fields[0].Text, back.Fields[1].Text));
        _place.Enter(_place.Enter(back));
        Assert.True(back.Stage == ActionStage.Done, string.Join('\n', back.Sentences));
        Assert.NotEqual(ExperimentStatus.Withdrawn, _place.Model.Standing.Experiments[0].Status);
    }

    [Fact]
    public void The_preview_of_an_exclusion_says_which_result_falls()
    {
        using ActionRun run = _place.Enter(_place.Begin('x', ("experiment", "E1"), ("line", "4"), ("reason", "spilled")));
        Assert.StartsWith("To be recorded: E1, excluded: value 0.9 of group a (line 4 of week-01.csv), by Ada: spilled", run.Sentences[0], StringComparison.Ordinal);
        Assert.Contains("1 result falls: its experiment counts as not tested, with p = 1, until the test is run again.", run.Sentences);
    }

    [Fact]
    public void The_report_is_the_one_that_the_command_writes_and_nothing_is_replaced_unasked()
    {
        string file = _place.Place.At("out.html"), before = _place.Digest;
        using ActionRun run = _place.Enter(_place.Begin('o', ("file", file)));
        Assert.True(run.Stage == ActionStage.Preview, string.Join('\n', run.Sentences));
        Assert.False(File.Exists(file));
        Assert.DoesNotContain(run.Sentences, s => s.StartsWith("The record names", StringComparison.Ordinal));
        _place.Enter(run);
        Assert.True(run.Stage == ActionStage.Done, string.Join('\n', run.Sentences));
        Ran ran = _place.Place.Run("report", ActionPlace.Code, "--out", _place.Place.At("command.html")).Well();
        Assert.Equal(File.ReadAllText(_place.Place.At("command.html")), File.ReadAllText(file));
        Assert.Equal(Flat(ran.Out.Replace("command.html", "out.html", StringComparison.Ordinal)), Flat(string.Join(' ', run.Sentences)));
        Assert.Equal(before, _place.Digest);

        using ActionRun again = _place.Enter(_place.Begin('o', ("file", file)));
        Assert.Equal(ActionStage.Refused, again.Stage);
        Assert.Contains("exists; nothing was written", again.Sentences[0], StringComparison.Ordinal);
        using ActionRun replacing = _place.Enter(_place.Begin('o', ("file", file), ("a file there", "is replaced")));
        Assert.Contains("in the place of the one that is there", replacing.Sentences[0], StringComparison.Ordinal);
        using ActionRun catalog = _place.Enter(_place.Begin('o', ("file", _place.Place.Catalog), ("a file there", "is replaced")));
        Assert.Contains("is the catalog itself", catalog.Sentences[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Marks_come_before_the_selected_experiment()
    {
        using ActionRun selected = _place.Begin('w');
        Assert.Equal("E1", selected.Fields[0].Text);
        _place.Model.MarkSelected();
        _place.Model.Select(2);
        _place.Model.MarkSelected();
        using ActionRun marked = _place.Begin('w');
        Assert.Equal("E1, E3", marked.Fields[0].Text);
    }

    [Fact]
    public void A_refusal_says_what_the_command_says_line_by_line_and_leads_back_to_the_form()
    {
        string file = _place.Place.Write("bad.csv", "experiment,group,value\nE3,a,12..5\nE3,q,1\n"), before = _place.Digest;
        Ran ran = _place.Place.Run("load", ActionPlace.Code, file);
        using ActionRun run = _place.Enter(_place.Begin('l', ("file", file)));
        Assert.Equal(ActionStage.Refused, run.Stage);
        Assert.Equal(ran.Error.TrimEnd('\n').Split('\n').Select(l => l.Trim()), run.Sentences);
        Assert.Equal(before, _place.Digest);
        Assert.False(run.Next());
        Assert.Equal(ActionStage.Form, run.Stage);
        Assert.Equal(file, run.Fields[0].Text);
    }

    [Theory]
    [InlineData('l', "file", "nowhere.csv", "nowhere.csv")]
    [InlineData('w', "experiments", "E9", "has no experiment 'E9'")]
    [InlineData('x', "line", "four", "not 'four'")]
    [InlineData('x', "line", "99", "No value of experiment 'E1' stands on line 99")]
    [InlineData('l', "columns", "value", "--columns")]
    public void What_cannot_be_done_is_told_in_a_sentence(char key, string field, string text, string words)
    {
        (string, string)[] rest = key == 'l' ? [("file", _place.Place.At("week-01.csv"))] : [("reason", "because")];
        if (key == 'x')
        {
            rest = [.. rest, ("experiment", "E1")];
        }

        using ActionRun run = _place.Enter(_place.Begin(key, [.. rest, (field, text)]));
        Assert.Equal(ActionStage.Refused, run.Stage);
        Assert.Contains(words, run.Sentences[0], StringComparison.Ordinal);
        Assert.DoesNotContain("A fault of the program", run.Sentences[0], StringComparison.Ordinal);
    }

    [Fact]
    public void What_is_missing_or_unwritable_is_told_before_anything_is_opened()
    {
        _place.OnOpen = () => Assert.Fail("opened");
        using ActionRun run = _place.Begin('w', ("reason", "  "));
        run.Next();
        Assert.Equal((2, "Why? A reason is recorded with every such decision."), run.Complaint);
        run.Type(2, "bad\u0007bell");
        Assert.Null(run.Complaint);
        run.Next();
        Assert.Contains("control character", run.Complaint!.Value.Sentence, StringComparison.Ordinal);
        Assert.Equal(ActionStage.Form, run.Stage);
    }

    [Fact]
    public void What_others_did_between_preview_and_carrying_out_is_told_and_previewed_again()
    {
        using ActionRun run = _place.Enter(_place.Begin('w', ("experiments", "E4"), ("reason", "resin")));
        _place.Place.Run("withdraw", ActionPlace.Code, "E3", "--reason", "no panels", "--as", "Ben").Well();
        string after = _place.Digest;
        _place.Enter(run);
        Assert.True(run.IsOutrun);
        Assert.Contains("Somebody changed this campaign after the preview", run.Sentences[0], StringComparison.Ordinal);
        Assert.Contains("Ben (account lab): withdrew an experiment of mini (E3)", run.Sentences[1], StringComparison.Ordinal);
        Assert.Equal(after, _place.Digest);
        Assert.Equal(ExperimentStatus.Withdrawn, _place.Model.Standing.Experiments[2].Status);

        _place.Enter(run);
        Assert.Equal(ActionStage.Preview, run.Stage);
        Assert.Contains("The family has 3 hypotheses now, and will have 2.", run.Sentences);
        _place.Enter(run);
        Assert.Equal(ActionStage.Done, run.Stage);
    }

    [Fact]
    public void A_catalog_that_another_program_holds_is_told_in_its_sentence()
    {
        using var other = new Microsoft.Data.Sqlite.SqliteConnection($"Data Source={_place.Place.Catalog};Pooling=False");
        other.Open();
        using Microsoft.Data.Sqlite.SqliteCommand command = other.CreateCommand();
        command.CommandText = "BEGIN IMMEDIATE";
        command.ExecuteNonQuery();
        using ActionRun run = _place.Enter(_place.Begin('w', ("experiments", "E4"), ("reason", "resin")));
        Assert.Equal(ActionStage.Refused, run.Stage);
        Assert.Contains("locked by another program", run.Sentences[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Enter_pressed_twice_by_mistake_carries_nothing_out()
    {
        using ActionRun run = _place.Enter(_place.Begin('w', ("experiments", "E4"), ("reason", "resin")));
        string before = _place.Digest;
        run.Next();
        Assert.Equal(ActionStage.Preview, run.Stage);
        _place.Enter(run);
        Assert.Equal(ActionStage.Done, run.Stage);
        Assert.NotEqual(before, _place.Digest);
    }

    [Fact]
    public void Escape_stops_the_work_and_nothing_of_it_is_kept()
    {
        var rows = string.Concat(Enumerable.Range(0, 60_000).Select(i => FormattableString.Invariant($"E3,{"ab"[i % 2]},{i % 977}.5\n")));
        using ActionRun run = _place.Enter(_place.Begin('l', ("file", _place.Place.Write("large.csv", "experiment,group,value\n" + rows))));
        Assert.Equal(ActionStage.Preview, run.Stage);
        string before = _place.Digest;
        using ManualResetEventSlim held = new();
        _place.OnOpen = held.Wait;
        _place.Place.Clock.Advance(ActionRun.ReadingTime);
        run.Next();
        Assert.False(run.Back());
        Assert.True(run.IsStopping);
        held.Set();
        ActionPlace.Await(run);
        Assert.Equal(ActionStage.Refused, run.Stage);
        Assert.Equal(["Stopped: nothing was changed."], run.Sentences);
        Assert.Equal(before, _place.Digest);
        Assert.False(run.Back());
        Assert.Equal(ActionStage.Form, run.Stage);
        Assert.True(run.Back());
    }

    [Fact]
    public void After_an_action_selection_filter_and_marks_are_kept()
    {
        _place.Model.SelectPosition(1);
        _place.Model.MarkSelected();
        _place.Model.SetFilter("a");
        string selected = _place.Model.Selected!.Plan.Code;
        using ActionRun run = _place.Enter(_place.Enter(_place.Begin('w', ("experiments", "E4"), ("reason", "resin"))));
        Assert.Equal(ActionStage.Done, run.Stage);
        Assert.Equal((selected, "a", 1), (_place.Model.Selected!.Plan.Code, _place.Model.FilterText, _place.Model.Marks.Count));
        Assert.Equal(3, _place.Model.Standing.FamilySize);
    }

    private static string Flat(string text) => string.Join(' ', text.Split([' ', '\n'], StringSplitOptions.RemoveEmptyEntries));
}
