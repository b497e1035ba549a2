namespace Campaigns.Torture;

/// <summary>Every torture test, in the order of its number.</summary>
internal static class TortureRegistry
{
    public static IReadOnlyList<Func<TortureTest>> All { get; } =
    [
        () => new Catalogs.KillWhileWriting(),
        () => new Catalogs.KillWhileUpgrading(),
        () => new Catalogs.FullDisk(),
        () => new Catalogs.ShutOut(),
        () => new Catalogs.TwoWriters(),
        () => new Catalogs.TwoEditors(),
        () => new Catalogs.TamperedCells(),
        () => new Catalogs.BlindDamage(),
        () => new Catalogs.ClockWalks(),
        () => new Catalogs.ForeignFiles(),
        () => new Catalogs.EarlierSchemas(),
        () => new Catalogs.BackupWhileWriting(),
        () => new Catalogs.HostileNames(),
        () => new Incoming.DamagedFiles(),
        () => new Incoming.FileForms(),
        () => new Incoming.Bombs(),
        () => new Incoming.NumberForms(),
        () => new Incoming.Locales(),
        () => new Incoming.SameFileTwice(),
        () => new Outgoing.FamilyBookkeeping(),
        () => new Outgoing.FormulasInText(),
        () => new Outgoing.FileNamesFromData(),
        () => new Outgoing.TerminalEscapes(),
        () => new Outgoing.SameEveryTime(),
    ];
}
