using Terminal.Gui.Input;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>The keys behind the names that footers and help give them.</summary>
internal static class KeyNames
{
    private const string Shift = "Shift+";

    private static readonly Dictionary<string, Key> Named = new(StringComparer.Ordinal)
    {
        ["Enter"] = Key.Enter,
        ["Esc"] = Key.Esc,
        ["Tab"] = Key.Tab,
        ["Space"] = Key.Space,
        ["Up"] = Key.CursorUp,
        ["Down"] = Key.CursorDown,
        ["Left"] = Key.CursorLeft,
        ["Right"] = Key.CursorRight,
        ["PgUp"] = Key.PageUp,
        ["PgDn"] = Key.PageDown,
        ["Home"] = Key.Home,
        ["End"] = Key.End,
        ["F1"] = Key.F1,
        ["F3"] = Key.F3,
        ["F5"] = Key.F5,
    };

    /// <summary>Whether a field of text would take the key as a letter.</summary>
    /// <param name="name">Its name.</param>
    public static bool IsLetter(string name) => name.Length == 1 || name.StartsWith(Shift, StringComparison.Ordinal);

    /// <summary>The key with a name.</summary>
    /// <param name="name">For example "Enter", "Shift+m", "z".</param>
    /// <returns>Null for a name of several keys, as "1-7".</returns>
    public static Key? Of(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        return name.StartsWith(Shift, StringComparison.Ordinal) ? Of(name[Shift.Length..])?.WithShift
            : Named.TryGetValue(name, out Key? key) ? key
            : name.Length == 1 ? new Key(name[0])
            : null;
    }
}
