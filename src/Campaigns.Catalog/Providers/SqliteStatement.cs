using System.Buffers;
using System.Diagnostics.CodeAnalysis;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Text;
using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;
using SQLitePCL;
using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>A prepared statement that binds and reads spans without a heap object per cell: the way of everything that is done once per experiment.</summary>
/// <remarks>
/// It runs on the connection, and so inside the transaction, that everything else uses; one thread at a time. Parameters and columns are numbered as SQLite numbers them: parameters from 1, columns from 0.
/// SQLite gives a number for a text and 0 for NULL without a word, and any file may hold any kind of value in any cell. So a cell that holds another kind than it is asked for is refused
/// (<see cref="RecordException"/>), unless the statement takes cells as they are. Asking for a cell where no row is at hand is a fault of the program.
/// </remarks>
internal sealed class SqliteStatement : IDisposable
{
    private const int OnStack = 512;
    private static readonly UTF8Encoding Utf8 = new(encoderShouldEmitUTF8Identifier: false, throwOnInvalidBytes: true);

    private readonly SqliteConnection _connection;
    private readonly sqlite3_stmt _statement;
    private readonly ICollection<SqliteStatement>? _open;
    private readonly bool _takesAnything;

    // A binding stays from one use to the next, so a parameter that is null again need not be bound again.
    private readonly bool[] _isNull;

    // The text that each column gave last: rows that follow each other often share their test, response and unit, and then one string will do.
    private string?[]? _texts;

    // For cells, which are asked for a million times: guarding the handle at each of them costs several times what the call does. 0 while no row is at hand, and after the end.
    private nint _row;

    /// <param name="connection">An open connection.</param>
    /// <param name="sql">One statement.</param>
    /// <param name="open">Holds the statement until it is disposed of, so that none is ever finalized beside a connection in use; null where the caller disposes of it in the same breath.</param>
    /// <param name="takesAnything">Whether cells are given as SQLite turns them into what is asked for: for the proofs, which tell what is odd themselves.</param>
    public SqliteStatement(SqliteConnection connection, string sql, ICollection<SqliteStatement>? open = null, bool takesAnything = false)
    {
        _connection = connection;
        _takesAnything = takesAnything;
        ObjectDisposedException.ThrowIf(connection.Handle is null, connection);
        Check(sqlite3_prepare_v2(connection.Handle, sql, out _statement));
        _isNull = new bool[sqlite3_bind_parameter_count(_statement) + 1];
        Array.Fill(_isNull, true);
        _open = open;
        open?.Add(this);
    }

    public SqliteStatement Bind(int parameter, long value)
    {
        _isNull[parameter] = false;
        Check(sqlite3_bind_int64(_statement, parameter, value));
        return this;
    }

    public SqliteStatement Bind(int parameter, long? value) => value is { } given ? Bind(parameter, given) : BindNull(parameter);

    public SqliteStatement Bind(int parameter, double? value)
    {
        if (value is not { } given)
        {
            return BindNull(parameter);
        }

        if (!double.IsFinite(given))
        {
            throw new ArgumentOutOfRangeException(nameof(value), value, "Only finite numbers are stored.");
        }

        _isNull[parameter] = false;
        Check(sqlite3_bind_double(_statement, parameter, given));
        return this;
    }

    public SqliteStatement Bind(int parameter, string? text)
    {
        if (text is null)
        {
            return BindNull(parameter);
        }

        // With its length: the driver's own way for strings ends at the first NUL.
        int most = Utf8.GetMaxByteCount(text.Length);
        byte[]? rented = most > OnStack ? ArrayPool<byte>.Shared.Rent(most) : null;
        try
        {
            Span<byte> utf8 = rented ?? stackalloc byte[OnStack];
            return BindText(parameter, utf8[..Utf8.GetBytes(text, utf8)]);
        }
        finally
        {
            if (rented is not null)
            {
                ArrayPool<byte>.Shared.Return(rented);
            }
        }
    }

    public SqliteStatement BindText(int parameter, ReadOnlySpan<byte> utf8)
    {
        _isNull[parameter] = false;

        // An empty span has no address, which SQLite would take for NULL.
        Check(utf8.IsEmpty ? sqlite3_bind_text(_statement, parameter, "") : sqlite3_bind_text(_statement, parameter, utf8));
        return this;
    }

    public SqliteStatement BindBlob(int parameter, ReadOnlySpan<byte> blob)
    {
        _isNull[parameter] = false;
        Check(blob.IsEmpty ? sqlite3_bind_zeroblob(_statement, parameter, 0) : sqlite3_bind_blob(_statement, parameter, blob));
        return this;
    }

    public SqliteStatement BindNull(int parameter)
    {
        if (!_isNull[parameter])
        {
            _isNull[parameter] = true;
            Check(sqlite3_bind_null(_statement, parameter));
        }

        return this;
    }

    /// <summary>Runs a statement that gives no rows, and makes it ready for the next use.</summary>
    public void Run()
    {
        _ = Step();
        Reset();
    }

    /// <summary>Moves to the next row; at the end the statement is ready for the next use.</summary>
    public bool Read()
    {
        if (Step())
        {
            _row = _statement.DangerousGetHandle();
            return true;
        }

        Reset();
        return false;
    }

    /// <summary>Makes the statement ready for the next use before its rows are at an end.</summary>
    public void Reset()
    {
        _row = 0;
        Check(sqlite3_reset(_statement));
    }

    public bool IsInteger(int column) => TypeOf(column) == SQLITE_INTEGER;

    public bool IsText(int column) => TypeOf(column) == SQLITE_TEXT;

    public bool IsNull(int column) => TypeOf(column) == SQLITE_NULL;

    /// <exception cref="RecordException">The cell holds no whole number.</exception>
    public long Integer(int column)
    {
        Demand(TypeOf(column), SQLITE_INTEGER, column);
        return IntegerAt(column);
    }

    /// <exception cref="RecordException">The cell holds something else than a whole number or NULL.</exception>
    public long? NullableInteger(int column)
    {
        int type = TypeOf(column);
        if (type == SQLITE_NULL)
        {
            return null;
        }

        Demand(type, SQLITE_INTEGER, column);
        return IntegerAt(column);
    }

    /// <exception cref="RecordException">The cell holds no finite number.</exception>
    public double Real(int column) => RealAt(column, TypeOf(column));

    /// <exception cref="RecordException">The cell holds something else than a finite number or NULL.</exception>
    public double? NullableReal(int column)
    {
        int type = TypeOf(column);
        return type == SQLITE_NULL ? null : RealAt(column, type);
    }

    /// <exception cref="RecordException">The cell holds no text.</exception>
    public string Text(int column)
    {
        Demand(TypeOf(column), SQLITE_TEXT, column);
        return TextAt(column);
    }

    /// <summary>Whether a cell holds just this ASCII text, without making a string of it.</summary>
    public bool TextEquals(int column, string ascii) => Ascii.Equals(BytesAt(column), ascii);

    /// <exception cref="RecordException">The cell holds something else than a text or NULL.</exception>
    public string? NullableText(int column)
    {
        int type = TypeOf(column);
        if (type == SQLITE_NULL)
        {
            return null;
        }

        Demand(type, SQLITE_TEXT, column);
        return TextAt(column);
    }

    /// <summary>Parameters of the statement.</summary>
    public int ParameterCount => _isNull.Length - 1;

    /// <summary>Adds every cell of the row at hand to a digest, with its type, so that no two rows share an encoding.</summary>
    public void AddRowTo(ChainHash hash)
    {
        int count = sqlite3_column_count(_statement);
        nint statement = Row;
        for (int i = 0; i < count; i++)
        {
            int type = NativeCells.Type(statement, i);
            hash.Byte((byte)type);
            switch (type)
            {
                case SQLITE_INTEGER:
                    hash.Integer(NativeCells.Integer(statement, i));
                    break;
                case SQLITE_FLOAT:
                    hash.Integer(BitConverter.DoubleToInt64Bits(NativeCells.Real(statement, i)));
                    break;
                case SQLITE_TEXT or SQLITE_BLOB:
                    nint bytes = NativeCells.Bytes(statement, i);
                    hash.Bytes(bytes, NativeCells.ByteCount(statement, i));
                    break;
                default:
                    break;
            }
        }

        GC.KeepAlive(_statement);
    }

    /// <summary>The bytes of a text or a blob; valid until the next call on this statement.</summary>
    /// <exception cref="RecordException">The cell holds neither.</exception>
    public ReadOnlySpan<byte> Blob(int column)
    {
        int type = TypeOf(column);
        if (type != SQLITE_TEXT)
        {
            Demand(type, SQLITE_BLOB, column);
        }

        return BytesAt(column);
    }

    public void Dispose()
    {
        _row = 0;
        _open?.Remove(this);
        _statement.Dispose();
    }

    private nint Row
    {
        get
        {
            if (_row == 0)
            {
                ThrowNoRow();
            }

            return _row;
        }
    }

    /// <returns>Whether there is a row.</returns>
    private bool Step()
    {
        _row = 0;
        int code = sqlite3_step(_statement);
        if (code is SQLITE_ROW or SQLITE_DONE)
        {
            return code == SQLITE_ROW;
        }

        Exception error = Error(code);
        _ = sqlite3_reset(_statement);
        throw error;
    }

    private int TypeOf(int column)
    {
        int type = NativeCells.Type(Row, column);
        GC.KeepAlive(_statement);
        return type;
    }

    private long IntegerAt(int column)
    {
        long value = NativeCells.Integer(_row, column);
        GC.KeepAlive(_statement);
        return value;
    }

    private double RealAt(int column, int type)
    {
        double value = NativeCells.Real(_row, column);
        GC.KeepAlive(_statement);

        // A whole number is one of the numbers: an expression may give 0 where its column holds 0.5.
        if ((type is not (SQLITE_FLOAT or SQLITE_INTEGER) || !double.IsFinite(value)) && !_takesAnything)
        {
            ThrowOddCell(type, SQLITE_FLOAT, column);
        }

        return value;
    }

    private string TextAt(int column)
    {
        nint bytes = NativeCells.Bytes(_row, column);
        int count = bytes == 0 ? 0 : NativeCells.ByteCount(_row, column);
        _texts ??= new string?[sqlite3_column_count(_statement)];
        if (_texts[column] is { } before && Ascii.Equals(MemoryMarshal.CreateReadOnlySpan(ref Unsafe.AddByteOffset(ref Unsafe.NullRef<byte>(), bytes), count), before))
        {
            GC.KeepAlive(_statement);
            return before;
        }

        string text = _texts[column] = count == 0 ? "" : Marshal.PtrToStringUTF8(bytes, count);
        GC.KeepAlive(_statement);

        // What is no UTF-8 was read as U+FFFD, so that two different texts may have become one.
        if (text.Contains('\uFFFD') && !_takesAnything && !BytesAt(column).SequenceEqual(Utf8.GetBytes(text)))
        {
            ThrowOddCell(SQLITE_TEXT, SQLITE_TEXT, column);
        }

        return text;
    }

    private ReadOnlySpan<byte> BytesAt(int column)
    {
        _ = Row;
        return sqlite3_column_blob(_statement, column);
    }

    private void Demand(int type, int wanted, int column)
    {
        if (type != wanted && !_takesAnything)
        {
            ThrowOddCell(type, wanted, column);
        }
    }

    // Apart from where they are thrown, so that what is done a million times stays small.
    [DoesNotReturn]
    private void ThrowOddCell(int type, int wanted, int column) => throw OddCells.Refuse(
        _connection.DataSource,
        sqlite3_column_table_name(_statement, column).utf8_to_string(),
        sqlite3_column_origin_name(_statement, column).utf8_to_string(),
        type,
        wanted);

    [DoesNotReturn]
    private void ThrowNoRow() => throw (_statement.IsClosed
        ? new ObjectDisposedException(nameof(SqliteStatement))
        : new InvalidOperationException("A cell was asked for where no row is at hand."));

    private void Check(int code)
    {
        if (code != SQLITE_OK)
        {
            throw Error(code);
        }
    }

    private Exception Error(int code) => SqliteErrors.Translate(
        code, (_connection.Handle is { } open ? sqlite3_errmsg(open).utf8_to_string() : null) ?? "", _connection.DataSource);
}
