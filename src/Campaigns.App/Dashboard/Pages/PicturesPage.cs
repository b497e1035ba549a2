using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>A page of several pictures: all of them together on a large screen, one at a time on a small one.</summary>
public abstract class PicturesPage : DashboardPage
{
    /// <summary>From this width and height on, all pictures stand together.</summary>
    public const int TogetherWidth = 110;

    /// <summary>See <see cref="TogetherWidth"/>.</summary>
    public const int TogetherHeight = 30;

    private Dictionary<Key, Action>? _keys;
    private int _view;

    /// <summary>Makes a page without pictures; whoever adds them calls <see cref="Arrange"/> afterwards.</summary>
    /// <param name="context">What it shows, and with what.</param>
    protected PicturesPage(PageContext context)
        : base(context) => Model.Changed += Follow;

    /// <inheritdoc/>
    public override View Entrance => Pictures[IsTogether ? 0 : View];

    /// <summary>The pictures in the order in which they are turned; those that are not there now are the last ones.</summary>
    protected abstract IReadOnlyList<CanvasView> Pictures { get; }

    /// <summary>How many of the pictures are there now.</summary>
    protected abstract int ViewCount { get; }

    /// <summary>What each picture is called in the footer.</summary>
    protected abstract IReadOnlyList<string> ViewNames { get; }

    /// <summary>The picture that a small screen shows, from 0.</summary>
    protected int View => Math.Min(_view, ViewCount - 1);

    /// <summary>What the next picture is called.</summary>
    protected string NextView => ViewNames[(View + 1) % ViewCount];

    /// <summary>Whether all pictures stand together.</summary>
    protected bool IsTogether => Frame.Width >= TogetherWidth && Frame.Height >= TogetherHeight;

    /// <summary>What the keys of the page do.</summary>
    protected abstract Dictionary<Key, Action> KeysOf();

    /// <summary>Gives every picture its place, or none.</summary>
    protected abstract void Arrange();

    /// <summary>Arranges anew where a change of the model asks for it.</summary>
    protected abstract void Follow();

    /// <summary>Turns to the picture after or before this one, where one is shown at a time.</summary>
    /// <param name="step">1 or -1.</param>
    protected void TurnView(int step)
    {
        if (!IsTogether)
        {
            ShowView((View + step + ViewCount) % ViewCount);
            ShowAll();
        }
    }

    /// <summary>Shows one of the pictures, and gives it the keys.</summary>
    /// <param name="view">Which, from 0.</param>
    protected void ShowView(int view)
    {
        _view = view;
        Arrange();
        Entrance.SetFocus();
    }

    /// <summary>Draws the page again, and what stands around it.</summary>
    protected void ShowAll()
    {
        ShowChange();
        SuperView?.SetNeedsDraw();
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (!(_keys ??= KeysOf()).TryGetValue(key, out Action? act))
        {
            return false;
        }

        act();
        return true;
    }

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            Model.Changed -= Follow;
        }

        base.Dispose(disposing);
    }
}
