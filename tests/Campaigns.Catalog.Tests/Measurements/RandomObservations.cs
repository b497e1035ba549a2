using System.Numerics;
using System.Text;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Tests.Measurements;

/// <summary>One observation as it is handed to the columns.</summary>
internal sealed record Observation(BigInteger Mantissa, int Decimals, ushort Group, long Line, string Specimen, string Block, long? Order);

/// <summary>Random observations of every kind that a file can bring, from a seed.</summary>
internal static class RandomObservations
{
    public static List<Observation> Draw(Random random, int mostCount = 300)
    {
        int count = random.Next(mostCount + 1);
        int bits = random.Next(1, 64);
        int groups = random.Next(3) switch { 0 => 1, 1 => random.Next(2, 9), _ => 65536 };
        int decimals = random.Next(-5, 12);
        int spread = random.Next(4) switch { 0 => 0, 1 => 3, 2 => 12, _ => 60 };
        bool isConstant = random.Next(10) == 0;
        bool isWide = random.Next(8) == 0;
        double orders = Share(random), specimens = Share(random), blocks = Share(random);
        long[] lines = [.. Enumerable.Range(2, count).Select(i => (long)i)];
        if (random.Next(2) == 0)
        {
            random.Shuffle(lines);
        }

        BigInteger first = Mantissa(random, bits, isWide);
        return
        [
            .. lines.Select(line => new Observation(
                isConstant ? first : Mantissa(random, bits, isWide),
                decimals + random.Next(-spread, spread + 1),
                (ushort)random.Next(groups),
                line,
                random.NextDouble() < specimens ? $"P-{random.Next(40)} µ" : "",
                random.NextDouble() < blocks ? $"day {random.Next(4)}" : "",
                random.NextDouble() < orders ? Signed(random, random.Next(1, 60)) : null)),
        ];
    }

    public static ObservationColumns Fill(IEnumerable<Observation> observations, ObservationColumns columns)
    {
        foreach (Observation o in observations)
        {
            if (o.Mantissa >= long.MinValue && o.Mantissa <= long.MaxValue)
            {
                columns.Add((long)o.Mantissa, o.Decimals, o.Group, o.Line);
            }
            else
            {
                columns.AddWide(o.Mantissa, o.Decimals, o.Group, o.Line);
            }

            columns.Describe(Encoding.UTF8.GetBytes(o.Specimen), Encoding.UTF8.GetBytes(o.Block), o.Order);
        }

        return columns;
    }

    public static byte[] Pack(ObservationColumns columns)
    {
        var writer = new PackWriter();
        PackedMeasurements.Write(columns, writer);
        return writer.Written.ToArray();
    }

    /// <summary>Asserts that the columns hold just these observations, value for value, exactly.</summary>
    public static void AssertHolds(IReadOnlyList<Observation> expected, ObservationColumns columns)
    {
        Assert.Equal(expected.Count, columns.Count);
        Assert.Equal(expected.Any(o => o.Order is not null), columns.HasOrder);
        for (int i = 0; i < expected.Count; i++)
        {
            Observation o = expected[i];
            BigInteger mantissa = columns.IsWide ? columns.WideMantissas[i] : columns.Mantissas[i];
            Assert.True(columns.Decimals >= o.Decimals);
            Assert.Equal(o.Mantissa * BigInteger.Pow(10, columns.Decimals - o.Decimals), mantissa);
            Assert.Equal(o.Group, columns.Groups[i]);
            Assert.Equal(o.Line, columns.Lines[i]);
            Assert.Equal(o.Order ?? ObservationColumns.NoOrder, columns.Orders[i]);
            Assert.Equal(o.Specimen, columns.Specimens[i] < 0 ? "" : columns.SpecimenNames.Text(columns.Specimens[i]));
            Assert.Equal(o.Block, columns.Blocks[i] < 0 ? "" : columns.BlockNames.Text(columns.Blocks[i]));
        }
    }

    private static double Share(Random random) => random.Next(3) / 2.0;

    private static BigInteger Mantissa(Random random, int bits, bool isWide) =>
        isWide && random.Next(3) == 0 ? Signed(random, 63) * BigInteger.Pow(10, random.Next(2, 40)) : Signed(random, bits);

    private static long Signed(Random random, int bits)
    {
        long size = random.NextInt64() >> (63 - bits);
        return random.Next(2) == 0 ? size : -size;
    }
}
