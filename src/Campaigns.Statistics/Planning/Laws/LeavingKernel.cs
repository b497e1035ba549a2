using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>Of n things each leaves with the same probability, independently: the probabilities that k leave, for a whole band of n at once, k after k.</summary>
internal sealed class LeavingKernel
{
    /// <summary>Expected leavers of one part are kept below about this, so that the start (1 - leave)^n neither underflows nor loses digits.</summary>
    private const double MostAtOnce = 30;

    /// <summary>The greatest double below 1; what leaves for certain leaves with this probability.</summary>
    private const double NearlyOne = 1 - 1.1102230246251565e-16;

    private readonly double[] _weights;
    private int _low;
    private int _high;
    private double _odds;
    private double _negligible;

    /// <summary>Makes memory for counts up to a greatest one.</summary>
    public LeavingKernel(int most) => _weights = new double[most + 1];

    /// <summary>How many leave.</summary>
    public int Leaving { get; private set; }

    /// <summary>The least n of the band that so many can leave.</summary>
    public int First => Math.Max(_low, Leaving);

    /// <summary>The probabilities for n = First..high.</summary>
    public ReadOnlySpan<double> Weights => _weights.AsSpan(First, _high - First + 1);

    /// <summary>Into how many equal parts a departure is cut, and with which probability a thing leaves in each.</summary>
    /// <param name="leave">Probability of leaving in all.</param>
    /// <param name="most">The greatest n.</param>
    public static (int Parts, double Leave) Cut(double leave, int most)
    {
        double log = Accurate.Log1p(-Math.Clamp(leave, 0, NearlyOne));
        int parts = (int)Math.Ceiling(Math.Max(-most * log / MostAtOnce, 1));
        return (parts, -Accurate.Expm1(log / parts));
    }

    /// <summary>Starts with nobody leaving.</summary>
    public void Start(int low, int high, double leave, double negligible)
    {
        (_low, _high, _odds, _negligible, Leaving) = (low, high, leave / (1 - leave), negligible, 0);
        double log = Accurate.Log1p(-leave);
        for (int n = low; n <= high; n++)
        {
            _weights[n] = Math.Exp(n * log);
        }
    }

    /// <summary>Goes on to one more leaving.</summary>
    /// <returns>False where no probability of the band is above the negligible any more.</returns>
    public bool Next()
    {
        double factor = _odds / (Leaving + 1);
        bool rises = _high * _odds > Leaving;
        double greatest = Vectors.ScaleByFalling(_weights.AsSpan(First, _high - First + 1), First - Leaving, factor);
        Leaving++;
        return Leaving <= _high && (greatest > _negligible || rises);
    }
}
