namespace Campaigns.App.Tests.Commands;

public sealed class StopTests
{
    [Fact]
    public void A_run_that_is_stopped_ends_with_130_and_keeps_nothing_half_done()
    {
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        using var place = new Workplace();
        using var stopped = new Workplace { Cancel = stop.Token };
        stopped.Variables["CAMPAIGNS_CATALOG"] = place.Catalog;
        place.Run("start", "C").Well();
        string file = place.Write("m.csv", Workplace.TwoExperiments);
        stopped.Run("load", "C", file, "--format", "csv").Refused(130, "Stopped");
        Assert.Equal("0", place.Run("show", "C", "--format", "csv").Well().Csv.Column("files_loaded")[0]);

        place.Run("load", "C", file).Well();
        place.Run("seal", "C").Well();
        stopped.Run("test", "C", "--format", "csv").Refused(130, "Stopped");
        Assert.Equal("0", place.Run("show", "C", "--format", "csv").Well().Csv.Column("tested")[0]);
        Assert.Equal("2", place.Run("test", "C", "--format", "csv").Well().Csv.Column("tested")[0]);

        stopped.Run("run", Workplace.Demo, "--format", "csv").Refused(130, "Stopped");
        Assert.Equal(14, place.Run("run", Workplace.Demo, "--format", "csv").Well().Csv.Rows.Count);
    }
}
