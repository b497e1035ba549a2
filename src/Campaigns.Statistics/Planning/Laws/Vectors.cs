using System.Numerics;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>Loops over doubles, as many at once as the machine takes. Products and sums are rounded the same at any width.</summary>
internal static class Vectors
{
    private static readonly Vector<double> Ascending = AscendingLanes();

    /// <summary>Adds scale times the products of two spans to a third.</summary>
    public static void AddProducts(Span<double> to, ReadOnlySpan<double> a, ReadOnlySpan<double> b, double scale)
    {
        int i = 0;
        for (; i <= to.Length - Vector<double>.Count; i += Vector<double>.Count)
        {
            (new Vector<double>(to[i..]) + (new Vector<double>(a[i..]) * new Vector<double>(b[i..]) * scale)).CopyTo(to[i..]);
        }

        for (; i < to.Length; i++)
        {
            to[i] += a[i] * b[i] * scale;
        }
    }

    /// <summary>Adds scale times a span to another.</summary>
    public static void AddScaled(Span<double> to, ReadOnlySpan<double> a, double scale)
    {
        int i = 0;
        for (; i <= to.Length - Vector<double>.Count; i += Vector<double>.Count)
        {
            (new Vector<double>(to[i..]) + (new Vector<double>(a[i..]) * scale)).CopyTo(to[i..]);
        }

        for (; i < to.Length; i++)
        {
            to[i] += a[i] * scale;
        }
    }

    /// <summary>Multiplies the elements by first, first + 1, first + 2, ..., each times the factor.</summary>
    /// <returns>The greatest of the results; 0 for an empty span.</returns>
    public static double ScaleByFalling(Span<double> values, int first, double factor)
    {
        int i = 0;
        var greatest = Vector<double>.Zero;
        for (; i <= values.Length - Vector<double>.Count; i += Vector<double>.Count)
        {
            Vector<double> scaled = new Vector<double>(values[i..]) * ((Ascending + new Vector<double>(first + i)) * factor);
            scaled.CopyTo(values[i..]);
            greatest = Vector.Max(greatest, scaled);
        }

        double most = 0;
        for (int lane = 0; lane < Vector<double>.Count; lane++)
        {
            most = Math.Max(most, greatest[lane]);
        }

        for (; i < values.Length; i++)
        {
            values[i] *= (first + i) * factor;
            most = Math.Max(most, values[i]);
        }

        return most;
    }

    private static Vector<double> AscendingLanes()
    {
        Span<double> lanes = stackalloc double[Vector<double>.Count];
        for (int i = 0; i < lanes.Length; i++)
        {
            lanes[i] = i;
        }

        return new Vector<double>(lanes);
    }
}
