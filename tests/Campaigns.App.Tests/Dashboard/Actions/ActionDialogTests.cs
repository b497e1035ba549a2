using Campaigns.App.Dashboard.Actions;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard.Actions;

[Collection(ScreenTests.Name)]
public sealed class ActionDialogTests : IDisposable
{
    private readonly ActionPlace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Menu_form_preview_and_end_look_as_kept(int width, int height)
    {
        using TestScreen screen = Screen(width, height);
        screen.InDialog(Key.A, Menu());
        screen.InDialog(Key.W, Withdraw());
        Golden.Match($"action-after-{width}x{height}", screen.Text, Here);

        IEnumerable<int> Menu()
        {
            yield return 0;
            Golden.Match($"action-menu-{width}x{height}", screen.Press(Key.CursorDown).Text, Here);
        }

        IEnumerable<int> Withdraw()
        {
            yield return 0;
            Golden.Match($"action-form-{width}x{height}", screen.Text, Here);
            screen.Type("resin no longer made").Press(Key.Enter);
            foreach (int pass in Until(screen, "What will happen"))
            {
                yield return pass;
            }

            Golden.Match($"action-preview-{width}x{height}", screen.Text, Here);
            Read(screen);
            screen.Press(Key.Enter);
            foreach (int pass in Until(screen, "Recorded:"))
            {
                yield return pass;
            }

            Golden.Match($"action-done-{width}x{height}", screen.Text, Here);
            screen.Press(Key.Enter);
            yield return 0;
        }
    }

    [Theory]
    [InlineData(80, 24, false)]
    [InlineData(120, 40, false)]
    [InlineData(80, 24, true)]
    public void A_refused_file_is_shown_line_by_line_and_can_be_scrolled(int width, int height, bool ascii)
    {
        string rows = string.Concat(Enumerable.Range(1, 40).Select(i => FormattableString.Invariant($"E3,a,{i}..5\n")));
        string name = _place.Place.Write("bad.csv", "experiment,group,value\n" + rows);
        using TestScreen screen = Screen(width, height, ascii);
        screen.InDialog(Key.L, Load());

        IEnumerable<int> Load()
        {
            yield return 0;
            screen.Type(name).Press(Key.Enter);
            foreach (int pass in Until(screen, "Not done; nothing was changed"))
            {
                yield return pass;
            }

            string kept = screen.Text.Replace(_place.Place.Folder, "(a folder)", StringComparison.Ordinal);
            Assert.Contains("lines 1 to", kept, StringComparison.Ordinal);
            Assert.Contains("was refused", kept, StringComparison.Ordinal);
            Assert.DoesNotContain("line 41", kept, StringComparison.Ordinal);
            Assert.Contains("line 41", screen.Press(Key.End).Text, StringComparison.Ordinal);
            if (ascii)
            {
                Assert.DoesNotContain(screen.Text, c => c > '~');
            }

            screen.Press(Key.Enter);
            yield return 0;
            Assert.Contains("Enter preview", screen.Text, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void Work_under_way_shows_what_is_done_of_what_and_can_be_stopped(int width, int height)
    {
        using ManualResetEventSlim held = new();
        using TestScreen screen = Screen(width, height);
        HeldAction action = new(held);
        using ActionRun run = new(action, screen.Model, _place.Desk);
        screen.InDialog(run, Work());
        Assert.Equal(ActionStage.Form, run.Stage);

        IEnumerable<int> Work()
        {
            yield return 0;
            screen.Press(Key.Enter);
            foreach (int pass in Until(screen, "What will happen"))
            {
                yield return pass;
            }

            Read(screen);
            screen.Press(Key.Enter);
            foreach (int pass in Until(screen, "45 %"))
            {
                yield return pass;
            }

            _place.Place.Clock.Advance(TimeSpan.FromSeconds(3));
            yield return 0;
            Golden.Match($"action-work-{width}x{height}", screen.Text, Here);
            screen.Press(Key.Esc);
            yield return 0;
            Assert.Contains("stopping", screen.Text, StringComparison.Ordinal);
            held.Set();
            foreach (int pass in Until(screen, "Stopped: nothing was changed."))
            {
                yield return pass;
            }

            screen.Press(Key.Enter);
            yield return 0;
        }
    }

    [Fact]
    public void Letters_go_into_a_text_field_and_begin_no_action()
    {
        using TestScreen screen = Screen(80, 24);
        screen.Press(new Key('/')).Type("a l t v w x o").Press(Key.Esc, Key.Esc);
        screen.InDialog(Key.X, Exclude());
        Assert.False(screen.IsStopped);

        IEnumerable<int> Exclude()
        {
            yield return 0;
            screen.Type("4").Press(Key.Tab, Key.Tab);
            yield return 0;
            screen.Press(Key.CursorRight);
            yield return 0;
            Assert.Contains("< take in again >", screen.Text, StringComparison.Ordinal);
            screen.Press(Key.CursorLeft, Key.Tab).Type("lxq wav 1?");
            yield return 0;
            Assert.Contains("lxq wav 1?", screen.Text, StringComparison.Ordinal);
            screen.Press(Key.Tab.WithShift, Key.CursorUp);
            yield return 0;
            Assert.Contains("for example 41", screen.Text, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Tab_completes_lists_what_would_fit_and_then_goes_on()
    {
        using TestScreen screen = Screen(80, 24);
        screen.InDialog(Key.X, Exclude());

        IEnumerable<int> Exclude()
        {
            yield return 0;
            screen.Press(Key.Tab);
            yield return 0;
            Assert.Contains("2 of week-01.csv: a, 1", screen.Text, StringComparison.Ordinal);
            screen.Type("7").Press(Key.Tab);
            yield return 0;
            Assert.Contains(screen.Lines, l => l.Contains("line        7 of week-01.csv", StringComparison.Ordinal));
            screen.Press(Key.Tab);
            yield return 0;
            Assert.Contains("both are recorded", screen.Text, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void The_mouse_chooses_fields_words_suggestions_and_keys()
    {
        using TestScreen screen = Screen(80, 24);
        screen.InDialog(Key.A, Menu());
        screen.InDialog(Key.X, Exclude());

        IEnumerable<int> Menu()
        {
            yield return 0;
            Click(screen, "Esc");
            yield return 0;
        }

        IEnumerable<int> Exclude()
        {
            yield return 0;
            Click(screen, "< leave out >");
            yield return 0;
            Click(screen, "< take in again >");
            yield return 0;
            Click(screen, "line ");
            screen.Press(Key.Tab);
            yield return 0;
            Click(screen, "3 of week-01.csv: a, 1.1");
            yield return 0;
            Click(screen, "reason");
            screen.Type("spilled");
            yield return 0;
            Click(screen, "Enter preview");
            foreach (int pass in Until(screen, "excluded: value 1.1 of group a (line 3"))
            {
                yield return pass;
            }

            Click(screen, "Esc change");
            yield return 0;
            Click(screen, "Esc close");
            yield return 0;
        }
    }

    [Fact]
    public void Dialogs_live_through_every_size()
    {
        using TestScreen screen = Screen(80, 24);
        foreach (Key key in new[] { Key.A, Key.L, Key.W })
        {
            screen.InDialog(key, Sizes());
        }

        IEnumerable<int> Sizes()
        {
            yield return 0;
            foreach ((int w, int h) in new[] { (1, 1), (20, 5), (41, 13), (300, 90), (80, 24) })
            {
                screen.Resize(w, h);
                yield return 0;
            }
        }
    }

    [Fact]
    public void Hostile_text_is_shown_and_not_obeyed()
    {
        using TestScreen screen = Screen(80, 24);
        screen.InDialog(Key.L, Load());

        IEnumerable<int> Load()
        {
            yield return 0;
            screen.Type("no\u202Esuch").Press(Key.Enter);
            foreach (int pass in Until(screen, "Not done"))
            {
                yield return pass;
            }

            Assert.Contains("no\\u202Esuch", screen.Text, StringComparison.Ordinal);
            Assert.DoesNotContain('\u202e', screen.Sent);
        }
    }

    [Fact]
    public void Without_a_desk_nothing_can_be_done_and_nothing_is_offered()
    {
        using TestScreen screen = new(80, 24, _place.Source);
        Assert.DoesNotContain("actions", screen.Press(Key.A, Key.L).Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData('q')]
    [InlineData('c')]
    public void Control_and_q_or_c_leave_the_dashboard_from_a_dialog(char letter)
    {
        using TestScreen screen = Screen(80, 24);
        screen.InDialog(Key.L, Leave());
        Assert.True(screen.IsStopped);

        IEnumerable<int> Leave()
        {
            yield return 0;
            screen.Press(new Key(letter).WithCtrl);
            yield return 0;
        }
    }

    private static string Here { get; } = Beside();

    private static string Beside([System.Runtime.CompilerServices.CallerFilePath] string here = "") => Path.Combine(Path.GetDirectoryName(here)!, "..", "Golden.cs");

    private TestScreen Screen(int width, int height, bool ascii = false) => new(width, height, _place.Source, ascii, desk: _place.Desk);

    private void Read(TestScreen screen)
    {
        Assert.Contains("carry it out", screen.Text, StringComparison.Ordinal);
        _place.Place.Clock.Advance(ActionRun.ReadingTime);
    }

    private static void Click(TestScreen screen, string text)
    {
        int y = screen.Lines.ToList().FindLastIndex(l => l.Contains(text, StringComparison.Ordinal));
        Assert.True(y >= 0, $"'{text}' is not on the screen:\n{screen.Text}");
        screen.Click(screen.Lines[y].IndexOf(text, StringComparison.Ordinal) + 2, y);
    }

    private static IEnumerable<int> Until(TestScreen screen, string text)
    {
        while (!screen.Text.Contains(text, StringComparison.Ordinal))
        {
            yield return 0;
        }
    }
}
