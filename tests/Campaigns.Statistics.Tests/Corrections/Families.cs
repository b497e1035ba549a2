using Campaigns.Statistics.Corrections;
using FsCheck;
using FsCheck.Fluent;

namespace Campaigns.Statistics.Tests.Corrections;

/// <summary>P-values with the size of their family, and how to draw them.</summary>
public sealed record Drawn(double[] P, int FamilySize)
{
    public override string ToString() => FormattableString.Invariant($"m = {FamilySize}: {string.Join(" ", P.Select(p => FormattableString.Invariant($"{p:R}")))}");
}

/// <summary>Draws families with ties, ends of the range, knife edges and tiny values.</summary>
public static class Families
{
    private static readonly double[] Edges = [0, 1, 0.05, 0.01, 0.025, 0.05 / 3, 5e-324, 1e-310, 1e-300, 1e-17, 1 - (1.0 / 9007199254740992)];

    public static Arbitrary<Drawn> Family()
    {
        Gen<double> uniform = Gen.Choose(0, int.MaxValue).Select(k => k / (double)int.MaxValue);
        Gen<double> grid = Gen.Choose(0, 100).Select(k => k / 100.0);
        Gen<double> small = Gen.Choose(0, 3000).Select(k => Math.Pow(10, -k / 10.0));
        Gen<double> p = Gen.Frequency((3, uniform), (2, grid), (2, small), (1, Gen.Elements(Edges)));
        Gen<Drawn> family =
            from values in p.ArrayOf()
            from more in Gen.Frequency((2, Gen.Constant(0)), (1, Gen.Choose(1, 20)), (1, Gen.Choose(1, 1000000)))
            select new Drawn(values, values.Length + more);
        return family.ToArbitrary();
    }

    /// <summary>The same kind of family from a seeded generator.</summary>
    public static double[] Draw(Random random, int count)
    {
        double[] p = new double[count];
        int kind = random.Next(4);
        for (int i = 0; i < count; i++)
        {
            p[i] = kind switch
            {
                0 => random.NextDouble(),
                1 => random.Next(101) / 100.0,
                2 => Math.Pow(10, -300 * random.NextDouble()),
                _ => random.Next(3) == 0 && i > 0 ? p[random.Next(i)] : Math.Pow(random.NextDouble(), 6),
            };
        }

        return p;
    }

    public static double[] Adjust(string key, double[] p, int familySize)
    {
        double[] adjusted = new double[p.Length];
        CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(p, familySize), adjusted);
        return adjusted;
    }

    /// <summary>How many doubles lie between two numbers from 0 up.</summary>
    public static long UlpsApart(double a, double b) => Math.Abs(BitConverter.DoubleToInt64Bits(a) - BitConverter.DoubleToInt64Bits(b));
}
