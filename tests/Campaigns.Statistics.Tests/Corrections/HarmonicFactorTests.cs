namespace Campaigns.Statistics.Tests.Corrections;

public sealed class HarmonicFactorTests
{
    // m (1 + 1/2 + ... + 1/m), mpmath 1.3.0 at 60 digits, rounded to the nearest double; the sum ends and the expansion begins between 65536 and 65537.
    [Theory]
    [InlineData(37, 155.45869028140166)]
    [InlineData(1000, 7485.470860550345)]
    [InlineData(65536, 764646.4038165405)]
    [InlineData(65537, 764659.0713947237)]
    [InlineData(65539, 764684.4065968656)]
    [InlineData(1000003, 14392772.901048893)]
    [InlineData(16777216, 288781991.6217215)]
    [InlineData(123456789, 2371434229.6692758)]
    [InlineData(1000000000, 21300481502.347942)]
    [InlineData(2147483647, 47383750492.38408)]
    public void The_factor_of_a_family_of_any_size_is_right_to_the_last_bit(int familySize, double factor)
    {
        // A power of two far below 1 passes through the multiplication unharmed.
        double p = Math.ScaleB(1, -200);
        Assert.Equal(Math.ScaleB(factor, -200), Families.Adjust("by", [p], familySize)[0]);
    }
}
