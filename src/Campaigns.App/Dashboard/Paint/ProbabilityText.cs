using System.Globalization;
using Campaigns.App.Output;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Probabilities in per cent without the sign, for columns and axes.</summary>
internal static class ProbabilityText
{
    /// <summary>Two decimals; what is neither 0 nor 1 never looks so.</summary>
    /// <param name="probability">In [0, 1].</param>
    public static string Percent(double probability) =>
        probability is > 0 and < 1e-4 ? NumberText.Screen(100 * probability, 2)
        : probability is > 0.9999 and < 1 ? ">99.99"
        : (100 * probability).ToString("0.00", CultureInfo.InvariantCulture);
}
