using System.Collections.Concurrent;
using PuppeteerSharp;
using PuppeteerSharp.Media;

namespace Campaigns.App.Tests.Browser;

/// <summary>A page in the browser, and what it complained of and asked for.</summary>
public sealed class OpenPage : IAsyncDisposable
{
    private readonly ConcurrentQueue<string> _complaints = [];
    private readonly ConcurrentQueue<string> _requests = [];

    public OpenPage(IPage page)
    {
        ArgumentNullException.ThrowIfNull(page);
        Page = page;
        page.Console += (_, e) => _complaints.Enqueue($"{e.Message.Type}: {e.Message.Text}");
        page.PageError += (_, e) => _complaints.Enqueue(e.Message);
        page.Error += (_, e) => _complaints.Enqueue(e.Error);
        page.Request += (_, e) => _requests.Enqueue(e.Request.Url);
    }

    public IPage Page { get; }

    /// <summary>Everything on the console, and errors of the page.</summary>
    public IReadOnlyCollection<string> Complaints => _complaints;

    /// <summary>Every address that was asked for.</summary>
    public IReadOnlyCollection<string> Requests => _requests;

    /// <summary>What a function gives in the page.</summary>
    public Task<T> Ask<T>(string function, params object[] arguments) => Page.EvaluateFunctionAsync<T>(function, arguments);

    /// <summary>The page on paper.</summary>
    public Task<byte[]> Print(PaperFormat paper) => Page.PdfDataAsync(new PdfOptions { Format = paper, PreferCSSPageSize = false });

    public async ValueTask DisposeAsync() => await Page.CloseAsync();
}
