using Campaigns.Catalog.Results;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Results;

public sealed class PackedReviewLinesTests
{
    [Fact]
    public void Lines_come_back_with_every_bit_and_every_logarithm()
    {
        var random = new Random(20261201);
        for (int round = 0; round < 200; round++)
        {
            (long[] ids, PValue[] p, PValue[] adjusted) = Draw(random);
            byte[] packed = PackedReviewLines.Pack(ids, p, adjusted).Written.ToArray();
            (FamilyColumns family, PValue[] readAdjusted) = PackedReviewLines.Unpack(packed);
            Assert.Equal(ids, family.ExperimentIds);
            Assert.Equal(p, family.P);
            Assert.Equal(adjusted, readAdjusted);
            FamilyColumns alone = PackedReviewLines.UnpackFamily(packed);
            Assert.Equal(ids, alone.ExperimentIds);
            Assert.Equal(p, alone.P);
        }
    }

    [Fact]
    public void Damaged_lines_are_told_as_damage_or_give_lines()
    {
        var random = new Random(20261202);
        int refused = 0;
        for (int flip = 0; flip < 2000; flip++)
        {
            (long[] ids, PValue[] p, PValue[] adjusted) = Draw(random);
            byte[] damaged = PackedReviewLines.Pack(ids, p, adjusted).Written.ToArray();
            int at = random.Next(flip % 2 == 0 ? Math.Min(16, damaged.Length) : damaged.Length);
            damaged = flip % 4 == 0 ? damaged[..at] : damaged;
            if (damaged.Length > at)
            {
                damaged[at] ^= (byte)random.Next(1, 256);
            }

            try
            {
                PackedReviewLines.Unpack(damaged);
            }
            catch (CatalogException)
            {
                refused++;
            }
        }

        Assert.InRange(refused, 600, 1900);
    }

    private static (long[] Ids, PValue[] P, PValue[] Adjusted) Draw(Random random)
    {
        int count = random.Next(60);
        long id = 0;
        long[] ids = [.. Enumerable.Range(0, count).Select(_ => id += random.Next(1, 1 << random.Next(1, 30)))];
        return (ids, [.. ids.Select(_ => P(random))], [.. ids.Select(_ => P(random))]);
    }

    private static PValue P(Random random) => random.Next(5) switch
    {
        0 => PValue.One,
        1 => PValue.FromValue(0),
        2 => PValue.FromLog(-random.Next(600, 9000) - random.NextDouble()),
        _ => PValue.FromValue(random.NextDouble()),
    };
}
