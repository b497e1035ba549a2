using System.Globalization;
using System.Text;

namespace Campaigns.App.Tests.Commands;

/// <summary>Observations of one invented experiment, and the campaign in which every test is run on them.</summary>
/// <param name="Rows">Group, value, specimen, block of each; the order is that of the rows.</param>
internal sealed record Layout(IReadOnlyList<(string Group, string Value, string Specimen, string Block)> Rows)
{
    public static readonly string[] Tests = ["f", "welch", "brown-forsythe", "kruskal-wallis", "permutation", "block-f"];

    /// <summary>The layouts at the edge, by name.</summary>
    public static Layout Of(string name) => name switch
    {
        "ordinary" => Groups(Noisy("a", 10, 8), Noisy("b", 11, 8), Noisy("c", 12.5, 8)),
        "one observation in a group" => Groups(Noisy("a", 10, 6), ("b", ["11.05"]), Noisy("c", 12, 5)),
        "zero variance in one group" => Groups(Noisy("a", 10, 6), Same("b", "5", 6), Noisy("c", 12, 6)),
        "zero variance in all groups" => Groups(Same("a", "1", 6), Same("b", "2", 6), Same("c", "3", 6)),
        "all values equal" => Groups(Same("a", "1", 6), Same("b", "1.0", 6), Same("c", "1", 6)),
        "one value in every group" => Groups(Same("a", "1", 1), Same("b", "2", 1), Same("c", "4", 1)),
        "two groups" => Groups(Noisy("a", 10, 7), Noisy("b", 12, 7)),
        "two groups of two and one" => Groups(("a", ["1", "2"]), ("b", ["2"])),
        "one group" => Groups(Noisy("a", 10, 7)),
        "sixty groups" => Groups([.. Enumerable.Range(0, 60).Select(i => Noisy($"g{i:00}", 10 + (i / 30.0), 4))]),
        "offset of 1e12" => Groups(Noisy("a", 1e12, 6), Noisy("b", 1e12 + 3, 6), Noisy("c", 1e12 + 6, 6)),
        "values at 1e-300" => Scaled("e-300"),
        "values at 1e300" => Scaled("e300"),
        "ties everywhere" => Groups(("a", Split("0 0 1 0 1 1 0 0 1")), ("b", Split("0 1 1 0 1 0 0 1 0")), ("c", Split("1 2 0 1 1 2 0 1 1"))),
        "groups far apart" => Groups(("a", [.. Enumerable.Repeat<string[]>(["1.0000001", "0.9999999"], 30).SelectMany(v => v)]), ("b", [.. Enumerable.Repeat<string[]>(["2.0000001", "1.9999999"], 30).SelectMany(v => v)])),
        "one block without a group" => new([.. Of("ordinary").Rows.Where(r => (r.Group, r.Block) != ("a", "d1"))]),
        "blocks not recorded" => new([.. Of("ordinary").Rows.Select(r => r with { Block = "" })]),
        "one block not recorded" => new([.. Of("ordinary").Rows.Select((r, i) => i == 4 ? r with { Block = "" } : r)]),
        "disconnected blocks" => new(
        [
            ("a", "1", "", "x"), ("b", "2", "", "x"), ("a", "1.5", "", "x"), ("b", "2.1", "", "x"),
            ("c", "3", "", "y"), ("d", "4", "", "y"), ("c", "3.3", "", "y"), ("d", "4.4", "", "y"),
        ]),
        "a specimen in two blocks" => new([.. Of("ordinary").Rows.Select((r, i) => i < 2 ? r with { Specimen = "s1" } : r)]),
        "several readings of a specimen" => new([.. Of("ordinary").Rows.Select((r, i) => r with { Specimen = $"{r.Group}{i % 8 / 2}", Block = $"d{i % 8 / 2}" })]),
        "100,000 observations in a group" => Groups(Noisy("a", 10, 100_000), Noisy("b", 10.1, 7), Noisy("c", 9, 9)),
        _ => throw new ArgumentOutOfRangeException(nameof(name), name, "No such layout."),
    };

    /// <summary>Opens a campaign in which every test with every follow-up that it may have is planned for these observations, loads, tests and reviews.</summary>
    /// <returns>Its experiments, "TEST FOLLOW-UP".</returns>
    public string[] Run(Workplace place, string campaign = "C")
    {
        string[] groups = [.. Rows.Select(r => r.Group).Distinct()];
        string[] experiments = [.. Tests.SelectMany(FollowUps)];
        var plan = new StringBuilder("experiment,unit,groups,control,test,follow_up\n");
        var data = new StringBuilder("experiment,group,value,specimen,block,order\n");
        foreach (string experiment in experiments)
        {
            string[] keys = experiment.Split(' ');
            plan.Append(CultureInfo.InvariantCulture, $"{experiment},N,{string.Join('|', groups.Length > 1 ? groups : ["a", "b"])},{groups[0]},{keys[0]},{keys[1]}\n");
            for (int i = 0; i < Rows.Count; i++)
            {
                (string group, string value, string specimen, string block) = Rows[i];
                data.Append(CultureInfo.InvariantCulture, $"{experiment},{group},{value},{specimen},{block},{i + 1}\n");
            }
        }

        place.Run("run", place.Campaign(campaign, plan.ToString(), data.ToString())).Well();
        return experiments;
    }

    private static string[] FollowUps(string test) => test switch
    {
        "f" => ["f tukey-kramer", "f dunnett", "f scheffe", "f holm-pairs"],
        "welch" => ["welch games-howell"],
        "block-f" => ["block-f tukey-kramer", "block-f dunnett", "block-f scheffe", "block-f holm-pairs"],
        _ => [$"{test} games-howell"],
    };

    private static Layout Groups(params (string Label, string[] Values)[] groups) =>
        new([.. groups.SelectMany(g => g.Values.Select((v, i) => (g.Label, v, "", $"d{(i % 50) + 1}")))]);

    private static (string Label, string[] Values) Noisy(string label, double mean, int count)
    {
        var random = new Random(label.Length + label[^1] + count);
        return (label, [.. Enumerable.Range(0, count).Select(_ => ((decimal)mean + Math.Round((decimal)(random.NextDouble() + random.NextDouble() + random.NextDouble() - 1.5), 3)).ToString(CultureInfo.InvariantCulture))]);
    }

    private static (string Label, string[] Values) Same(string label, string value, int count) => (label, [.. Enumerable.Repeat(value, count)]);

    private static Layout Scaled(string power)
    {
        return Groups(("a", Powers("3 1 4 1 5 9")), ("b", Powers("5 8 9 7 9 3")), ("c", Powers("12 14 11 10 9 15")));

        string[] Powers(string values) => [.. Split(values).Select(v => v + power)];
    }

    private static string[] Split(string values) => values.Split(' ');
}
