using System.Security.Cryptography;
using System.Text;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;

namespace Campaigns.Catalog.Tests.Ledger;

public sealed class LedgerWriterTests
{
    [Fact]
    public void Every_action_that_changes_the_catalog_writes_one_entry_and_the_chain_recomputes()
    {
        using var catalog = new TestCatalog();
        Live(catalog);
        LedgerEntry[] entries = Entries(catalog);
        Assert.Equal(["start", "plan", "seal", "load", "test", "review", "exclude", "include", "test"], entries.Select(e => e.Action));
        Assert.Equal(Enumerable.Range(1, entries.Length).Select(i => (long)i), entries.Select(e => e.Sequence));
        string previous = LedgerHead.Empty.Hash;
        foreach (LedgerEntry entry in entries)
        {
            Assert.Equal(ByHand(previous, entry), entry.Hash);
            previous = entry.Hash;
        }

        Assert.Equal(new LedgerHead(entries.Length, previous), new LedgerReader(catalog.Catalog).Head);
    }

    [Fact]
    public void What_changes_nothing_writes_nothing()
    {
        using var catalog = new TestCatalog();
        Live(catalog);
        LedgerHead head = new LedgerReader(catalog.Catalog).Head;
        catalog.Review();
        LedgerHead reviewed = new LedgerReader(catalog.Catalog).Head;
        Assert.Equal(head.Sequence + 1, reviewed.Sequence);
        catalog.Test();
        catalog.Review();
        catalog.Refused("E9,A,1\n");
        Assert.Equal(reviewed, new LedgerReader(catalog.Catalog).Head);
    }

    [Fact]
    public void A_change_without_an_entry_is_taken_back()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        string before = catalog.Dump;
        Assert.Throws<InvalidOperationException>(() => catalog.Catalog.Change(() =>
        {
            Raw.Execute(catalog.Catalog.Connection, "UPDATE campaigns SET title = 'x'");
            return 0;
        }));
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void A_clock_that_goes_back_is_recorded_as_such_and_the_sequence_rises()
    {
        using var catalog = new TestCatalog();
        catalog.Clock.AdjustTime(catalog.Clock.GetUtcNow());
        catalog.Start();
        catalog.Clock.AdjustTime(catalog.Clock.GetUtcNow().AddHours(-1));
        catalog.Plan(TestCatalog.Experiment("E1", null, "A", "B"));
        LedgerEntry entry = Entries(catalog)[^1];
        Assert.Equal(2, entry.Sequence);
        Assert.Equal(new LedgerChange("clock", "2026-12-01T08:00:00.000000Z", "2026-12-01T07:00:00.000000Z"), Assert.Single(entry.Changes));
    }

    [Fact]
    public void The_digest_of_rows_is_that_of_every_cell_with_its_type_and_length()
    {
        using var catalog = new TestCatalog();
        string reason = new('ä', 40_000);
        Live(catalog);
        new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(3, null), true, reason, "Ada");
        LedgerEvidence evidence = Assert.Single(Entries(catalog)[^1].Evidence);
        using var bytes = new MemoryStream();
        bytes.WriteByte(1);
        bytes.WriteByte(1);
        Text("exclusion");
        Integer(3);
        Integer(0);
        bytes.WriteByte((byte)'r');
        foreach (object cell in (object[])[3L, 1L, 1L, 3L, 1L, "A", "2", reason, "Ada", Instants.ToMicroseconds(catalog.Clock.GetUtcNow()), Campaigns.Catalog.Results.ProgramVersion.Current])
        {
            bytes.WriteByte(cell is long ? (byte)1 : (byte)3);
            if (cell is long number)
            {
                Integer(number);
            }
            else
            {
                Text((string)cell);
            }
        }

        Assert.Equal((3, Convert.ToHexStringLower(SHA256.HashData(bytes.ToArray()))), (evidence.Owner, evidence.Digest));

        void Integer(long value) => bytes.Write(BitConverter.GetBytes(value));

        void Text(string text)
        {
            Integer(Encoding.UTF8.GetByteCount(text));
            bytes.Write(Encoding.UTF8.GetBytes(text));
        }
    }

    [Theory]
    [InlineData("3:00000000000000000000000000000000000000000000000000000000000000Ff", true)]
    [InlineData("3:0000", false)]
    [InlineData("-3:0000000000000000000000000000000000000000000000000000000000000000", false)]
    [InlineData("0000000000000000000000000000000000000000000000000000000000000000", false)]
    [InlineData("3:000000000000000000000000000000000000000000000000000000000000000g", false)]
    [InlineData("", false)]
    public void A_head_is_read_as_it_is_printed(string text, bool isHead)
    {
        Assert.Equal(isHead, LedgerHead.TryParse(text, out LedgerHead head));
        Assert.Equal(isHead, string.Equals(head.ToString(), text, StringComparison.OrdinalIgnoreCase));
    }

    internal static LedgerEntry[] Entries(TestCatalog catalog) => [.. new LedgerReader(catalog.Catalog).Entries(new LedgerFilter())];

    /// <summary>A campaign's life: planned, sealed, loaded, tested, reviewed; a value left out and taken in again.</summary>
    internal static void Live(TestCatalog catalog)
    {
        catalog.Seal(TestCatalog.Experiment("E1", null, "A", "B"), TestCatalog.Experiment("E2", null, "A", "B"));
        catalog.Load(TestCatalog.Rows("E1", "A", "1 2 3") + TestCatalog.Rows("E1", "B", "7 8 9") + TestCatalog.Rows("E2", "A", "1 2 3") + TestCatalog.Rows("E2", "B", "1 2 4"));
        catalog.Test();
        catalog.Review();
        var exclusions = new ExclusionStore(catalog.Catalog);
        exclusions.Decide(TestCatalog.Code, "E1", new ObservationPlace(2, null), true, "spilled", "Ada");
        exclusions.Decide(TestCatalog.Code, "E1", new ObservationPlace(2, null), false, "it was another", "Ada");
        catalog.Test();
    }

    /// <summary>The hash as the format is described, with nothing of the program's: a byte 0, the label, the hash before, then the fields.</summary>
    private static string ByHand(string previous, LedgerEntry entry)
    {
        using var bytes = new MemoryStream();
        bytes.WriteByte(0);
        Text("campaigns ledger 1");
        Text(previous);
        Integer(entry.Sequence);
        Integer((entry.At - DateTimeOffset.UnixEpoch).Ticks / 10);
        foreach (string? text in (string?[])[entry.By.Account, entry.By.ActingAs, entry.ProgramVersion, entry.Action, entry.Campaign, entry.Subject, entry.Reason])
        {
            Text(text);
        }

        Integer(entry.Changes.Count);
        foreach (LedgerChange change in entry.Changes)
        {
            Text(change.What);
            Text(change.Before);
            Text(change.After);
        }

        Integer(entry.Evidence.Count);
        foreach (LedgerEvidence evidence in entry.Evidence)
        {
            Text(evidence.Kind);
            Integer(evidence.Owner);
            Integer(evidence.First);
            Integer(evidence.Last);
            Text(evidence.Digest);
        }

        return Convert.ToHexStringLower(SHA256.HashData(bytes.ToArray()));

        void Integer(long value) => bytes.Write(BitConverter.GetBytes(value));

        void Text(string? text)
        {
            bytes.WriteByte(text is null ? (byte)0 : (byte)1);
            if (text is not null)
            {
                byte[] utf8 = Encoding.UTF8.GetBytes(text);
                Integer(utf8.Length);
                bytes.Write(utf8);
            }
        }
    }
}
