using System.Buffers.Binary;
using System.Security.Cryptography;
using System.Text;

namespace Campaigns.Catalog.Ledger;

/// <summary>SHA-256 over an encoding that no two different contents share: a byte for the domain, then every field with its presence and length.</summary>
/// <remarks>
/// Entries begin with 0x00 and rows with 0x01, so that a digest of one is never taken for the other (the idea of RFC 9162, section 2.1.1).
/// An entry is 0x00, the label "campaigns ledger 1", the previous hash, then the fields in their fixed order; lists go in with their counts.
/// </remarks>
internal sealed class ChainHash : IDisposable
{
    private const byte DomainOfEntries = 0;
    private const string EntryLabel = "campaigns ledger 1";
    private readonly IncrementalHash _hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
    private readonly byte[] _buffer = new byte[1 << 15];
    private int _length;
    private bool _isOpen;

    /// <summary>Begins anew, whatever was added before.</summary>
    /// <param name="domain">0 for an entry, 1 for rows.</param>
    public void Begin(byte domain)
    {
        if (_isOpen)
        {
            Finish();
        }

        _isOpen = true;
        Byte(domain);
    }

    /// <summary>The hash of an entry that follows another.</summary>
    /// <param name="previous">Hash of the entry before; zeros before the first.</param>
    /// <param name="entry">The entry; its own hash does not count.</param>
    public static string Of(string previous, LedgerEntry entry)
    {
        using var hash = new ChainHash();
        hash.BeginEntry(Encoding.UTF8.GetBytes(previous));
        hash.Integer(entry.Sequence);
        hash.Integer(Instants.ToMicroseconds(entry.At));
        hash.Text(entry.By.Account);
        hash.Text(entry.By.ActingAs);
        hash.Text(entry.ProgramVersion);
        hash.Text(entry.Action);
        hash.Text(entry.Campaign);
        hash.Text(entry.Subject);
        hash.Text(entry.Reason);
        hash.Integer(entry.Changes.Count);
        foreach (LedgerChange change in entry.Changes)
        {
            hash.Text(change.What);
            hash.Text(change.Before);
            hash.Text(change.After);
        }

        hash.Integer(entry.Evidence.Count);
        foreach (LedgerEvidence evidence in entry.Evidence)
        {
            hash.Text(evidence.Kind);
            hash.Integer(evidence.Owner);
            hash.Integer(evidence.First);
            hash.Integer(evidence.Last);
            hash.Text(evidence.Digest);
        }

        return hash.Finish();
    }

    public void Byte(byte value)
    {
        if (_length == _buffer.Length)
        {
            Flush();
        }

        _buffer[_length++] = value;
    }

    public void Integer(long value)
    {
        Span<byte> bytes = stackalloc byte[8];
        BinaryPrimitives.WriteInt64LittleEndian(bytes, value);
        Raw(bytes);
    }

    /// <summary>A text: 0 for none, else 1, the length of its UTF-8 form and that form.</summary>
    public void Text(string? text)
    {
        if (text is null)
        {
            Byte(0);
            return;
        }

        Byte(1);
        Bytes(Encoding.UTF8.GetBytes(text));
    }

    /// <summary>A text that is there, as its UTF-8 bytes; the same encoding as <see cref="Text"/>.</summary>
    public void Utf8(ReadOnlySpan<byte> utf8)
    {
        Byte(1);
        Bytes(utf8);
    }

    /// <summary>Begins an entry: its domain, the label, and the hash before.</summary>
    /// <param name="previous">That hash as it is written: 64 hexadecimal digits.</param>
    public void BeginEntry(ReadOnlySpan<byte> previous)
    {
        Begin(DomainOfEntries);
        Text(EntryLabel);
        Utf8(previous);
    }

    /// <summary>Bytes after their count.</summary>
    public void Bytes(ReadOnlySpan<byte> bytes)
    {
        Integer(bytes.Length);
        Raw(bytes);
    }

    /// <summary>The digest in lower-case hexadecimal.</summary>
    public string Finish()
    {
        Flush();
        _isOpen = false;
        return Convert.ToHexStringLower(_hash.GetHashAndReset());
    }

    public void Dispose() => _hash.Dispose();

    private void Raw(ReadOnlySpan<byte> bytes)
    {
        if (bytes.Length > _buffer.Length - _length)
        {
            Flush();
        }

        if (bytes.Length > _buffer.Length)
        {
            _hash.AppendData(bytes);
            return;
        }

        bytes.CopyTo(_buffer.AsSpan(_length));
        _length += bytes.Length;
    }

    private void Flush()
    {
        _hash.AppendData(_buffer, 0, _length);
        _length = 0;
    }
}
