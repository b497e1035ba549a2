using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Distributions;

/// <summary>The law of an extreme W of normal variables whose standard deviation is known: what a <see cref="StudentizedLaw"/> divides by an estimated one.</summary>
/// <remarks>The upper tail is kept as ln P(W > w) + rate w^2, which varies slowly, in a table (<see cref="PiecewiseChebyshev"/>) that a subclass's quadrature fills.</remarks>
internal abstract class NormalExtreme
{
    private const double Tolerance = 1e-14;
    private const double ManyVariables = 100;

    private readonly PiecewiseChebyshev _table;

    /// <summary>Makes the law.</summary>
    /// <param name="rate">The tail falls like exp(-rate w^2).</param>
    /// <param name="variables">How many variables it is the extreme of.</param>
    /// <param name="tabledTo">End of the table, whole.</param>
    protected NormalExtreme(double rate, int variables, int tabledTo)
    {
        Rate = rate;
        Sharpness = Math.Max(1, Math.Log(variables) / Math.Log(ManyVariables));
        _table = new PiecewiseChebyshev(ScaledLogByQuadrature, 1, tabledTo, Tolerance);
    }

    /// <summary>The tail falls like exp(-rate w^2).</summary>
    public double Rate { get; }

    /// <summary>How much narrower, on the scale of ln w, the law is than that of a hundred variables; at least 1. The extreme of k variables has a relative width of about 1/ln k.</summary>
    public double Sharpness { get; }

    /// <summary>ln P(W > w) + rate w^2.</summary>
    /// <param name="w">At least 0, finite.</param>
    public double ScaledLog(double w) => w < _table.End ? _table.At(w) : ScaledLogBeyond(w);

    /// <summary>ln P(W > w) + rate w^2 by quadrature.</summary>
    /// <param name="w">At least 0, finite.</param>
    protected abstract double ScaledLogByQuadrature(double w);

    /// <summary>The same beyond the table.</summary>
    /// <param name="w">At least the end of the table.</param>
    protected virtual double ScaledLogBeyond(double w) => ScaledLogByQuadrature(w);
}
