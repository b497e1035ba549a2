using System.Runtime.CompilerServices;

namespace Campaigns.Statistics.Numerics;

/// <summary>A number of about 32 significant digits: the unevaluated sum of two doubles, the second at most half a unit in the last place of the first.</summary>
/// <remarks>
/// Each operation is right to about 2^-102 relatively as long as nothing leaves the range of doubles; <see cref="WideReal"/> guards that range.
/// <see cref="High"/> alone is the number rounded to the nearest double.
/// Sources: Dekker (1971), Numerische Mathematik 18:224; Knuth, The Art of Computer Programming 2, section 4.2.2; Joldes, Muller and Popescu (2017), ACM Transactions on Mathematical Software 44:15.
/// </remarks>
public readonly record struct DoubleDouble
{
    private DoubleDouble(double high, double low)
    {
        High = high;
        Low = low;
    }

    /// <summary>The number rounded to a double.</summary>
    public double High { get; }

    /// <summary>What <see cref="High"/> leaves.</summary>
    public double Low { get; }

    /// <summary>A double as it stands.</summary>
    /// <param name="value">Finite.</param>
    public static DoubleDouble From(double value) => new(value, 0);

    /// <summary>An integer: exact up to 106 bits, else rounded to about that many.</summary>
    /// <param name="value">Any.</param>
    public static DoubleDouble From(Int128 value) =>
        Int128.IsNegative(value) ? -FromMagnitude((UInt128)(-value)) : FromMagnitude((UInt128)value);

    /// <inheritdoc cref="From(Int128)"/>
    public static DoubleDouble From(UInt128 value) => FromMagnitude(value);

    /// <summary>The negated number; exact.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator -(DoubleDouble value) => new(-value.High, -value.Low);

    /// <summary>The sum.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator +(DoubleDouble left, DoubleDouble right)
    {
        DoubleDouble high = TwoSum(left.High, right.High);
        DoubleDouble low = TwoSum(left.Low, right.Low);
        DoubleDouble sum = FastTwoSum(high.High, high.Low + low.High);
        return FastTwoSum(sum.High, sum.Low + low.Low);
    }

    /// <summary>The difference.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator -(DoubleDouble left, DoubleDouble right) => left + -right;

    /// <summary>The product.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator *(DoubleDouble left, DoubleDouble right)
    {
        DoubleDouble product = TwoProduct(left.High, right.High);
        double cross = Math.FusedMultiplyAdd(left.High, right.Low, left.Low * right.High);
        return FastTwoSum(product.High, product.Low + cross);
    }

    /// <summary>The quotient: that of the leading doubles, and one correction.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator /(DoubleDouble left, DoubleDouble right)
    {
        double first = left.High / right.High;
        DoubleDouble product = TwoProduct(right.High, first);
        double low = Math.FusedMultiplyAdd(right.Low, first, product.Low);
        double rest = (left.High - product.High) + (left.Low - low);
        return FastTwoSum(first, rest / right.High);
    }

    /// <summary>The quotient by a double.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static DoubleDouble operator /(DoubleDouble left, double right)
    {
        double first = left.High / right;
        double rest = Math.FusedMultiplyAdd(-first, right, left.High) + left.Low;
        return FastTwoSum(first, rest / right);
    }

    /// <summary>The square root, one Newton step from the root of the leading double.</summary>
    /// <param name="value">Not negative.</param>
    public static DoubleDouble Sqrt(DoubleDouble value)
    {
        if (value.High == 0)
        {
            return default;
        }

        double root = Math.Sqrt(value.High);
        DoubleDouble rest = value - TwoProduct(root, root);
        return FastTwoSum(root, rest.High / (2 * root));
    }

    /// <summary>The number times a power of two; exact inside the range of doubles.</summary>
    /// <param name="value">Any.</param>
    /// <param name="exponent">The power of two.</param>
    internal static DoubleDouble ScaleB(DoubleDouble value, int exponent) =>
        new(Math.ScaleB(value.High, exponent), Math.ScaleB(value.Low, exponent));

    private static DoubleDouble FromMagnitude(UInt128 value)
    {
        if (value < (UInt128)(1UL << 62))
        {
            long small = (long)value;
            double rounded = small;
            return new(rounded, small - (long)rounded);
        }

        // Three limbs of at most 43 bits are doubles as they stand.
        double top = Math.ScaleB((double)(ulong)(value >> 85), 85);
        double middle = Math.ScaleB((double)((ulong)(value >> 42) & ((1UL << 43) - 1)), 42);
        double bottom = (ulong)value & ((1UL << 42) - 1);
        DoubleDouble upper = FastTwoSum(top, middle);
        DoubleDouble lower = FastTwoSum(upper.Low, bottom);
        DoubleDouble sum = TwoSum(upper.High, lower.High);
        return FastTwoSum(sum.High, sum.Low + lower.Low);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static DoubleDouble TwoSum(double a, double b)
    {
        double sum = a + b;
        double part = sum - a;
        return new(sum, a - (sum - part) + (b - part));
    }

    /// <summary>As <see cref="TwoSum"/>, for |a| at least |b| or a = 0.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static DoubleDouble FastTwoSum(double a, double b)
    {
        double sum = a + b;
        return new(sum, b - (sum - a));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static DoubleDouble TwoProduct(double a, double b)
    {
        double product = a * b;
        return new(product, Math.FusedMultiplyAdd(a, b, -product));
    }
}
