namespace Campaigns.Catalog.Loading;

/// <summary>One observation as its file gives it. The texts are UTF-8 and valid until the next row is read.</summary>
public readonly ref struct MeasurementRow
{
    /// <summary>The physical line on which the row starts, from 1.</summary>
    public long Line { get; init; }

    /// <summary>The experiment; not empty, trimmed.</summary>
    public ReadOnlySpan<byte> Experiment { get; init; }

    /// <summary>The group; not empty, trimmed.</summary>
    public ReadOnlySpan<byte> Group { get; init; }

    /// <summary>The specimen; empty where none is recorded.</summary>
    public ReadOnlySpan<byte> Specimen { get; init; }

    /// <summary>The block; empty where none is recorded.</summary>
    public ReadOnlySpan<byte> Block { get; init; }

    /// <summary>The place in the order of measuring; null where none is recorded.</summary>
    public long? Order { get; init; }

    /// <summary>Whether the file marks the value as missing.</summary>
    public bool IsMissing { get; init; }

    /// <summary>The value as typed; zero where it is missing.</summary>
    public ParsedDecimal Value { get; init; }
}
