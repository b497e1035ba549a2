using System.Xml.Linq;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

/// <summary>The direction of dependencies: App to Catalog to Domain to Statistics, and migrations to Catalog.</summary>
public sealed class ArchitectureTests
{
    [Theory]
    [InlineData("src/Campaigns.Statistics", new string[0])]
    [InlineData("src/Campaigns.Domain", new[] { "Campaigns.Statistics" })]
    [InlineData("src/Campaigns.Catalog", new[] { "Campaigns.Domain" })]
    [InlineData("migrations/Campaigns.Migrations.Sqlite", new[] { "Campaigns.Catalog" })]
    [InlineData("src/Campaigns.App", new[] { "Campaigns.Catalog", "Campaigns.Migrations.Sqlite" })]
    public void Projects_refer_only_to_the_next_room(string project, string[] references) =>
        Assert.Equal(references, Items(project, "ProjectReference").Select(r => Path.GetFileNameWithoutExtension(r.Replace('\\', '/'))));

    [Fact]
    public void Domain_knows_no_storage_and_no_screen()
    {
        Assert.Empty(Items("src/Campaigns.Domain", "PackageReference"));
        Assert.All(typeof(Campaign).Assembly.GetReferencedAssemblies(), a => Assert.Matches(@"^(System(\..*)?|Campaigns\.Statistics)$", a.Name));
    }

    [Fact]
    public void There_is_no_other_room_in_the_house() => Assert.Equal(
        ["Campaigns.App", "Campaigns.Catalog", "Campaigns.Domain", "Campaigns.Statistics"],
        Directory.EnumerateDirectories(Path.Combine(Root(), "src")).Select(d => Path.GetFileName(d)).Order(StringComparer.Ordinal));

    private static IEnumerable<string> Items(string project, string kind) =>
        XDocument.Load(Path.Combine(Root(), project, Path.GetFileName(project) + ".csproj")).Descendants(kind).Select(e => e.Attribute("Include")!.Value);

    private static string Root() => Path.Combine(ReferenceTable.Folder(), "..", "..");
}
