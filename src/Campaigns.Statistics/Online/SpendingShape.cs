using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>How a level is spread over the experiments of a stream: weights that never rise, before they are divided by their sum.</summary>
public sealed class SpendingShape
{
    private readonly Func<int, double> _weight;

    private SpendingShape(string key, string formula, string source, double? sumOfAll, Func<int, double> weight)
    {
        Key = key;
        Formula = formula;
        Source = source;
        SumOfAll = sumOfAll;
        _weight = weight;
    }

    /// <summary>Every shape that the program offers, in the order in which people see them.</summary>
    /// <remarks>The sums over all positions are from 60-digit arithmetic: a plain sum and the Euler-Maclaurin formula, or the zeta function.</remarks>
    public static IReadOnlyList<SpendingShape> All { get; } =
    [
        new("jm", "log(max(j, 2)) / (j exp(sqrt(log j)))", "A. Javanmard and A. Montanari (2018), Annals of Statistics 46:526-554",
            12.645107872871751, j => Math.Log(Math.Max(j, 2)) / (j * Math.Exp(Math.Sqrt(Math.Log(j))))),
        new("p1.6", "j^-1.6", "A. Ramdas, T. Zrnic, M. J. Wainwright and M. I. Jordan (2018), Proceedings of Machine Learning Research 80:4286-4294",
            2.2857656656801299, j => Math.Pow(j, -1.6)),
        new("p2", "j^-2", "A power of the position; sum: L. Euler (1740), Commentarii Academiae Scientiarum Petropolitanae 7:123-134",
            1.6449340668482264, j => 1 / ((double)j * j)),
        new("log2", "1 / (j log(max(j, 2))^2)", "A. Javanmard and A. Montanari (2018), Annals of Statistics 46:526-554",
            4.1911117822424998, j => 1 / (j * Math.Log(Math.Max(j, 2)) * Math.Log(Math.Max(j, 2)))),
        new("uniform", "1", "The same share for every experiment up to the horizon: O. J. Dunn (1961), Journal of the American Statistical Association 56:52-64",
            null, _ => 1),
    ];

    /// <summary>The short, frozen word by which files and commands name the shape.</summary>
    public string Key { get; }

    /// <summary>The weight of position j, for people.</summary>
    public string Formula { get; }

    /// <summary>Where it was published.</summary>
    public string Source { get; }

    /// <summary>The sum of the weights over all positions without end; null where it is infinite, so that the shape needs a horizon.</summary>
    public double? SumOfAll { get; }

    /// <summary>The shape with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static SpendingShape? Find(string key) => All.FirstOrDefault(s => s.Key == key);

    /// <summary>The weight of a position, above 0 and never above that of an earlier one.</summary>
    /// <param name="position">From 1.</param>
    public double Weight(int position) => _weight(position);

    /// <summary>The share of a position in the whole, gamma in the publications; the shares of all positions sum to 1.</summary>
    /// <param name="position">From 1.</param>
    /// <param name="horizon">The number of experiments over which the shape is spread; null for no end.</param>
    /// <returns>0 after the horizon.</returns>
    /// <exception cref="ArgumentException">The shape needs a horizon and none was given.</exception>
    /// <remarks>Costs a sum over the horizon; a stream keeps it.</remarks>
    public double Share(int position, int? horizon) => horizon < position ? 0 : (DoubleDouble.From(Weight(position)) / Total(horizon)).High;

    /// <summary>The sum of the weights up to a horizon, or of all.</summary>
    internal DoubleDouble Total(int? horizon)
    {
        if (horizon is not { } last)
        {
            return DoubleDouble.From(SumOfAll ?? throw new ArgumentException($"The shape '{Key}' needs a horizon.", nameof(horizon)));
        }

        DoubleDouble sum = default;
        for (int j = 1; j <= last; j++)
        {
            sum += DoubleDouble.From(Weight(j));
        }

        return sum;
    }
}
