using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves the rows: every digest that an entry carries is recomputed from what stands in the tables today.</summary>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
internal sealed class EvidenceProof(Catalog catalog, Findings findings)
{
    private readonly Dictionary<(EvidenceKind Kind, long Owner), List<(long First, long Last)>> _spokenFor = [];

    /// <summary>Digests recomputed.</summary>
    public long Recomputed { get; private set; }

    /// <summary>Ranges that entries speak for, in no order; none where no entry speaks for the owner at all.</summary>
    public List<(long First, long Last)> RangesOf(EvidenceKind kind, long owner) => _spokenFor.GetValueOrDefault((kind, owner)) ?? [];

    /// <summary>Whether any entry speaks for an owner.</summary>
    public bool SpeaksFor(EvidenceKind kind, long owner) => _spokenFor.ContainsKey((kind, owner));

    /// <summary>Recomputes every digest that still counts. O(bytes).</summary>
    public void Run()
    {
        List<Piece> pieces = Read();
        var latest = new Dictionary<(EvidenceKind, long), int>();
        for (int i = 0; i < pieces.Count; i++)
        {
            latest[(pieces[i].Kind, pieces[i].Owner)] = i;
        }

        using var digester = new EvidenceDigester(catalog);
        var known = new Dictionary<(EvidenceKind, long, long, long), string>();
        for (int i = 0; i < pieces.Count; i++)
        {
            Piece piece = pieces[i];
            if (piece.Kind.IsLatestOnly && latest[(piece.Kind, piece.Owner)] != i)
            {
                continue;
            }

            LookAt(piece, digester, known);
        }
    }

    private List<Piece> Read()
    {
        using SqliteStatement rows = catalog.PrepareAsItIs(
            """
            SELECT e.sequence, e.kind, e.owner, e.first, e.last, e.digest, l.campaign FROM ledger_evidence e LEFT JOIN ledger l ON l.sequence = e.sequence
            ORDER BY e.sequence, e.position
            """);
        var pieces = new List<Piece>();
        while (rows.Read())
        {
            long sequence = rows.Integer(0);
            string? campaign = rows.NullableText(6);
            if (EvidenceRegistry.Find(rows.Text(1)) is not { } kind)
            {
                findings.Add(sequence, campaign, $"This entry speaks for rows of a kind that the program does not know, '{rows.Text(1)}'.");
                continue;
            }

            var piece = new Piece(sequence, campaign, kind, rows.Integer(2), rows.Integer(3), rows.Integer(4), rows.Text(5));
            pieces.Add(piece);
            if (!_spokenFor.TryGetValue((kind, piece.Owner), out List<(long, long)>? ranges))
            {
                _spokenFor.Add((kind, piece.Owner), ranges = []);
            }

            ranges.Add((piece.First, piece.Last));
        }

        return pieces;
    }

    private void LookAt(Piece piece, EvidenceDigester digester, Dictionary<(EvidenceKind, long, long, long), string> known)
    {
        try
        {
            if (!known.TryGetValue((piece.Kind, piece.Owner, piece.First, piece.Last), out string? digest))
            {
                known.Add((piece.Kind, piece.Owner, piece.First, piece.Last), digest = digester.Digest(piece.Kind, piece.Owner, piece.First, piece.Last));
                Recomputed++;
            }

            if (digest != piece.Digest)
            {
                findings.Add(piece.Sequence, piece.Campaign, $"The catalog does not hold what this entry recorded: {EvidenceWords.Of(catalog, piece.Kind, piece.Owner)} was changed, added to or taken away afterwards.");
            }
        }
        catch (CatalogException error)
        {
            findings.Add(piece.Sequence, piece.Campaign, $"What this entry recorded cannot be read: {error.Message}");
        }
    }

    private readonly record struct Piece(long Sequence, string? Campaign, EvidenceKind Kind, long Owner, long First, long Last, string Digest);
}
