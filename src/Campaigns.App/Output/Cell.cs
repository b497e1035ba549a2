using Campaigns.Statistics.Probability;

namespace Campaigns.App.Output;

/// <summary>What a cell of a table holds.</summary>
internal enum CellKind
{
    /// <summary>Nothing.</summary>
    Empty,

    /// <summary>Text.</summary>
    Text,

    /// <summary>A whole number.</summary>
    Whole,

    /// <summary>A real number.</summary>
    Number,

    /// <summary>A p-value.</summary>
    P,

    /// <summary>True or false.</summary>
    Truth,
}

/// <summary>One cell of a table: a value that each format writes in its own way.</summary>
internal readonly struct Cell
{
    private readonly double _number;
    private readonly string? _text;
    private readonly PValue _p;

    private Cell(CellKind kind, double number = 0, string? text = null, PValue p = default)
    {
        Kind = kind;
        _number = number;
        _text = text;
        _p = p;
    }

    public CellKind Kind { get; }

    public string AsText => _text ?? "";

    public double AsNumber => _number;

    public long AsWhole => (long)_number;

    public bool AsTruth => _number != 0;

    public PValue AsP => _p;

    public static Cell Empty => default;

    public static Cell Text(string? text) => string.IsNullOrEmpty(text) ? Empty : new Cell(CellKind.Text, text: text);

    /// <summary>A count; exact up to 2^53.</summary>
    public static Cell Whole(long? value) => value is { } given ? new Cell(CellKind.Whole, given) : Empty;

    /// <summary>A number; one beyond the range of doubles, for which the largest double stands, is left out.</summary>
    public static Cell Number(double? value) => value is { } given && Math.Abs(given) < double.MaxValue ? new Cell(CellKind.Number, given) : Empty;

    /// <summary>A number that somebody chose, such as a level: people see it as it was typed, not rounded to a column's digits.</summary>
    public static Cell Setting(double value) => new(CellKind.Number, value, NumberText.RoundTrip(value));

    /// <summary>A number with the text that people see in its place, where its digits would claim too much.</summary>
    public static Cell Shown(double? value, Func<double, string> text) => value is { } given ? new Cell(CellKind.Number, given, text(given)) : Empty;

    /// <summary>Degrees of freedom: whole ones without decimals.</summary>
    public static Cell Degrees(double? value) => value is { } given && double.IsInteger(given) ? Setting(given) : Number(value);

    public static Cell P(PValue? value) => value is { } given ? new Cell(CellKind.P, p: given) : Empty;

    public static Cell Truth(bool? value) => value is { } given ? new Cell(CellKind.Truth, given ? 1 : 0) : Empty;
}
