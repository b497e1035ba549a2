using System.Globalization;
using System.Text;
using Campaigns.App.Tests.Commands;
using Campaigns.App.Tests.Report;

namespace Campaigns.App.Tests.Browser;

/// <summary>Reports as the program writes them: of the demonstration, and of a campaign with names that would break a page and p-values below the range of doubles.</summary>
public sealed class ReportFiles : IDisposable
{
    private readonly Workplace _place = new();

    public ReportFiles()
    {
        _place.Run("run", Workplace.Demo).Well();
        _place.Run("run", _place.Campaign(Odd, OddPlan, OddValues())).Well();
        foreach (string folder in new[] { "nist-one-way", "published-classics", "published-designs" })
        {
            _place.Run("run", Path.Combine(Workplace.Repository(), "campaigns", folder)).Well();
        }

        _place.Run("run", ManySurvivors.Folder(_place)).Well();
        foreach (string code in new[] { "many", Demo, Odd, "nist-one-way", "published-classics", "published-designs" })
        {
            // As many experiments in full as tell all kinds of content apart: every one would make each look at the page slower.
            _place.Run("report", code, "--most", "12", "--out", FileOf(code)).Well();
        }
    }

    /// <summary>Code of the demonstration.</summary>
    public const string Demo = "adhesion-screen";

    /// <summary>Code of the other campaign.</summary>
    public const string Odd = "odd";

    private const string OddPlan = """
        experiment,title,response,unit,groups,follow_up
        tiny-1,"<script>alert(1)</script> & ""quoted"" 'single'",<b>shine</b>,%,a|b,tukey-kramer
        tiny-2,=1+1,shine,</td></table>,a|b,tukey-kramer
        plain,a title without any place to break averyveryveryveryveryveryveryveryveryveryveryveryveryveryveryverylongword,shine,GU,a|b,none
        empty,nothing yet,shine,GU,a|b,none

        """;

    /// <summary>The file of a report.</summary>
    public string FileOf(string code) => _place.At(code + ".html");

    /// <summary>Both codes, as tests take them.</summary>
    public static TheoryData<string> Codes => [Demo, Odd];

    /// <summary>What a command prints as csv about the same catalog.</summary>
    internal CsvText Ask(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;

    public void Dispose() => _place.Dispose();

    /// <summary>Groups that lie 10^9 (or 10^7) standard deviations apart: p is about 1e-330, or 1e-260.</summary>
    private static string OddValues()
    {
        StringBuilder text = new("experiment,group,value\n");
        foreach ((string experiment, string step) in new[] { ("tiny-1", "0000000001"), ("tiny-2", "00000001"), ("plain", "4") })
        {
            for (int i = 0; i < 20; i++)
            {
                text.Append(CultureInfo.InvariantCulture, $"{experiment},a,1.{(i % 2 == 0 ? step : "0")}\n{experiment},b,{(experiment == "plain" ? 1 : 2)}.{(i % 3 == 0 ? step : "0")}\n");
            }
        }

        return text.ToString();
    }
}

/// <summary>Tests that look at the same reports with the same browser.</summary>
[CollectionDefinition(Name)]
public sealed class ReportInBrowser : ICollectionFixture<Chromium>, ICollectionFixture<ReportFiles>
{
    public const string Name = "report in a browser";
}
