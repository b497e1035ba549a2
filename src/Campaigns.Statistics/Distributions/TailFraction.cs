namespace Campaigns.Statistics.Distributions;

/// <summary>The continued fraction of the regularised incomplete beta function I_x(a, b) with the parts of its coefficients that depend on a and b alone computed once.</summary>
/// <remarks>
/// I_x(a, b) = K/(b1 + a2/(b2 + a3/(b3 + ...))), K = x^a y^b/B(a, b), y = 1 - x, lambda = a y - b x, with
/// b1 = a (lambda + 1)/(a + 1), and for j from 1 on, s = a + 2j - 1:
/// a(j+1) = (a + j - 1)(a + b + j - 1) j (b - j)/s^2 x^2, b(j+1) = j + j (b - j)/s x + (a + j)/(s + 2) (lambda + 1 + j (1 + y)).
/// Used for lambda of at least 0, x left of the mean, where it converges fast. Source: DiDonato and Morris (1992), ACM Transactions on Mathematical Software 18:360, equation 9.
/// </remarks>
internal sealed class TailFraction
{
    /// <summary>Steps worth a table for a law that is asked often.</summary>
    public const int UsualSteps = 32;

    private const int MostSteps = 1_000_000;
    private const double Tolerance = 1.2e-16;
    private const double Big = 1e100;

    private readonly double _a;
    private readonly double _b;
    private readonly Coefficients[] _tabled;

    /// <summary>Makes the fraction.</summary>
    /// <param name="a">Positive.</param>
    /// <param name="b">Positive.</param>
    /// <param name="tabledSteps">Steps whose coefficients are computed now; those of others are computed whenever they are needed, to the same bits.</param>
    public TailFraction(double a, double b, int tabledSteps = UsualSteps)
    {
        _a = a;
        _b = b;
        _tabled = tabledSteps == 0 ? [] : new Coefficients[tabledSteps];
        for (int j = 1; j <= tabledSteps; j++)
        {
            _tabled[j - 1] = At(j);
        }
    }

    /// <summary>The fraction's denominator: I_x(a, b) is K over it.</summary>
    /// <param name="x">In [0, 1].</param>
    /// <param name="y">1 - x, computed without that subtraction.</param>
    /// <param name="lambda">a y - b x, computed without that subtraction; at least 0 up to rounding.</param>
    /// <exception cref="ArithmeticException">No convergence.</exception>
    /// <remarks>Forward recurrence for numerators and denominators, one division at the end; both are scaled down together before they could overflow.</remarks>
    public double Denominator(double x, double y, double lambda)
    {
        double square = x * x;
        double shifted = lambda + 1;
        double slope = 1 + y;
        double evenTop = 1;
        double evenBottom = 0;
        double oddTop = _a / (_a + 1) * shifted;
        double oddBottom = 1;
        for (int j = 1; j <= MostSteps; j += 2)
        {
            Coefficients c = j <= _tabled.Length ? _tabled[j - 1] : At(j);
            double numerator = c.Square * square;
            double denominator = c.At(x, shifted, slope);
            evenTop = Math.FusedMultiplyAdd(denominator, oddTop, numerator * evenTop);
            evenBottom = Math.FusedMultiplyAdd(denominator, oddBottom, numerator * evenBottom);

            c = j < _tabled.Length ? _tabled[j] : At(j + 1);
            numerator = c.Square * square;
            denominator = c.At(x, shifted, slope);
            oddTop = Math.FusedMultiplyAdd(denominator, evenTop, numerator * oddTop);
            oddBottom = Math.FusedMultiplyAdd(denominator, evenBottom, numerator * oddBottom);

            double cross = oddTop * evenBottom;
            if (Math.Abs(Math.FusedMultiplyAdd(-oddBottom, evenTop, cross)) <= Tolerance * Math.Abs(cross))
            {
                return oddTop / oddBottom;
            }

            if (Math.Abs(oddBottom) > Big)
            {
                evenTop /= Big;
                evenBottom /= Big;
                oddTop /= Big;
                oddBottom /= Big;
            }
        }

        throw new ArithmeticException(FormattableString.Invariant($"The tail of the beta law with a = {_a:R}, b = {_b:R} did not converge at x = {x:R}."));
    }

    private Coefficients At(double j)
    {
        double s = _a + (2 * j) - 1;
        double shift = (_a + j) / (s + 2);
        return new((_a + j - 1) / s * ((_a + _b + j - 1) / s) * j * (_b - j), j, j * (_b - j) / s, shift, shift * j);
    }

    private readonly record struct Coefficients(double Square, double Constant, double Linear, double Shift, double Slope)
    {
        /// <summary>The partial denominator.</summary>
        public double At(double x, double shifted, double slope) =>
            Math.FusedMultiplyAdd(Linear, x, Constant) + Math.FusedMultiplyAdd(Shift, shifted, Slope * slope);
    }
}
