using Campaigns.Statistics.Corrections;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class BoundaryTests
{
    [Theory]
    [InlineData("none")]
    [InlineData("bonferroni")]
    [InlineData("sidak")]
    [InlineData("holm")]
    [InlineData("holm-sidak")]
    [InlineData("hochberg")]
    [InlineData("bh")]
    [InlineData("by")]
    public void A_rank_survives_just_below_its_boundary_and_not_just_above_it(string key)
    {
        Correction correction = CorrectionRegistry.Find(key)!;
        foreach (int familySize in new[] { 1, 2, 7, 60 })
        {
            for (int rank = 1; rank <= familySize; rank++)
            {
                double boundary = correction.BoundaryAt(rank, familySize, 0.05)!.Value;
                Assert.True(AdjustedOfLast(key, rank, familySize, boundary * (1 - 1e-12)) <= 0.05, $"{key}, rank {rank} of {familySize}");
                Assert.True(AdjustedOfLast(key, rank, familySize, boundary * (1 + 1e-12)) > 0.05, $"{key}, rank {rank} of {familySize}");
            }
        }
    }

    [Fact]
    public void Hommel_has_no_boundary_of_rank_and_level_alone() => Assert.Null(CorrectionRegistry.Find("hommel")!.BoundaryAt(1, 10, 0.05));

    /// <summary>Smaller ranks far below every boundary, larger ones at 1: only the boundary of this rank decides.</summary>
    private static double AdjustedOfLast(string key, int rank, int familySize, double p)
    {
        double[] family = new double[familySize];
        Array.Fill(family, 1e-200, 0, rank - 1);
        family[rank - 1] = p;
        Array.Fill(family, 1, rank, familySize - rank);
        return Families.Adjust(key, family, familySize)[rank - 1];
    }
}
