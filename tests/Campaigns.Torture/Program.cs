using System.Diagnostics;
using System.Globalization;
using Campaigns.Torture;

const string Usage = "usage: Campaigns.Torture full|short [KEY...] [--seed N] [--tries N]";
string[] words = args;
int seed = Number("--seed") ?? 20261201;
int? tries = Number("--tries");
if (words.Length == 0 || words[0] is not ("full" or "short"))
{
    Console.Error.WriteLine(Usage);
    return 2;
}

bool isFull = words[0] == "full";
List<TortureTest> tests = [.. TortureRegistry.All.Select(make => make())];
string[] wanted = words[1..];
if (wanted.FirstOrDefault(w => tests.All(t => t.Key != w)) is { } unknown)
{
    Console.Error.WriteLine($"There is no test '{unknown}'; there are {string.Join(", ", tests.Select(t => t.Key))}. {Usage}");
    return 2;
}

bool clean = true;
foreach (TortureTest test in tests.Where(t => wanted.Length == 0 || wanted.Contains(t.Key)))
{
    int count = tries ?? (isFull ? test.Full : test.Short);
    if (count == 0)
    {
        continue;
    }

    var tally = new Tally(test.Key);
    long start = Stopwatch.GetTimestamp();
    tally.Guard(() => test.Run(tally, count, new Random(seed)));
    string time = Stopwatch.GetElapsedTime(start).TotalSeconds.ToString("F0", CultureInfo.InvariantCulture);
    string outcome = FormattableString.Invariant($"{tally.Tried} tried, {tally.Passed} passed") + (tally.NotTriable is { } why ? $", not triable here: {why}" : "");
    clean &= tally.IsClean;
    Console.WriteLine($"{test.Key,-4} {test.What}: {outcome} ({time} s)");
}

Console.WriteLine(FormattableString.Invariant($"seed {seed}; {(clean ? "everything passed" : "something failed")}"));
return clean ? 0 : 1;

int? Number(string name)
{
    int at = Array.IndexOf(words, name);
    if (at < 0)
    {
        return null;
    }

    if (at + 1 >= words.Length || !int.TryParse(words[at + 1], NumberStyles.None, CultureInfo.InvariantCulture, out int number))
    {
        Console.Error.WriteLine(Usage);
        Environment.Exit(2);
        return null;
    }

    words = [.. words[..at], .. words[(at + 2)..]];
    return number;
}
