using System.Runtime.CompilerServices;
using System.Text.RegularExpressions;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Texts kept beside the tests. With CAMPAIGNS_UPDATE_GOLDEN=1 they are written instead of compared.</summary>
internal static partial class Golden
{
    public static void Match(string name, string actual, [CallerFilePath] string here = "")
    {
        actual = LedgerHead().Replace(actual, "<hash>");
        string folder = Path.Combine(Path.GetDirectoryName(here)!, "golden");
        string file = Path.Combine(folder, name + ".golden"), received = Path.Combine(folder, name + ".received.txt");
        if (Environment.GetEnvironmentVariable("CAMPAIGNS_UPDATE_GOLDEN") == "1")
        {
            Directory.CreateDirectory(folder);
            File.WriteAllText(file, actual);
            return;
        }

        string expected = File.Exists(file) ? File.ReadAllText(file) : "";
        if (expected == actual)
        {
            File.Delete(received);
            return;
        }

        File.WriteAllText(received, actual);
        string[] left = expected.Split('\n'), right = actual.Split('\n');
        int line = left.Zip(right).TakeWhile(pair => pair.First == pair.Second).Count();
        Assert.Fail($"'{name}' differs from line {line + 1} on.\nkept: {left.ElementAtOrDefault(line)}\nnow:  {right.ElementAtOrDefault(line)}\nThe whole text is in {name}.received.txt.");
    }

    // The hash of a head changes with every version of the program and every kind of digest; that it is right is for other tests.
    [GeneratedRegex("(?<=[0-9]:)[0-9a-f]{64}")]
    private static partial Regex LedgerHead();
}
