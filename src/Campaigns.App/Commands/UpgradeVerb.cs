using System.CommandLine;
using Campaigns.Catalog.Providers;
using Campaigns.Migrations.Sqlite;

namespace Campaigns.App.Commands;

/// <summary>upgrade: bring a catalog of an older version up to date.</summary>
internal sealed class UpgradeVerb : Verb
{
    private readonly Option<string?> _keep = TypedOptions.NotBlank(new Option<string?>("--keep") { Description = "Keep the catalog as it was in this file, which does not exist yet.", HelpName = "FILE" });

    public override Command Build() => new("upgrade", Describe("Bring a catalog that an older version wrote up to date, by way of a checked copy.", "upgrade --catalog campaigns.db --keep campaigns-before.db"))
    {
        _keep,
    };

    public override int Run(Session session)
    {
        string? keep = session.Typed.GetValue(_keep);
        bool done = CatalogUpgrade.Run(
            session.CatalogPath, typeof(DesignTimeContext).Assembly.GetName().Name!, session.Host.Clock, session.Actor, keep, session.Host.Cancel);
        session.Say(done
            ? $"Upgraded the catalog '{session.CatalogPath}'.{(keep is null ? "" : $" As it was it is kept in '{keep}'.")}"
            : $"The catalog '{session.CatalogPath}' is up to date.");
        return ExitCode.Done;
    }
}
