using Campaigns.Catalog;

namespace Campaigns.App.Output;

/// <summary>Shows how far long work has come, on one line of standard error, where people watch it: what, how much, how fast, how long still.</summary>
internal sealed class ProgressLine(Host host) : IDisposable
{
    private static readonly TimeSpan FirstAfter = TimeSpan.FromMilliseconds(500);
    private static readonly TimeSpan Every = TimeSpan.FromMilliseconds(200);

    private string _what = "";
    private long _began;
    private long _last;
    private int _shownLength;

    /// <summary>Takes a report; most are passed over.</summary>
    public void Report(WorkProgress progress)
    {
        if (!host.ErrorIsTerminal)
        {
            return;
        }

        long now = host.Clock.GetTimestamp();
        if (progress.What != _what)
        {
            (_what, _began, _last) = (progress.What, now, 0);
        }

        TimeSpan elapsed = host.Clock.GetElapsedTime(_began, now);
        if (elapsed >= FirstAfter && (_last == 0 || host.Clock.GetElapsedTime(_last, now) >= Every))
        {
            _last = now;
            Show(Describe(progress, elapsed));
        }
    }

    /// <summary>Takes the line away.</summary>
    public void Dispose()
    {
        if (_shownLength > 0)
        {
            host.Error.Write($"\r{new string(' ', _shownLength)}\r");
            _shownLength = 0;
        }
    }

    /// <summary>For example "loading week-01.csv: 45 %, 12.3 MB/s, 4 s left".</summary>
    internal static string Describe(WorkProgress progress, TimeSpan elapsed)
    {
        double rate = progress.Done / Math.Max(elapsed.TotalSeconds, 1e-3);
        string rows = progress.Rows > 0 ? FormattableString.Invariant($"{progress.Rows} rows, ") : "";
        string speed = progress.Unit == "bytes"
            ? FormattableString.Invariant($"{rate / 1e6:0.0} MB/s")
            : FormattableString.Invariant($"{rate:0} {progress.Unit}/s");
        return progress.Total <= 0
            ? FormattableString.Invariant($"{progress.What}: {progress.Done} {progress.Unit}, {speed}")
            : FormattableString.Invariant($"{progress.What}: {rows}{Math.Min(100, 100.0 * progress.Done / progress.Total):0} %, {speed}, {Math.Max(0, progress.Total - progress.Done) / Math.Max(rate, 1):0} s left");
    }

    private void Show(string text)
    {
        text = SafeText.Escape(text);
        text = text.Length < host.Width ? text : text[..(host.Width - 1)];
        host.Error.Write($"\r{text.PadRight(_shownLength)}");
        _shownLength = text.Length;
    }
}
