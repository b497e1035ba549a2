using System.CommandLine;
using Campaigns.Catalog.Providers;
using Campaigns.Migrations.Sqlite;

namespace Campaigns.App.Commands;

/// <summary>upgrade: bring a catalog of an older version up to date.</summary>
internal sealed class UpgradeVerb : Verb
{
    public override Command Build() => new("upgrade", Describe("Bring a catalog that an older version wrote up to date, by way of a checked copy.", "upgrade --catalog campaigns.db"));

    public override int Run(Session session)
    {
        bool done = CatalogUpgrade.Run(session.CatalogPath, typeof(DesignTimeContext).Assembly.GetName().Name!, session.Host.Clock, session.Actor);
        session.Say(done ? $"Upgraded the catalog '{session.CatalogPath}'." : $"The catalog '{session.CatalogPath}' is up to date.");
        return ExitCode.Done;
    }
}
