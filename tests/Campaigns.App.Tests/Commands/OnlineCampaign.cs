using System.Globalization;
using System.Text;

namespace Campaigns.App.Tests.Commands;

/// <summary>Experiments of two groups from a seeded generator, some with a real difference, for campaigns that are judged as they arrive.</summary>
internal static class OnlineCampaign
{
    public static string Plan(int experiments, string more = "")
    {
        var text = new StringBuilder("experiment,groups,replicates,follow_up" + (more.Length > 0 ? ",family" : "") + "\n");
        for (int i = 1; i <= experiments; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"{Code(i)},A|B,5,tukey-kramer{(more.Length > 0 ? "," + more : "")}\n");
        }

        return text.ToString();
    }

    public static string Measurements(params IEnumerable<int> experiments)
    {
        var text = new StringBuilder("experiment,group,value\n");
        foreach (int i in experiments)
        {
            var random = new Random(1000 + i);
            double gap = (i % 4) switch { 0 => 3, 2 => 1.6, _ => 0 };
            for (int v = 0; v < 10; v++)
            {
                text.Append(CultureInfo.InvariantCulture, $"{Code(i)},{(v % 2 == 0 ? 'A' : 'B')},{10 + (v % 2 * gap) + Noise(random):F3}\n");
            }
        }

        return text.ToString();
    }

    public static string Code(int i) => FormattableString.Invariant($"E{i:D2}");

    /// <summary>Starts, plans and seals a campaign C of so many experiments.</summary>
    public static void Open(Workplace place, int experiments, params string[] options)
    {
        place.Run(["start", "C", .. options]).Well();
        place.Run("plan", "C", place.Write("plan.csv", Plan(experiments))).Well();
        place.Run("seal", "C").Well();
    }

    // Nearly normal: the sum of twelve uniform values, less its mean.
    private static double Noise(Random random)
    {
        double sum = -6;
        for (int i = 0; i < 12; i++)
        {
            sum += random.NextDouble();
        }

        return sum;
    }
}
