using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger;

/// <summary>Digests rows that entries speak for; each statement is prepared once, however many owners are asked for.</summary>
/// <param name="catalog">The open catalog.</param>
internal sealed class EvidenceDigester(Catalog catalog) : IDisposable
{
    private const byte DomainOfRows = 1;
    private readonly Dictionary<EvidenceKind, SqliteStatement[]> _statements = [];
    private readonly ChainHash _hash = new();

    /// <summary>SHA-256 of the rows: the domain of rows, the word of the kind, the owner, then of each statement its number and of each row every cell with its type. O(bytes).</summary>
    /// <param name="kind">Which kind.</param>
    /// <param name="owner">Whose rows.</param>
    /// <param name="first">First of the range.</param>
    /// <param name="last">Last of the range.</param>
    public string Digest(EvidenceKind kind, long owner, long first, long last)
    {
        if (!_statements.TryGetValue(kind, out SqliteStatement[]? statements))
        {
            _statements.Add(kind, statements = [.. kind.Rows.Select(catalog.Prepare)]);
        }

        _hash.Begin(DomainOfRows);
        _hash.Text(kind.Word);
        _hash.Integer(owner);
        for (int i = 0; i < statements.Length; i++)
        {
            _hash.Integer(i);
            SqliteStatement rows = statements[i];
            rows.Bind(1, owner);
            if (rows.ParameterCount == 3)
            {
                rows.Bind(2, first).Bind(3, last);
            }

            while (rows.Read())
            {
                _hash.Byte((byte)'r');
                rows.AddRowTo(_hash);
            }
        }

        return _hash.Finish();
    }

    public void Dispose()
    {
        _hash.Dispose();
        foreach (SqliteStatement statement in _statements.Values.SelectMany(s => s))
        {
            statement.Dispose();
        }
    }
}
