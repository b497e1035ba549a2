using System.Runtime.CompilerServices;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Texts kept beside the tests. With CAMPAIGNS_UPDATE_GOLDEN=1 they are written instead of compared.</summary>
internal static class Golden
{
    public static void Match(string name, string actual, [CallerFilePath] string here = "")
    {
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
}
