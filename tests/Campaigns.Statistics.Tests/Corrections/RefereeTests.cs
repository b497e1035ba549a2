using System.Globalization;
using System.Text;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class RefereeTests(ITestOutputHelper output)
{
    private const int Seed = 20260403;
    private const int Vectors = 2000;

    // R multiplies and divides in steps of its own (n / i * p, n * p / i, sum(1 / (1:n)) * n / i * p), each rounded: that many units it may be off.
    private static readonly (string Key, string Method, int Units)[] Methods =
        [("bonferroni", "bonferroni", 0), ("holm", "holm", 0), ("hochberg", "hochberg", 0), ("hommel", "hommel", 2), ("bh", "BH", 2), ("by", "BY", 2)];

    private const string Script = """
        lines <- readLines(file("stdin"))
        for (l in lines) {
          v <- as.numeric(strsplit(l, " ", fixed = TRUE)[[1]])
          for (k in c("bonferroni", "holm", "hochberg", "hommel", "BH", "BY"))
            cat(sprintf("%a", p.adjust(v[-1], k, n = v[1])), "\n")
        }
        """;

    [Fact]
    public void Two_thousand_random_families_agree_with_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        var families = new (double[] P, int Size)[Vectors];
        var input = new StringBuilder();
        for (int i = 0; i < Vectors; i++)
        {
            double[] p = Families.Draw(random, random.Next(1, 201));
            families[i] = (p, p.Length + (random.Next(3) == 0 ? random.Next(1, 100) : 0));
            input.Append(families[i].Size).Append(' ').AppendJoin(' ', p.Select(Hexadecimal)).Append('\n');
        }

        string[] lines = RProgram.Run(Script, input.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(Vectors * Methods.Length, lines.Length);
        long[] largest = new long[Methods.Length];
        for (int line = 0; line < lines.Length; line++)
        {
            (string key, _, int units) = Methods[line % Methods.Length];
            (double[] p, int size) = families[line / Methods.Length];
            double[] theirs = [.. lines[line].Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(FromHexadecimal)];
            long apart = Families.Adjust(key, p, size).Zip(theirs).Max(pair => Families.UlpsApart(pair.First, pair.Second));
            largest[line % Methods.Length] = Math.Max(largest[line % Methods.Length], apart);
            Assert.True(apart <= units, $"seed {Seed}, vector {line / Methods.Length}, {key}: {apart} units apart");
        }

        output.WriteLine($"seed {Seed}; largest difference from R in units in the last place: {string.Join(", ", Methods.Zip(largest, (m, u) => $"{m.Key} {u}"))}");
    }

    private static string Hexadecimal(double value)
    {
        long bits = BitConverter.DoubleToInt64Bits(value);
        int exponent = (int)(bits >> 52);
        return FormattableString.Invariant($"0x{(exponent == 0 ? 0 : 1)}.{bits & 0xFFFFFFFFFFFFF:x13}p{Math.Max(exponent, 1) - 1023}");
    }

    private static double FromHexadecimal(string text)
    {
        string[] parts = text.Trim()[2..].Split('p');
        string[] digits = parts[0].Split('.');
        long mantissa = long.Parse(digits[0] + (digits.Length > 1 ? digits[1] : "").PadRight(13, '0'), NumberStyles.HexNumber, CultureInfo.InvariantCulture);
        return Math.ScaleB(mantissa, int.Parse(parts[1], CultureInfo.InvariantCulture) - 52);
    }
}
