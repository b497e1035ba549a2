using System.Diagnostics;
using System.Globalization;
using System.Text;

namespace Campaigns.Torture.Outgoing;

/// <summary>T23: the same measurements give the same bytes, whatever the order of their rows, the files they are split into, the number of threads, and however often.</summary>
internal sealed class SameEveryTime : TortureTest
{
    /// <summary>One try in so many draws arrangements, which takes longer.</summary>
    private const int DrawsEvery = 10;

    /// <summary>One try in so many, from the first on, also runs as processes of one and of eight processors, which takes longest: a process starts in the time of ten commands.</summary>
    private const int ProcessesEvery = 5 * DrawsEvery;

    private static readonly string[] Readings = ["results", "survivors", "comparisons", "corrections", "corrections --by-experiment"];
    private static readonly string[] Tests = ["f", "welch", "brown-forsythe", "kruskal-wallis", "block-f"];
    private static readonly string[] FollowUps = ["none", "tukey-kramer", "games-howell", "dunnett", "scheffe", "holm-pairs"];
    private static readonly string[] Corrections = ["bh", "by", "holm", "hommel", "storey", "bky"];

    public override string Key => "T23";

    public override string What => "the same bytes from shuffled rows, other files, 1 and 8 threads, again";

    public override int Full => 1000;

    public override int Short => 10;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            int seed = random.Next();
            int number = i;
            tally.Try(FormattableString.Invariant($"campaign {i}, seed {seed}"), () => Fault(new Random(seed), number));
        }
    }

    private static string? Fault(Random random, int number)
    {
        bool asProcess = number % ProcessesEvery == 0;
        string correction = Corrections[random.Next(Corrections.Length)];
        (string plan, List<string> rows) = Invent(random, withDraws: number % DrawsEvery == 0);
        string expected = Read(plan, correction, [rows], threads: null);
        string[] shuffled = [.. rows];
        random.Shuffle(shuffled);
        int files = random.Next(1, 5);
        IEnumerable<string>[] parts = [.. Enumerable.Range(0, files).Select(f => shuffled.Where((_, i) => i % files == f))];
        return Different("shuffled, in other files", expected, Read(plan, correction, parts, threads: null))
            ?? (asProcess ? Different("with 1 processor", expected, Read(plan, correction, parts, threads: 1)) ?? Different("with 8 processors", expected, Read(plan, correction, parts, threads: 8))
                : number % DrawsEvery == 1 ? Different("a second time", expected, Read(plan, correction, [rows], threads: null)) : null);
    }

    private static string? Different(string what, string expected, string actual)
    {
        if (expected == actual)
        {
            return null;
        }

        string[] lines = expected.Split('\n');
        string[] others = actual.Split('\n');
        int at = Enumerable.Range(0, Math.Min(lines.Length, others.Length)).FirstOrDefault(i => lines[i] != others[i], Math.Min(lines.Length, others.Length) - 1);
        return $"{what}: '{lines[at]}' became '{others[at]}'";
    }

    /// <summary>A plan that names every group, and rows for it: blocks, readings of specimens, ties and unequal numbers among them.</summary>
    private static (string Plan, List<string> Rows) Invent(Random random, bool withDraws)
    {
        var plan = new StringBuilder("experiment,groups,control,test,follow_up,weight\n");
        var rows = new List<string>();
        int experiments = random.Next(6, 14);
        for (int e = 0; e < experiments; e++)
        {
            int groups = random.Next(2, 5);
            string test = withDraws && e == 0 ? "permutation" : Tests[random.Next(Tests.Length)];
            string labels = string.Join('|', Enumerable.Range(0, groups).Select(g => FormattableString.Invariant($"g{g}")));
            string followUp = FollowUps[random.Next(FollowUps.Length)];
            followUp = followUp == "games-howell" && test == "block-f" ? "none" : followUp; // Groups within blocks have no variance of their own.
            plan.Append(CultureInfo.InvariantCulture, $"E{e},{labels},g0,{test},{followUp},{random.Next(1, 4)}\n");
            bool isIncomplete = test == "block-f" && groups > 2 && e % 3 == 2;
            bool hasSpecimens = test != "block-f" && random.Next(4) == 0;
            double effect = random.Next(2) * random.NextDouble() * 3;
            string decimals = random.Next(3) == 0 ? "0" : "0.0000";
            for (int g = 0; g < groups; g++)
            {
                int values = test == "block-f" ? 5 : random.Next(3, 8);
                for (int v = 0; v < values; v++)
                {
                    double value = ((random.NextDouble() + random.NextDouble() + (effect * g)) * (decimals == "0" ? 5 : 1)) + (decimals == "0" ? 0 : 1e6 * (e % 2));
                    if (isIncomplete && (g + v) % groups == 0)
                    {
                        continue; // Each block lacks a group.
                    }

                    rows.Add(string.Create(CultureInfo.InvariantCulture, $"E{e},g{g},{value.ToString(decimals, CultureInfo.InvariantCulture)},{(hasSpecimens ? $"s{g}-{v / 2}" : "")},{(test == "block-f" ? $"day {v}" : "")}"));
                }
            }
        }

        return (plan.ToString(), rows);
    }

    /// <summary>Runs the whole campaign in a catalog of its own and gives back everything that must be the same.</summary>
    private static string Read(string plan, string correction, IEnumerable<string>[] files, int? threads)
    {
        using var bench = new Workbench();
        string folder = Directory.CreateDirectory(bench.At("C")).FullName;
        Directory.CreateDirectory(Path.Combine(folder, "measurements"));
        bench.Write("C/campaign.json", $$"""{"code": "C", "title": "Invented", "purpose": "", "errorRate": "{{(correction is "holm" or "hommel" ? "familywise" : "false-discovery")}}", "level": 0.05, "correction": "{{correction}}", "test": "f", "followUp": "none"}""");
        bench.Write("C/plan.csv", plan);
        for (int f = 0; f < files.Length; f++)
        {
            bench.Write(FormattableString.Invariant($"C/measurements/week-{f}.csv"), $"experiment,group,value,specimen,block\n{string.Join('\n', files[f])}\n");
        }

        // Tests are made by the first command and comparisons when they are read; the rest reads what is stored, for which no process need start.
        Said(bench, threads, ["run", folder]);
        return string.Concat(Readings.Select(r => $"{r}\n{Said(bench, r == "comparisons" ? threads : null, [.. r.Split(' ')[..1], "C", .. r.Split(' ')[1..], "--format", "csv"])}"));
    }

    private static string Said(Workbench bench, int? threads, string[] arguments)
    {
        Ran ran = threads is { } count ? Process(bench, count, arguments) : bench.Run(arguments);
        return ran.Code == 0 ? ran.Out : throw new InvalidOperationException($"campaigns {string.Join(' ', arguments)}: exit {ran.Code}: {ran.Error}");
    }

    private static Ran Process(Workbench bench, int processors, string[] arguments)
    {
        var start = new ProcessStartInfo(Workbench.Program, arguments) { RedirectStandardOutput = true, RedirectStandardError = true, WorkingDirectory = bench.Folder };
        start.Environment["CAMPAIGNS_CATALOG"] = bench.Catalog;
        start.Environment["DOTNET_PROCESSOR_COUNT"] = processors.ToString(CultureInfo.InvariantCulture);
        using Process process = System.Diagnostics.Process.Start(start)!;
        Task<string> standardOutput = process.StandardOutput.ReadToEndAsync(), standardError = process.StandardError.ReadToEndAsync();
        process.WaitForExit();
        return new Ran(process.ExitCode, standardOutput.GetAwaiter().GetResult(), standardError.GetAwaiter().GetResult());
    }
}
