using Campaigns.App.Dashboard.Model;
using Campaigns.Catalog;

namespace Campaigns.App.Tests.Dashboard;

public sealed class SideJobTests
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(30);

    [Fact]
    public void It_gives_its_result_and_the_last_that_it_said_of_its_progress()
    {
        using var job = new SideJob<string>((report, _) =>
        {
            report(new WorkProgress("reading", 1, 2, "parts"));
            report(new WorkProgress("reading", 2, 2, "parts"));
            return "done";
        });
        AwaitEnd(job);
        Assert.Equal(("done", (long?)2), (job.Result, job.Progress?.Done));
        Assert.Null(job.Thrown);
        Assert.False(job.IsStopping);
    }

    [Fact]
    public void What_it_threw_is_kept_for_whoever_looks()
    {
        using var job = new SideJob<string>((_, _) => throw new CatalogException("The catalog is locked."));
        AwaitEnd(job);
        Assert.Null(job.Result);
        Assert.Equal("The catalog is locked.", Assert.IsType<CatalogException>(job.Thrown).Message);
        Assert.Same(job.Thrown, job.Fault);
    }

    [Fact]
    public void One_that_is_stopped_ends_and_that_is_no_fault()
    {
        using var job = new SideJob<string>((_, stop) =>
        {
            stop.WaitHandle.WaitOne();
            stop.ThrowIfCancellationRequested();
            return "never";
        });
        Assert.False(job.IsOver);
        Assert.True(job.StopAndWait(Patience));
        Assert.True(job.IsStopping);
        Assert.IsAssignableFrom<OperationCanceledException>(job.Thrown);
        Assert.Null(job.Fault);
        Assert.Null(job.Result);
    }

    [Fact]
    public void One_that_does_not_stop_is_not_waited_for_longer_than_was_said()
    {
        using var goOn = new ManualResetEventSlim();
        var job = new SideJob<string>((_, _) =>
        {
            goOn.Wait(Patience, TestContext.Current.CancellationToken);
            return "late";
        });
        Assert.False(job.StopAndWait(TimeSpan.Zero));
        goOn.Set();
        AwaitEnd(job);
        Assert.Equal("late", job.Result);
        job.Dispose();
    }

    [Fact]
    public void One_that_nobody_looks_at_any_more_is_asked_to_stop()
    {
        using var stopped = new ManualResetEventSlim();
        var job = new SideJob<string>((_, stop) =>
        {
            stop.WaitHandle.WaitOne();
            stopped.Set();
            throw new InvalidOperationException("Nobody sees this.");
        });
        job.Dispose();
        Assert.True(stopped.Wait(Patience, TestContext.Current.CancellationToken));
    }

    private static void AwaitEnd(SideJob<string> job) => Assert.True(SpinWait.SpinUntil(() => job.IsOver, Patience));
}
