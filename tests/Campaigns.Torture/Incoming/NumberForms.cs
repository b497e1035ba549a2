using System.Globalization;

namespace Campaigns.Torture.Incoming;

/// <summary>T16: every form in which a number is written is taken for its value or refused, and never for another number.</summary>
internal sealed class NumberForms : TortureTest
{
    /// <summary>A cell as typed; the decimal mark of the file; the value, or the code of the refusal, or "missing".</summary>
    private static readonly (string Cell, bool IsComma, string Outcome)[] Cases =
    [
        ("1.5", false, "1.5"), ("1.50", false, "1.50"), ("+1", false, "1"), ("-1", false, "-1"), ("-0.25", false, "-0.25"), (".5", false, "0.5"), ("1e3", false, "1e3"), ("1E-3", false, "1E-3"),
        ("  2.5  ", false, "2.5"), ("1,5", true, "1.5"), ("-1,5", true, "-1.5"), ("1,5e2", true, "150"), ("007", false, "7"), ("0.0", false, "0.0"),
    ];

    public override string Key => "T16";

    public override string What => "forms of numbers";

    public override int Full => 60;

    public override int Short => 60;

    public override void Run(Tally tally, int tries, Random random)
    {
        foreach ((string cell, bool isComma, string outcome) in Cases)
        {
            tally.Try($"'{cell}'", () => Fault(cell, isComma, outcome));
        }
    }

    private static string? Fault(string cell, bool isComma, string outcome)
    {
        using var bench = new Workbench();
        char separator = isComma ? ';' : ',';
        string file = bench.Write("m.csv", $"experiment{separator}group{separator}value\nE{separator}A{separator}{cell}\nE{separator}A{separator}3\nE{separator}B{separator}4\nE{separator}B{separator}5\n");
        bench.Run("start", "C");
        Ran load = bench.Run("load", "C", file, "--decimal", isComma ? "comma" : "point");
        if (load.Code != 0)
        {
            return $"refused: {load.Error}";
        }

        string folder = bench.At("out");
        bench.Run("export", "C", "--out", folder);
        string value = File.ReadLines(Path.Combine(folder, "measurements", "measurements.csv")).ElementAt(1).Split(',')[2];
        return decimal.Parse(value, NumberStyles.Float, CultureInfo.InvariantCulture) == decimal.Parse(outcome, NumberStyles.Float, CultureInfo.InvariantCulture) ? null : $"became {value}";
    }
}
