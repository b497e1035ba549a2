using System.Diagnostics;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Tests.Measurements;

public sealed class PackedMeasurementsTests
{
    private const int Seed = 20261201;

    /// <summary>What one damaged blob of a few kilobytes may cost at most.</summary>
    private const long MostBytes = 256L << 20;

    [Fact]
    public void Random_observations_come_back_exactly_as_they_were_given()
    {
        var random = new Random(Seed);
        var filled = new ObservationColumns();
        var read = new ObservationColumns();
        int wide = 0;
        for (int round = 0; round < 1500; round++)
        {
            List<Observation> observations = RandomObservations.Draw(random);
            filled.Clear();
            read.Clear();
            RandomObservations.AssertHolds(observations, RandomObservations.Fill(observations, filled));
            PackedMeasurements.Read(RandomObservations.Pack(filled), read);
            RandomObservations.AssertHolds(observations, read);
            Assert.Equal(filled.IsWide, read.IsWide);
            Assert.Equal(observations.Count == 0 ? 0 : filled.Decimals, read.Decimals);
            wide += read.IsWide ? 1 : 0;
        }

        Assert.InRange(wide, 100, 1400);
    }

    [Fact]
    public void Several_loads_are_read_one_after_the_other_into_the_same_columns()
    {
        var random = new Random(Seed + 1);
        for (int round = 0; round < 300; round++)
        {
            List<Observation> all = [];
            var read = new ObservationColumns();
            for (int load = 0; load < 3; load++)
            {
                List<Observation> part = RandomObservations.Draw(random, 60);
                PackedMeasurements.Read(RandomObservations.Pack(RandomObservations.Fill(part, new ObservationColumns())), read);
                all.AddRange(part);
            }

            RandomObservations.AssertHolds(all, read);
        }
    }

    [Fact]
    public void A_value_too_wide_for_the_shared_decimals_keeps_all_its_digits()
    {
        // 1e-10 fixes ten decimals; the second value with ten more digits no longer fits 64 bits.
        var columns = new ObservationColumns();
        columns.Add(1, 10, 0, 2);
        columns.Add(123_456_789_012_345, 0, 1, 3);
        Assert.True(columns.IsWide);
        Assert.Equal("0.0000000001", columns.Text(0));
        Assert.Equal("123456789012345.0000000000", columns.Text(1));
    }

    [Fact]
    public void Zeros_are_followed_by_a_value_with_very_many_decimals()
    {
        var columns = new ObservationColumns();
        columns.Add(0, 0, 0, 2);
        columns.Add(0, 1, 0, 3);
        columns.Add(7, 25, 1, 4);
        Assert.Equal(25, columns.Decimals);
        Assert.Equal(0, columns.NearestDouble(0));
        Assert.Equal(0, columns.NearestDouble(1));
        Assert.Equal(7e-25, columns.NearestDouble(2));
    }

    [Fact]
    public void A_million_equal_values_of_one_group_come_back()
    {
        var columns = new ObservationColumns();
        const int count = (1 << 20) + 1;
        for (int i = 0; i < count; i++)
        {
            columns.Add(7, 0, 0, i + 2);
        }

        var read = new ObservationColumns();
        PackedMeasurements.Read(RandomObservations.Pack(columns), read);
        Assert.Equal(count, read.Count);
        Assert.Equal(7, read.Mantissas[count - 1]);
        Assert.Equal(count + 1, read.Lines[count - 1]);
    }

    [Fact]
    public void Every_truncation_is_told_as_damage_or_gives_columns()
    {
        foreach (byte[] sound in Samples())
        {
            int refused = 0;
            for (int length = 0; length < sound.Length; length++)
            {
                refused += Attempt(sound[..length]) ? 0 : 1;
            }

            Assert.Equal(sound.Length, refused);
        }
    }

    [Fact]
    public void Random_damage_is_told_as_damage_or_gives_columns()
    {
        var random = new Random(Seed + 2);
        List<byte[]> samples = Samples();
        int refused = 0;
        for (int flip = 0; flip < 2000; flip++)
        {
            byte[] damaged = [.. samples[flip % samples.Count]];

            // Every other flip hits the first bytes, where version, flags, counts and widths are.
            damaged[random.Next(flip % 2 == 0 ? Math.Min(24, damaged.Length) : damaged.Length)] ^= (byte)random.Next(1, 256);
            refused += Attempt(damaged) ? 0 : 1;
        }

        Assert.InRange(refused, 200, 1900);
    }

    [Fact]
    public void A_damaged_count_or_scale_costs_no_memory()
    {
        // Version 1, flags, a count of 99,999,999 (varint), decimals 0; three columns of one least value, no width, no bytes.
        byte[] constant = [1, 0, 0xff, 0xc1, 0xd7, 0x2f, 0, 14, 0, 0, 0, 4, 0];
        Assert.False(Attempt(constant));
        byte[] wide = [1, 1, 0xff, 0xc1, 0xd7, 0x2f, 0, 1, 7];
        Assert.False(Attempt(wide));

        // One value in one specimen, of 99,999,999 names.
        byte[] names = [1, 4, 1, 0, 14, 0, 0, 0, 4, 0, 0xff, 0xc1, 0xd7, 0x2f, 1, 65, 2, 0];
        Assert.False(Attempt(names));

        // Two loads of one experiment, the second with 500 million decimals.
        var columns = new ObservationColumns();
        columns.Add(1, 0, 0, 2);
        Assert.Throws<CatalogException>(() => PackedMeasurements.Read([1, 0, 1, 0x80, 0x94, 0xeb, 0xdc, 0x03, 2, 0, 0, 0, 4, 0], columns));
    }

    /// <summary>Reads; true where columns came of it, false where damage was told. Anything else fails the test.</summary>
    private static bool Attempt(byte[] packed)
    {
        long before = GC.GetAllocatedBytesForCurrentThread();
        long started = Stopwatch.GetTimestamp();
        var columns = new ObservationColumns();
        bool isRead;
        try
        {
            PackedMeasurements.Read(packed, columns);
            isRead = true;
        }
        catch (CatalogException)
        {
            isRead = false;
        }

        Assert.True(Stopwatch.GetElapsedTime(started) < TimeSpan.FromSeconds(5), "Reading damaged bytes took too long.");
        long allocated = GC.GetAllocatedBytesForCurrentThread() - before;
        Assert.True(allocated < MostBytes, FormattableString.Invariant($"{allocated} bytes were allocated for {packed.Length} damaged bytes."));
        return isRead;
    }

    private static List<byte[]> Samples()
    {
        var random = new Random(Seed + 3);
        var samples = new List<byte[]>();
        while (samples.Count < 24)
        {
            List<Observation> observations = RandomObservations.Draw(random, 80);
            if (observations.Count > 0)
            {
                samples.Add(RandomObservations.Pack(RandomObservations.Fill(observations, new ObservationColumns())));
            }
        }

        return samples;
    }
}
