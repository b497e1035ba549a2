using System.Data.Common;
using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Conventions;

namespace Campaigns.Catalog;

/// <summary>The catalog's model: the source of its schema and migrations, and the way by which all but the hottest questions are asked.</summary>
/// <param name="options">Provider and connection.</param>
public sealed class CatalogContext(DbContextOptions<CatalogContext> options) : DbContext(options)
{
    /// <summary>Campaigns.</summary>
    public DbSet<CampaignRow> Campaigns => Set<CampaignRow>();

    /// <summary>Experiments.</summary>
    public DbSet<ExperimentRow> Experiments => Set<ExperimentRow>();

    /// <summary>Groups of every set.</summary>
    public DbSet<GroupRow> Groups => Set<GroupRow>();

    /// <summary>Loaded files.</summary>
    public DbSet<LoadRow> Loads => Set<LoadRow>();

    /// <summary>Packed measurements.</summary>
    public DbSet<MeasurementRow> Measurements => Set<MeasurementRow>();

    /// <summary>Test runs.</summary>
    public DbSet<TestRunRow> TestRuns => Set<TestRunRow>();

    /// <summary>Test results.</summary>
    public DbSet<TestResultRow> TestResults => Set<TestResultRow>();

    /// <summary>Observations left out, and taken in again.</summary>
    public DbSet<ExclusionRow> Exclusions => Set<ExclusionRow>();

    /// <summary>Reviews.</summary>
    public DbSet<ReviewRow> Reviews => Set<ReviewRow>();

    /// <summary>Families of campaigns that have several.</summary>
    public DbSet<FamilyRow> Families => Set<FamilyRow>();

    /// <summary>Families as reviews found them.</summary>
    public DbSet<ReviewFamilyRow> ReviewFamilies => Set<ReviewFamilyRow>();

    /// <summary>What campaigns say of their online procedure before the seal.</summary>
    public DbSet<OnlineSettingsRow> OnlineSettings => Set<OnlineSettingsRow>();

    /// <summary>Online procedures with their settings.</summary>
    public DbSet<StreamRow> Streams => Set<StreamRow>();

    /// <summary>Levels given to experiments before their p-values were seen.</summary>
    public DbSet<StreamEntryRow> StreamEntries => Set<StreamEntryRow>();

    /// <summary>Standing decisions.</summary>
    public DbSet<StandingDecisionRow> StandingDecisions => Set<StandingDecisionRow>();

    /// <summary>The record of everything that was done.</summary>
    public DbSet<LedgerRow> Ledger => Set<LedgerRow>();

    /// <summary>Values before and after the actions in the record.</summary>
    public DbSet<LedgerChangeRow> LedgerChanges => Set<LedgerChangeRow>();

    /// <summary>Digests of the rows that the actions wrote.</summary>
    public DbSet<LedgerEvidenceRow> LedgerEvidence => Set<LedgerEvidenceRow>();

    /// <summary>How the bytes of loaded files are kept.</summary>
    public DbSet<OriginalRow> Originals => Set<OriginalRow>();

    /// <summary>The bytes of loaded files.</summary>
    public DbSet<OriginalPieceRow> OriginalPieces => Set<OriginalPieceRow>();

    /// <summary>Changes of plans after their seal.</summary>
    public DbSet<PlanAmendmentRow> PlanAmendments => Set<PlanAmendmentRow>();

    /// <summary>What those changed.</summary>
    public DbSet<PlanAmendmentChangeRow> PlanAmendmentChanges => Set<PlanAmendmentChangeRow>();

    /// <summary>Experiments taken out, or back in.</summary>
    public DbSet<WithdrawalRow> Withdrawals => Set<WithdrawalRow>();

    /// <summary>Makes a context on a connection that is open already and stays its owner's.</summary>
    /// <remarks>The model that was compiled ahead (CompiledModel) is found by its attribute and used, except where migrations are made or compared.</remarks>
    /// <param name="connection">An open SQLite connection.</param>
    /// <param name="migrationsAssembly">Name of the assembly that holds the migrations; null where none are run.</param>
    public static CatalogContext On(DbConnection connection, string? migrationsAssembly = null) =>
        new(new DbContextOptionsBuilder<CatalogContext>()
            .UseSqlite(connection, sqlite => _ = migrationsAssembly is null ? sqlite : sqlite.MigrationsAssembly(migrationsAssembly))
            .UseQueryTrackingBehavior(QueryTrackingBehavior.NoTracking)
            .Options);

    /// <inheritdoc/>
    protected override void ConfigureConventions(ModelConfigurationBuilder configurationBuilder)
    {
        ArgumentNullException.ThrowIfNull(configurationBuilder);

        // An index behind every foreign key would serve deletions of parents alone, and nothing here is deleted; the useful ones are named in Mapping.
        configurationBuilder.Conventions.Remove<ForeignKeyIndexConvention>();
    }

    /// <inheritdoc/>
    protected override void OnModelCreating(ModelBuilder modelBuilder)
    {
        ArgumentNullException.ThrowIfNull(modelBuilder);
        modelBuilder.ApplyConfigurationsFromAssembly(typeof(CatalogContext).Assembly);
    }
}
