using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Providers;

namespace Campaigns.App.Commands;

/// <summary>backup: a consistent copy of a catalog in use.</summary>
internal sealed class BackupVerb : Verb
{
    private readonly Argument<string> _file = TypedOptions.NotBlank(new Argument<string>("FILE") { Description = "The copy to write." });
    private readonly Option<bool> _replace = new("--replace") { Description = "Take the place of a file that is there." };

    public override Command Build() => new("backup", Describe("Make a consistent copy of the catalog, also while other programs use it. The catalog is not changed.",
        "backup campaigns-2026-03-02.db"))
    {
        _file, _replace,
    };

    public override int Run(Session session)
    {
        string file = session.Get(_file);
        using Catalog.Catalog catalog = session.OpenCatalog();
        BackupSummary backup = BackupWriter.Write(catalog, file, session.Get(_replace));
        session.Say(FormattableString.Invariant($"Wrote '{file}': {backup.Bytes} bytes. Keep the head of its ledger elsewhere; 'campaigns restore-check {file} --head HEAD' holds the copy against it. Head: {backup.Head}"));
        session.PrintForScripts(new RowTable(
            [new Column("file", null), new Column("bytes", null, true), new Column("head", null)],
            [[Cell.Text(file), Cell.Whole(backup.Bytes), Cell.Text(backup.Head.ToString())]]));
        return ExitCode.Done;
    }
}
