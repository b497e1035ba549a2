using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Loading;

public sealed class FamilyFileTests
{
    // "lord" stands for a key that a campaign may name and a family may not: a procedure that decides as experiments arrive.
    private static readonly KnownKeys Known = new(["f"], ["none"], ["bh", "holm", "hommel", "lord"]);

    [Fact]
    public void A_full_row_gives_every_part_of_a_family()
    {
        FamilyFileResult result = Read("Opens_When;family;remark;LEVEL;correction;opens_after\n;main;x;0.03;Holm;\nall;second;y;;;main\nany;third;;0.01;;second\n");
        Assert.Empty(result.Problems.Sentences());
        Assert.Equal(["remark"], result.IgnoredColumns);
        Assert.Equal(
            [
                new Family("main") { Correction = "holm", Level = new SignificanceLevel(0.03) },
                new Family("second") { OpensAfter = "main", Gate = FamilyGate.AllSurvive },
                new Family("third") { Level = new SignificanceLevel(0.01), OpensAfter = "second" },
            ],
            result.Families);
    }

    [Fact]
    public void One_column_is_enough() => Assert.Equal([new Family("b"), new Family("a")], Read("family\nb\na\n").Families);

    [Theory]
    [InlineData("family,correction\na,hol\n", "unknown-correction@2:correction", "did you mean holm?")]
    [InlineData("family,correction\na,lord\n", "online-in-family@2:correction", "decides as experiments arrive")]
    [InlineData("family,level\na,0\n", "out-of-range@2:level", "between 0 and 1")]
    [InlineData("family,level\na,1\n", "out-of-range@2:level", "between 0 and 1")]
    [InlineData("family,level\na,\"0,03\"\n", "decimal-comma@2:level", "")]
    [InlineData("family,level\na,small\n", "not-a-number@2:level", "")]
    [InlineData("family\na\nb\na\n", "duplicate-family@4:family", "line 2")]
    [InlineData("family,level\n,0.1\n", "empty-name@2:family", "")]
    [InlineData("family,opens_after\na,\nb,c\n", "unknown-family@3:opens_after", "none of the families")]
    [InlineData("family,opens_after\nmain,\nb,mian\n", "unknown-family@3:opens_after", "did you mean \"main\"?")]
    [InlineData("family,opens_after\na,a\n", "waits-on-itself@2:opens_after", "waits on itself")]
    [InlineData("family,opens_after\na,\nb,c\nc,b\n", "waits-in-a-circle@3:opens_after waits-in-a-circle@4:opens_after", "over others")]
    [InlineData("family,opens_after,opens_when\na,,\nb,a,most\n", "unknown-gate@3:opens_when", "write any")]
    [InlineData("family,opens_when\na,all\n", "gate-without-family@2:opens_when", "not after which family")]
    [InlineData("name\na\n", "missing-column@1:family", "")]
    [InlineData("family\n", "no-rows@0", "")]
    [InlineData("", "empty-file@0", "")]
    public void What_is_wrong_is_refused_at_its_place(string text, string codes, string words)
    {
        FamilyFileResult result = Read(text);
        Assert.Equal(codes, string.Join(' ', Outcome.Codes(result.Problems)));
        Assert.Contains(words, string.Join(' ', result.Problems.Sentences()), StringComparison.Ordinal);
    }

    [Fact]
    public void A_level_may_have_a_decimal_comma_where_that_is_said()
    {
        using TestFile file = new("family;level\na;0,03\n", "families.csv");
        Assert.Equal(0.03, FamilyFile.Read(file.Path, new DelimitedFileOptions { DecimalMark = DecimalMark.Comma }, Known).Families[0].Level!.Value.Value);
    }

    private static FamilyFileResult Read(string text)
    {
        using TestFile file = new(text, "families.csv");
        return FamilyFile.Read(file.Path, DelimitedFileOptions.Default, Known);
    }
}
