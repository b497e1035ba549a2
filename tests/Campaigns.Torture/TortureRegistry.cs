namespace Campaigns.Torture;

/// <summary>Every torture test, in the order of its number.</summary>
internal static class TortureRegistry
{
    public static IReadOnlyList<Func<TortureTest>> All { get; } =
    [
        () => new Catalogs.HostileNames(),
        () => new Incoming.DamagedFiles(),
        () => new Incoming.FileForms(),
        () => new Incoming.Bombs(),
        () => new Incoming.NumberForms(),
        () => new Incoming.SameFileTwice(),
        () => new Outgoing.FormulasInText(),
        () => new Outgoing.FileNamesFromData(),
        () => new Outgoing.TerminalEscapes(),
    ];
}
