using Campaigns.App.Dashboard.Actions;

namespace Campaigns.App.Tests.Dashboard.Actions;

public sealed class CodeListTests
{
    [Fact]
    public void Codes_with_commas_quotes_and_blanks_come_back_as_they_were()
    {
        string[] codes = ["E1", "a,b", "say \"x\"", " lead", "trail ", "two words", "\"", ","];
        Assert.Equal(codes, CodeList.Read(CodeList.Write(codes)));
        Assert.Equal("E1, E2", CodeList.Write(["E1", "E2"]));
    }

    [Theory]
    [InlineData("", new string[0])]
    [InlineData(" , ,", new string[0])]
    [InlineData("E1,E2", new[] { "E1", "E2" })]
    [InlineData(" E1 ,  E2 ", new[] { "E1", "E2" })]
    [InlineData("\"a,b", new[] { "a,b" })]
    public void Loose_typing_is_read(string typed, string[] codes) => Assert.Equal(codes, CodeList.Read(typed));

    [Fact]
    public void The_last_code_is_completed_and_those_that_are_named_are_not_offered_again()
    {
        (string, string)[] known = [("E1", "Gloss"), ("E10", ""), ("F,2", "Haze")];
        Assert.Equal(["E1, E10"], CodeList.Complete("E1, E", known).Select(s => s.Text));
        Assert.Equal(["E10, E1", "E10, \"F,2\""], CodeList.Complete("E10, ", known).Select(s => s.Text));
        Assert.Equal("E1  Gloss", CodeList.Complete("", known)[0].Shown);
    }

    [Fact]
    public void Files_are_completed_from_their_folder()
    {
        string folder = Directory.CreateTempSubdirectory("campaigns-test-").FullName;
        try
        {
            Directory.CreateDirectory(Path.Combine(folder, "weeks"));
            File.WriteAllText(Path.Combine(folder, "week-1.csv"), "");
            File.WriteAllText(Path.Combine(folder, "week-2.csv"), "");
            File.WriteAllText(Path.Combine(folder, ".hidden"), "");
            Assert.Equal([$"{folder}/week-1.csv", $"{folder}/week-2.csv", $"{folder}/weeks/"], FileNames.That(folder + "/").Select(s => s.Text));
            Assert.Equal($"{folder}/week", FileNames.CommonStart([.. FileNames.That(folder + "/we").Select(s => s.Text)]));
            Assert.Equal(["week-2.csv"], FileNames.That(folder + "/week-2").Select(s => s.Shown));
            Assert.Equal([$"{folder}/.hidden"], FileNames.That(folder + "/.h").Select(s => s.Text));
            Assert.Empty(FileNames.That(folder + "/nowhere/x"));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }
}
