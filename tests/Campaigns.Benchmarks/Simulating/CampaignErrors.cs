using System.Globalization;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Benchmarks.Simulating;

/// <summary>The error rates that every procedure over a campaign really has, by simulation: as a Markdown table, each rate beside its standard error.</summary>
internal static class CampaignErrors
{
    /// <summary>Campaigns a scenario unless told otherwise: standard errors of 0.0015 at a rate of 0.05.</summary>
    public const int UsualReplicates = 20_000;

    private const int Blocks = 8;

    private static readonly SignificanceLevel Level = new(0.05);

    /// <summary>Weights that were guessed before the data: the first half of the experiments is thought three times as promising as the second.</summary>
    private static readonly double[] Weights = [.. Enumerable.Range(0, CampaignScenario.Experiments).Select(i => i < CampaignScenario.Experiments / 2 ? 1.5 : 0.5)];

    private static readonly double[] Critical = [.. Enumerable.Range(0, CampaignScenario.Experiments + 1).Select(CriticalRange)];

    private static readonly Judge[] Judges =
    [
        .. CorrectionRegistry.All.Select(c => new Judge(c.Key, c.Controls, (p, survives) => Adjust(c, p, survives))),
        .. OnlineRegistry.All.Select(o => new Judge(o.Key, o.Controls, (p, survives) => Arrive(o, p, survives))),
    ];

    /// <summary>Simulates every scenario under every registered procedure. The same numbers on every run.</summary>
    /// <param name="replicates">Campaigns a scenario.</param>
    /// <param name="output">Receives the tables.</param>
    public static void Print(int replicates, TextWriter output)
    {
        Tally[,] tallies = new Tally[CampaignScenario.All.Count, Judges.Length];
        Coverage[] coverages = new Coverage[CampaignScenario.All.Count];
        for (int s = 0; s < CampaignScenario.All.Count; s++)
        {
            int scenario = s;
            var parts = new (Tally[] Tallies, Coverage Coverage)[Blocks];
            Parallel.For(0, Blocks, block => parts[block] = Count(scenario, replicates * block / Blocks, replicates * (block + 1) / Blocks));
            for (int j = 0; j < Judges.Length; j++)
            {
                tallies[s, j] = parts.Aggregate(default(Tally), (sum, part) => sum + part.Tallies[j]);
            }

            coverages[s] = parts.Aggregate(default(Coverage), (sum, part) => sum + part.Coverage);
        }

        string heads = string.Join(" | ", CampaignScenario.All.Select(s => s.Name));
        string rule = string.Concat(CampaignScenario.All.Select(_ => "---|"));
        output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"Realised error rates at {Level}, {replicates} campaigns of {CampaignScenario.Experiments} F tests each, with standard errors; in brackets the share of the real effects found"));
        output.WriteLine();
        output.WriteLine($"| procedure | rate | {heads} |\n|---|---|{rule}");
        for (int j = 0; j < Judges.Length; j++)
        {
            Judge judge = Judges[j];
            output.WriteLine($"| {judge.Key} | {Words(judge.Controls)} | " + string.Join(" | ", CampaignScenario.All.Select((s, i) => Cell(tallies[i, j], judge.Controls, s.Effects, replicates))) + " |");
        }

        output.WriteLine();
        output.WriteLine("Tukey-Kramer's intervals inside the survivors");
        output.WriteLine();
        output.WriteLine($"| what | {heads} |\n|---|{rule}");
        output.WriteLine("| survivors of bh whose intervals at 1 - R q/m miss a true difference, share of R | " + string.Join(" | ", coverages.Select(c => Rate(c.Selected, c.SelectedSquares, replicates))) + " |");
        output.WriteLine("| the same with intervals at 1 - q, not adjusted | " + string.Join(" | ", coverages.Select(c => Rate(c.Plain, c.PlainSquares, replicates))) + " |");
        output.WriteLine("| any survivor of holm whose intervals at 1 - level/m miss a true difference | " + string.Join(" | ", coverages.Select(c => Rate(c.Familywise, c.Familywise, replicates))) + " |");
    }

    private static (Tally[] Tallies, Coverage Coverage) Count(int scenario, int from, int to)
    {
        CampaignScenario drawn = CampaignScenario.All[scenario];
        var tallies = new Tally[Judges.Length];
        Coverage coverage = default;
        var p = new PValue[CampaignScenario.Experiments];
        double[] widest = new double[CampaignScenario.Experiments];
        bool[] survives = new bool[CampaignScenario.Experiments];
        for (int replicate = from; replicate < to; replicate++)
        {
            drawn.Draw(scenario, replicate, p, widest);
            for (int j = 0; j < Judges.Length; j++)
            {
                Judges[j].Decide(p, survives);
                tallies[j] += Tally.Of(drawn, survives);
                coverage += Judges[j].Key switch
                {
                    "bh" => Coverage.OfSelection(survives, widest),
                    "holm" => Coverage.OfFamilywise(survives, widest),
                    _ => default,
                };
            }
        }

        return (tallies, coverage);
    }

    private static void Adjust(Correction correction, PValue[] p, bool[] survives)
    {
        RankedFamily family = correction.NeedsWeights ? RankedFamily.Of(p, p.Length, Weights, 0) : RankedFamily.Of(p, p.Length);
        PValue[] adjusted = correction.Adjust(family);
        for (int i = 0; i < p.Length; i++)
        {
            survives[i] = Level.Rejects(adjusted[i]);
        }
    }

    private static void Arrive(OnlineProcedure procedure, PValue[] p, bool[] survives)
    {
        OnlineStream stream = procedure.Start(OnlineSettings.For(procedure, Level, p.Length));
        for (int i = 0; i < p.Length; i++)
        {
            survives[i] = stream.Report(stream.Register().Position, p[i]);
        }
    }

    /// <summary>The critical range at level R q/m; for none selected, at q itself.</summary>
    private static double CriticalRange(int selected) =>
        StudentizedRange.For(CampaignScenario.Groups, CampaignScenario.Groups * (CampaignScenario.Replicates - 1))
            .UpperQuantile(selected == 0 ? Level.Value : Level.Value * selected / CampaignScenario.Experiments);

    private static string Words(ErrorRate rate) => rate switch { ErrorRate.Familywise => "familywise", ErrorRate.FalseDiscovery => "false discovery", _ => "familywise, not held" };

    private static string Cell(Tally tally, ErrorRate rate, bool hasEffects, int replicates)
    {
        string cell = rate == ErrorRate.FalseDiscovery ? Rate(tally.FalseShare, tally.FalseShareSquares, replicates) : Rate(tally.AnyFalse, tally.AnyFalse, replicates);
        return hasEffects ? cell + string.Create(CultureInfo.InvariantCulture, $" ({tally.FoundShare / replicates:0.00})") : cell;
    }

    private static string Rate(double sum, double squares, int replicates)
    {
        double mean = sum / replicates;
        return string.Create(CultureInfo.InvariantCulture, $"{mean:0.0000} ± {Math.Sqrt(Math.Max(0, (squares / replicates) - (mean * mean)) / replicates):0.0000}");
    }

    private sealed record Judge(string Key, ErrorRate Controls, Action<PValue[], bool[]> Decide);

    /// <summary>Sums over campaigns.</summary>
    private readonly record struct Tally(double AnyFalse, double FalseShare, double FalseShareSquares, double FoundShare)
    {
        public static Tally Of(CampaignScenario scenario, bool[] survives)
        {
            int falseOnes = 0;
            int found = 0;
            int real = 0;
            for (int i = 0; i < survives.Length; i++)
            {
                bool isReal = scenario.IsReal(i);
                real += isReal ? 1 : 0;
                found += survives[i] && isReal ? 1 : 0;
                falseOnes += survives[i] && !isReal ? 1 : 0;
            }

            double share = falseOnes == 0 ? 0 : (double)falseOnes / (falseOnes + found);
            return new Tally(falseOnes > 0 ? 1 : 0, share, share * share, real == 0 ? 0 : (double)found / real);
        }

        public static Tally operator +(Tally a, Tally b) =>
            new(a.AnyFalse + b.AnyFalse, a.FalseShare + b.FalseShare, a.FalseShareSquares + b.FalseShareSquares, a.FoundShare + b.FoundShare);
    }

    /// <summary>Sums over campaigns of the share of selected experiments in which an interval misses a true difference.</summary>
    private readonly record struct Coverage(double Selected, double SelectedSquares, double Plain, double PlainSquares, double Familywise)
    {
        public static Coverage OfSelection(bool[] survives, double[] widest)
        {
            int selected = survives.Count(s => s);
            double missed = selected == 0 ? 0 : (double)Missed(survives, widest, Critical[selected]) / selected;
            double plain = selected == 0 ? 0 : (double)Missed(survives, widest, Critical[0]) / selected;
            return new Coverage(missed, missed * missed, plain, plain * plain, 0);
        }

        public static Coverage OfFamilywise(bool[] survives, double[] widest) => new(0, 0, 0, 0, Missed(survives, widest, Critical[1]) > 0 ? 1 : 0);

        public static Coverage operator +(Coverage a, Coverage b) =>
            new(a.Selected + b.Selected, a.SelectedSquares + b.SelectedSquares, a.Plain + b.Plain, a.PlainSquares + b.PlainSquares, a.Familywise + b.Familywise);

        private static int Missed(bool[] survives, double[] widest, double critical)
        {
            int missed = 0;
            for (int i = 0; i < survives.Length; i++)
            {
                missed += survives[i] && widest[i] > critical ? 1 : 0;
            }

            return missed;
        }
    }
}
