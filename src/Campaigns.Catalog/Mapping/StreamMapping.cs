using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class OnlineSettingsMapping : IEntityTypeConfiguration<OnlineSettingsRow>
{
    public void Configure(EntityTypeBuilder<OnlineSettingsRow> builder)
    {
        builder.ToTable("online_settings", table => table.HasCheckConstraint("ck_online_settings_horizon", "horizon is null or horizon >= 0"));
        builder.HasKey(s => s.CampaignId);
        builder.Property(s => s.CampaignId).HasColumnName("campaign_id").ValueGeneratedNever();
        builder.Property(s => s.Horizon).HasColumnName("horizon");
        builder.Property(s => s.Shape).HasColumnName("shape");
        builder.Property(s => s.InitialWealth).HasColumnName("initial_wealth");
        builder.Property(s => s.Lambda).HasColumnName("lambda");
        builder.Property(s => s.Tau).HasColumnName("tau");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(s => s.CampaignId).OnDelete(DeleteBehavior.Restrict);
    }
}

internal sealed class StreamMapping : IEntityTypeConfiguration<StreamRow>
{
    public void Configure(EntityTypeBuilder<StreamRow> builder)
    {
        builder.ToTable("streams", table =>
        {
            table.HasCheckConstraint("ck_streams_number", "number > 0");
            table.HasCheckConstraint("ck_streams_level", "level > 0 and level < 1");
            table.HasCheckConstraint("ck_streams_horizon", "horizon is null or horizon > 0");
            table.HasCheckConstraint("ck_streams_reason", "(reason is null) = (number = 1) and (reason is null or length(reason) > 0)");
        });
        builder.HasKey(s => s.Id);
        builder.Property(s => s.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(s => s.CampaignId).HasColumnName("campaign_id");
        builder.Property(s => s.Number).HasColumnName("number");
        builder.Property(s => s.Procedure).HasColumnName("procedure");
        builder.Property(s => s.Level).HasColumnName("level");
        builder.Property(s => s.Horizon).HasColumnName("horizon");
        builder.Property(s => s.Shape).HasColumnName("shape");
        builder.Property(s => s.InitialWealth).HasColumnName("initial_wealth");
        builder.Property(s => s.Lambda).HasColumnName("lambda");
        builder.Property(s => s.Tau).HasColumnName("tau");
        builder.Property(s => s.Reason).HasColumnName("reason");
        builder.Property(s => s.StartedAt).HasColumnName("started_at");
        builder.Property(s => s.ProgramVersion).HasColumnName("program_version");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(s => s.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(s => new { s.CampaignId, s.Number }).IsUnique().HasDatabaseName("ux_streams_number");
    }
}

internal sealed class StreamEntryMapping : IEntityTypeConfiguration<StreamEntryRow>
{
    public void Configure(EntityTypeBuilder<StreamEntryRow> builder)
    {
        builder.ToTable("stream_entries", table =>
        {
            table.HasCheckConstraint("ck_stream_entries_position", "position > 0 and known_count between 0 and position - 1");
            table.HasCheckConstraint("ck_stream_entries_level", "level >= 0 and level < 1");
        });
        builder.HasKey(e => new { e.StreamId, e.Position });
        builder.Property(e => e.StreamId).HasColumnName("stream_id");
        builder.Property(e => e.Position).HasColumnName("position");
        builder.Property(e => e.ExperimentId).HasColumnName("experiment_id");
        builder.Property(e => e.Level).HasColumnName("level");
        builder.Property(e => e.KnownCount).HasColumnName("known_count");
        builder.Property(e => e.RegisteredAt).HasColumnName("registered_at");
        builder.HasOne<StreamRow>().WithMany().HasForeignKey(e => e.StreamId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<ExperimentRow>().WithMany().HasForeignKey(e => e.ExperimentId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(e => e.ExperimentId).IsUnique().HasDatabaseName("ux_stream_entries_experiment");
    }
}

internal sealed class StandingDecisionMapping : IEntityTypeConfiguration<StandingDecisionRow>
{
    public void Configure(EntityTypeBuilder<StandingDecisionRow> builder)
    {
        builder.ToTable("standing_decisions", table =>
        {
            table.HasCheckConstraint("ck_standing_decisions_order", "known_order > 0");
            table.HasCheckConstraint("ck_standing_decisions_p", "(p is null or (p >= 0 and p <= 1 and (p > 0 or log_p is not null))) and (log_p is null or (p is not null and log_p <= 0))");
            table.HasCheckConstraint("ck_standing_decisions_survives", "survives in (0, 1) and (survives = 0 or p is not null)");
        });
        builder.HasKey(d => new { d.StreamId, d.Position });
        builder.Property(d => d.StreamId).HasColumnName("stream_id");
        builder.Property(d => d.Position).HasColumnName("position");
        builder.Property(d => d.KnownOrder).HasColumnName("known_order");
        builder.Property(d => d.TestRunId).HasColumnName("test_run_id");
        builder.Property(d => d.P).HasColumnName("p");
        builder.Property(d => d.LogP).HasColumnName("log_p");
        builder.Property(d => d.Survives).HasColumnName("survives");
        builder.Property(d => d.DecidedAt).HasColumnName("decided_at");
        builder.HasOne<StreamEntryRow>().WithMany().HasForeignKey(d => new { d.StreamId, d.Position }).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<TestRunRow>().WithMany().HasForeignKey(d => d.TestRunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(d => new { d.StreamId, d.KnownOrder }).IsUnique().HasDatabaseName("ux_standing_decisions_order");
    }
}
