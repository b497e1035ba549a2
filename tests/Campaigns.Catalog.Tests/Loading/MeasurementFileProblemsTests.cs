using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class MeasurementFileProblemsTests
{
    private const string Header = "experiment,group,value\n";

    [Fact]
    public void A_problem_says_file_line_column_and_what_to_do()
    {
        using TestFile file = new(Header + "E1,A,1\nE1,B,\"1,5\"\n");
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);
        ReadAll(measurements);

        ImportProblem problem = Assert.Single(measurements.Problems.Kept);
        Assert.Equal(("data.csv", 3L, "value", "decimal-comma"), (problem.File, problem.Line, problem.Column, problem.Code));
        Assert.StartsWith("data.csv line 3, column value: \"1,5\" has a comma", problem.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void A_missing_column_is_told_with_those_that_are_there_and_with_the_option()
    {
        using TestFile file = new("experiment,grp,value\nE1,A,1\n");
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);

        Assert.False(measurements.Read(out _));
        string sentence = Assert.Single(measurements.Problems.Sentences());
        Assert.Contains("\"experiment\", \"grp\", \"value\"", sentence, StringComparison.Ordinal);
        Assert.Contains("--columns group=HEADER", sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void All_problems_are_counted_and_the_first_hundred_kept()
    {
        using TestFile file = new(Header + string.Concat(Enumerable.Repeat("E1,A,x\nE1,A,1\n", 250)));
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);

        Assert.Equal(250, ReadAll(measurements));
        Assert.Equal(250, measurements.Problems.Count);
        Assert.Equal(100, measurements.Problems.Kept.Count);
        Assert.Equal(Enumerable.Range(0, 100).Select(i => 2L + (2 * i)), measurements.Problems.Kept.Select(p => p.Line));
        Assert.Equal(101, measurements.Problems.Sentences().Count());
        Assert.Contains("150 more problems, 250 in all", measurements.Problems.Sentences().Last(), StringComparison.Ordinal);
    }

    [Fact]
    public void Problems_of_several_files_add_up()
    {
        ImportProblems one = new();
        ImportProblems all = new();
        for (int i = 1; i <= 130; i++)
        {
            one.Add(new ImportProblem("a.csv", i, "", "code", "text."));
        }

        all.AddAll(one);
        all.AddAll(one);
        Assert.Equal(260, all.Count);
        Assert.Equal(100, all.Kept.Count);
        Assert.False(all.IsEmpty);
    }

    [Fact]
    public void Lines_are_physical_ones_whatever_comes_between()
    {
        string text = "\r\n" + "experiment,group,value,note\r\n" + "E1,A,1,\"a\r\nb\nc\rd\"\r\n" + "\n\r\r\n" + "E1,B,2,\"\"\"\"\r" + "E1,C,3,x\n" + ",,,\n" + "E1,D,4,";
        using TestFile file = new(text);
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);
        List<long> lines = [];
        while (measurements.Read(out MeasurementRow row))
        {
            lines.Add(row.Line);
        }

        Assert.True(measurements.Problems.IsEmpty);
        Assert.Equal([3, 10, 11, 13], lines);
    }

    [Fact]
    public void Columns_that_are_not_used_are_listed()
    {
        using TestFile file = new("operator,experiment,,group,value,Note\nx,E1,y,A,1,z\n");
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);

        Assert.Equal(["operator", "(column 3, without a name)", "Note"], measurements.IgnoredColumns);
        Assert.Equal(1, ReadAll(measurements));
        Assert.False(measurements.HasSpecimens || measurements.HasBlocks || measurements.HasOrder);
    }

    [Fact]
    public void Names_are_at_most_two_hundred_characters()
    {
        foreach (string character in (string[])["x", "ä", "\uD83E\uDDEA"])
        {
            string longest = string.Concat(Enumerable.Repeat(character, 200));
            Assert.Equal($"E1/{longest}=1 name-too-long@3:group", Outcome.OfMeasurements(Encoding.UTF8.GetBytes($"{Header}E1,{longest},1\nE1,{longest}{character},1\n")));
        }
    }

    [Fact]
    public void A_field_above_64_KiB_is_refused_and_reading_goes_on()
    {
        string text = $"experiment,group,value,note\nE1,A,1,{new string('x', 65_536)}\nE1,B,2,{new string('x', 65_537)}\nE1,C,3,\n";
        Assert.Equal("E1/A=1 E1/C=3 field-too-long@3:note", Outcome.OfMeasurements(Encoding.UTF8.GetBytes(text)));
    }

    [Theory]
    [InlineData("E1,A,1\nE1,B,")]
    [InlineData("E1,A,1\n\"")]
    public void A_field_of_16_MB_is_refused_at_its_line_within_bounded_memory(string start)
    {
        using TestFile file = new([.. Encoding.UTF8.GetBytes(Header + start), .. Enumerable.Repeat((byte)'7', 16_000_000), .. "\nE1,C,3\n"u8]);
        long before = GC.GetAllocatedBytesForCurrentThread();
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);

        Assert.Equal(1, ReadAll(measurements));
        Assert.Equal(["record-too-long@3"], Outcome.Codes(measurements.Problems));
        Assert.InRange(GC.GetAllocatedBytesForCurrentThread() - before, 0, 16_000_000);
    }

    [Fact]
    public void A_million_rows_are_read_without_memory_for_each()
    {
        using TestFile file = new(Header + string.Concat(Enumerable.Repeat("E1,A,12.5\nE1,Größe,7\n", 500_000)));
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);
        long before = GC.GetAllocatedBytesForCurrentThread();

        Assert.Equal(1_000_000, ReadAll(measurements));
        Assert.True(measurements.Problems.IsEmpty);
        Assert.InRange(GC.GetAllocatedBytesForCurrentThread() - before, 0, 1_000_000);
    }

    [Fact]
    public void Names_are_spelt_in_normal_form_C()
    {
        string path = Path.Combine(ReferenceFolder(), "loading", "composition.csv");
        (string Text, string Composed)[] cases = [.. File.ReadLines(path).Where(l => l[0] != '#').Skip(1).Select(l => l.Split(',')).Select(c => (Chars(c[0]), Chars(c[1])))];
        using TestFile file = new("experiment;group;value\n" + string.Concat(cases.Select(c => $"E;\"x{c.Text}x\";1\n")));
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, DelimitedFileOptions.Default);
        List<string> groups = [];
        while (measurements.Read(out MeasurementRow row))
        {
            groups.Add(Encoding.UTF8.GetString(row.Group));
        }

        Assert.InRange(cases.Length, 500, int.MaxValue);
        Assert.Equal(cases.Select(c => $"x{c.Composed}x"), groups);
        Assert.NotEmpty(measurements.RespelledNames);
    }

    [Fact]
    public void A_file_that_is_not_there_or_is_no_file_is_told_in_one_sentence()
    {
        using TestFile file = new("x");
        foreach (string path in (string[])[Path.Combine(file.Folder, "none.csv"), file.Folder, Path.Combine(file.Path, "inside.csv"), "", "a\0b"])
        {
            string message = Assert.Throws<LoadingException>(() => MeasurementFile.Open(path, DelimitedFileOptions.Default)).Message;
            Assert.EndsWith(".", message, StringComparison.Ordinal);
            Assert.DoesNotContain('\n', message);
            Assert.DoesNotContain('\0', message);
            Assert.Throws<LoadingException>(() => FileDigest.Sha256(path));
        }
    }

    // The digests of no bytes and of "abc" are those of FIPS 180-2 and of its examples.
    [Theory]
    [InlineData("", "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855")]
    [InlineData("abc", "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad")]
    public void A_digest_is_that_of_all_bytes(string text, string expected)
    {
        using TestFile file = new(text);
        Assert.Equal(new FileDigest(expected, text.Length), FileDigest.Sha256(file.Path));
    }

    private static int ReadAll(MeasurementFile measurements)
    {
        int rows = 0;
        while (measurements.Read(out _))
        {
            rows++;
        }

        Assert.Equal(rows, measurements.RowCount);
        return rows;
    }

    private static string Chars(string codes) => string.Concat(codes.Split(' ').Select(c => (char)Convert.ToInt32(c, 16)));

    private static string ReferenceFolder()
    {
        for (DirectoryInfo? at = new(AppContext.BaseDirectory); at is not null; at = at.Parent)
        {
            string candidate = Path.Combine(at.FullName, "tests", "reference");
            if (Directory.Exists(candidate))
            {
                return candidate;
            }
        }

        throw new DirectoryNotFoundException("tests/reference was not found above the test's folder.");
    }
}
