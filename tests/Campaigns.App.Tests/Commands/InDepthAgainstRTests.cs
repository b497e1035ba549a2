using System.Text.Json;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.App.Tests.Commands;

/// <summary>What the commands print, from file to screen, beside R in the same run: anova, oneway.test, kruskal.test, TukeyHSD, pairwise.t.test, p.adjust.</summary>
public sealed class InDepthAgainstRTests : IDisposable
{
    private const string Script = """
        d <- read.csv(file("stdin"))
        d$group <- factor(d$group); d$block <- factor(d$block)
        say <- function(key, ...) cat(key, sprintf("%.17g", c(...)), "\n")
        a <- anova(lm(value ~ group, d)); say("f", a$F[1], a$Df[1:2], a$P[1])
        w <- oneway.test(value ~ group, d); say("welch", w$statistic, w$parameter, w$p.value)
        k <- kruskal.test(value ~ group, d); say("kruskal-wallis", k$statistic, k$parameter, k$p.value)
        b <- anova(lm(value ~ block + group, d)); say("block-f", b$F[2], b$Df[2:3], b$P[2])
        t <- TukeyHSD(aov(value ~ group, d))$group; for (r in rownames(t)) say(paste0("tukey:", r), t[r, ])
        h <- pairwise.t.test(d$value, d$group, "holm", pool.sd = TRUE)$p.value
        for (r in rownames(h)) for (c in colnames(h)) if (!is.na(h[r, c])) say(paste0("holm:", r, "-", c), h[r, c])
        """;

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("ordinary")]
    [InlineData("one block without a group")]
    [InlineData("ties everywhere")]
    public void Tests_and_comparisons_are_those_of_R(string layout)
    {
        RProgram.SkipIfAbsent();
        var observations = Layout.Of(layout);
        observations.Run(_place);
        string input = "group,value,block\n" + string.Concat(observations.Rows.Select(r => $"{r.Group},{r.Value},{r.Block}\n"));
        Dictionary<string, double[]> r = RProgram.Run(Script, input).Split('\n', StringSplitOptions.RemoveEmptyEntries)
            .Select(l => l.Split(' ', StringSplitOptions.RemoveEmptyEntries)).ToDictionary(l => l[0], l => l[1..].Select(CsvText.Number).ToArray());
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        foreach ((string key, string experiment) in (ReadOnlySpan<(string, string)>)[("f", "f dunnett"), ("welch", "welch games-howell"), ("kruskal-wallis", "kruskal-wallis games-howell"), ("block-f", "block-f scheffe")])
        {
            string[] columns = key == "kruskal-wallis" ? ["statistic", "df1", "p"] : ["statistic", "df1", "df2", "p"];
            AssertNear(key, r[key], [.. columns.Select(c => CsvText.Number(results.Value(experiment, c)))], 1e-9);
        }

        CsvText comparisons = _place.Run("comparisons", "C", "--format", "csv").Well().Csv;
        int compared = 0;
        foreach (string[] row in comparisons.Rows)
        {
            string pair = $"{row[2]}-{row[1]}";
            if (row[0] == "f tukey-kramer")
            {
                // R's ptukey is good to about 1e-10 in absolute terms, its quantile to 1e-4 of the width at worst.
                AssertNear(pair, r[$"tukey:{pair}"][..3], [.. row[3..6].Select(CsvText.Number)], 1e-4);
                Assert.Equal(r[$"tukey:{pair}"][3], CsvText.Number(row[7]), 1e-8);
                compared++;
            }
            else if (row[0] == "f holm-pairs")
            {
                AssertNear(pair, r[$"holm:{pair}"], [CsvText.Number(row[7])], 1e-9);
                compared++;
            }
        }

        Assert.Equal(6, compared);
    }

    [Theory]
    [InlineData("false-discovery", "bh")]
    [InlineData("familywise", "holm")]
    public void Selection_is_paid_for_as_R_would_and_survivors_list_what_comparisons_claim(string errorRate, string correction)
    {
        RProgram.SkipIfAbsent();
        Layout.Of("ordinary").Run(_place, "first");
        string folder = _place.At("first");
        _place.Write("first/campaign.json", File.ReadAllText(_place.At("first", "campaign.json")).Replace("\"first\"", "\"C\"", StringComparison.Ordinal)
            .Replace("false-discovery", errorRate, StringComparison.Ordinal).Replace("\"bh\"", $"\"{correction}\"", StringComparison.Ordinal));
        _place.Run("run", folder).Well();
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        string adjusted = RProgram.Run($"cat(sprintf('%.17g', p.adjust(scan(file('stdin'), quiet = TRUE), '{(correction == "bh" ? "BH" : correction)}')), sep = '\\n')", string.Join('\n', results.Column("p")) + "\n");
        AssertNear("adjusted p", [.. adjusted.Split('\n', StringSplitOptions.RemoveEmptyEntries).Select(CsvText.Number)], results.Numbers("adjusted_p"), 1e-14);

        double share = errorRate == "familywise" ? results.Rows.Count : (double)results.Rows.Count / results.Column("survives").Count(s => s == "true");
        CsvText comparisons = _place.Run("comparisons", "C", "--format", "csv").Well().Csv;
        var claimed = new List<string>();
        foreach (string[] row in comparisons.Rows)
        {
            bool selected = results.Value(row[0], "survives") == "true";
            if (selected || errorRate == "familywise")
            {
                double expected = Math.Min(1, CsvText.Number(row[7]) * share);
                AssertNear(row[0], [expected], [CsvText.Number(row[8])], 1e-15);
                Assert.Equal(selected && expected <= 0.05, row[9] == "true");
            }

            if (row[9] == "true")
            {
                claimed.Add($"{row[0]}: {row[2]} - {row[1]}");
            }
        }

        Assert.NotEmpty(claimed);
        CsvText survivors = _place.Run("survivors", "C", "--format", "csv").Well().Csv;
        Assert.Equal(claimed.Order(StringComparer.Ordinal), survivors.Rows.SelectMany(s => survivors.Value(s[0], "claimed_comparisons").Split("; ", StringSplitOptions.RemoveEmptyEntries)
            .Select(c => $"{s[0]}: {string.Join(' ', c.Split(' ')[..3])}")).Order(StringComparer.Ordinal));
        using var json = JsonDocument.Parse(_place.Run("show", "C", "f tukey-kramer", "--format", "json").Well().Out);
        Assert.Equal(comparisons.Rows.Where(c => c[0] == "f tukey-kramer").Select(c => c[8]), json.RootElement.GetProperty("comparisons").EnumerateArray().Select(c => c.GetProperty("adjusted_p").GetRawText()));
    }

    [Fact]
    public void A_permutation_of_two_groups_counts_the_arrangements_that_R_counts()
    {
        RProgram.SkipIfAbsent();
        var observations = Layout.Of("two groups");
        observations.Run(_place);
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        const string Count = """
            v <- scan(file("stdin"), quiet = TRUE); v <- round(1000 * v)
            s <- combn(14, 7, function(i) abs(2 * sum(v[i]) - sum(v)))
            cat(sprintf("%.17g", mean(s >= abs(2 * sum(v[1:7]) - sum(v)))), length(s))
            """;
        double[] r = [.. RProgram.Run(Count, string.Join('\n', observations.Rows.Select(o => o.Value)) + "\n").Split(' ').Select(CsvText.Number)];
        Assert.Equal((r[0], r[1]), (CsvText.Number(results.Value("permutation games-howell", "p")), CsvText.Number(results.Value("permutation games-howell", "arrangements"))));
        Assert.Contains("Exact:", _place.Run("show", "C", "permutation games-howell").Well().Out, StringComparison.Ordinal);
    }

    private static void AssertNear(string what, double[] expected, double[] found, double relative)
    {
        Assert.Equal(expected.Length, found.Length);
        Assert.All(expected.Zip(found), pair => Assert.True(Math.Abs(pair.First - pair.Second) <= (relative * Math.Abs(pair.First)) + 1e-14, $"{what}: {pair.First:R} and {pair.Second:R}"));
    }
}
