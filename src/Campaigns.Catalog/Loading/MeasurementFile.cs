namespace Campaigns.Catalog.Loading;

/// <summary>A file of measurements, read row by row with bounded memory.</summary>
/// <remarks>
/// Rows with problems are reported and passed over, so read to the end first and take nothing over unless <see cref="Problems"/> is empty.
/// Names are trimmed; those outside ASCII are composed (Unicode normal form C), see <see cref="RespelledNames"/>.
/// </remarks>
public sealed class MeasurementFile : IDisposable
{
    private readonly DelimitedFile _file;
    private readonly DecimalMark _mark;
    private readonly NameText _names = new();
    private readonly int _experiment;
    private readonly int _group;
    private readonly int _value;
    private readonly int _specimen;
    private readonly int _block;
    private readonly int _order;

    private MeasurementFile(DelimitedFile file, DelimitedFileOptions options)
    {
        _file = file;
        _mark = options.DecimalMark;
        if (file.Headers.Count == 0)
        {
            return;
        }

        ColumnFinder finder = new(file, options.Columns);
        _experiment = finder.Find("experiment", isRequired: true);
        _group = finder.Find("group", isRequired: true);
        _value = finder.Find("value", isRequired: true);
        _specimen = finder.Find("specimen");
        _block = finder.Find("block");
        _order = finder.Find("order");
        IgnoredColumns = finder.Ignored;
        Form = FileForm.Of(file, options.DecimalMark, finder);
    }

    /// <summary>Our names of the columns; the first three are required.</summary>
    public static IReadOnlyList<string> ColumnNames { get; } = ["experiment", "group", "value", "specimen", "block", "order"];

    /// <summary>The file's name as shown in problems.</summary>
    public string Name => _file.Name;

    /// <summary>What is wrong with the file, as far as it was read.</summary>
    public ImportProblems Problems => _file.Problems;

    /// <summary>The headers of columns that are not used, for a notice.</summary>
    public IReadOnlyList<string> IgnoredColumns { get; } = [];

    /// <summary>How the file was read: encoding, separator, decimal mark and the headers taken for our columns.</summary>
    public FileForm Form { get; } = FileForm.Unknown;

    /// <summary>Names that were given another spelling of the same letters, for a notice; the first hundred.</summary>
    public IReadOnlyCollection<string> RespelledNames => _names.Respelled;

    /// <summary>Whether the file has a column of specimens.</summary>
    public bool HasSpecimens => _specimen >= 0 && _file.Headers.Count > 0;

    /// <summary>Whether the file has a column of blocks.</summary>
    public bool HasBlocks => _block >= 0 && _file.Headers.Count > 0;

    /// <summary>Whether the file has a column of the order of measuring.</summary>
    public bool HasOrder => _order >= 0 && _file.Headers.Count > 0;

    /// <summary>Rows given out so far.</summary>
    public long RowCount { get; private set; }

    /// <summary>Bytes of text read so far, for progress; UTF-16 counts as the UTF-8 that it becomes.</summary>
    public long Position => _file.Position;

    /// <summary>Opens a file and reads its header; what is wrong with it is in <see cref="Problems"/>, and then there may be no rows.</summary>
    /// <param name="path">The file.</param>
    /// <param name="options">How to read it.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static MeasurementFile Open(string path, DelimitedFileOptions options) => Open(path, FileOpening.Open, options);

    /// <summary>Opens a file by way of something that gives its bytes.</summary>
    internal static MeasurementFile Open(string path, Func<string, Stream> open, DelimitedFileOptions options) =>
        new(DelimitedFile.Open(path, open, options, ColumnNames), options);

    /// <summary>Reads the next row that has no problem.</summary>
    /// <param name="row">The row; its texts are valid until the next call.</param>
    /// <returns>Whether there was one.</returns>
    /// <exception cref="LoadingException">The file can no longer be read.</exception>
    public bool Read(out MeasurementRow row)
    {
        while (_file.Read())
        {
            if (TryMake(out row))
            {
                RowCount++;
                return true;
            }
        }

        row = default;
        return false;
    }

    /// <inheritdoc/>
    public void Dispose() => _file.Dispose();

    private bool TryMake(out MeasurementRow row)
    {
        bool isSound = true;
        ReadOnlySpan<byte> experiment = RequiredName(_experiment, ref isSound);
        ReadOnlySpan<byte> group = RequiredName(_group, ref isSound);
        NumberReading reading = DecimalText.Parse(_file.Field(_value), _mark, out ParsedDecimal value);
        if (reading > NumberReading.Missing)
        {
            _file.Report(_value, NumberRefusal.Code(reading), NumberRefusal.Explain(reading, _file.Field(_value)));
            isSound = false;
        }

        row = new MeasurementRow
        {
            Line = _file.Line,
            Experiment = experiment,
            Group = group,
            Specimen = _specimen < 0 ? default : OptionalName(_specimen, ref isSound),
            Block = _block < 0 ? default : OptionalName(_block, ref isSound),
            Order = _order < 0 ? null : ReadOrder(ref isSound),
            IsMissing = reading == NumberReading.Missing,
            Value = value,
        };
        return isSound;
    }

    private ReadOnlySpan<byte> RequiredName(int column, scoped ref bool isSound)
    {
        bool isClean = true;
        ReadOnlySpan<byte> name = CleanName(column, ref isClean);
        if (name.IsEmpty && isClean)
        {
            _file.Report(column, "empty-name", "the field is empty: every value belongs to an experiment and a group.");
            isClean = false;
        }

        isSound &= isClean;

        return name;
    }

    private ReadOnlySpan<byte> OptionalName(int column, scoped ref bool isSound)
    {
        ReadOnlySpan<byte> name = CleanName(column, ref isSound);
        return DecimalText.IsMissing(name) ? default : name;
    }

    private ReadOnlySpan<byte> CleanName(int column, scoped ref bool isSound)
    {
        ReadOnlySpan<byte> field = _file.Field(column);
        if (_file.IsPlain && AsciiText.Trim(field) is var plain && (plain.IsEmpty || plain[0] != '\''))
        {
            return plain;
        }

        NameFault? fault = _names.Clean(field, out ReadOnlySpan<byte> name);
        if (fault is not null)
        {
            _file.Report(column, fault.Code, fault.Text);
            isSound = false;
        }

        return name;
    }

    private long? ReadOrder(scoped ref bool isSound)
    {
        ReadOnlySpan<byte> field = AsciiText.Trim(_file.Field(_order));
        if (IntegerText.TryParse(field, out long order))
        {
            return order;
        }

        if (!DecimalText.IsMissing(field))
        {
            _file.Report(_order, "not-an-integer", $"{ShownText.Quote(field)} is no whole number: write the place in the order of measuring, such as 12, or leave it empty.");
            isSound = false;
        }

        return null;
    }
}
