using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests;

/// <summary>Experiments that confirm earlier ones: what a plan may name, which data are new, and over which family the pairs are corrected.</summary>
public sealed class ConfirmationTests : IDisposable
{
    private const string Clear = "1.0 1.1 0.9 1.2";
    private const string Apart = "3.0 3.2 2.9 3.3";

    private readonly TestCatalog _catalog = new();

    public void Dispose() => _catalog.Dispose();

    [Theory]
    [InlineData("E9", "there is no experiment 'E9' to confirm (did you mean 'E1'?)")]
    [InlineData("A/F9", "there is no experiment 'A/F9' to confirm (did you mean 'A/F1'?)")]
    [InlineData("B/F1", "there is no experiment 'B/F1' to confirm; name one of this campaign, or CAMPAIGN/EXPERIMENT")]
    [InlineData("E2", "an experiment cannot confirm itself")]
    [InlineData("C/E2", "an experiment cannot confirm itself")]
    [InlineData("E3", "'E3' is registered after it; put the row of the experiment that is confirmed above")]
    [InlineData("A/F2", "'A/F2' confirms 'A/F1' itself; name 'A/F1'")]
    public void What_a_plan_may_not_confirm_is_refused_and_nothing_is_kept(string reference, string words)
    {
        Open("A");
        Register("A", Experiment("F1"), Experiment("F2") with { Confirms = "F1" });
        _catalog.Start();
        string before = _catalog.Dump;
        RefusedException refused = Assert.Throws<RefusedException>(() => _catalog.Plan(Experiment("E1"), Experiment("E2") with { Confirms = reference }, Experiment("E3")));
        Assert.Contains("column confirms; nothing was changed", refused.Message, StringComparison.Ordinal);
        Assert.Contains(words, Assert.Single(refused.Details), StringComparison.Ordinal);
        Assert.Equal(before, _catalog.Dump);
    }

    [Fact]
    public void An_experiment_that_is_confirmed_may_not_become_a_confirmation()
    {
        Open("A");
        Register("A", Experiment("F1"), Experiment("F2"));
        _catalog.Start();
        _catalog.Plan(Experiment("E1"), Experiment("E2") with { Confirms = "E1" }, Experiment("E3") with { Confirms = "A/F1" });
        Assert.Contains("it is confirmed by another experiment", Assert.Single(Assert.Throws<RefusedException>(() => Register("A", Experiment("F0"), Experiment("F1") with { Confirms = "C/E1" })).Details), StringComparison.Ordinal);
        Register("A", Experiment("F2") with { Confirms = "C/E1" });
    }

    [Fact]
    public void In_one_plan_the_family_is_the_confirmations_planned()
    {
        _catalog.Seal(Experiment("E1"), Experiment("E2"), Experiment("N1") with { Confirms = "E1" }, Experiment("N2") with { Confirms = "E2" });
        _catalog.Load(Two("E1", Clear, Apart) + Two("N1", "1.05 1.0 1.25 1.15", Apart) + Two("E2", Clear, Apart));
        _catalog.Test();
        Confirmation pair = _catalog.Result("N1").Confirmation!;
        PValue larger = new[] { _catalog.Result("E1").P!.Value, _catalog.Result("N1").P!.Value }.Max();
        Assert.Equal((larger, 2, false), (pair.P!.Value, pair.FamilySize, pair.First.WasTestedBefore));
        Assert.Equal(2 * larger.Value, pair.AdjustedP!.Value.Value, 1e-15);
        Assert.True(pair.IsReplicated);
        Assert.Null(_catalog.Result("N2").Confirmation!.P);
        Assert.Null(_catalog.Result("E1").Confirmation);
    }

    [Theory]
    [InlineData(true, 1)]
    [InlineData(false, 3)]
    public void In_another_campaign_it_depends_on_whether_the_seal_came_before_the_first_test(bool sealedFirst, int family)
    {
        Open("A");
        Register("A", Experiment("F1"), Experiment("F2"), Experiment("F3"));
        _catalog.Campaigns.Seal("A");
        Load("A", Two("F1", Clear, Apart));
        if (!sealedFirst)
        {
            TestIn("A");
            _catalog.Clock.Advance(TimeSpan.FromHours(1));
        }

        _catalog.Seal(Experiment("N1") with { Confirms = "A/F1" });
        _catalog.Clock.Advance(TimeSpan.FromHours(1));
        _catalog.Load(Two("N1", "1.05 1.0 1.25 1.15", Apart));
        _catalog.Test();
        if (sealedFirst)
        {
            Assert.Null(_catalog.Result("N1").Confirmation!.P);
            TestIn("A");
        }

        Confirmation pair = _catalog.Result("N1").Confirmation!;
        Assert.Equal((family, !sealedFirst, "A", "F1"), (pair.FamilySize, pair.First.WasTestedBefore, pair.First.Campaign, pair.First.Experiment));
        Assert.Equal(family * pair.P!.Value.Value, pair.AdjustedP!.Value.Value, 1e-15);
    }

    [Fact]
    public void Campaigns_that_confirm_each_other_are_read()
    {
        Open("A");
        Register("A", Experiment("F1"));
        _catalog.Start();
        _catalog.Plan(Experiment("E1"), Experiment("N1") with { Confirms = "A/F1" });
        Register("A", Experiment("F2") with { Confirms = "C/E1" });
        Assert.Equal("F1", _catalog.Result("N1").Confirmation!.First.Experiment);
    }

    [Fact]
    public void The_same_file_again_is_no_confirmation()
    {
        Open("A");
        Register("A", Experiment("E1"));
        _catalog.Campaigns.Seal("A");
        string file = _catalog.Write("experiment,group,value\n" + Two("E1", "1 1 2 2", "3 3 2 2"));
        Load("A", file, isPath: true);
        _catalog.Seal(Experiment("E1") with { Confirms = "A/E1" });
        string before = _catalog.Dump;
        RefusedException refused = Assert.Throws<RefusedException>(() => _catalog.LoadFile(file));
        Assert.Contains("the experiment \"C/E1\" confirms \"A/E1\" on new data, and this file has the same bytes as 'data-1.csv'", Assert.Single(refused.Details), StringComparison.Ordinal);
        Assert.Equal(before, _catalog.Dump);
    }

    [Fact]
    public void The_same_rows_in_another_file_and_order_are_none_either()
    {
        _catalog.Seal(Experiment("E1"), Experiment("N1") with { Confirms = "E1" });
        _catalog.Load(Two("E1", Clear, Apart));
        RefusedException refused = _catalog.Refused(TestCatalog.Rows("N1", "b", "3.2 3.0") + TestCatalog.Rows("N1", "a", "1.20 1.1"));
        Assert.Contains("line 2, column value: the experiment \"N1\" confirms \"E1\" on new data, and every row stands in \"E1\" with the same group and value", Assert.Single(refused.Details), StringComparison.Ordinal);

        // The groups exchanged, one value more of a kind, or one that is new: measurements of its own.
        _catalog.Load(TestCatalog.Rows("N1", "a", "3.2 3.0") + TestCatalog.Rows("N1", "b", "1.2 1.1"));
        _catalog.Load(TestCatalog.Rows("N1", "a", "1.1 1.1 1.0") + TestCatalog.Rows("N1", "b", "3.0 3.2"));
        _catalog.Load(TestCatalog.Rows("N1", "a", "1.1 1.0 0.95") + TestCatalog.Rows("N1", "b", "3.0 3.2"));
    }

    [Fact]
    public void Nor_is_it_where_the_first_experiment_gets_the_rows_of_its_confirmation()
    {
        _catalog.Seal(Experiment("E1"), Experiment("N1") with { Confirms = "E1" });
        _catalog.Load(Two("N1", Clear, Apart));
        Assert.Contains("the experiment \"E1\" is confirmed by \"N1\" on new data", Assert.Single(_catalog.Refused(Two("E1", Clear, Apart)).Details), StringComparison.Ordinal);
        _catalog.Load(Two("E1", "1.3 1.1 0.9 1.2", Apart));
    }

    [Fact]
    public void A_few_coarse_readings_agree_by_chance_and_other_specimens_are_other_data()
    {
        _catalog.Seal(Experiment("E1"), Experiment("N1") with { Confirms = "E1" }, Experiment("E2"), Experiment("N2") with { Confirms = "E2" });
        _catalog.Load(Two("E1", "1 1 2 2", "3 3 2 2"));
        _catalog.Load(Two("N1", "1 1 2 2", "3 3 2 2"));
        const string header = "experiment,group,value,specimen\n";
        _catalog.LoadFile(_catalog.Write(header + "E2,a,1.1,p1\nE2,a,1.2,p2\nE2,b,2.1,p3\nE2,b,2.2,p4\n"));
        string before = _catalog.Dump;
        Assert.Throws<RefusedException>(() => _catalog.LoadFile(_catalog.Write(header + "N2,a,1.1,p1\nN2,a,1.2,p2\nN2,b,2.1,p3\nN2,b,2.2,p4\n")));
        Assert.Equal(before, _catalog.Dump);
        _catalog.LoadFile(_catalog.Write(header + "N2,a,1.1,q1\nN2,a,1.2,q2\nN2,b,2.1,q3\nN2,b,2.2,q4\n"));
    }

    [Fact]
    public void More_data_for_a_tested_experiment_are_sent_to_a_confirmation()
    {
        _catalog.Seal(Experiment("E1"));
        _catalog.Load(Two("E1", Clear, Apart));
        _catalog.Test();
        Assert.Contains("Register a new experiment that confirms it (plan column confirms) and put the new data there, or give --amend REASON", Assert.Single(_catalog.Refused(Two("E1", "1", "3")).Details), StringComparison.Ordinal);
    }

    private static PlannedExperiment Experiment(string code) => TestCatalog.Experiment(code, null, "a", "b");

    private static string Two(string experiment, string a, string b) => TestCatalog.Rows(experiment, "a", a) + TestCatalog.Rows(experiment, "b", b);

    private void Open(string code) => _catalog.Campaigns.Open(new Campaign
    {
        Code = code,
        ErrorRate = ErrorRate.Familywise,
        Level = new SignificanceLevel(0.05),
        Correction = "holm",
        OpenedAt = _catalog.Clock.GetUtcNow(),
    });

    private void Register(string code, params PlannedExperiment[] experiments) => new PlanStore(_catalog.Catalog).Register(code, experiments);

    private void Load(string code, string rows, bool isPath = false) => new MeasurementLoader(_catalog.Catalog).Load(
        code, isPath ? rows : _catalog.Write("experiment,group,value\n" + rows), new LoadOptions(DelimitedFileOptions.Default), _ => { }, default);

    private void TestIn(string code) => new TestRunner(_catalog.Catalog).Run(code, false, _ => { }, default);
}
