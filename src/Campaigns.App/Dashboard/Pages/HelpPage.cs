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
        _scroll = new ScrollPane(width => HelpPainter.Paint(Model, width, Glyphs));
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
    public override string Name => "Help";

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys => [("Esc", "back"), ("Up/Down", "scroll"), TurnKeys, ("q", "quit")];

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
