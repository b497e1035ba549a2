using PuppeteerSharp;

namespace Campaigns.App.Tests.Browser;

/// <summary>One real browser for the tests of a collection: Debian's Chromium without a window. Where it is not installed, the tests that ask for it are skipped, visibly.</summary>
public sealed class Chromium : IAsyncLifetime
{
    private const string Program = "/usr/bin/chromium";
    private static readonly string[] Arguments =
    [
        "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync", "--disable-dev-shm-usage",
    ];

    private readonly string _folder = Directory.CreateTempSubdirectory("campaigns-test-browser-").FullName;
    private IBrowser? _browser;

    public async ValueTask InitializeAsync()
    {
        if (File.Exists(Program))
        {
            _browser = await Puppeteer.LaunchAsync(new LaunchOptions
            {
                Headless = true,
                ExecutablePath = Program,
                Args = Arguments,
                UserDataDir = Path.Combine(_folder, "profile"),
            });
        }
    }

    /// <summary>Opens a file in a page of its own.</summary>
    /// <param name="file">The file.</param>
    /// <param name="width">Width of the window.</param>
    /// <param name="height">Its height.</param>
    /// <param name="isPhone">Whether it is that of a telephone, which heeds what a page says of its width.</param>
    /// <param name="isDark">Whether the reader prefers a dark scheme.</param>
    public async Task<OpenPage> Open(string file, int width = 1280, int height = 900, bool isPhone = false, bool isDark = false)
    {
        Assert.SkipUnless(_browser is not null, "Chromium is not installed (Debian package chromium).");
        IPage page = await _browser.NewPageAsync();
        var open = new OpenPage(page);
        await page.SetViewportAsync(new ViewPortOptions { Width = width, Height = height, IsMobile = isPhone, HasTouch = isPhone });
        await page.EmulateMediaFeaturesAsync([new() { MediaFeature = MediaFeature.PrefersColorScheme, Value = isDark ? "dark" : "light" }]);
        await page.GoToAsync(new Uri(file).AbsoluteUri, new NavigationOptions { WaitUntil = [WaitUntilNavigation.Load], Timeout = 180_000 });
        return open;
    }

    public async ValueTask DisposeAsync()
    {
        if (_browser is not null)
        {
            await _browser.CloseAsync();
            _browser.Dispose();
        }

        Directory.Delete(_folder, recursive: true);
    }
}
