using System.Globalization;
using System.Text;
using System.Text.Json;
using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Outgoing;

/// <summary>A small campaign to which random things are done, with what the rules say of it kept beside.</summary>
internal sealed class BookkeepingCampaign : IDisposable
{
    private const string Code = "C";
    private static readonly string[] Corrections = ["bonferroni", "holm", "bh"];
    private static readonly string[] Deletions =
    [
        "DELETE FROM experiments", "DELETE FROM measurements", "DELETE FROM loads", "DELETE FROM test_results", "DELETE FROM test_runs", "DELETE FROM reviews", "DELETE FROM withdrawals",
        "DELETE FROM exclusions", "DELETE FROM plan_amendments", "DELETE FROM plan_amendment_changes", "DELETE FROM campaigns", "UPDATE withdrawals SET had_data = 0", "UPDATE withdrawals SET is_withdrawn = 1 - is_withdrawn",
        "UPDATE experiments SET campaign_id = 2", "UPDATE experiments SET family = 'other'", "UPDATE test_results SET p = 0.5 WHERE p IS NOT NULL", "DELETE FROM ledger",
    ];

    private readonly Random _random;
    private readonly Workbench _bench = new();
    private readonly Catalog.Catalog _catalog;
    private readonly List<HeldExperiment> _held = [];
    private readonly string _correction;
    private readonly bool _hasFamilies;
    private int _files;

    public BookkeepingCampaign(Random random)
    {
        _random = random;
        _correction = Corrections[random.Next(Corrections.Length)];
        _hasFamilies = random.Next(3) == 0;
        _catalog = Catalog.Catalog.OpenOrCreate(_bench.Catalog, TimeProvider.System);
        int count = random.Next(3, 8);
        for (int i = 1; i <= count; i++)
        {
            _held.Add(new HeldExperiment(FormattableString.Invariant($"E{i}"), _hasFamilies ? i % 2 == 0 ? "even" : "odd" : null));
        }

        new CampaignStore(_catalog).Open(new Campaign
        {
            Code = Code,
            ErrorRate = _correction == "bh" ? ErrorRate.FalseDiscovery : ErrorRate.Familywise,
            Level = new SignificanceLevel(0.05),
            Correction = _correction,
            OpenedAt = DateTimeOffset.UnixEpoch,
        });
        new PlanStore(_catalog).Register(Code, [.. _held.Select(Plan)]);
        new CampaignStore(_catalog).Seal(Code);
    }

    /// <summary>Does one thing at random.</summary>
    /// <returns>What was done.</returns>
    public string Step()
    {
        HeldExperiment e = _held[_random.Next(_held.Count)];
        return _random.Next(12) switch
        {
            0 => Delete(),
            1 or 2 => Withdraw(e),
            3 => TakeBack(),
            4 => Exclude(e),
            5 => AddExperiment(),
            6 => ChangeReplicates(e),
            7 => Review(),
            8 or 9 => Test(),
            _ => Load(e),
        };
    }

    /// <summary>What is wrong with the campaign as the program reads it; null where all is as the rules say.</summary>
    public string? Fault()
    {
        CampaignStanding standing = Standing();
        CampaignOverview overview = new OverviewReader(_catalog).Read(new CampaignStore(_catalog).Get(Code));
        int size = _held.Count(e => !e.Left);
        if (standing.FamilySize != size || overview.FamilySize != size || standing.Families.Sum(f => f.Size) != size || !standing.Families.SequenceEqual(overview.Families))
        {
            return FormattableString.Invariant($"the family counts {standing.FamilySize} and {overview.FamilySize} where the rules say {size}");
        }

        if (standing.Withdrawn.CountAsOne != _held.Count(e => e.IsWithdrawn && !e.Left) || standing.Withdrawn.Left != _held.Count(e => e.Left))
        {
            return $"withdrawn: {standing.Withdrawn}";
        }

        foreach ((HeldExperiment held, ExperimentResult shown) in _held.Zip(standing.Experiments))
        {
            bool hasP = held is { IsCurrent: true, IsTestable: true, IsWithdrawn: false };
            if (held.Code != shown.Plan.Code || held.Status != shown.Status.Word() || held.Left != shown.LeftFamily || hasP != shown.P is not null || hasP != shown.AdjustedP is not null)
            {
                return $"{held.Code} shows as {shown.Status.Word()} with p {shown.P} where the rules say {held.Status}";
            }
        }

        return AdjustedFault(standing) ?? (overview.SurvivorCount == standing.SurvivorCount && overview.TestedCount == standing.TestedCount ? null : "two ways of counting survivors or tests differ");
    }

    /// <summary>What is wrong with what the program prints; null where every experiment is listed and every missing one counted.</summary>
    public string? FaultOfOutputs()
    {
        StoredCampaign stored = new CampaignStore(_catalog).Get(Code);
        if (SealedPlan.Digest(_catalog, stored) != stored.Campaign.PlanDigest)
        {
            return "the sealed plan cannot be had back";
        }

        Ran results = _bench.Run("results", Code, "--format", "json");
        using var json = JsonDocument.Parse(results.Out);
        string shown = string.Join(' ', json.RootElement.EnumerateArray().Select(r => $"{r.GetProperty("experiment").GetString()}:{r.GetProperty("status").GetString()}"));
        string expected = string.Join(' ', _held.Select(e => $"{e.Code}:{e.Status}"));
        if (shown != expected)
        {
            return $"results lists {shown} where the rules say {expected}";
        }

        string people = string.Join(' ', _bench.Run("results", Code).Out.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries));
        int left = _held.Count(e => e.Left), asOne = _held.Count(e => e.IsWithdrawn && !e.Left);
        return (left > 0) != people.Contains(FormattableString.Invariant($"Withdrawn before any data: {left} experiment"), StringComparison.Ordinal) ? "those that left the family are not told"
            : (asOne > 0) != people.Contains(FormattableString.Invariant($"Withdrawn after their data came: {asOne} experiment"), StringComparison.Ordinal) ? "those that count with p = 1 are not told"
            : null;
    }

    public void Dispose()
    {
        _catalog.Dispose();
        _bench.Dispose();
    }

    private string? AdjustedFault(CampaignStanding standing)
    {
        foreach (IGrouping<string?, ExperimentResult> family in standing.Experiments.GroupBy(e => _hasFamilies ? e.Plan.Family : null))
        {
            ExperimentResult[] tested = [.. family.Where(e => e.P is not null)];
            double[] expected = FamilyOracle.Adjust(_correction, [.. tested.Select(e => e.P!.Value.Value)], _held.Count(e => e.Family == family.Key && !e.Left));
            for (int i = 0; i < tested.Length; i++)
            {
                double adjusted = tested[i].AdjustedP!.Value.Value;
                if (Math.Abs(adjusted - expected[i]) > 1e-12 * expected[i] || tested[i].Survives != (tested[i].Family!.Level.Value >= adjusted))
                {
                    return FormattableString.Invariant($"{tested[i].Plan.Code} has adjusted p {adjusted} where the definition gives {expected[i]}");
                }
            }
        }

        return null;
    }

    private CampaignStanding Standing() => new StandingReader(_catalog).Read(Code);

    private static PlannedExperiment Plan(HeldExperiment e) => new() { Code = e.Code, Groups = ["A", "B"], Test = "f", FollowUp = "none", Replicates = e.Replicates, Family = e.Family };

    /// <summary>Tries to delete or change rows behind the program's back; the catalog itself refuses, unless there is no such row.</summary>
    private string Delete()
    {
        string sql = Deletions[_random.Next(Deletions.Length)];
        using SqliteCommand command = _catalog.Connection.CreateCommand();
#pragma warning disable CA2100 // One of the texts above.
        command.CommandText = sql;
#pragma warning restore CA2100
        try
        {
            if (command.ExecuteNonQuery() > 0)
            {
                throw new InvalidOperationException($"'{sql}' was let through.");
            }
        }
        catch (SqliteException)
        {
            // As it must be.
        }

        return sql;
    }

    private string Withdraw(HeldExperiment e)
    {
        Dictionary<string, double> before = AdjustedNow();
        bool refused = Refuses(() => new WithdrawalStore(_catalog).Decide(Code, [e.Code], withdraw: true, "dropped", "Ada"));
        Expect(refused == e.IsWithdrawn, $"withdrawing {e.Code} was {(refused ? "refused" : "let through")}");
        if (!refused)
        {
            (e.IsWithdrawn, e.Left, e.IsCurrent) = (true, !e.HasData, false);
            if (e.HasData)
            {
                foreach ((string code, double adjusted) in AdjustedNow())
                {
                    Expect(adjusted >= before[code], $"{code} gained by dropping {e.Code} after its data");
                }
            }
        }

        return $"withdraw {e.Code}";
    }

    private Dictionary<string, double> AdjustedNow() => Standing().Experiments.Where(e => e.AdjustedP is not null).ToDictionary(e => e.Plan.Code, e => e.AdjustedP!.Value.Value, StringComparer.Ordinal);

    private string TakeBack()
    {
        HeldExperiment[] gone = [.. _held.Where(e => e.IsWithdrawn)];
        if (gone.Length == 0)
        {
            return "nothing to take back";
        }

        new WithdrawalStore(_catalog).Decide(Code, [.. gone.Select(e => e.Code)], withdraw: false, "again", "Ada");
        foreach (HeldExperiment e in gone)
        {
            (e.IsWithdrawn, e.Left) = (false, false);
        }

        return $"take back {string.Join('+', gone.Select(e => e.Code))}";
    }

    private string Exclude(HeldExperiment e)
    {
        if ((e.Excluded ?? e.FirstValue) is not { } place || e.Values < 3)
        {
            return "nothing to exclude";
        }

        bool takeBack = e.Excluded is not null;
        new ExclusionStore(_catalog).Decide(Code, e.Code, new ObservationPlace(place.Line, place.File), exclude: !takeBack, "spilled", "Ada");
        (e.Excluded, e.IsCurrent) = (takeBack ? null : place, false);
        return $"{(takeBack ? "include" : "exclude")} {e.Code}";
    }

    private string AddExperiment()
    {
        var added = new HeldExperiment(FormattableString.Invariant($"E{_held.Count + 1}"), _hasFamilies ? _random.Next(2) == 0 ? "even" : "odd" : null);
        Expect(Refuses(() => new PlanStore(_catalog).Register(Code, [Plan(added)])), "a sealed plan took an experiment without a reason");
        new PlanStore(_catalog).Register(Code, [Plan(added)], "one more");
        _held.Add(added);
        return $"add {added.Code}";
    }

    private string ChangeReplicates(HeldExperiment e)
    {
        e.Replicates = _random.Next(2, 5);
        new PlanStore(_catalog).Register(Code, [Plan(e)], "other number");
        Expect(Refuses(() => new PlanStore(_catalog).Register(Code, [Plan(e) with { Weight = 5 }], "heavier")), "a weight was changed after the seal");
        return FormattableString.Invariant($"{e.Replicates} replicates for {e.Code}");
    }

    private string Test()
    {
        TestRunSummary summary = new TestRunner(_catalog).Run(Code, includeIncomplete: false, _ => { }, default);
        HeldExperiment[] due = [.. _held.Where(e => e.IsDue)];
        Expect(summary.Tested == due.Count(e => e.IsTestable) && summary.NotTestable == due.Count(e => !e.IsTestable), $"tested {summary} where {string.Join('+', due.Select(e => e.Code))} were due");
        foreach (HeldExperiment e in due)
        {
            (e.IsCurrent, e.WasEverTested) = (true, true);
        }

        return "test";
    }

    private string Review()
    {
        var reviews = new ReviewStore(_catalog);
        if (reviews.CanReview(Code))
        {
            ReviewHead review = reviews.Take(Code, testedOnly: false).Review;
            int tested = _held.Count(e => e is { IsCurrent: true, IsTestable: true, IsWithdrawn: false });
            Expect(review.FamilySize == _held.Count(e => !e.Left) && review.TestedCount == tested, $"a review counted {review.TestedCount} of {review.FamilySize}");
            Expect(Standing().DecisionsSinceReview == 0, "a review that was just taken is out of date");
        }

        return "review";
    }

    /// <summary>Brings values: too few, enough, or such that no test is possible; to one that is withdrawn, or tested, they must be refused.</summary>
    private string Load(HeldExperiment e)
    {
        int values = _random.Next(1, 4);
        bool isConstant = !e.HasData && _random.Next(4) == 0;
        if (!e.IsTestable && e.HasData)
        {
            return "leave constant values alone";
        }

        string name = FormattableString.Invariant($"f{++_files}.csv");
        double gap = _random.Next(2) == 0 ? 0 : 3;
        var text = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < values; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"{e.Code},A,{(isConstant ? 5 : _random.NextDouble()):F6}\n{e.Code},B,{(isConstant ? 5 : gap + _random.NextDouble()):F6}\n");
        }

        string path = _bench.Write(name, text.ToString());
        bool refused = Refuses(() => new MeasurementLoader(_catalog).Load(Code, path, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default));
        Expect(refused == (e.IsWithdrawn || e.WasEverTested), $"a file for {e.Code} was {(refused ? "refused" : "let through")}");
        if (!refused)
        {
            e.Values += values;
            e.IsTestable = !isConstant;
            e.FirstValue ??= (name, 2);
        }

        return FormattableString.Invariant($"load {values} into {e.Code}");
    }

    private static bool Refuses(Action action)
    {
        try
        {
            action();
            return false;
        }
        catch (RefusedException)
        {
            return true;
        }
    }

    private static void Expect(bool isSo, string fault)
    {
        if (!isSo)
        {
            throw new InvalidOperationException(fault);
        }
    }
}
