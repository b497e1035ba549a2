using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Dialogs;

/// <summary>Something that stands over the page until it is answered: a bar with its name, a body that a painter paints, a bar with its keys, which can be clicked as well.</summary>
internal abstract class PopUp : Runnable
{
    /// <summary>Column of the body's left edge, and cells that the frame takes on either side.</summary>
    protected const int Edge = 2;

    private const int LeastBeside = 10;
    private const int Bars = 2;
    private readonly GlyphSet _glyphs;
    private int _rows;

    /// <summary>Makes it, in the middle of the screen.</summary>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    /// <param name="width">Cells across, where the screen has room.</param>
    protected PopUp(GlyphSet glyphs, Theme theme, int width)
    {
        _glyphs = glyphs;
        (X, Y) = (Pos.Center(), Pos.Center());
        Width = Dim.Func(_ => Across(width));
        Height = Dim.Func(_ => Math.Min(Rows(Across(width) - (2 * Edge)) + Bars, Room.Height > 12 ? Room.Height - 2 : Room.Height));
        KeyBindings.Clear();
        Whole = new CanvasView(Paint, theme) { CanFocus = true, Width = Dim.Fill(), Height = Dim.Fill() };
        Whole.Clicked += Click;
        Whole.Wheeled += Wheel;
        Add(Whole);
    }

    /// <summary>Whether the whole dashboard is to be left.</summary>
    public bool IsLeaving { get; private set; }

    /// <summary>Its name.</summary>
    protected abstract string Heading { get; }

    /// <summary>The keys in its lower bar, with what they do and what is done where one is clicked.</summary>
    protected abstract IReadOnlyList<(string Key, string Does, Key Pressed)> Keys { get; }

    /// <summary>Everything that is painted; it takes the keys where no field does.</summary>
    protected CanvasView Whole { get; }

    /// <summary>The signs.</summary>
    protected GlyphSet Glyphs => _glyphs;

    /// <summary>Rows that the body would fill now; it grows with them and never shrinks, so that it does not jump about.</summary>
    /// <param name="width">Cells across.</param>
    protected abstract int WantedRows(int width);

    /// <summary>Cells across the body.</summary>
    protected int BodyWidth => Math.Max(1, Frame.Width - (2 * Edge));

    private System.Drawing.Rectangle Room => App?.Screen ?? new System.Drawing.Rectangle(0, 0, 80, 24);

    /// <inheritdoc/>
    protected sealed override bool OnKeyDown(Key key)
    {
        if (key == TextBox.Suspend)
        {
            return false;
        }

        if (key == Key.Q.WithCtrl || key == Key.C.WithCtrl)
        {
            IsLeaving = true;
            App?.RequestStop(this);
        }
        else
        {
            Obey(key);
        }

        return true;
    }

    /// <summary>Obeys a key that no field took.</summary>
    /// <param name="key">The key.</param>
    protected abstract void Obey(Key key);

    /// <summary>Paints the body.</summary>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    protected abstract TextCanvas PaintBody(int width, int height);

    /// <summary>The body was clicked.</summary>
    /// <param name="x">Column in the body, from 0.</param>
    /// <param name="y">Row in the body, from 0.</param>
    protected virtual void ClickBody(int x, int y)
    {
    }

    /// <summary>The wheel was turned.</summary>
    /// <param name="lines">Lines to move by.</param>
    protected virtual void Wheel(int lines)
    {
    }

    /// <summary>Draws all of it again.</summary>
    protected void Redraw()
    {
        Whole.SetNeedsDraw();
        SetNeedsLayout();
        SetNeedsDraw();
    }

    // Of the page beside it only as much is left as can be read: a sliver tells nothing.
    private int Across(int wanted) => Room.Width < wanted + (2 * LeastBeside) ? Room.Width : wanted;

    private int Rows(int width) => _rows = Math.Max(_rows, WantedRows(Math.Max(1, width)));

    private TextCanvas Paint(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        canvas.InkRow(0, Ink.Bar);
        canvas.Write(1, 0, CellText.Fit(Heading, width - 2, _glyphs.Cut), Ink.Bar);
        for (int y = 1; y < height - 1; y++)
        {
            canvas.Put(0, y, _glyphs.Upright, Ink.Axis);
            canvas.Put(width - 1, y, _glyphs.Upright, Ink.Axis);
        }

        canvas.Paste(PaintBody(Math.Max(1, width - (2 * Edge)), Math.Max(1, height - 2)), Edge, 1);
        canvas.Paste(KeysPainter.Paint(Keys.Select(k => (k.Key, k.Does)), width), 0, height - 1);
        return canvas;
    }

    private void Click(int x, int y)
    {
        if (y == Frame.Height - 1)
        {
            if (KeysPainter.KeyAt([.. Keys.Select(k => (k.Key, k.Does))], Frame.Width, x) is { } at)
            {
                NewKeyDownEvent(Keys[at].Pressed);
            }
        }
        else if (y > 0)
        {
            ClickBody(x - Edge, y - 1);
        }

        Redraw();
    }
}
