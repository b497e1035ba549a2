using System.Runtime.InteropServices;
using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;
using SQLitePCL;
using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>A prepared statement that binds and reads spans without a heap object per cell: the way of everything that is done once per experiment.</summary>
/// <remarks>It runs on the connection, and so inside the transaction, that everything else uses. Parameters and columns are numbered as SQLite numbers them: parameters from 1, columns from 0.</remarks>
internal sealed class SqliteStatement : IDisposable
{
    private readonly SqliteConnection _connection;
    private readonly sqlite3_stmt _statement;

    // The same for cells, which are asked for a million times: guarding the handle at each of them costs several times what the call does. SQLite answers NULL where it is 0.
    private nint _row;

    // A binding stays from one use to the next, so a parameter that is null again need not be bound again.
    private readonly bool[] _isNull;

    public SqliteStatement(SqliteConnection connection, string sql)
    {
        _connection = connection;
        Check(sqlite3_prepare_v2(connection.Handle, sql, out _statement));
        _row = _statement.DangerousGetHandle();
        _isNull = new bool[sqlite3_bind_parameter_count(_statement) + 1];
        Array.Fill(_isNull, true);
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

        _isNull[parameter] = false;
        Check(sqlite3_bind_text(_statement, parameter, text));
        return this;
    }

    public SqliteStatement BindText(int parameter, ReadOnlySpan<byte> utf8)
    {
        _isNull[parameter] = false;
        Check(sqlite3_bind_text(_statement, parameter, utf8));
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
        int code = sqlite3_step(_statement);
        if (code is not (SQLITE_DONE or SQLITE_ROW))
        {
            Exception error = Error(code);
            _ = sqlite3_reset(_statement);
            throw error;
        }

        Check(sqlite3_reset(_statement));
    }

    /// <summary>Moves to the next row; at the end the statement is ready for the next use.</summary>
    public bool Read()
    {
        int code = sqlite3_step(_statement);
        if (code == SQLITE_ROW)
        {
            return true;
        }

        if (code != SQLITE_DONE)
        {
            Exception error = Error(code);
            _ = sqlite3_reset(_statement);
            throw error;
        }

        Check(sqlite3_reset(_statement));
        return false;
    }

    /// <summary>Makes the statement ready for the next use before its rows are at an end.</summary>
    public void Reset() => Check(sqlite3_reset(_statement));

    public bool IsInteger(int column) => TypeOf(column) == SQLITE_INTEGER;

    public bool IsText(int column) => TypeOf(column) == SQLITE_TEXT;

    public bool IsNull(int column) => TypeOf(column) == SQLITE_NULL;

    public long Integer(int column)
    {
        long value = NativeCells.Integer(_row, column);
        GC.KeepAlive(_statement);
        return value;
    }

    public long? NullableInteger(int column) => IsNull(column) ? null : Integer(column);

    public double Real(int column)
    {
        double value = NativeCells.Real(_row, column);
        GC.KeepAlive(_statement);
        return value;
    }

    public double? NullableReal(int column) => IsNull(column) ? null : Real(column);

    public string Text(int column)
    {
        nint bytes = NativeCells.Bytes(_row, column);
        string text = bytes == 0 ? "" : Marshal.PtrToStringUTF8(bytes, NativeCells.ByteCount(_row, column));
        GC.KeepAlive(_statement);
        return text;
    }

    /// <summary>Whether a cell holds just this ASCII text, without making a string of it.</summary>
    public bool TextEquals(int column, string ascii) =>
        System.Text.Ascii.Equals(sqlite3_column_blob(_statement, column), ascii);

    public string? NullableText(int column) => IsNull(column) ? null : Text(column);

    /// <summary>Parameters of the statement.</summary>
    public int ParameterCount => _isNull.Length - 1;

    /// <summary>Adds every cell of the row at hand to a digest, with its type, so that no two rows share an encoding.</summary>
    public void AddRowTo(ChainHash hash)
    {
        int count = sqlite3_column_count(_statement);
        nint statement = _statement.DangerousGetHandle();
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

    /// <summary>The bytes of a cell; valid until the next call on this statement.</summary>
    public ReadOnlySpan<byte> Blob(int column) => sqlite3_column_blob(_statement, column);

    public void Dispose()
    {
        _row = 0;
        _statement.Dispose();
    }

    private int TypeOf(int column)
    {
        int type = NativeCells.Type(_row, column);
        GC.KeepAlive(_statement);
        return type;
    }

    private void Check(int code)
    {
        if (code != SQLITE_OK)
        {
            throw Error(code);
        }
    }

    private Exception Error(int code) =>
        SqliteErrors.Translate(code, sqlite3_errmsg(_connection.Handle).utf8_to_string() ?? "", _connection.DataSource);
}
