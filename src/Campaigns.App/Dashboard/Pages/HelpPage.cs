using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>The keys, the signs, and what the campaign's correction means, in full.</summary>
public sealed class HelpPage : DashboardPage
{
    private readonly CanvasView _text;
    private readonly ScrollPane _scroll;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public HelpPage(PageContext context)
        : base(context)
    {
        _scroll = new ScrollPane(width => HelpPainter.Paint(Model, Subject, width));
        _text = Part(_scroll.Paint, takesKeys: true);
        _text.X = 1;
        _text.Width = Dim.Fill();
        _text.Height = Dim.Fill();
        _text.Wheeled += lines =>
        {
            _scroll.Move(lines);
            ShowChange();
        };
        Add(_text);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys => [("Esc", "back"), ("Up/Down", "scroll"), TurnKeys, ("q", "quit")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help => [];

    /// <summary>The page that is explained first, by name; null for none.</summary>
    public (string Name, IReadOnlyList<(string Key, string Does)> Help)? Subject { get; private set; }

    /// <summary>Explains a page first, from its first line.</summary>
    /// <param name="name">Its name.</param>
    /// <param name="page">The page.</param>
    public void Explain(string name, DashboardPage page)
    {
        ArgumentNullException.ThrowIfNull(page);
        Subject = (name, page.Help);
        _scroll.ToTop();
    }

    /// <inheritdoc/>
    public override View Entrance => _text;

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        bool isScrolled = _scroll.Obey(key);
        ShowChange();
        return isScrolled;
    }
}
