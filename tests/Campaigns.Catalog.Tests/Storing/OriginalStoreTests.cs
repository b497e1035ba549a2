using System.Globalization;
using System.Text;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Originals;

namespace Campaigns.Catalog.Tests.Storing;

public sealed class OriginalStoreTests
{
    public static TheoryData<string, string, string, string, string> Forms => new()
    {
        { "", "experiment,group,value\nE1,a,1.5\nE1,b,2\n", "utf-8", "comma", "point" },
        { "efbbbf", "experiment;group;value\r\nE1;a;1,5\r\nE1;b;2\r\n", "utf-8 with mark", "semicolon", "comma" },
        { "fffe", "experiment\tgroup\tvalue\nE1\ta\t1.5\nE1\tb\tµ\n", "utf-16le", "tab", "point" },
        { "feff", "sep=;\nexperiment;group;value\nE1;a;1.5\nE1;b;2\n\n\n", "utf-16be", "semicolon", "point" },
    };

    [Theory]
    [MemberData(nameof(Forms))]
    public void The_bytes_come_back_as_they_were_with_how_they_were_read(string mark, string text, string encoding, string separator, string decimalMark)
    {
        ArgumentNullException.ThrowIfNull(text);
        using TestCatalog catalog = Exploratory();
        Encoding form = encoding switch { "utf-16le" => new UnicodeEncoding(false, false), "utf-16be" => new UnicodeEncoding(true, false), _ => new UTF8Encoding(false) };
        byte[] bytes = [.. Convert.FromHexString(mark), .. form.GetBytes(text.Replace("µ", "3", StringComparison.Ordinal))];
        string path = catalog.Folder["week 1.csv"];
        File.WriteAllBytes(path, bytes);
        Load(catalog, path, new DelimitedFileOptions { DecimalMark = decimalMark == "comma" ? DecimalMark.Comma : DecimalMark.Point });
        OriginalFile file = Assert.Single(new OriginalStore(catalog.Catalog).All(TestCatalog.Code));
        Assert.Equal(new FileForm(encoding, separator, decimalMark, "experiment=experiment\ngroup=group\nvalue=value"), file.Form);
        Assert.Equal(("week 1.csv", bytes.Length, FileDigest.Sha256(path).Hex), (file.FileName, (int)file.ByteCount, file.Sha256));
        Assert.Equal(bytes, Read(catalog, file));
    }

    [Fact]
    public void Headers_that_were_taken_for_our_columns_are_told_as_the_file_spells_them()
    {
        using TestCatalog catalog = Exploratory();
        string path = catalog.Write("Code,Reading,EXPERIMENT,note,Block\na,1,E1,x,d1\nb,2,E1,y,d1\n");
        Load(catalog, path, new DelimitedFileOptions { Columns = ColumnMap.Parse("group=code,value=reading", MeasurementFile.ColumnNames) });
        Assert.Equal("experiment=EXPERIMENT\ngroup=Code\nvalue=Reading\nblock=Block", new OriginalStore(catalog.Catalog).All(TestCatalog.Code).Single().Form!.Columns);
    }

    /// <summary>Experiments together are read in one pass; scattered ones in a second, after the pieces of the first were given up.</summary>
    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void A_file_of_many_pieces_is_kept_whole_whatever_the_order_of_its_rows(bool together)
    {
        using TestCatalog catalog = Exploratory();
        var text = new StringBuilder("experiment,group,value,note\n");
        var random = new Random(4);
        for (int i = 0; i < 120_000; i++)
        {
            int experiment = together ? i / 400 : i % 300;
            text.Append(CultureInfo.InvariantCulture, $"E{experiment:000},{"ab"[i % 2]},{random.NextDouble():0.0000},{random.NextInt64():x16}\n");
        }

        string path = catalog.Write(text.ToString());
        Load(catalog, path, DelimitedFileOptions.Default);
        OriginalFile file = Assert.Single(new OriginalStore(catalog.Catalog).All(TestCatalog.Code));
        Assert.Equal(File.ReadAllBytes(path), Read(catalog, file));
        Assert.Equal(
            [FormattableString.Invariant($"{(file.ByteCount + (1 << 20) - 1) >> 20}|{file.ByteCount}|1048576")],
            Raw.Rows(catalog.Catalog.Connection, "SELECT o.piece_count, sum(p.byte_count), max(p.byte_count) FROM originals o JOIN original_pieces p ON p.load_id = o.load_id GROUP BY o.load_id"));
        Assert.True(file.ByteCount > 3 << 20);
    }

    [Fact]
    public void A_refused_file_leaves_no_piece_behind()
    {
        using TestCatalog catalog = Exploratory();
        var text = new StringBuilder();
        for (int i = 0; i < 300_000; i++)
        {
            text.Append("E1,a,1\n");
        }

        catalog.Refused(text.Append("E1,a,one\n").ToString());
        Assert.Equal(["0"], Raw.Rows(catalog.Catalog.Connection, "SELECT count(*) FROM original_pieces"));
    }

    [Fact]
    public void Bytes_that_were_changed_in_the_catalog_are_not_given_out_as_the_original()
    {
        using TestCatalog catalog = Exploratory();
        catalog.Load("E1,a,1\nE1,b,2\n");
        OriginalFile file = Assert.Single(new OriginalStore(catalog.Catalog).All(TestCatalog.Code));
        byte[] scratch = [];
        byte[] forged = PieceCompression.Compress("experiment,group,value\nE1,a,9\nE1,b,2\n"u8, ref scratch);
        Change(catalog, $"UPDATE original_pieces SET content = x'{Convert.ToHexString(forged)}'");
        Assert.Contains("SHA-256 does not match", Assert.Throws<RecordException>(() => Read(catalog, file)).Message, StringComparison.Ordinal);
        Change(catalog, "UPDATE original_pieces SET content = x'00ff'");
        Assert.Contains("not those that were loaded", Assert.Throws<RecordException>(() => Read(catalog, file)).Message, StringComparison.Ordinal);
        Change(catalog, "DELETE FROM original_pieces");
        Assert.Throws<RecordException>(() => Read(catalog, file));
    }

    [Fact]
    public void The_ledger_speaks_for_the_bytes()
    {
        using TestCatalog catalog = Exploratory();
        catalog.Load("E1,a,1\nE1,b,2\n");
        LedgerEntry entry = new LedgerReader(catalog.Catalog).Entries(new LedgerFilter { Action = LedgerAction.Load }).Single();
        LedgerEvidence evidence = Assert.Single(entry.Evidence, e => e.Kind == "original");
        Assert.Equal(evidence.Digest, Digest(catalog));
        Change(catalog, "UPDATE originals SET decimal_mark = 'comma'");
        Assert.NotEqual(evidence.Digest, Digest(catalog));
    }

    [Fact]
    public void A_load_of_an_earlier_schema_has_no_bytes_and_is_listed_all_the_same()
    {
        using TestCatalog catalog = Exploratory();
        catalog.Load("E1,a,1\nE1,b,2\n");
        Change(catalog, "DELETE FROM original_pieces; DELETE FROM originals");
        OriginalFile file = Assert.Single(new OriginalStore(catalog.Catalog).All(TestCatalog.Code));
        Assert.False(file.IsKept);
    }

    /// <summary>Changes what the catalog's own rules let nobody change, as somebody would who takes the rules away first.</summary>
    private static void Change(TestCatalog catalog, string sql)
    {
        List<string> rules = Raw.Rows(catalog.Catalog.Connection, "SELECT name FROM sqlite_master WHERE type = 'trigger' AND tbl_name LIKE 'original%'");
        Raw.Execute(catalog.Catalog.Path, string.Concat(rules.Select(r => $"DROP TRIGGER \"{r}\"; ")) + sql);
    }

    private static string Digest(TestCatalog catalog)
    {
        using var digester = new EvidenceDigester(catalog.Catalog);
        return digester.Digest(EvidenceRegistry.Original, 1, 0, 0);
    }

    private static TestCatalog Exploratory()
    {
        var catalog = new TestCatalog();
        catalog.Start();
        return catalog;
    }

    private static void Load(TestCatalog catalog, string path, DelimitedFileOptions reading) =>
        new MeasurementLoader(catalog.Catalog).Load(TestCatalog.Code, path, new LoadOptions(reading), _ => { }, TestContext.Current.CancellationToken);

    private static byte[] Read(TestCatalog catalog, OriginalFile file)
    {
        using var bytes = new MemoryStream();
        new OriginalStore(catalog.Catalog).CopyTo(file, bytes);
        return bytes.ToArray();
    }
}
