using CsvHelper;

namespace Campaigns.Catalog.Loading;

/// <summary>The rows of a delimited text file, one after another, with the problems of its text and shape collected.</summary>
/// <remarks>
/// CsvHelper splits; this class gives it checked text in bounded pieces and decides what a sound row is: as many fields as the header,
/// none longer than 64 KiB. Rows that are not sound are reported and passed over; blank ones are passed over.
/// </remarks>
internal sealed class DelimitedFile : IDisposable
{
    private const int LongestField = 1 << 16;
    private const int LongestRecord = 1 << 20;

    private readonly SourceText _source;
    private readonly CsvReader _rows;
    private readonly char _separator;
    private readonly string _path;
    private int _width;
    private bool _hasTrailingSeparator;
    private bool _hasRows;
    private bool _isOver;

    private DelimitedFile(string path, SourceText source, char separator)
    {
        _path = path;
        Name = Path.GetFileName(path);
        _source = source;
        _separator = separator;
        _rows = CsvReader.Create(source, new CsvReaderOptions
        {
            Separator = separator,
            HasHeader = false,
            Encoding = System.Text.Encoding.UTF8,
            BufferSize = 1 << 18,
            MaxRecordSize = LongestRecord,
            TrackLineNumbers = true,
            MalformedData = CsvMalformedDataHandling.Skip,
            OnMalformedRecord = ReportMalformed,
        });
    }

    /// <summary>The file's name as shown.</summary>
    public string Name { get; }

    /// <summary>What is wrong with the file.</summary>
    public ImportProblems Problems { get; } = new();

    /// <summary>The headers, trimmed and composed; empty where the file has no readable header.</summary>
    public IReadOnlyList<string> Headers { get; private set; } = [];

    /// <summary>The physical line on which the header starts.</summary>
    public long HeaderLine { get; private set; }

    /// <summary>The physical line on which the current row starts, from 1.</summary>
    public long Line { get; private set; }

    /// <summary>Whether the current row is short and all printable ASCII, so that its names need no look.</summary>
    public bool IsPlain { get; private set; }

    /// <summary>The character between fields.</summary>
    public char Separator => _separator;

    /// <summary>The form of the file's text.</summary>
    public SourceKind Encoding => _source.Kind;

    /// <summary>Whether the text began with a byte-order mark.</summary>
    public bool HasMark => _source.HasMark;

    /// <summary>Bytes of text that were read so far.</summary>
    public long Position => _rows.ByteOffset;

    /// <summary>Opens a file and reads its header; trouble with the content becomes problems, and then there are no rows.</summary>
    /// <param name="path">The file.</param>
    /// <param name="options">How to read it.</param>
    /// <param name="ours">Our names of the columns that it may have.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read, or the separator is none that is known.</exception>
    public static DelimitedFile Open(string path, DelimitedFileOptions options, IReadOnlyCollection<string> ours) => Open(path, FileOpening.Open, options, ours);

    /// <summary>Opens a file by way of something that gives its bytes.</summary>
    /// <inheritdoc cref="Open(string, DelimitedFileOptions, IReadOnlyCollection{string})"/>
    /// <param name="path">The file.</param>
    /// <param name="open">Opens it.</param>
    /// <param name="options">How to read it.</param>
    /// <param name="ours">Our names of the columns that it may have.</param>
    public static DelimitedFile Open(string path, Func<string, Stream> open, DelimitedFileOptions options, IReadOnlyCollection<string> ours)
    {
        ArgumentNullException.ThrowIfNull(options);
        if (options.Separator is char given and not (',' or ';' or '\t'))
        {
            throw new LoadingException($"{ShownText.Quote(given.ToString())} is no separator: use a comma, a semicolon or a tab.");
        }

        Stream bytes = open(path);
        try
        {
            SourceText source = new(bytes);
            char? hint = SeparatorDetection.Hint(source.Head, out int hintLength);
            if (hint is not null)
            {
                source.SkipFirstLine(hintLength);
            }

            char separator = options.Separator ?? hint ?? SeparatorDetection.Detect(source.Head, [.. ours.Select(options.Columns.HeaderOf)]);
            DelimitedFile file = new(path, source, separator);
            file.ReadHeader();
            return file;
        }
        catch (Exception e) when (FileOpening.IsOfTheWorld(e))
        {
            bytes.Dispose();
            throw FileOpening.Explain(path, e);
        }
    }

    /// <summary>Goes to the next sound row.</summary>
    /// <returns>Whether there is one.</returns>
    /// <exception cref="LoadingException">The file can no longer be read.</exception>
    public bool Read()
    {
        while (Advance())
        {
            ReadOnlySpan<byte> raw = _rows.RawRecord;
            IsPlain = raw.Length <= NameText.Longest && AsciiText.IsPlain(raw);
            bool isOrdinary = _rows.FieldCount == _width && raw.Length <= LongestField && !_hasTrailingSeparator && !MayBeBlank(raw[0]);
            if (isOrdinary || IsSound(raw))
            {
                _hasRows = true;
                return true;
            }
        }

        return false;
    }

    /// <summary>A field of the current row, UTF-8 without its quotation marks, not trimmed; valid until the next row.</summary>
    /// <param name="index">The column, from 0.</param>
    public ReadOnlySpan<byte> Field(int index) => _rows.GetSpan(index);

    /// <summary>Adds a problem of the current row.</summary>
    /// <param name="column">The column, from 0; -1 for the whole row.</param>
    /// <param name="code">The kind.</param>
    /// <param name="text">What is wrong and what to do.</param>
    public void Report(int column, string code, string text) => ReportAt(Line, column < 0 ? "" : ShownHeader(column), code, text);

    /// <summary>Adds a problem at a line.</summary>
    public void ReportAt(long line, string column, string code, string text) => Problems.Add(new ImportProblem(Name, line, column, code, text));

    /// <summary>Reads no further.</summary>
    public void Stop() => _isOver = true;

    /// <inheritdoc/>
    public void Dispose()
    {
        _rows.Dispose();
        _source.Dispose();
    }

    private void ReadHeader()
    {
        if (!Advance())
        {
            return;
        }

        HeaderLine = Line;
        string[] headers = new string[_rows.FieldCount];
        for (int i = 0; i < headers.Length; i++)
        {
            headers[i] = Composition.Compose(_rows.GetString(i).Trim());
        }

        _width = headers.Length;
        _hasTrailingSeparator = headers.Length > 1 && headers[^1].Length == 0;
        Headers = _hasTrailingSeparator ? headers[..^1] : headers;
        if (!Problems.IsEmpty)
        {
            // The reader passed over a broken first line: what it took for the header is a row.
            Headers = [];
            _isOver = true;
        }
    }

    private bool Advance()
    {
        if (_isOver)
        {
            return false;
        }

        try
        {
            if (_rows.Read() && !IsCutOff())
            {
                Line = _rows.LineNumber + _source.SkippedLines;
                return true;
            }
        }
        catch (CsvFormatException e)
        {
            ReportAt(
                e.LineNumber + _source.SkippedLines,
                "",
                "record-too-long",
                "the row that starts here is longer than 1 MiB: close its quotation mark, or check that the file is a table.");
            _isOver = true;
            return false;
        }
        catch (Exception e) when (FileOpening.IsOfTheWorld(e))
        {
            throw FileOpening.Explain(_path, e);
        }

        Finish();
        return false;
    }

    // At a fault the text ends, so a row that reaches that end is only the start of one.
    private bool IsCutOff() => _source.Fault is not null && _rows.ByteOffset + _rows.RawRecord.Length >= _source.Length8;

    private void Finish()
    {
        _isOver = true;
        if (_source.Fault is SourceFault fault)
        {
            ReportAt(fault.Line, "", fault.Code, fault.Text);
        }
        else if (_source.Length8 == 0)
        {
            ReportAt(0, "", "empty-file", "is empty: export it again.");
        }
        else if (!_hasRows && Problems.IsEmpty)
        {
            ReportAt(0, "", "no-rows", "has no rows below its header: export it again.");
        }
    }

    private bool MayBeBlank(byte first) => first == _separator || AsciiText.IsBlank(first) || first == '"';

    private bool IsSound(ReadOnlySpan<byte> raw)
    {
        if (MayBeBlank(raw[0]) && IsBlank())
        {
            return false;
        }

        bool isSound = true;
        for (int i = 0; i < _rows.FieldCount && raw.Length > LongestField; i++)
        {
            if (_rows.GetRawSpan(i).Length > LongestField)
            {
                Report(i, "field-too-long", "the field is longer than 64 KiB: check that the file is a table of measurements.");
                isSound = false;
            }
        }

        return HasRightWidth() && isSound;
    }

    private bool IsBlank()
    {
        for (int i = 0; i < _rows.FieldCount; i++)
        {
            if (!AsciiText.Trim(_rows.GetSpan(i)).IsEmpty)
            {
                return false;
            }
        }

        return true;
    }

    private bool HasRightWidth()
    {
        int count = _rows.FieldCount;
        if (count == _width && (!_hasTrailingSeparator || AsciiText.Trim(_rows.GetSpan(count - 1)).IsEmpty))
        {
            return true;
        }

        string counts = FormattableString.Invariant($"the row has {count} fields, the header {_width}");
        if (count < _width)
        {
            Report(-1, "too-few-fields", $"{counts}: fill in the missing ones, or leave them empty between separators.");
        }
        else if (_separator == ',')
        {
            Report(-1, "too-many-fields", $"{counts}: put text and decimal numbers that have commas in quotation marks, or separate the file by semicolons.");
        }
        else
        {
            Report(-1, "too-many-fields", $"{counts}: put text that has the separator in quotation marks, or name the further columns.");
        }

        return false;
    }

    private string ShownHeader(int column) =>
        column < Headers.Count && Headers[column].Length > 0 ? ShownText.Quote(Headers[column]).Trim('"') : FormattableString.Invariant($"{column + 1}");

    private void ReportMalformed(CsvMalformedRecord record)
    {
        if (record.Reason == CsvMalformedReason.UnterminatedQuote && _source.Fault is not null)
        {
            return;
        }

        (string code, string text) = record.Reason switch
        {
            CsvMalformedReason.UnterminatedQuote => ("open-quote", "a quotation mark in this row is never closed: close it."),
            CsvMalformedReason.TextAfterClosingQuote => ("text-after-quote", "text follows a closing quotation mark: double the quotation marks inside a quoted field."),
            _ => ("stray-quote", "a quotation mark stands inside an unquoted field: quote the whole field, and double the marks inside it."),
        };
        ReportAt(record.LineNumber + _source.SkippedLines, "", code, text);
    }
}
