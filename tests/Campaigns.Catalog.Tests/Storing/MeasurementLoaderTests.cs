using Campaigns.Catalog.Loading;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Storing;

public sealed class MeasurementLoaderTests
{
    private static readonly PlannedExperiment E1 = TestCatalog.Experiment("E1", 2, "control", "treated");
    private static readonly PlannedExperiment E2 = TestCatalog.Experiment("E2");

    [Fact]
    public void A_file_is_counted_with_its_missing_values_and_its_digest()
    {
        using TestCatalog catalog = Sealed();
        LoadSummary load = catalog.Load("E1,control,1.0\nE1,control,NA\nE1,treated,\nE2,x,3\n");
        Assert.Equal((4, 2, 2, 0), (load.RowCount, load.MissingCount, load.ExperimentCount, load.NewExperimentCount));
        Assert.Equal(FileDigest.Sha256(catalog.Folder["data-1.csv"]).Hex, load.Sha256);
        Assert.Equal(["1|data-1.csv|4|2|2|NULL|1796112000000000"], Raw.Rows(catalog.Catalog.Connection, "SELECT campaign_id, file_name, row_count, missing_count, experiment_count, amendment_reason, loaded_at FROM loads"));
        Assert.Equal(["1|2", "1|0"], Raw.Rows(catalog.Catalog.Connection, "SELECT value_count, missing_count FROM measurements ORDER BY experiment_id"));
    }

    [Fact]
    public void Values_stand_as_they_were_typed_with_specimen_block_order_and_line()
    {
        using TestCatalog catalog = Sealed();
        catalog.LoadFile(catalog.Write("order;value;group;block;experiment;specimen\n3;1.50;treated;day 1;E1;P-1\n;2;control;;E1;\n-4;0.125;treated;day 1;E1;P-2\n"));
        Assert.Equal([$"1.500/1/3/P-1/day 1@2 2.000/0/{long.MinValue}/-/-@3 0.125/1/-4/P-2/day 1@4"], catalog.Packed("E1", withLines: true));
    }

    [Fact]
    public void A_plan_must_be_sealed_before_the_data_come()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Plan(E1);
        Assert.Contains("is not sealed", catalog.Refused("E1,control,1\n").Message, StringComparison.Ordinal);
    }

    [Fact]
    public void The_same_bytes_are_taken_once_whatever_the_files_name()
    {
        using TestCatalog catalog = Sealed();
        catalog.LoadFile(catalog.Write("experiment,group,value\nE2,x,3\n", "first.csv"));
        string before = catalog.Dump;
        string again = catalog.Write("experiment,group,value\nE2,x,3\n", "second.csv");
        RefusedException refused = Assert.Throws<RefusedException>(() => catalog.LoadFile(again));
        Assert.Contains("as 'first.csv' on 2026-12-01 08:00:00 UTC", refused.Message, StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
        Assert.Null(new MeasurementLoader(catalog.Catalog).LoadUnlessKnown(TestCatalog.Code, again, new LoadOptions(DelimitedFileOptions.Default), _ => { }, TestContext.Current.CancellationToken));
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void A_link_to_a_file_is_as_good_as_the_file()
    {
        using TestCatalog catalog = new();
        catalog.Start();
        string file = catalog.Write("experiment,group,value\n" + TestCatalog.Rows("E1", "A", "1 2 3"), "week-1.csv"), link = catalog.Folder["link.csv"];
        File.CreateSymbolicLink(link, file);
        Assert.Equal(3, catalog.LoadFile(link).RowCount);
        Assert.Contains("was loaded", Assert.Throws<RefusedException>(() => catalog.LoadFile(file)).Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("E1,control,1\nE3,x,2\nE3,x,3\nE1x,treated,2\n")]
    [InlineData("E1,control,1\nE3,x,2\nE1,control,5\nE3,x,3\nE1x,treated,2\n")]
    public void Unknown_experiments_are_told_with_line_column_rows_and_the_nearest(string rows)
    {
        using TestCatalog catalog = Sealed();
        RefusedException refused = catalog.Refused(rows);
        Assert.Contains("Problems: 2", refused.Message, StringComparison.Ordinal);
        Assert.Contains("data-1.csv line 3, column experiment: \"E3\" is no experiment of the campaign 'C' (did you mean 'E1'?)", refused.Details[0], StringComparison.Ordinal);
        Assert.EndsWith("(2 rows)", refused.Details[0], StringComparison.Ordinal);
        Assert.Contains("column experiment: \"E1x\" is no experiment", refused.Details[1], StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("E1,control,1\nE1,traeted,2\nE1,traeted,2\nE1,other,2\n", 3)]
    [InlineData("E1,control,1\nE2,x,2\nE1,traeted,2\nE1,traeted,2\nE1,other,2\n", 4)]
    public void Unknown_groups_of_a_planned_experiment_are_told_with_line_column_and_the_nearest(string rows, int line)
    {
        using TestCatalog catalog = Sealed();
        RefusedException refused = catalog.Refused(rows);
        Assert.Equal(2, refused.Details.Count);
        Assert.Contains(FormattableString.Invariant($"line {line}, column group: \"traeted\" is no group of experiment \"E1\" (did you mean 'treated'?); its groups are control, treated."), refused.Details[0], StringComparison.Ordinal);
        Assert.EndsWith("(2 rows)", refused.Details[0], StringComparison.Ordinal);
        Assert.Contains("\"other\" is no group", refused.Details[1], StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("E1,control,1\nE1,treated,one\nE3,x,2\n")]
    [InlineData("E1,control,1\nE3,x,2\nE1,treated,one\nE3,x,1\nE1,treated,1\n")]
    public void Bad_values_and_unknown_names_are_listed_together(string rows)
    {
        using TestCatalog catalog = Sealed();
        RefusedException refused = catalog.Refused(rows);
        Assert.Equal(2, refused.Details.Count);
        Assert.Contains(refused.Details, d => d.Contains("column value", StringComparison.Ordinal));
        Assert.Contains(refused.Details, d => d.Contains("\"E3\" is no experiment", StringComparison.Ordinal));
    }

    [Fact]
    public void A_hundred_problems_are_listed_and_all_are_counted()
    {
        using TestCatalog catalog = Sealed();
        RefusedException refused = catalog.Refused(string.Concat(Enumerable.Range(1, 150).Select(i => FormattableString.Invariant($"N{i},x,1\n"))));
        Assert.Contains("Problems: 150", refused.Message, StringComparison.Ordinal);
        Assert.Equal(101, refused.Details.Count);
        Assert.Equal("... and 50 more problems, 150 in all.", refused.Details[100]);
    }

    [Fact]
    public void A_header_alone_is_refused()
    {
        using TestCatalog catalog = Sealed();
        Assert.Contains("no rows", catalog.Refused("").Details.Single(), StringComparison.Ordinal);
    }

    [Fact]
    public void A_tested_experiment_takes_data_only_as_an_amendment_with_its_reason()
    {
        using TestCatalog catalog = Sealed();
        catalog.Load("E1,control,1\nE1,control,2\nE1,treated,3\nE1,treated,4\n");
        catalog.Test();
        RefusedException refused = catalog.Refused("E1,control,9\nE2,x,1\n");
        Assert.Contains("line 2, column experiment: experiment \"E1\" was tested already", Assert.Single(refused.Details), StringComparison.Ordinal);
        LoadSummary load = catalog.Load("E1,control,9\nE2,x,2\n", "panel found later");
        Assert.Equal(["E1"], load.AmendedExperiments);
        Assert.Equal(["NULL", "panel found later"], Raw.Rows(catalog.Catalog.Connection, "SELECT amendment_reason FROM loads ORDER BY id"));

        // A reason given for data that amend nothing is not recorded.
        catalog.Load("E2,x,3\n", "not needed");
        Assert.Equal("NULL", Raw.Rows(catalog.Catalog.Connection, "SELECT amendment_reason FROM loads ORDER BY id")[2]);
    }

    [Fact]
    public void Experiments_without_a_plan_come_from_the_data_and_the_campaign_is_marked()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        LoadSummary load = catalog.Load("Z,g10,1\nZ,g2,2\nA,x,3\n");
        Assert.Equal(2, load.NewExperimentCount);
        Assert.True(catalog.Standing.Campaign.IsExploratory);
        Assert.Equal(["A", "Z"], catalog.Standing.Experiments.Select(e => e.Plan.Code));
        Assert.Equal(["g2", "g10"], catalog.Result("Z").Plan.Groups);

        // More of the same, before and after sealing: known labels keep their places, new ones follow.
        catalog.Load("Z,g1,5\nB,y,4\n");
        Assert.Equal(["g2", "g10", "g1"], catalog.Result("Z").Plan.Groups);
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load("Z,g0,6\nD,y,4\n");
        Assert.Equal(["g2", "g10", "g1", "g0"], catalog.Result("Z").Plan.Groups);
        Assert.Equal(["A", "B", "D", "Z"], catalog.Standing.Experiments.Select(e => e.Plan.Code));
    }

    [Fact]
    public void A_refused_file_of_a_campaign_without_a_plan_leaves_no_experiment()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Refused("Z,g10,1\nZ,g2,2\nA,x,3\nA,y,four\n");
        catalog.Refused("Z,g10,1\nA,g2,2\nZ,x,3\nA,y,four\n");
        Assert.False(catalog.Standing.Campaign.IsExploratory);
    }

    [Fact]
    public void Scattered_rows_give_the_packed_contents_of_sorted_ones_but_for_the_lines()
    {
        var random = new Random(20261201);
        string[] sorted =
        [
            .. from e in Enumerable.Range(1, 40)
               from r in Enumerable.Range(1, 25)
               let g = random.Next(5)
               select FormattableString.Invariant($"E{e:D2},g{g},{Value(random)},{(random.Next(3) == 0 ? "" : $"S{g}{random.Next(3)}")},{(random.Next(2) == 0 ? $"day {random.Next(3)}" : "")},{(random.Next(4) == 0 ? "" : r)}"),
        ];

        // Rows of one experiment keep their order; those of several are dealt out in turn.
        string[] scattered = [.. Enumerable.Range(0, 25).SelectMany(r => Enumerable.Range(0, 40).Select(e => sorted[(e * 25) + r]))];
        using TestCatalog together = Planned(sorted), apart = Planned(scattered);
        for (int e = 1; e <= 40; e++)
        {
            string code = FormattableString.Invariant($"E{e:D2}");
            Assert.Equal(together.Packed(code), apart.Packed(code));
            Assert.NotEqual(together.Packed(code, withLines: true), apart.Packed(code, withLines: true));
        }

        const string counts = "SELECT experiment_id, value_count, missing_count FROM measurements";
        Assert.Equal(Raw.Rows(together.Catalog.Connection, counts), Raw.Rows(apart.Catalog.Connection, counts));

        static TestCatalog Planned(string[] rows)
        {
            var catalog = new TestCatalog();
            catalog.Seal([.. Enumerable.Range(1, 40).Select(e => TestCatalog.Experiment(FormattableString.Invariant($"E{e:D2}"), null, "g0", "g1", "g2", "g3", "g4"))]);
            catalog.LoadFile(catalog.Write("experiment,group,value,specimen,block,order\n" + string.Join('\n', rows) + "\n"));
            return catalog;
        }

        static string Value(Random random) => random.Next(12) switch
        {
            0 => "NA",
            1 => FormattableString.Invariant($"1234567890123456789012345678.{random.Next(100):D2}"),
            2 => FormattableString.Invariant($"{random.Next(1, 9)}e-12"),
            3 => "0",
            _ => FormattableString.Invariant($"{random.Next(-9999, 9999) / 100.0}"),
        };
    }

    [Fact]
    public void Wide_decimals_are_kept_to_the_last_digit()
    {
        using TestCatalog catalog = Sealed();
        catalog.Load("E2,x,123456789012345678901234567890\nE2,x,1e300\nE2,y,1e-300\nE2,y,0\nE2,y,-0.5\n");
        string[] values = catalog.Packed("E2").Single().Split(' ');
        Assert.StartsWith("123456789012345678901234567890." + new string('0', 300), values[0], StringComparison.Ordinal);
        Assert.StartsWith("1" + new string('0', 300) + "." + new string('0', 300), values[1], StringComparison.Ordinal);
        Assert.StartsWith("-0.5" + new string('0', 299) + "/1", values[4], StringComparison.Ordinal);
        catalog.Test();
        Assert.Equal(ExperimentStatus.Tested, catalog.Result("E2").Status);
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Work_that_is_stopped_in_the_middle_leaves_nothing(bool scattered)
    {
        using TestCatalog catalog = Sealed();
        string rows = string.Concat(Enumerable.Range(0, 50_000).Select(i => FormattableString.Invariant(
            $"{(scattered ? i % 2 == 0 : i < 25_000 ? true : false) switch { true => "E1,control", false => "E2,x" }},{i % 97}\n")));
        string path = catalog.Write("experiment,group,value\n" + rows);
        string before = catalog.Dump;
        using var stop = new CancellationTokenSource();
        var reports = new List<WorkProgress>();
        Assert.Throws<OperationCanceledException>(() => new MeasurementLoader(catalog.Catalog).Load(TestCatalog.Code, path, new LoadOptions(DelimitedFileOptions.Default), Stop, stop.Token));
        Assert.Equal(before, catalog.Dump);
        Assert.Equal(new FileInfo(path).Length, Assert.Single(reports).Total);
        Assert.Equal(50_000, catalog.LoadFile(path).RowCount);

        void Stop(WorkProgress report)
        {
            reports.Add(report);
            stop.Cancel();
        }
    }

    private static TestCatalog Sealed()
    {
        var catalog = new TestCatalog();
        catalog.Seal(E1, E2);
        return catalog;
    }
}
