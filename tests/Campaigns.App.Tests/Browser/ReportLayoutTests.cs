using System.Text.Json;
using PuppeteerSharp.Media;

namespace Campaigns.App.Tests.Browser;

/// <summary>How the report looks: on a telephone, on paper, in both schemes, and to who does not see it.</summary>
[Collection(ReportInBrowser.Name)]
public sealed class ReportLayoutTests(Chromium browser, ReportFiles reports)
{
    /// <summary>Texts whose contrast to what lies behind them is below a bound: WCAG 2.2, relative luminance; in pictures, the letters lie on their white card.</summary>
    private const string LowContrast = """
        bound => {
            const parse = text => { const n = text.match(/[\d.]+/g).map(Number); return { r: n[0], g: n[1], b: n[2], a: n.length > 3 ? n[3] : 1 }; };
            const over = (top, under) => ({ r: top.r * top.a + under.r * (1 - top.a), g: top.g * top.a + under.g * (1 - top.a), b: top.b * top.a + under.b * (1 - top.a), a: 1 });
            const part = v => { const s = v / 255; return s <= 0.04045 ? s / 12.92 : ((s + 0.055) / 1.055) ** 2.4; };
            const light = c => 0.2126 * part(c.r) + 0.7152 * part(c.g) + 0.0722 * part(c.b);
            const behind = element => {
                const layers = [];
                for (let e = element; e; e = e.parentElement) {
                    if (e.tagName === 'svg') layers.push(parse(getComputedStyle(e.querySelector('rect')).fill));
                    const background = parse(getComputedStyle(e).backgroundColor);
                    if (background.a > 0) layers.push(background);
                }
                const canvas = matchMedia('(prefers-color-scheme: dark)').matches && getComputedStyle(document.documentElement).colorScheme.includes('dark') ? { r: 18, g: 18, b: 18, a: 1 } : { r: 255, g: 255, b: 255, a: 1 };
                return layers.reduceRight((under, layer) => over(layer, under), canvas);
            };
            const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
            const low = [];
            let seen = 0;
            while (walker.nextNode()) {
                const element = walker.currentNode.parentElement;
                if (!walker.currentNode.data.trim() || ['SCRIPT', 'STYLE', 'title', 'desc'].includes(element.tagName)) continue;
                const style = getComputedStyle(element);
                if (style.visibility === 'hidden' || style.display === 'none') continue;
                seen++;
                const back = behind(element), front = over(parse(element instanceof SVGElement ? style.fill : style.color), back);
                const [a, b] = [light(front), light(back)].sort((x, y) => y - x);
                const ratio = (a + 0.05) / (b + 0.05);
                if (ratio < bound) low.push(`${ratio.toFixed(2)} <${element.tagName}> ${walker.currentNode.data.trim().slice(0, 40)}`);
            }
            return seen < 100 ? ['only ' + seen + ' texts seen'] : [...new Set(low)].slice(0, 20);
        }
        """;

    [Theory]
    [InlineData(ReportFiles.Demo, false)]
    [InlineData(ReportFiles.Demo, true)]
    [InlineData(ReportFiles.Odd, false)]
    [InlineData(ReportFiles.Odd, true)]
    public async Task Every_text_stands_out_from_what_lies_behind_it(string code, bool isDark)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code), isDark: isDark);
        Assert.Equal(isDark, await page.Ask<bool>("() => matchMedia('(prefers-color-scheme: dark)').matches"));
        Assert.Empty(await page.Ask<string[]>(LowContrast, 4.5));

        // The measure itself sees what is wrong.
        await page.Ask<bool>("() => { const p = document.querySelector('main p'); p.style.color = '#777'; p.style.backgroundColor = '#888'; return true; }");
        Assert.NotEmpty(await page.Ask<string[]>(LowContrast, 4.5));
    }

    [Theory]
    [InlineData(ReportFiles.Demo, 360)]
    [InlineData(ReportFiles.Odd, 360)]
    [InlineData(ReportFiles.Odd, 320)]
    [InlineData(ReportFiles.Demo, 768)]
    public async Task Nothing_is_wider_than_a_telephone_but_what_scrolls_in_its_own_box(string code, int width)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code), width, 740, isPhone: true);
        Assert.Empty(await page.Ask<string[]>(Wide));
        Assert.Equal(width, await page.Ask<int>("() => document.documentElement.clientWidth"));
        Assert.Equal(1, await page.Ask<int>("() => visualViewport.scale"));

        // The measure itself sees what is wrong.
        await page.Ask<bool>("() => { document.querySelector('main p').style.width = '2000px'; document.querySelector('main p').style.maxWidth = 'none'; return true; }");
        Assert.NotEmpty(await page.Ask<string[]>(Wide));
    }

    private const string Wide = """
            () => {
                const inside = document.documentElement.clientWidth;
                if (document.documentElement.scrollWidth > inside) {
                    return [...document.body.querySelectorAll('*')]
                        .filter(e => !e.parentElement.closest('.box, svg') && e.getBoundingClientRect().right > inside + 1)
                        .map(e => `${e.tagName} ${e.className} ${Math.round(e.getBoundingClientRect().right)}: ${e.textContent.slice(0, 50)}`).slice(0, 10).concat('scrolls sideways');
                }
                return [];
            }
            """;

    [Fact]
    public async Task What_scrolls_in_its_own_box_can_be_reached_by_keyboard_and_has_a_name()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo), 360, 740, isPhone: true);
        Assert.Equal(0, await page.Ask<int>("""
            () => [...document.querySelectorAll('*')].filter(e => e.scrollWidth > e.clientWidth + 1 && ['auto', 'scroll'].includes(getComputedStyle(e).overflowX)
                && !(e.tabIndex === 0 && document.getElementById(e.getAttribute('aria-labelledby'))?.textContent.trim())).length
            """));
    }

    [Theory]
    [InlineData(ReportFiles.Demo, "A4")]
    [InlineData(ReportFiles.Demo, "Letter")]
    [InlineData(ReportFiles.Odd, "Letter")]
    [InlineData("many", "A4")]
    [InlineData("many", "Letter")]
    [InlineData("nist-one-way", "Letter")]
    [InlineData("published-classics", "Letter")]
    [InlineData("published-designs", "Letter")]
    public async Task On_paper_the_first_page_is_the_managers_and_no_page_is_empty(string code, string format)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code));
        string[] pages = await Paper.Pages(await page.Print(format == "A4" ? PaperFormat.A4 : PaperFormat.Letter));
        Assert.True(pages.Length > 2);
        Assert.Contains("On one page", pages[0], StringComparison.Ordinal);
        Assert.Contains("What was risked", pages[0], StringComparison.Ordinal);
        Assert.Contains("What to be careful about", pages[0], StringComparison.Ordinal);
        Assert.Contains("ledger head", pages[0], StringComparison.Ordinal);
        Assert.StartsWith("Plan and deviations", pages[1].TrimStart(), StringComparison.Ordinal);

        // More on each than its number.
        Assert.All(pages, text => Assert.True(text.Count(char.IsLetter) > 20, $"a page holds only: {text}"));
    }

    [Fact]
    public async Task Paper_is_white_also_for_who_prefers_a_dark_screen()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo), isDark: true);
        await page.Page.EmulateMediaTypeAsync(MediaType.Print);
        Assert.Contains(await page.Ask<string>("() => getComputedStyle(document.body).backgroundColor"), new[] { "rgb(255, 255, 255)", "rgba(0, 0, 0, 0)" });
        Assert.Empty(await page.Ask<string[]>(LowContrast.Replace("matchMedia('(prefers-color-scheme: dark)').matches", "false", StringComparison.Ordinal), 4.5));
    }

    [Theory]
    [MemberData(nameof(ReportFiles.Codes), MemberType = typeof(ReportFiles))]
    public async Task Figures_tables_headings_and_ids_are_in_order(string code)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(code));
        string[] faults = await page.Ask<string[]>("""
            () => {
                const faults = [];
                const ids = [...document.querySelectorAll('[id]')].map(e => e.id);
                ids.filter((id, i) => ids.indexOf(id) !== i).forEach(id => faults.push('twice: ' + id));
                for (const e of document.querySelectorAll('[aria-labelledby]')) {
                    for (const id of e.getAttribute('aria-labelledby').split(' ')) {
                        if (!document.getElementById(id)?.textContent.trim()) faults.push('no words: ' + id);
                    }
                }
                for (const svg of document.querySelectorAll('svg')) {
                    if (svg.getAttribute('role') !== 'img' || !svg.querySelector('title')?.textContent || !svg.querySelector('desc')?.textContent) faults.push('a picture without words');
                    for (const e of svg.querySelectorAll('[clip-path]')) {
                        if (!svg.querySelector(e.getAttribute('clip-path').slice(4, -1))) faults.push('a clip of another picture');
                    }
                }
                for (const a of document.querySelectorAll('a[href^="#"]')) if (!document.getElementById(a.getAttribute('href').slice(1))) faults.push('leads nowhere: ' + a.href);
                let level = 0;
                for (const h of document.querySelectorAll('h1, h2, h3, h4, h5, h6')) {
                    const at = Number(h.tagName[1]);
                    if (at > level + 1) faults.push(`h${level} is followed by h${at}: ${h.textContent}`);
                    level = at;
                }
                if (document.querySelectorAll('h1').length !== 1) faults.push('not one h1');
                for (const t of document.querySelectorAll('table')) {
                    if (!t.caption?.textContent.trim()) faults.push('a table without a caption');
                    for (const th of t.querySelectorAll('th')) if (!th.scope) faults.push('a head without scope: ' + th.textContent);
                }
                if (!document.documentElement.lang || document.querySelectorAll('main').length !== 1) faults.push('no language, or not one main part');
                return [...new Set(faults)];
            }
            """);
        Assert.Empty(faults);
        int drawn = await page.Ask<int>("() => document.querySelectorAll('figure svg').length");
        Assert.True(drawn >= (code == ReportFiles.Demo ? 20 : 5), $"{drawn} figures");
    }

    [Fact]
    public async Task Names_from_data_are_shown_as_they_are_and_run_nothing()
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Odd));
        JsonElement seen = await page.Ask<JsonElement>("() => ({ scripts: document.querySelectorAll('script').length, bold: document.querySelectorAll('main b').length, text: document.body.innerText })");
        Assert.Equal(1, seen.GetProperty("scripts").GetInt32());
        Assert.Equal(0, seen.GetProperty("bold").GetInt32());
        Assert.Contains("<script>alert(1)</script> & \"quoted\" 'single'", seen.GetProperty("text").GetString()!.Replace("\u200b", "", StringComparison.Ordinal), StringComparison.Ordinal);
    }

    [Theory]
    [MemberData(nameof(ReportFiles.Codes), MemberType = typeof(ReportFiles))]
    public async Task A_checker_of_HTML_finds_nothing(string code) => Assert.Empty(await Paper.Faults(await File.ReadAllTextAsync(reports.FileOf(code), TestContext.Current.CancellationToken)));

    [Theory]
    [InlineData(360, true)]
    [InlineData(1280, false)]
    public async Task A_figure_scales_with_its_place_and_its_letters_stay_readable(int width, bool isPhone)
    {
        await using OpenPage page = await browser.Open(reports.FileOf(ReportFiles.Demo), width, 900, isPhone);
        double[][] sizes = await page.Ask<double[][]>("""
            () => [...document.querySelectorAll('figure svg')].map(svg => {
                const box = svg.getBoundingClientRect();
                return [box.width / svg.viewBox.baseVal.width, box.height / svg.viewBox.baseVal.height, box.width];
            })
            """);
        Assert.All(sizes, s =>
        {
            Assert.Equal(s[0], s[1], 0.02);
            Assert.InRange(s[2], 1, width);

            // Axes have letters of 12 units.
            Assert.True(12 * s[0] >= 8, $"letters of {12 * s[0]} pixels");
        });
    }
}
