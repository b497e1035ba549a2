using Campaigns.Catalog;
using Microsoft.Data.Sqlite;
using Microsoft.EntityFrameworkCore.Design;

namespace Campaigns.Migrations.Sqlite;

/// <summary>Gives the command-line tool of EF Core a context to compare the model with.</summary>
public sealed class DesignTimeContext : IDesignTimeDbContextFactory<CatalogContext>
{
    public CatalogContext CreateDbContext(string[] args) =>
        CatalogContext.On(new SqliteConnection("Data Source=design-time.db"), typeof(DesignTimeContext).Assembly.GetName().Name);
}
