using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class DelimitedTableTests
{
    [Fact]
    public void Cells_are_kept_as_they_are_with_their_lines()
    {
        DelimitedTable table = Read("name,p,note\n a ,0.05,\"x, \"\"y\"\"\"\n\nb,1e-400,\"two\nlines\"\nc,,\n");

        Assert.Equal(["name", "p", "note"], table.Headers);
        Assert.Equal(3, table.RowCount);
        Assert.Equal([2, 4, 6], Enumerable.Range(0, 3).Select(table.Line));
        Assert.Equal([" a ", "0.05", "x, \"y\""], Enumerable.Range(0, 3).Select(c => table.Cell(0, c)));
        Assert.Equal(["b", "1e-400", "two\nlines"], Enumerable.Range(0, 3).Select(c => table.Cell(1, c)));
        Assert.Equal(["c", "", ""], Enumerable.Range(0, 3).Select(c => table.Cell(2, c)));
        Assert.Throws<ArgumentOutOfRangeException>(() => table.Cell(0, 3));
        Assert.True(table.Problems.IsEmpty);
    }

    [Fact]
    public void A_column_is_found_by_its_exact_header_first()
    {
        DelimitedTable table = Read("P,p,Value,x,x\n1,2,3,4,5\n");

        Assert.Equal(1, table.FindColumn("p"));
        Assert.Equal(0, table.FindColumn("P"));
        Assert.Equal(2, table.FindColumn(" value "));
        Assert.Contains("2 columns", Assert.Throws<LoadingException>(() => table.FindColumn("x")).Message, StringComparison.Ordinal);
        string message = Assert.Throws<LoadingException>(() => table.FindColumn("valeu")).Message;
        Assert.Contains("\"Value\" may be it", message, StringComparison.Ordinal);
        Assert.Contains("\"P\", \"p\", \"Value\"", message, StringComparison.Ordinal);
    }

    [Fact]
    public void Rows_of_another_width_are_refused()
    {
        DelimitedTable table = Read("a,p\n1,2\n3\n4,5,6\n");
        Assert.Equal(["too-few-fields@3", "too-many-fields@4"], Outcome.Codes(table.Problems));
        Assert.Equal(1, table.RowCount);
    }

    [Fact]
    public void Many_cells_take_little_more_than_their_text()
    {
        using TestFile file = new("id,p\n" + string.Concat(Enumerable.Range(0, 200_000).Select(i => FormattableString.Invariant($"{i},0.5\n"))));
        long before = GC.GetAllocatedBytesForCurrentThread();
        DelimitedTable table = DelimitedTable.Read(file.Path, DelimitedFileOptions.Default);

        Assert.Equal("199999", table.Cell(199_999, 0));
        Assert.InRange(GC.GetAllocatedBytesForCurrentThread() - before, 0, 20_000_000);
    }

    private static DelimitedTable Read(string text)
    {
        using TestFile file = new(text);
        return DelimitedTable.Read(file.Path, DelimitedFileOptions.Default);
    }
}
