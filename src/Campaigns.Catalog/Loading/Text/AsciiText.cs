using System.Runtime.CompilerServices;

namespace Campaigns.Catalog.Loading;

/// <summary>Small operations on UTF-8 text that concern its ASCII part alone.</summary>
internal static class AsciiText
{
    /// <summary>The text without the spaces and tabs around it.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static ReadOnlySpan<byte> Trim(ReadOnlySpan<byte> text) => text.IsEmpty || (text[0] > ' ' && text[^1] > ' ') ? text : TrimBlanks(text);

    private static ReadOnlySpan<byte> TrimBlanks(ReadOnlySpan<byte> text)
    {
        int start = 0;
        int end = text.Length;
        while (start < end && IsBlank(text[start]))
        {
            start++;
        }

        while (end > start && IsBlank(text[end - 1]))
        {
            end--;
        }

        return text[start..end];
    }

    /// <summary>Whether every byte is a printable ASCII character or a space.</summary>
    public static bool IsPlain(ReadOnlySpan<byte> text) => text.IndexOfAnyExceptInRange((byte)' ', (byte)'~') < 0;

    /// <summary>Whether a byte is a space or a tab.</summary>
    public static bool IsBlank(byte b) => b is (byte)' ' or (byte)'\t';
}
