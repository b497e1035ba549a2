using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>A page of the dashboard: one class in one file, and one line in <see cref="PageList"/>. It shows the model, and turns keys and clicks into calls of the model.</summary>
public abstract class DashboardPage : View
{
    /// <summary>Makes an empty page that is shown again whenever the model changes.</summary>
    /// <param name="context">What it shows, and with what.</param>
    protected DashboardPage(PageContext context)
    {
        Context = context;
        CanFocus = true;
        Width = Dim.Fill();
        KeyBindings.Clear();
        Context.Model.Changed += ShowChange;
    }

    /// <summary>The keys shown below the page, the most needed first.</summary>
    public abstract IReadOnlyList<(string Key, string Does)> Keys { get; }

    /// <summary>Everything that keys, clicks and signs mean on this page, for the help page; what holds on every page is left out.</summary>
    public abstract IReadOnlyList<(string Key, string Does)> Help { get; }

    /// <summary>The part of the page that takes the keys when the page is opened.</summary>
    public abstract View Entrance { get; }

    /// <summary>The keys that turn to another page.</summary>
    internal static (string Key, string Does) TurnKeys => (string.Create(CultureInfo.InvariantCulture, $"1-{PageList.All.Count}"), "page");

    /// <summary>What the page shows, and with what.</summary>
    protected PageContext Context { get; }

    /// <summary>The model.</summary>
    protected DashboardModel Model => Context.Model;

    /// <summary>The signs.</summary>
    protected GlyphSet Glyphs => Context.Glyphs;

    /// <summary>One step back inside the page.</summary>
    /// <returns>Whether there was one.</returns>
    public virtual bool Back() => false;

    /// <summary>Makes a part of the page that a painter paints.</summary>
    /// <param name="paint">Paints for a width and a height.</param>
    /// <param name="takesKeys">Whether it can have the focus.</param>
    /// <param name="cursorRow">Row of the terminal's cursor, or null.</param>
    protected CanvasView Part(Func<int, int, TextCanvas> paint, bool takesKeys = false, Func<int?>? cursorRow = null) =>
        new(paint, Context.Theme) { CanFocus = takesKeys, CursorRow = cursorRow };

    /// <summary>Draws all parts again.</summary>
    protected void ShowChange()
    {
        foreach (View part in SubViews)
        {
            part.SetNeedsDraw();
        }

        SetNeedsDraw();
    }

    /// <summary>Lets all be drawn again: what was drawn before the page may have to tell what the page found out while it was drawn.</summary>
    protected void AnnounceAfterDrawing() => App?.AddTimeout(TimeSpan.FromMilliseconds(1), () =>
    {
        Model.Announce();
        return false;
    });

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            Context.Model.Changed -= ShowChange;
        }

        base.Dispose(disposing);
    }
}
