using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Terminal.Gui.Input;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Scrolls over a canvas that is higher than its place, and says where it stands.</summary>
/// <param name="paint">Paints the whole for a width.</param>
public sealed class ScrollPane(Func<int, TextCanvas> paint)
{
    private int _top;
    private int _lines;
    private int _height = 1;

    /// <summary>Goes back to the first line.</summary>
    public void ToTop() => _top = 0;

    /// <summary>Moves by lines, not beyond the ends.</summary>
    /// <param name="lines">Down, or up where negative.</param>
    public void Move(int lines) => _top = Math.Clamp(_top + lines, 0, Math.Max(0, _lines - _height));

    /// <summary>Moves a page down.</summary>
    /// <returns>Whether there was anything further down.</returns>
    public bool PageDown()
    {
        int before = _top;
        Move(_height);
        return _top != before;
    }

    /// <summary>Paints what is seen.</summary>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    public TextCanvas Paint(int width, int height)
    {
        TextCanvas whole = paint(width), seen = new(width, height);
        _lines = whole.Height;
        bool fits = _lines <= height;
        _height = Math.Max(1, fits ? height : height - 1);
        Move(0);
        seen.Paste(whole, 0, 0, _top);
        if (!fits)
        {
            seen.Repeat(0, height - 1, width, " ", Ink.Quiet);
            seen.Write(0, height - 1, string.Create(CultureInfo.InvariantCulture, $"lines {_top + 1} to {Math.Min(_lines, _top + _height)} of {_lines}"), Ink.Quiet);
        }

        return seen;
    }

    /// <summary>Obeys a key that scrolls.</summary>
    /// <param name="key">The key.</param>
    /// <returns>Whether it was one.</returns>
    public bool Obey(Key key)
    {
        int? lines = key == Key.CursorDown ? 1
            : key == Key.CursorUp ? -1
            : key == Key.PageDown || key == Key.Space ? _height
            : key == Key.PageUp ? -_height
            : key == Key.Home ? -_lines
            : key == Key.End ? _lines
            : null;
        Move(lines ?? 0);
        return lines is not null;
    }
}
