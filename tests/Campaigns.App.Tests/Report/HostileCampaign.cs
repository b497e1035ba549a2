using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>A campaign in which everything that people name tries to be more than a name.</summary>
internal static class HostileCampaign
{
    public const string Script = "<script>alert(1)</script>";

    public const string Image = "\"><img src=x onerror=alert(2)>";

    public const string Bars = "a|b `c` **d** [e](http://evil.example) <b>f</b> www.evil.example # g";

    public const string Reversed = "abc\u202egpj\u2066x";

    /// <summary>Runs it; the experiment's code, groups, titles, units, reasons and the file's name are hostile.</summary>
    public static void Run(Workplace place)
    {
        place.Write("H/campaign.json", $$"""{"code": "H", "title": "{{Script}} & title", "purpose": "</style><script>alert(3)</script>", "errorRate": "false-discovery", "level": 0.05, "correction": "bh", "test": "f", "followUp": "tukey-kramer"}""");
        place.Write("H/plan.csv", $"experiment,title,response,unit\n{Quoted(Script)},{Quoted(Bars)},{Quoted(Image)},{Quoted("<u>&amp;")}\n{Quoted("1. - # E2")},{Quoted(Reversed)},\uFFFE,$x$\n");
        place.Write("H/measurements/week-01.csv", "experiment,group,value\n" + string.Concat(
            Enumerable.Range(0, 24).Select(i => $"{Quoted(i < 12 ? Script : "1. - # E2")},{Quoted((i % 2) switch { 0 => Image, _ => "</td></tr>|*b*" })},{10 + (i % 2 * 5) + (i * 7 % 5 * 0.1)}\n")));
        place.Run("run", place.At("H")).Well();
        place.Run("exclude", "H", Script, "--line", "2", "--reason", Bars, "--as", Image).Well();
        place.Run("test", "H").Well();
        place.Run("review", "H").Well();
    }

    private static string Quoted(string text) => $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"";
}
