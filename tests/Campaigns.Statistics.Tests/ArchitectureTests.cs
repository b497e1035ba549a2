using System.Text.RegularExpressions;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests;

public sealed class ArchitectureTests
{
    [Fact]
    public void Statistics_references_only_System_and_MathNet() =>
        Assert.All(typeof(GroupTest).Assembly.GetReferencedAssemblies(), a => Assert.Matches(@"^(System(\..*)?|MathNet\.Numerics)$", a.Name));

    /// <summary>The far tail of a law is its own branch: one minus the near tail has lost it.</summary>
    [Fact]
    public void No_tail_is_formed_by_taking_the_other_from_one()
    {
        var subtraction = new Regex(@"\b1(\.0)?\s*-\s*[\w.()]*(Cdf|CumulativeDistribution|LowerTail|UpperTail|BetaRegularized|GammaLowerRegularized|GammaUpperRegularized|Survival)\w*\(", RegexOptions.IgnoreCase);
        Assert.Matches(subtraction, "return 1 - law.UpperTail(f);");
        Assert.Matches(subtraction, "1.0 - FisherSnedecor.CDF(1, 2, x)");
        string folder = Path.Combine(ReferenceTable.Folder(), "..", "..", "src", "Campaigns.Statistics");
        string[] files = [.. Directory.EnumerateFiles(folder, "*.cs", SearchOption.AllDirectories).Where(f => !f.Contains($"{Path.DirectorySeparatorChar}obj{Path.DirectorySeparatorChar}", StringComparison.Ordinal))];
        Assert.True(files.Length > 10);
        Assert.All(files, file => Assert.All(
            File.ReadLines(file).Select(l => l.Split("//")[0]),
            line => Assert.DoesNotMatch(subtraction, line)));
    }
}
