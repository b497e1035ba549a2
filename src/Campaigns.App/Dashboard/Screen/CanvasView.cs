using System.Text;
using Campaigns.App.Dashboard.Canvas;
using Terminal.Gui.Drivers;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Shows what a painter paints for the size at hand; it knows nothing else.</summary>
public sealed class CanvasView : View
{
    private readonly Func<int, int, TextCanvas> _paint;
    private readonly Theme _theme;

    /// <summary>Makes a view of a painter.</summary>
    /// <param name="paint">Paints for a width and a height in cells.</param>
    /// <param name="theme">How meanings look.</param>
    public CanvasView(Func<int, int, TextCanvas> paint, Theme theme)
    {
        _paint = paint;
        _theme = theme;
        CanFocus = false;
        KeyBindings.Clear();
        MouseBindings.Clear();
    }

    /// <summary>A cell was clicked: column and row in the view.</summary>
    public event Action<int, int>? Clicked;

    /// <summary>The wheel was turned: rows to move by.</summary>
    public event Action<int>? Wheeled;

    /// <summary>Row on which the terminal's cursor stands, for readers that follow it; null for none.</summary>
    public Func<int?>? CursorRow { get; init; }

    /// <inheritdoc/>
    protected override bool OnDrawingContent(DrawContext? context)
    {
        int width = Viewport.Width, height = Viewport.Height;
        if (width <= 0 || height <= 0)
        {
            return true;
        }

        TextCanvas canvas = _paint(width, height);
        StringBuilder run = new();
        for (int y = 0; y < height; y++)
        {
            for (int x = 0; x < width;)
            {
                int start = x;
                Ink ink = InkAt(canvas, x, y);
                run.Clear();
                for (; x < width && InkAt(canvas, x, y) == ink; x++)
                {
                    run.Append(x < canvas.Width && y < canvas.Height ? canvas.SignAt(x, y) : " ");
                }

                SetAttribute(_theme.Of(ink));
                AddStr(start, y, run.ToString());
            }
        }

        if (CursorRow?.Invoke() is { } row && HasFocus)
        {
            Cursor = new Cursor { Position = ViewportToScreen(new System.Drawing.Point(0, row)), Style = CursorStyle.SteadyUnderline };
        }

        return true;
    }

    /// <inheritdoc/>
    protected override bool OnMouseEvent(Mouse mouse)
    {
        // The second of two quick clicks comes as a double one.
        if ((mouse.Flags.HasFlag(MouseFlags.LeftButtonClicked) || mouse.Flags.HasFlag(MouseFlags.LeftButtonDoubleClicked)) && mouse.Position is { } at)
        {
            Clicked?.Invoke(at.X, at.Y);
            return true;
        }

        if (mouse.Flags.HasFlag(MouseFlags.WheeledDown) || mouse.Flags.HasFlag(MouseFlags.WheeledUp))
        {
            Wheeled?.Invoke(mouse.Flags.HasFlag(MouseFlags.WheeledDown) ? 3 : -3);
            return true;
        }

        return base.OnMouseEvent(mouse);
    }

    private static Ink InkAt(TextCanvas canvas, int x, int y) => x < canvas.Width && y < canvas.Height ? canvas.InkAt(x, y) : Ink.Text;
}
