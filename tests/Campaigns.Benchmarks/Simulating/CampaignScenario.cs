using Campaigns.Benchmarks.Generating;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Benchmarks.Simulating;

/// <summary>How campaigns of twenty experiments are drawn: how many have a real effect, and what ties them together.</summary>
/// <param name="Name">The scenario in a few words.</param>
/// <param name="Effects">Whether six of the twenty experiments have a real effect.</param>
/// <param name="SharesControl">Whether all experiments hold their groups against the same control values.</param>
/// <param name="Correlation">Correlation between the errors of the same specimen in any two experiments.</param>
internal sealed record CampaignScenario(string Name, bool Effects, bool SharesControl, double Correlation)
{
    /// <summary>Experiments of a campaign.</summary>
    public const int Experiments = 20;

    /// <summary>Groups of an experiment; the first is the control.</summary>
    public const int Groups = 4;

    /// <summary>Values of a group.</summary>
    public const int Replicates = 6;

    /// <summary>The last group of an experiment with an effect lies so many standard deviations above the others.</summary>
    public const double Effect = 1.6;

    private const int FirstPurpose = 90;
    private const int Values = Groups * Replicates;
    private const int DrawsOfOne = 1 << 10;

    /// <summary>The scenarios in which the procedures are held against their promises.</summary>
    public static IReadOnlyList<CampaignScenario> All { get; } =
    [
        new("no effects, independent", false, false, 0),
        new("no effects, shared control", false, true, 0),
        new("no effects, correlation 0.5", false, false, 0.5),
        new("6 of 20 real, independent", true, false, 0),
        new("6 of 20 real, shared control", true, true, 0),
        new("6 of 20 real, correlation 0.5", true, false, 0.5),
    ];

    private static FDistribution Law { get; } = FDistribution.For(Groups - 1, Groups * (Replicates - 1));

    /// <summary>Whether an experiment has a real effect; real ones are spread over the order of arrival.</summary>
    public bool IsReal(int experiment) => Effects && (experiment % 10) is 1 or 4 or 7;

    /// <summary>Draws one campaign; a pure function of scenario and number.</summary>
    /// <param name="purpose">The scenario's place in <see cref="All"/>.</param>
    /// <param name="replicate">The campaign's number.</param>
    /// <param name="p">Receives the F test's p-value of each experiment.</param>
    /// <param name="widest">Receives for each experiment the largest error of a difference of two group means, in estimated standard errors of one mean.</param>
    public void Draw(int purpose, long replicate, Span<PValue> p, Span<double> widest)
    {
        Span<double> common = stackalloc double[Values];
        Span<double> control = stackalloc double[Replicates];
        Span<double> means = stackalloc double[Groups];
        long first = replicate * DrawsOfOne;
        for (int i = 0; i < Values; i++)
        {
            common[i] = Math.Sqrt(Correlation) * Normal(purpose, first + 500 + i);
        }

        for (int i = 0; i < Replicates; i++)
        {
            control[i] = Normal(purpose, first + 600 + i);
        }

        for (int experiment = 0; experiment < Experiments; experiment++)
        {
            double within = 0;
            for (int group = 0; group < Groups; group++)
            {
                double sum = 0;
                double squares = 0;
                for (int i = 0; i < Replicates; i++)
                {
                    int at = (group * Replicates) + i;
                    double value = SharesControl && group == 0 ? control[i] : common[at] + (Math.Sqrt(1 - Correlation) * Normal(purpose, first + (experiment * Values) + at));
                    sum += value;
                    squares += value * value;
                }

                means[group] = sum / Replicates;
                within += squares - (sum * means[group]);
            }

            double residual = within / (Groups * (Replicates - 1));
            widest[experiment] = Range(means) / Math.Sqrt(residual / Replicates);
            means[Groups - 1] += IsReal(experiment) ? Effect : 0;
            p[experiment] = Law.UpperTailPValue(Between(means) / (Groups - 1) / residual);
        }
    }

    private static double Between(ReadOnlySpan<double> means)
    {
        double sum = 0;
        double squares = 0;
        foreach (double mean in means)
        {
            sum += mean;
            squares += mean * mean;
        }

        return Replicates * (squares - (sum * sum / Groups));
    }

    private static double Range(ReadOnlySpan<double> means)
    {
        double least = means[0];
        double most = means[0];
        foreach (double mean in means)
        {
            least = Math.Min(least, mean);
            most = Math.Max(most, mean);
        }

        return most - least;
    }

    /// <summary>Box and Muller's transformation of two uniform numbers.</summary>
    private static double Normal(int purpose, long at) =>
        Math.Sqrt(-2 * Math.Log(Uniform(purpose, 2 * at))) * Math.Cos(2 * Math.PI * Uniform(purpose, (2 * at) + 1));

    /// <summary>Above 0 and below 1.</summary>
    private static double Uniform(int purpose, long index) => ((Draws.Bits(FirstPurpose + purpose, index) >> 11) + 0.5) / (1L << 53);
}
