using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.App;
using Terminal.Gui.Drivers;
using Terminal.Gui.Input;
using Terminal.Gui.Testing;
using Terminal.Gui.Time;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class LoopPaceTests
{
    [Fact]
    public void The_loop_turns_fast_while_keys_come_and_slowly_two_seconds_later()
    {
        ushort usual = Application.MaximumIterationsPerSecond;
        Clock clock = new();
        using IApplication app = Application.Create(new VirtualTimeProvider());
        app.Init(DriverRegistry.Names.ANSI);
        using (LoopPace pace = new(app, clock))
        {
            Assert.Equal(LoopPace.Fast, Application.MaximumIterationsPerSecond);
            Assert.True(usual < LoopPace.Fast);
            clock.Seconds = 1.9;
            pace.Turn();
            Assert.Equal(LoopPace.Fast, Application.MaximumIterationsPerSecond);
            clock.Seconds = 2.1;
            pace.Turn();
            Assert.Equal(usual, Application.MaximumIterationsPerSecond);
            app.InjectKey(Key.CursorDown);
            Assert.Equal(LoopPace.Fast, Application.MaximumIterationsPerSecond);
        }

        Assert.Equal(usual, Application.MaximumIterationsPerSecond);
    }

    private sealed class Clock : TimeProvider
    {
        public double Seconds { get; set; }

        public override long TimestampFrequency => 1000;

        public override long GetTimestamp() => (long)(1000 * Seconds);
    }
}
