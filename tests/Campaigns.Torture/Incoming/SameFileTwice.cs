using System.Globalization;
using System.Text;

namespace Campaigns.Torture.Incoming;

/// <summary>T18: a file that was loaded is known again by its bytes, whatever its name and place, and its values never count twice.</summary>
internal sealed class SameFileTwice : TortureTest
{
    public override string Key => "T18";

    public override string What => "the same file loaded twice";

    public override int Full => 50;

    public override int Short => 10;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            byte[] file = RandomFile(random);
            tally.Try(string.Create(CultureInfo.InvariantCulture, $"file {i}, {file.Length} bytes"), () => Fault(file, random));
        }
    }

    private static byte[] RandomFile(Random random)
    {
        var text = new StringBuilder("experiment,group,value\n");
        int rows = random.Next(4, 400);
        for (int r = 0; r < rows; r++)
        {
            text.Append(CultureInfo.InvariantCulture, $"E{random.Next(5)},{"ab"[random.Next(2)]},{random.NextDouble():0.000}{(random.Next(3) == 0 ? "\r\n" : "\n")}");
        }

        return Encoding.UTF8.GetBytes(text.ToString());
    }

    private static string? Fault(byte[] bytes, Random random)
    {
        using var bench = new Workbench();
        string first = bench.Write("first.csv", bytes);
        bench.Run("start", "C");
        if (bench.Run("load", "C", first) is { Code: not 0 } refused)
        {
            return $"the first load was refused: {refused.Error}";
        }

        Directory.CreateDirectory(bench.At("elsewhere"));
        string[] again = [first, bench.Write("second name.csv", bytes), bench.Write(Path.Combine("elsewhere", "first.csv"), bytes)];
        foreach (string path in again)
        {
            Ran second = bench.Run("load", "C", path);
            if (second.Code != 3 || !second.Error.Contains("was loaded into 'C' before", StringComparison.Ordinal))
            {
                return $"'{Path.GetFileName(path)}' ended with {second.Code}: {second.Error}";
            }
        }

        // One byte more or less is another file, and counts.
        byte[] other = [.. bytes, .. "E9,a,1\n"u8];
        bool loadsOther = random.Next(2) == 0;
        if (loadsOther && bench.Run("load", "C", bench.Write("other.csv", other)).Code != 0)
        {
            return "another file was taken for the same";
        }

        bench.Run("export", "C", "--out", bench.At("out"));
        int exported = File.ReadLines(Path.Combine(bench.At("out"), "measurements", "measurements.csv")).Count() - 1;
        int rows = bytes.Count(b => b == '\n') - 1, all = rows + (loadsOther ? rows + 1 : 0);
        return exported == all ? null : $"{exported} values instead of {all}";
    }
}
