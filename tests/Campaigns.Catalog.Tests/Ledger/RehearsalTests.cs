using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Ledger;

public sealed class RehearsalTests : IDisposable
{
    private readonly TestCatalog _catalog = new();

    public RehearsalTests() => LedgerWriterTests.Live(_catalog);

    public void Dispose() => _catalog.Dispose();

    private LedgerHead Head => new LedgerReader(_catalog.Catalog).Head;

    private string Digest => Convert.ToHexString(SHA256.HashData(File.ReadAllBytes(_catalog.Catalog.Path)));

    [Fact]
    public void What_is_rehearsed_comes_out_as_it_would_and_leaves_the_file_byte_for_byte_as_it_was()
    {
        (string digest, string dump, LedgerHead head) = (Digest, _catalog.Dump, Head);
        string file = _catalog.Write("experiment,group,value\n" + TestCatalog.Rows("E1", "A", "7 8 9.5"));
        Func<object>[] works =
        [
            () => new MeasurementLoader(_catalog.Catalog).Load(TestCatalog.Code, file, new LoadOptions(DelimitedFileOptions.Default, "late values"), _ => { }, default).RowCount,
            () => new ExclusionStore(_catalog.Catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(3, "data-1.csv"), true, "spilled", "Ada"),
            () => string.Join(';', new WithdrawalStore(_catalog.Catalog).Decide(TestCatalog.Code, ["E1", "E2"], true, "no resin", "Ada")),
            () => _catalog.Test(includeIncomplete: true),
            () => _catalog.Review(testedOnly: true).Review.SurvivorCount,
        ];
        foreach (Func<object> work in works)
        {
            (object first, LedgerHead seen) = _catalog.Catalog.Rehearse(work);
            Assert.Equal(head, seen);
            Assert.Equal(digest, Digest);
            Assert.Equal(dump, _catalog.Dump);
            Assert.Equal(head, Head);
            Assert.Equal(first, _catalog.Catalog.Rehearse(work).Result);
        }

        foreach (Func<object> work in works)
        {
            object rehearsed = _catalog.Catalog.Rehearse(work).Result, done = work();
            Assert.Equal(rehearsed, done);
        }

        Assert.NotEqual(head, Head);
    }

    [Fact]
    public void A_rehearsal_that_outgrows_the_memory_of_a_transaction_is_taken_back_from_the_file()
    {
        var rows = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < 25_000; i++)
        {
            for (int v = 0; v < 40; v++)
            {
                rows.Append(CultureInfo.InvariantCulture, $"N{i},{"ab"[v % 2]},{(i * 37 % 1000) + (v * v * 0.137):0.000}\n");
            }
        }

        using TestCatalog exploratory = new();
        exploratory.Start();
        string file = exploratory.Write(rows.ToString()), path = exploratory.Catalog.Path;
        byte[] before = File.ReadAllBytes(path);
        long grown = 0;
        (LoadSummary load, _) = exploratory.Catalog.Rehearse(() =>
        {
            LoadSummary loaded = new MeasurementLoader(exploratory.Catalog).Load(TestCatalog.Code, file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default);
            grown = new FileInfo(path).Length;
            return loaded;
        });
        Assert.Equal(1_000_000, load.RowCount);
        Assert.True(grown > before.Length, $"The file did not grow ({grown} bytes): this test has to load more.");
        Assert.Equal(before, File.ReadAllBytes(path));
    }

    [Fact]
    public void A_refusal_is_the_same_and_leaves_nothing()
    {
        (string digest, string dump) = (Digest, _catalog.Dump);
        string file = _catalog.Write("experiment,group,value\nE1,A,1\nE1,A,x\n");
        RefusedException Refusal(Func<Func<int>, object> way) => Assert.Throws<RefusedException>(() => way(() =>
            new MeasurementLoader(_catalog.Catalog).Load(TestCatalog.Code, file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, default).ExperimentCount));
        RefusedException rehearsed = Refusal(work => _catalog.Catalog.Rehearse(work)), done = Refusal(work => _catalog.Catalog.Change(work));
        Assert.Equal((done.Message, string.Join('|', done.Details)), (rehearsed.Message, string.Join('|', rehearsed.Details)));
        Assert.Contains("line 3", string.Join('|', rehearsed.Details), StringComparison.OrdinalIgnoreCase);
        Assert.Equal((digest, dump), (Digest, _catalog.Dump));
    }

    [Fact]
    public void A_change_that_names_the_head_of_the_rehearsal_is_refused_where_others_came_between()
    {
        (_, LedgerHead seen) = _catalog.Catalog.Rehearse(() => Exclude(_catalog.Catalog, 3));
        using (Catalog own = Catalog.Open(_catalog.Catalog.Path, _catalog.Clock, null, seen))
        {
            Exclude(own, 3);
        }

        using Catalog late = Catalog.Open(_catalog.Catalog.Path, _catalog.Clock, null, seen);
        ChangedSinceException refused = Assert.Throws<ChangedSinceException>(() => Exclude(late, 4));
        Assert.Equal("E1: line 3 of data-1.csv", Assert.Single(refused.Since).Subject);
    }

    [Fact]
    public void Nothing_is_rehearsed_inside_a_transaction_which_would_be_taken_back_too()
    {
        Assert.Throws<InvalidOperationException>(() => _catalog.Catalog.Change(() => _catalog.Catalog.Rehearse(() => 1)));
        Assert.Throws<InvalidOperationException>(() => _catalog.Catalog.Rehearse(() => _catalog.Catalog.Rehearse(() => 1)));
        Assert.Equal(1, _catalog.Catalog.Rehearse(() => 1).Result);
    }

    [Fact]
    public void Others_can_write_again_as_soon_as_a_rehearsal_is_over()
    {
        using Catalog other = Catalog.Open(_catalog.Catalog.Path, _catalog.Clock);
        _catalog.Catalog.Rehearse(() => Exclude(_catalog.Catalog, 3));
        Exclude(other, 3);
        Assert.Throws<RefusedException>(() => _catalog.Catalog.Rehearse(() => Exclude(_catalog.Catalog, 3)));
    }

    private static string Exclude(Catalog catalog, int line) =>
        new ExclusionStore(catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(line, null), true, "spilled", "Ada").Sentence;
}
