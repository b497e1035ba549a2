namespace Campaigns.App.Tests.Browser;

/// <summary>What the report makes of little room and of much: the first page on a telephone, an experiment on paper.</summary>
[Collection(ReportInBrowser.Name)]
public sealed class ReportRoomTests(Chromium browser, ReportFiles reports)
{
    [Theory]
    [InlineData(ReportFiles.Demo)]
    [InlineData(ReportFiles.Odd)]
    public async Task On_a_telephone_the_manager_sees_every_difference_with_its_interval_without_scrolling_sideways(string code)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code), 360, 740, isPhone: true);
        Assert.Empty(await page.Ask<string[]>("""
            () => [...document.querySelectorAll('.sheet .cards th[scope=row], .sheet .cards tbody td')].filter(c => c.textContent.trim())
                .filter(c => { const box = c.getBoundingClientRect(); return box.width < 1 || box.left < 0 || box.right > innerWidth; }).map(c => c.textContent)
            """));
        Assert.Equal(0, await page.Ask<int>("() => [...document.querySelectorAll('.sheet .box')].filter(b => b.scrollWidth > b.clientWidth + 1).length"));
        Assert.Equal(["difference", "from", "to", "adjusted p"], await page.Ask<string[]>("() => [...document.querySelector('.sheet .cards tbody tr').querySelectorAll('td[data-label]')].map(c => c.dataset.label)"));
    }

    [Fact]
    public async Task On_paper_an_experiment_takes_less_than_a_page()
    {
        // A4 paper less the margins, in units of 1/96 inch.
        const int width = 688, height = 1016;
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo), width, height);
        await page.Page.EmulateMediaTypeAsync(PuppeteerSharp.Media.MediaType.Print);
        int[] heights = await page.Ask<int[]>("() => [...document.querySelectorAll('.panel')].map(p => Math.ceil(p.getBoundingClientRect().height))");
        Assert.True(heights.Length >= 12);
        Assert.All(heights, h => Assert.InRange(h, 100, height));
    }
}
