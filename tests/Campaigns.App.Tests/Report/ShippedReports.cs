using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Report;

/// <summary>The shipped campaigns, run once, each with its report.</summary>
public sealed class ShippedReports : IDisposable
{
    public static readonly string[] Codes = ["adhesion-screen", "nist-one-way", "published-classics", "published-designs"];

    private readonly Dictionary<string, ReadPage> _pages = [];

    public ShippedReports()
    {
        foreach (string code in Codes)
        {
            Place.Run("run", Path.Combine(Workplace.Repository(), "campaigns", code)).Well();
        }
    }

    internal Workplace Place { get; } = new();

    internal ReadPage Page(string code) => _pages.TryGetValue(code, out ReadPage? page) ? page : _pages[code] = ReadPage.Of(Place.Run("report", code).Well().Out);

    internal CsvText Csv(params string[] command) => Place.Run([.. command, "--format", "csv"]).Well().Csv;

    public void Dispose() => Place.Dispose();
}
