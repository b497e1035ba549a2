using Campaigns.Catalog.Loading;

namespace Campaigns.Torture.Incoming;

/// <summary>T16: every form in which a number is written is taken for its value or refused with its own code, and never for another number.</summary>
internal sealed class NumberForms : TortureTest
{
    /// <summary>A cell as typed; whether the file has decimal commas; the value, "NA", or the code of the refusal.</summary>
    private static readonly (string Cell, bool IsComma, string Outcome)[] Cases =
    [
        ("1.5", false, "1.5"), ("1.50", false, "1.50"), ("+1", false, "1"), ("-1", false, "-1"), ("-0.25", false, "-0.25"), (".5", false, "0.5"), ("5.", false, "5"), ("1e3", false, "1000"),
        ("1E-3", false, "0.001"), ("  2.5  ", false, "2.5"), ("007", false, "7"), ("0.0", false, "0"), ("-0", false, "0"), ("\u22121.5", false, "-1.5"), ("123456789012345.25", false, "123456789012345.25"),
        ("1,5", true, "1.5"), ("-1,5", true, "-1.5"), ("1,5e2", true, "150"), (",5", true, "0.5"), ("7", true, "7"),
        ("1,5", false, "decimal-comma"), ("1.5", true, "decimal-point"), ("1.234", true, "decimal-point"), ("1,234", false, "decimal-comma"), ("1.234,5", false, "thousands-separator"),
        ("1.234,5", true, "thousands-separator"), ("1,234.5", false, "thousands-separator"), ("1,234.5", true, "thousands-separator"), ("1 234.5", false, "thousands-separator"),
        ("1\u00A0234.5", false, "thousands-separator"), ("1\u202F234,5", true, "thousands-separator"), ("1'234", false, "thousands-separator"), ("1\u2019234", false, "thousands-separator"), ("1_000", false, "thousands-separator"),
        ("1.234.567", true, "thousands-separator"), ("1,234,567", false, "thousands-separator"),
        ("\uFF11\uFF12", false, "foreign-digits"), ("\u0661\u0662\u0663", false, "foreign-digits"), ("\u06F1.\u06F5", false, "foreign-digits"), ("1\u0665", false, "foreign-digits"),
        ("1e999", false, "too-large"), ("-1e999", false, "too-large"), ("1e-999", false, "too-small"), ("NaN", false, "not-finite"), ("Inf", false, "not-finite"), ("-Infinity", false, "not-finite"), ("\u221E", false, "not-finite"),
        ("1.#IND", false, "not-finite"), ("0x10", false, "hexadecimal"), ("&h1F", false, "hexadecimal"), ("TRUE", false, "truth-value"), ("no", false, "truth-value"),
        ("2024-05-31", false, "date"), ("1/2", false, "date"), ("31.05.2024", false, "date"), ("3-Mar", false, "date"), ("12:30", false, "date"),
        ("", false, "NA"), ("NA", false, "NA"), ("n/a", false, "NA"), ("  ", false, "NA"),
        ("<0.05", false, "limit"), ("\u22643", false, "limit"), (">100", false, "limit"), ("5 mPa", false, "unit"), ("12%", false, "unit"), ("3 \u00B0C", false, "unit"), ("1e", false, "not-a-number"), ("1.2.3x", false, "not-a-number"),
        ("--1", false, "not-a-number"), ("1-", false, "not-a-number"), ("#N/A", false, "not-a-number"), ("e5", false, "not-a-number"), (".", false, "not-a-number"), ("+", false, "not-a-number"),
    ];

    public override string Key => "T16";

    public override string What => "forms of numbers";

    public override int Full => 60;

    public override int Short => 60;

    public override void Run(Tally tally, int tries, Random random)
    {
        using var bench = new Workbench();
        foreach ((string cell, bool isComma, string outcome) in Cases)
        {
            tally.Try($"'{cell}' with decimal {(isComma ? "comma" : "point")}", () => Read(bench, cell, isComma) is var became && became == outcome ? null : $"became {became} instead of {outcome}");
        }
    }

    private static string Read(Workbench bench, string cell, bool isComma)
    {
        string path = bench.Write("m.csv", $"experiment\tgroup\tvalue\nE\tA\t{cell}\n");
        using MeasurementFile file = MeasurementFile.Open(path, new DelimitedFileOptions { DecimalMark = isComma ? DecimalMark.Comma : DecimalMark.Point });
        if (file.Read(out MeasurementRow row))
        {
            // The exact decimal, without a way through a double or a culture.
            return row.IsMissing ? "NA" : Plain(row.Value.ToString());
        }

        ImportProblem problem = file.Problems.Kept.Single();
        return problem is { Line: 2, Column: "value" } ? problem.Code : $"{problem.Code} at line {problem.Line}, column {problem.Column}";
    }

    /// <summary>A decimal without exponent, zeros at its end as typed.</summary>
    private static string Plain(string text)
    {
        decimal value = decimal.Parse(text, System.Globalization.NumberStyles.Float, System.Globalization.CultureInfo.InvariantCulture);
        return value == 0 ? "0" : value.ToString(System.Globalization.CultureInfo.InvariantCulture);
    }
}
