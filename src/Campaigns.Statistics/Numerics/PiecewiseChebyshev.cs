namespace Campaigns.Statistics.Numerics;

/// <summary>A smooth function on [0, end), replaced piece by piece by Chebyshev polynomials.</summary>
/// <remarks>
/// A piece is made when it is first asked for, from the function alone: what is returned never depends on which arguments came before. A piece whose last coefficients, or whose value at two places between the nodes, miss the tolerance is halved, unless the piece it came from shows that halving no longer helps: what is left then is the rounding error of the function.
/// The tolerance is absolute and grows with the square of the argument, as the rounding error of the logarithm of a normal tail does.
/// May be shared between threads: a piece is published whole, and a race costs a second making at worst. A value costs about 15 ns.
/// </remarks>
internal sealed class PiecewiseChebyshev
{
    private const int Nodes = 20;
    private const int MostHalvings = 12;

    /// <summary>No miss above this is taken for rounding errors.</summary>
    private const double RoundingErrors = 1e-11;

    private static readonly double[] Places = [.. Enumerable.Range(0, Nodes).Select(i => Math.Cos(Math.PI * (i + 0.5) / Nodes))];
    private static readonly double[] Probes = [-0.9973, 0.0381];
    private static readonly double[,] Cosines = CosineTable();

    private readonly Func<double, double> _function;
    private readonly double _width;
    private readonly double _tolerance;
    private readonly Piece?[] _pieces;

    /// <summary>Makes an approximation that samples nothing yet.</summary>
    /// <param name="function">Smooth inside every piece; called on [0, end).</param>
    /// <param name="width">Width of a piece before halving.</param>
    /// <param name="pieces">Number of pieces.</param>
    /// <param name="tolerance">Absolute tolerance near 0; at x it is 1 + x^2/100 times that.</param>
    public PiecewiseChebyshev(Func<double, double> function, double width, int pieces, double tolerance)
    {
        _function = function;
        _width = width;
        _tolerance = tolerance;
        _pieces = new Piece?[pieces];
    }

    /// <summary>Where the approximation ends.</summary>
    public double End => _width * _pieces.Length;

    /// <summary>The function at a point.</summary>
    /// <param name="x">In [0, end).</param>
    public double At(double x)
    {
        ref Piece? slot = ref _pieces[(int)(x / _width)];
        Piece? piece = Volatile.Read(ref slot);
        if (piece is null)
        {
            double from = Math.Floor(x / _width) * _width;
            piece = Make(from, from + _width, MostHalvings, double.PositiveInfinity);
            Volatile.Write(ref slot, piece);
        }

        while (piece.Below is not null)
        {
            piece = x < piece.Centre ? piece.Below : piece.Above!;
        }

        return piece.At(x);
    }

    private Piece Make(double from, double to, int halvings, double missBefore)
    {
        double centre = (from + to) / 2;
        double half = (to - from) / 2;
        double tolerance = _tolerance * (1 + (to * to / 100));
        Span<double> values = stackalloc double[Nodes];
        for (int i = 0; i < Nodes; i++)
        {
            values[i] = _function(centre + (half * Places[i]));
        }

        var coefficients = new double[Nodes];
        for (int j = 0; j < Nodes; j++)
        {
            for (int i = 0; i < Nodes; i++)
            {
                coefficients[j] += values[i] * Cosines[i, j];
            }
        }

        Piece piece = new(centre, 1 / half, Trimmed(coefficients, tolerance / 1000));
        double miss = Math.Abs(coefficients[^1]) + Math.Abs(coefficients[^2]) + Math.Abs(coefficients[^3]);
        foreach (double probe in Probes)
        {
            double x = centre + (half * probe);
            miss = Math.Max(miss, Math.Abs(piece.At(x) - _function(x)) / Nodes);
        }

        bool isNoise = miss < RoundingErrors && miss > missBefore / 4;
        return miss <= tolerance || isNoise || halvings == 0
            ? piece
            : new(centre, 1 / half, []) { Below = Make(from, centre, halvings - 1, miss), Above = Make(centre, to, halvings - 1, miss) };
    }

    private static double[] Trimmed(double[] coefficients, double negligible)
    {
        int kept = coefficients.Length;
        while (kept > 2 && Math.Abs(coefficients[kept - 1]) < negligible)
        {
            kept--;
        }

        return coefficients[..kept];
    }

    private static double[,] CosineTable()
    {
        var table = new double[Nodes, Nodes];
        for (int i = 0; i < Nodes; i++)
        {
            for (int j = 0; j < Nodes; j++)
            {
                table[i, j] = (j == 0 ? 1.0 : 2.0) / Nodes * Math.Cos(Math.PI * j * (i + 0.5) / Nodes);
            }
        }

        return table;
    }

    private sealed class Piece(double centre, double inverseHalf, double[] coefficients)
    {
        public double Centre { get; } = centre;

        public Piece? Below { get; init; }

        public Piece? Above { get; init; }

        /// <summary>Clenshaw's recurrence.</summary>
        public double At(double x)
        {
            double twice = 2 * ((x - Centre) * inverseHalf);
            double last = 0;
            double beforeLast = 0;
            double[] c = coefficients;
            for (int j = c.Length - 1; j > 0; j--)
            {
                double next = Math.FusedMultiplyAdd(twice, last, c[j] - beforeLast);
                beforeLast = last;
                last = next;
            }

            return Math.FusedMultiplyAdd(twice / 2, last, c[0] - beforeLast);
        }
    }
}
