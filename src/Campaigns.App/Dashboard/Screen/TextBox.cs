using Terminal.Gui.Input;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>A field of text that leaves the key to the terminal which puts a program to sleep; the library's own takes it for undoing.</summary>
public sealed class TextBox : TextField
{
    /// <summary>Makes an empty field of one row.</summary>
    public TextBox()
    {
        Height = 1;
        KeyBindings.Remove(Suspend);
    }

    /// <summary>Puts the program to sleep, until the shell's <c>fg</c>.</summary>
    public static Key Suspend => Key.Z.WithCtrl;
}
