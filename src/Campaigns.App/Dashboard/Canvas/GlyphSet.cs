namespace Campaigns.App.Dashboard.Canvas;

/// <summary>The signs that screens are drawn with: one set for terminals that can, one of plain ASCII.</summary>
public sealed record GlyphSet
{
    /// <summary>Signs beyond ASCII.</summary>
    public static GlyphSet Full { get; } = new();

    /// <summary>ASCII alone.</summary>
    public static GlyphSet Ascii { get; } = new()
    {
        Survivor = "#",
        Other = "x",
        Open = "o",
        Mean = "O",
        Left = "[",
        Right = "]",
        Across = "-",
        Crossing = "+",
        Upright = "|",
        Corner = "+",
        TickDown = "+",
        TickLeft = "+",
        Boundary = ".",
        Explored = "-",
        Lost = "%",
        Bars = "#",
        BelowScale = "v",
        Here = "^",
        Rising = "^",
        Falling = "v",
        None = "-",
        Cut = "~",
        Between = "|",
        Times = "*",
        Marked = "=",
        HasDots = false,
    };

    /// <summary>Survives the correction.</summary>
    public string Survivor { get; private init; } = "◆";

    /// <summary>Does not survive.</summary>
    public string Other { get; private init; } = "◇";

    /// <summary>Has no result.</summary>
    public string Open { get; private init; } = "○";

    /// <summary>A mean.</summary>
    public string Mean { get; private init; } = "●";

    /// <summary>Left end of an interval.</summary>
    public string Left { get; private init; } = "├";

    /// <summary>Right end of an interval.</summary>
    public string Right { get; private init; } = "┤";

    /// <summary>A horizontal line.</summary>
    public string Across { get; private init; } = "─";

    /// <summary>A horizontal line that crosses a vertical one.</summary>
    public string Crossing { get; private init; } = "┼";

    /// <summary>A vertical line.</summary>
    public string Upright { get; private init; } = "│";

    /// <summary>Where the two axes meet.</summary>
    public string Corner { get; private init; } = "└";

    /// <summary>A tick on a horizontal axis.</summary>
    public string TickDown { get; private init; } = "┬";

    /// <summary>A tick on a vertical axis.</summary>
    public string TickLeft { get; private init; } = "┤";

    /// <summary>A point of the boundary.</summary>
    public string Boundary { get; private init; } = "·";

    /// <summary>A point of a boundary that is only looked at.</summary>
    public string Explored { get; private init; } = "╌";

    /// <summary>Would survive at the level that is looked at, and does not.</summary>
    public string Gained { get; private init; } = "+";

    /// <summary>Survives, and would not at the level that is looked at.</summary>
    public string Lost { get; private init; } = "◈";

    /// <summary>A cell of a bar, from the lowest to a full one.</summary>
    public string Bars { get; private init; } = "▁▂▃▄▅▆▇█";

    /// <summary>A point below the scale.</summary>
    public string BelowScale { get; private init; } = "▽";

    /// <summary>Points at the place that the keys act on.</summary>
    public string Here { get; private init; } = "▲";

    /// <summary>Sorted with the smallest first.</summary>
    public string Rising { get; private init; } = "▲";

    /// <summary>Sorted with the largest first.</summary>
    public string Falling { get; private init; } = "▼";

    /// <summary>No value.</summary>
    public string None { get; private init; } = "–";

    /// <summary>Where text was cut.</summary>
    public string Cut { get; private init; } = "…";

    /// <summary>Between two facts on a line.</summary>
    public string Between { get; private init; } = "·";

    /// <summary>Something that warns.</summary>
    public string Warns { get; private init; } = "!";

    /// <summary>Marked by the user.</summary>
    public string Marked { get; private init; } = "▪";

    /// <summary>Multiplication.</summary>
    public string Times { get; private init; } = "×";

    /// <summary>Whether cells may be divided into 2 by 4 dots (the Unicode block of braille patterns).</summary>
    public bool HasDots { get; private init; } = true;
}
