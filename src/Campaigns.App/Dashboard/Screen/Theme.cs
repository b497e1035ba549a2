using Campaigns.App.Dashboard.Canvas;
using Terminal.Gui.Configuration;
using Terminal.Gui.Drawing;
using Terminal.Gui.Drivers;
using Attribute = Terminal.Gui.Drawing.Attribute;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>How meanings look: on the terminal's own background, in its 16 colours or in none.</summary>
public sealed class Theme
{
    private readonly bool _hasColour;

    private Theme(bool hasColour) => _hasColour = hasColour;

    /// <summary>The theme that the environment asks for: no colour where NO_COLOR is set and not empty (no-color.org), or TERM is dumb.</summary>
    /// <param name="environment">The value of an environment variable, or null.</param>
    public static Theme For(Func<string, string?> environment) =>
        new(string.IsNullOrEmpty(environment("NO_COLOR")) && environment("TERM") != "dumb");

    /// <summary>Makes the library's own views look alike; to be called before the first is made.</summary>
    public void Apply()
    {
        Driver.Force16Colors = true;
        Attribute normal = Of(Ink.Text), selected = Of(Ink.Selected), heading = Of(Ink.Heading), quiet = Of(Ink.Quiet);
        Attribute field = Plain(TextStyle.Underline);
        Scheme scheme = new()
        {
            Normal = normal,
            HotNormal = heading,
            Focus = normal,
            HotFocus = heading,
            Active = selected,
            HotActive = selected,
            Highlight = heading,
            Editable = field,
            ReadOnly = quiet,
            Disabled = quiet,
        };
        foreach (string name in new[] { "Base", "Dialog", "Menu", "Error", "Accent" })
        {
            SchemeManager.AddScheme(name, scheme);
        }
    }

    /// <summary>The look of a meaning.</summary>
    /// <param name="ink">The meaning.</param>
    public Attribute Of(Ink ink) => ink switch
    {
        Ink.Text => Plain(TextStyle.None),
        Ink.Quiet => Coloured(Color.None, TextStyle.Faint),
        Ink.Heading => Plain(TextStyle.Bold),
        Ink.Bar or Ink.Selected => Plain(TextStyle.Reverse),
        Ink.KeyName => Plain(TextStyle.Reverse | TextStyle.Bold),
        Ink.Survivor => Coloured(Color.Green, TextStyle.Bold),
        Ink.Open => Coloured(Color.Cyan, TextStyle.None),
        Ink.Boundary => Coloured(Color.Red, TextStyle.None),
        Ink.Axis => Coloured(Color.None, TextStyle.Faint),
        Ink.Mean => Coloured(Color.Blue, TextStyle.Bold),
        Ink.Warning => Coloured(Color.Red, TextStyle.Bold),
        _ => throw new ArgumentOutOfRangeException(nameof(ink), ink, "No look for this meaning."),
    };

    private static Attribute Plain(TextStyle style) => new(Color.None, Color.None, style);

    private Attribute Coloured(Color colour, TextStyle style) => new(_hasColour ? colour : Color.None, Color.None, style);
}
