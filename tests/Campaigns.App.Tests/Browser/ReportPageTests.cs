using System.Globalization;
using Campaigns.App.Output;
using Campaigns.App.Tests.Commands;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Browser;

/// <summary>The report as a real browser sees it.</summary>
[Collection(ReportInBrowser.Name)]
public sealed class ReportPageTests(Chromium browser, ReportFiles reports)
{
    /// <summary>The rows of the table with a caption: its heads, and cell by cell the exact value where there is one, else the text.</summary>
    private const string TableByCaption = """
        caption => {
            const table = [...document.querySelectorAll('table')].find(t => t.caption.textContent === caption);
            const text = cell => cell.dataset.value ?? cell.textContent.trim();
            const heads = [...table.tHead.rows[0].cells].map(c => c.firstChild.textContent.trim());
            return [heads, ...[...table.tBodies[0].rows].map(r => [...r.cells].map(text)), ...[...table.tBodies[0].rows].map(r => [...r.cells].map(c => c.textContent.trim()))];
        }
        """;

    [Theory]
    [MemberData(nameof(ReportFiles.Codes), MemberType = typeof(ReportFiles))]
    public async Task It_opens_without_a_complaint_and_asks_for_nothing_beside_itself(string code)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code));
        Assert.Empty(page.Complaints);
        Assert.Equal([new Uri(reports.FileOf(code)).AbsoluteUri], page.Requests);
        Assert.Equal(0, await page.Ask<int>("() => performance.getEntriesByType('resource').length"));
    }

    [Theory]
    [MemberData(nameof(ReportFiles.Codes), MemberType = typeof(ReportFiles))]
    public async Task The_results_on_the_page_are_those_of_the_catalog(string code)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code));
        string[][] table = await page.Ask<string[][]>(TableByCaption, "Results");
        CsvText results = reports.Ask("results", code);
        int count = results.Rows.Count;
        Assert.Equal((2 * count) + 1, table.Length);
        foreach ((string head, string column) in new[] { ("experiment", "experiment"), ("values", "observations"), ("statistic", "statistic"), ("df1", "df1"), ("p", "p"), ("adjusted p", "adjusted_p") })
        {
            int at = Array.IndexOf(table[0], head);
            Assert.True(at >= 0, $"no column '{head}' among {string.Join(", ", table[0])}");
            Assert.Equal(results.Column(column), table[1..(count + 1)].Select(r => r[at]));
        }

        int p = Array.IndexOf(table[0], "p"), survives = Array.IndexOf(table[0], "survives");
        Assert.Equal(results.Column("survives").Select(s => s switch { "true" => "yes", "false" => "no", _ => "" }), table[1..(count + 1)].Select(r => r[survives]));
        string[] shown = [.. results.Column("p").Select(text => text.Length == 0 ? "" : NumberText.P(P(text)))];
        Assert.Equal(shown, table[(count + 1)..].Select(r => r[p]));
    }

    [Fact]
    public async Task The_comparisons_on_the_page_are_those_of_the_catalog()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo));
        string[][] table = await page.Ask<string[][]>(TableByCaption, "Comparisons claimed inside the survivors");
        CsvText all = reports.Ask("comparisons", ReportFiles.Demo);
        string[][] claimed = [.. all.Rows.Where(r => r[Array.IndexOf(all.Columns, "survives")] == "true")];
        int count = claimed.Length;
        Assert.Equal((2 * count) + 1, table.Length);
        foreach ((string head, string column) in new[] { ("lower", "lower"), ("upper", "upper"), ("p", "p"), ("adjusted p", "adjusted_p") })
        {
            int at = Array.IndexOf(table[0], head), from = Array.IndexOf(all.Columns, column);
            Assert.True(at >= 0, $"no column '{head}' among {string.Join(", ", table[0])}");
            Assert.Equal(claimed.Select(r => r[from]).Order(StringComparer.Ordinal), table[1..(count + 1)].Select(r => r[at]).Order(StringComparer.Ordinal));
        }
    }

    [Fact]
    public async Task A_click_sorts_numbers_as_numbers_and_again_the_other_way_and_a_third_time_as_they_were()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo));
        foreach (string head in new[] { "p", "statistic", "adjusted p" })
        {
            string[] before = await Column(page, head);
            await page.Ask<bool>(Clicks, "Results", head);
            string[] up = await Column(page, head);
            Assert.Equal(before.Where(v => v.Length > 0).Select(Log10).Order(), up.Where(v => v.Length > 0).Select(Log10));
            Assert.All(up[..up.Count(v => v.Length > 0)], v => Assert.NotEqual("", v));
            await page.Ask<bool>(Clicks, "Results", head);
            string[] down = await Column(page, head);
            Assert.Equal(before.Where(v => v.Length > 0).Select(Log10).OrderDescending(), down.Where(v => v.Length > 0).Select(Log10));
            await page.Ask<bool>(Clicks, "Results", head);
            Assert.Equal(before, await Column(page, head));
        }
    }

    [Fact]
    public async Task P_values_below_the_range_of_doubles_sort_by_their_exponent()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Odd));
        string[] before = await Column(page, "p");
        Assert.Contains(before, v => v.Length > 0 && Log10(v) < -324);
        await page.Ask<bool>(Clicks, "Results", "p");
        string[] up = await Column(page, "p");
        Assert.Equal(before.Where(v => v.Length > 0).Select(Log10).Order(), up.Where(v => v.Length > 0).Select(Log10));
    }

    [Fact]
    public async Task The_keyboard_sorts_too_and_says_the_order()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo));
        Assert.True(await page.Ask<bool>("""
            () => {
                const table = [...document.querySelectorAll('table')].find(t => t.caption.textContent === 'Results');
                const head = [...table.tHead.rows[0].cells].find(c => c.firstChild.textContent.trim() === 'p');
                head.querySelector('button').focus();
                return document.activeElement.closest('th') === head;
            }
            """));
        string order = "() => document.activeElement.closest('th').getAttribute('aria-sort')";
        Assert.Equal("none", await page.Ask<string>(order));
        await page.Page.Keyboard.PressAsync("Enter");
        Assert.Equal("ascending", await page.Ask<string>(order));
        string[] up = [.. (await Column(page, "p")).Where(v => v.Length > 0)];
        Assert.Equal(up.Select(Log10).Order(), up.Select(Log10));
        await page.Page.Keyboard.PressAsync("Space");
        Assert.Equal("descending", await page.Ask<string>(order));
    }

    private const string Clicks = """
        (caption, name) => {
            const table = [...document.querySelectorAll('table')].find(t => t.caption.textContent === caption);
            [...table.tHead.rows[0].cells].find(c => c.firstChild.textContent.trim() === name).click();
            return true;
        }
        """;

    private static async Task<string[]> Column(OpenPage page, string head)
    {
        string[][] table = await page.Ask<string[][]>(TableByCaption, "Results");
        int at = Array.IndexOf(table[0], head);
        return [.. table[1..(1 + ((table.Length - 1) / 2))].Select(r => r[at])];
    }

    /// <summary>The decimal logarithm of a number as written, which tells also p-values below the range of doubles apart.</summary>
    private static double Log10(string text)
    {
        string[] parts = text.Split('E', 'e');
        double exponent = parts.Length > 1 ? double.Parse(parts[1], NumberStyles.Float, CultureInfo.InvariantCulture) : 0;
        return Math.Log10(double.Parse(parts[0], NumberStyles.Float, CultureInfo.InvariantCulture)) + exponent;
    }

    private static PValue P(string text) => double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture) is > 0 and var value ? PValue.FromValue(value) : PValue.FromLog(Log10(text) * Math.Log(10));
}
