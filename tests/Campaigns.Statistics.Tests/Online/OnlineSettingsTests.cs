using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Online;

public sealed class OnlineSettingsTests
{
    private static readonly SignificanceLevel Level = new(0.1);

    [Theory]
    [InlineData("alpha-spending", "jm", null, null, null)]
    [InlineData("online-fallback", "jm", null, null, null)]
    [InlineData("addis-spending", "p1.6", null, 0.25, 0.5)]
    [InlineData("lond", "jm", null, null, null)]
    [InlineData("lond-any", "jm", null, null, null)]
    [InlineData("lord", "jm", 0.05, null, null)]
    [InlineData("saffron", "p1.6", 0.05, 0.5, null)]
    [InlineData("addis", "p1.6", 0.05, 0.25, 0.5)]
    public void What_is_not_given_takes_its_usual_value(string key, string shape, double? wealth, double? lambda, double? tau)
    {
        OnlineSettings settings = For(key);
        Assert.Equal((shape, 100, wealth, lambda, tau), (settings.Shape, settings.Horizon, settings.InitialWealth, settings.Lambda, settings.Tau));
        Assert.Equal(Level, settings.Level);
    }

    [Theory]
    [InlineData("lond", 0.01, null, null, "LOND ('lond') takes no initial wealth")]
    [InlineData("alpha-spending", null, 0.5, null, "takes no lambda")]
    [InlineData("saffron", null, null, 0.5, "takes no tau")]
    [InlineData("lord", 0.11, null, null, "initial wealth lies above 0 and is at most the level 0.1; 0.11 does not")]
    [InlineData("lord", -0.01, null, null, "initial wealth")]
    [InlineData("lord", 0.0, null, null, "initial wealth")]
    [InlineData("lord", double.NaN, null, null, "initial wealth")]
    [InlineData("saffron", null, 1.0, null, "Lambda lies above 0 and below 1; 1 does not fit")]
    [InlineData("saffron", null, 0.0, null, "Lambda lies above 0")]
    [InlineData("addis", null, 0.5, null, "lambda 0.5 with tau 0.5 does not fit")]
    [InlineData("addis", null, null, 1.1, "tau is at most 1; lambda 0.25 with tau 1.1 does not fit")]
    [InlineData("addis", null, 0.0, null, "Lambda lies above 0 and below tau")]
    [InlineData("addis", null, double.NaN, 0.5, "does not fit")]
    [InlineData("addis-spending", null, -0.1, null, "Lambda is at least 0 and below tau")]
    [InlineData("addis-spending", null, null, 0.25, "lambda 0.25 with tau 0.25 does not fit")]
    public void What_does_not_fit_is_refused_in_a_sentence(string key, double? wealth, double? lambda, double? tau, string reason) =>
        Assert.Contains(reason, Assert.Throws<OnlineSettingsException>(() => For(key, 100, null, wealth, lambda, tau)).Message, StringComparison.Ordinal);

    [Theory]
    [InlineData("jm2", 100, "no shape 'jm2'; known are jm, p1.6, p2, log2, uniform")]
    [InlineData("jm", 0, "from 1 to 10000000, or none; not 0")]
    [InlineData("jm", 10000001, "from 1 to 10000000")]
    [InlineData("uniform", null, "'uniform' needs a horizon")]
    public void Shapes_and_horizons_that_do_not_fit_are_refused(string shape, int? horizon, string reason) =>
        Assert.Contains(reason, Assert.Throws<OnlineSettingsException>(() => For("lond", horizon, shape)).Message, StringComparison.Ordinal);

    [Fact]
    public void What_fits_at_the_edge_is_taken()
    {
        Assert.Equal(0.1, For("lord", 1, null, 0.1).InitialWealth);
        Assert.Equal(1, For("addis", 1, null, null, 0.9, 1).Tau);
        Assert.Equal(0, For("addis-spending", 1, null, null, 0).Lambda);
        Assert.Null(For("lord", null).Horizon);
    }

    private static OnlineSettings For(string key, int? horizon = 100, string? shape = null, double? wealth = null, double? lambda = null, double? tau = null) =>
        OnlineSettings.For(OnlineRegistry.Find(key)!, Level, horizon, shape, wealth, lambda, tau);
}
