using System.Text;

namespace Campaigns.Catalog.Measurements;

/// <summary>Numbers distinct UTF-8 texts from 0 in the order of their first appearance, without making a string of them.</summary>
/// <remarks>Open addressing over one arena of bytes; a look-up costs one hash of the text and, nearly always, one comparison.</remarks>
internal sealed class Utf8Interner
{
    private byte[] _arena = new byte[256];
    private int[] _ends = new int[16];
    private Slot[] _slots = new Slot[64];

    /// <summary>Distinct texts so far.</summary>
    public int Count { get; private set; }

    /// <summary>The text with a number.</summary>
    public ReadOnlySpan<byte> this[int number]
    {
        get
        {
            int start = number == 0 ? 0 : _ends[number - 1];
            return _arena.AsSpan(start, _ends[number] - start);
        }
    }

    /// <summary>The text with a number, as a string.</summary>
    public string Text(int number) => Encoding.UTF8.GetString(this[number]);

    /// <summary>Forgets all texts and keeps the memory.</summary>
    public void Clear()
    {
        if (Count > 0)
        {
            Count = 0;
            Array.Clear(_slots);
        }
    }

    /// <summary>The number of a text, a new one where it is new.</summary>
    public int Intern(ReadOnlySpan<byte> text)
    {
        uint hash = Hash(text);
        int slot = Probe(text, hash);
        return _slots[slot].Follower > 0 ? _slots[slot].Follower - 1 : Add(text, hash, slot);
    }

    /// <summary>The number of a text, or -1 where it was never interned.</summary>
    public int Find(ReadOnlySpan<byte> text) => _slots[Probe(text, Hash(text))].Follower - 1;

    private int Probe(ReadOnlySpan<byte> text, uint hash)
    {
        int mask = _slots.Length - 1;
        for (int slot = (int)(hash & (uint)mask); ; slot = (slot + 1) & mask)
        {
            ref readonly Slot at = ref _slots[slot];
            if (at.Follower == 0 || (at.Hash == hash && _arena.AsSpan(at.Start, at.Length).SequenceEqual(text)))
            {
                return slot;
            }
        }
    }

    private int Add(ReadOnlySpan<byte> text, uint hash, int slot)
    {
        int number = Count;
        int start = number == 0 ? 0 : _ends[number - 1];
        Reserve(ref _arena, start + text.Length);
        Reserve(ref _ends, number + 1);
        text.CopyTo(_arena.AsSpan(start));
        _ends[number] = start + text.Length;
        _slots[slot] = new Slot { Hash = hash, Follower = number + 1, Start = start, Length = text.Length };
        Count++;
        if (Count * 2 > _slots.Length)
        {
            Rehash();
        }

        return number;
    }

    private void Rehash()
    {
        Slot[] old = _slots;
        _slots = new Slot[old.Length * 2];
        int mask = _slots.Length - 1;
        foreach (Slot kept in old)
        {
            if (kept.Follower > 0)
            {
                int slot = (int)(kept.Hash & (uint)mask);
                while (_slots[slot].Follower > 0)
                {
                    slot = (slot + 1) & mask;
                }

                _slots[slot] = kept;
            }
        }
    }

    private static void Reserve<T>(ref T[] array, int length)
    {
        if (length > array.Length)
        {
            Array.Resize(ref array, Math.Max(length, array.Length * 2));
        }
    }

    /// <summary>FNV-1a over the text, eight bytes at a time, mixed at the end.</summary>
    private static uint Hash(ReadOnlySpan<byte> text)
    {
        const ulong prime = 0x9E3779B97F4A7C15;
        ulong hash = (ulong)text.Length * prime;
        while (text.Length >= 8)
        {
            hash = (hash ^ System.Buffers.Binary.BinaryPrimitives.ReadUInt64LittleEndian(text)) * prime;
            hash ^= hash >> 29;
            text = text[8..];
        }

        foreach (byte b in text)
        {
            hash = (hash ^ b) * prime;
        }

        return (uint)(hash >> 32) ^ (uint)(hash >> 7);
    }

    /// <summary>A place in the table. Everything a look-up needs but the text itself stands together, because each further place in memory is another miss of the cache.</summary>
    private struct Slot
    {
        public uint Hash;

        /// <summary>The text's number plus one; 0 where the place is free.</summary>
        public int Follower;
        public int Start;
        public int Length;
    }
}
