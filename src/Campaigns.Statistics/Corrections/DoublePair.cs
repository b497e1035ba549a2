namespace Campaigns.Statistics.Corrections;

/// <summary>An unevaluated sum of two doubles, the second at most half a unit in the last place of the first: about 32 digits.</summary>
/// <param name="High">The sum rounded to a double.</param>
/// <param name="Low">What the rounding left out.</param>
/// <remarks>Source: T. J. Dekker (1971), Numerische Mathematik 18:224-242. Sums of this kind carry a relative error of a few 2^-104 for numbers of one sign.</remarks>
internal readonly record struct DoublePair(double High, double Low)
{
    /// <summary>1 divided by a whole number.</summary>
    /// <param name="divisor">At least 1.</param>
    public static DoublePair Reciprocal(double divisor)
    {
        double quotient = 1 / divisor;
        return new DoublePair(quotient, Math.FusedMultiplyAdd(-quotient, divisor, 1) / divisor);
    }

    /// <summary>The sum of two pairs.</summary>
    public static DoublePair operator +(DoublePair a, DoublePair b)
    {
        (double high, double error) = SumOf(a.High, b.High);
        (double low, double lowError) = SumOf(a.Low, b.Low);
        (high, error) = Normal(high, error + low);
        return FromOrdered(high, error + lowError);
    }

    /// <summary>The product of two pairs.</summary>
    public static DoublePair operator *(DoublePair a, DoublePair b)
    {
        double high = a.High * b.High;
        double error = Math.FusedMultiplyAdd(a.High, b.High, -high);
        error = Math.FusedMultiplyAdd(a.High, b.Low, Math.FusedMultiplyAdd(a.Low, b.High, error));
        return FromOrdered(high, error);
    }

    /// <summary>1 less the pair: its complement as a probability.</summary>
    public DoublePair Complement() => new DoublePair(1, 0) + new DoublePair(-High, -Low);

    private static DoublePair FromOrdered(double high, double low)
    {
        (double sum, double rest) = Normal(high, low);
        return new DoublePair(sum, rest);
    }

    private static (double Sum, double Error) Normal(double large, double small)
    {
        double sum = large + small;
        return (sum, small - (sum - large));
    }

    private static (double Sum, double Error) SumOf(double a, double b)
    {
        double sum = a + b;
        double part = sum - a;
        return (sum, (a - (sum - part)) + (b - part));
    }
}
