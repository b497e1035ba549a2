using Terminal.Gui.Input;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>A field of text that leaves the keys alone which put a program to sleep and end it; the library's own takes them for undoing and copying.</summary>
public sealed class TextBox : TextField
{
    /// <summary>Makes an empty field of one row.</summary>
    public TextBox()
    {
        Height = 1;
        KeyBindings.Remove(Suspend);
        KeyBindings.Remove(Key.C.WithCtrl);
    }

    /// <summary>Puts the program to sleep, until the shell's <c>fg</c>.</summary>
    public static Key Suspend => Key.Z.WithCtrl;
}
