using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>The pictures in README are what the program draws of the demonstration. With CAMPAIGNS_UPDATE_GOLDEN=1 they are drawn anew.</summary>
[Collection(ScreenTests.Name)]
public sealed class ReadmePictureTests
{
    private const string Folder = "campaigns/adhesion-screen/pictures";

    private static readonly (string File, string[] Command)[] Pictures =
    [
        ("dashboard-experiments.svg", ["dashboard", "adhesion-screen", "--page", "experiments", "--size", "120x36", "--picture"]),
        ("dashboard-ranking.svg", ["dashboard", "adhesion-screen", "--page", "ranking", "--size", "120x36", "--picture"]),
        ("observations.svg", ["plot", "adhesion-screen", "GS-09", "--out"]),
        ("survivors.svg", ["plot", "adhesion-screen", "--figure", "survivors", "--out"]),
        ("ranking.svg", ["plot", "adhesion-screen", "--out"]),
        ("risk.svg", ["plot", "adhesion-screen", "--figure", "risk", "--out"]),
    ];

    [Fact]
    public void Pictures_in_the_readme_are_those_that_the_program_draws()
    {
        using Workplace place = new();
        place.Run("run", Workplace.Demo).Well();
        string folder = Path.Combine(Workplace.Repository(), Folder);
        foreach ((string file, string[] command) in Pictures)
        {
            string kept = Path.Combine(folder, file), now = place.At(file);
            place.Run([.. command, now]).Well();
            if (Environment.GetEnvironmentVariable("CAMPAIGNS_UPDATE_GOLDEN") == "1")
            {
                File.Copy(now, kept, overwrite: true);
            }

            Assert.True(File.ReadAllText(now) == File.ReadAllText(kept), $"{Folder}/{file} is not what the program draws; CAMPAIGNS_UPDATE_GOLDEN=1 draws it anew, then look at it.");
        }
    }

    [Fact]
    public void Each_picture_stands_in_the_readme()
    {
        string readme = File.ReadAllText(Path.Combine(Workplace.Repository(), "README.md"));
        Assert.All(Pictures, p => Assert.Contains($"({Folder}/{p.File})", readme, StringComparison.Ordinal));
    }
}
