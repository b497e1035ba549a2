using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class TestRunMapping : IEntityTypeConfiguration<TestRunRow>
{
    public void Configure(EntityTypeBuilder<TestRunRow> builder)
    {
        builder.ToTable("test_runs", table =>
            table.HasCheckConstraint("ck_test_runs_includes_incomplete", "includes_incomplete in (0, 1)"));
        builder.HasKey(r => r.Id);
        builder.Property(r => r.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(r => r.CampaignId).HasColumnName("campaign_id");
        builder.Property(r => r.LastLoadId).HasColumnName("last_load_id");
        builder.Property(r => r.LastExclusionId).HasColumnName("last_exclusion_id");
        builder.Property(r => r.LastAmendmentId).HasColumnName("last_amendment_id");
        builder.Property(r => r.LastWithdrawalId).HasColumnName("last_withdrawal_id");
        builder.Property(r => r.RanAt).HasColumnName("ran_at");
        builder.Property(r => r.IncludesIncomplete).HasColumnName("includes_incomplete");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(r => r.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<LoadRow>().WithMany().HasForeignKey(r => r.LastLoadId).OnDelete(DeleteBehavior.Restrict);
    }
}

internal sealed class TestResultMapping : IEntityTypeConfiguration<TestResultRow>
{
    public void Configure(EntityTypeBuilder<TestResultRow> builder)
    {
        builder.ToTable("test_results", table =>
        {
            table.HasCheckConstraint("ck_test_results_status", "(status = 'tested') = (p is not null) and (p is null) = (statistic is null)");
            table.HasCheckConstraint("ck_test_results_p", "p is null or (p >= 0 and p <= 1 and (p > 0 or log_p is not null))");
            table.HasCheckConstraint("ck_test_results_log_p", "log_p is null or (p is not null and log_p <= 0)");
        });
        builder.HasKey(r => new { r.ExperimentId, r.TestRunId });
        builder.Property(r => r.ExperimentId).HasColumnName("experiment_id");
        builder.Property(r => r.TestRunId).HasColumnName("test_run_id");
        builder.Property(r => r.Status).HasColumnName("status");
        builder.Property(r => r.GroupCount).HasColumnName("group_count");
        builder.Property(r => r.ObservationCount).HasColumnName("observation_count");
        builder.Property(r => r.Statistic).HasColumnName("statistic");
        builder.Property(r => r.Df1).HasColumnName("df1");
        builder.Property(r => r.Df2).HasColumnName("df2");
        builder.Property(r => r.P).HasColumnName("p");
        builder.Property(r => r.LogP).HasColumnName("log_p");
        builder.Property(r => r.EtaSquared).HasColumnName("eta_squared");
        builder.Property(r => r.OmegaSquared).HasColumnName("omega_squared");
        builder.Property(r => r.SpecimenCount).HasColumnName("specimen_count");
        builder.Property(r => r.Arrangements).HasColumnName("arrangements");
        builder.Property(r => r.AsExtreme).HasColumnName("as_extreme");
        builder.Property(r => r.Seed).HasColumnName("seed");
        builder.HasOne<ExperimentRow>().WithMany().HasForeignKey(r => r.ExperimentId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<TestRunRow>().WithMany().HasForeignKey(r => r.TestRunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(r => r.TestRunId).HasDatabaseName("ix_test_results_run");
    }
}

internal sealed class ReviewMapping : IEntityTypeConfiguration<ReviewRow>
{
    public void Configure(EntityTypeBuilder<ReviewRow> builder)
    {
        builder.ToTable("reviews", table =>
        {
            table.HasCheckConstraint("ck_reviews_number", "number > 0");
            table.HasCheckConstraint("ck_reviews_level", "level > 0 and level < 1");
            table.HasCheckConstraint("ck_reviews_counts", "tested_count between 0 and family_size and survivor_count between 0 and tested_count");
            table.HasCheckConstraint("ck_reviews_interim", "is_interim in (0, 1)");
        });
        builder.HasKey(r => r.Id);
        builder.Property(r => r.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(r => r.CampaignId).HasColumnName("campaign_id");
        builder.Property(r => r.Number).HasColumnName("number");
        builder.Property(r => r.TakenAt).HasColumnName("taken_at");
        builder.Property(r => r.Correction).HasColumnName("correction");
        builder.Property(r => r.Level).HasColumnName("level");
        builder.Property(r => r.FamilySize).HasColumnName("family_size");
        builder.Property(r => r.TestedCount).HasColumnName("tested_count");
        builder.Property(r => r.SurvivorCount).HasColumnName("survivor_count");
        builder.Property(r => r.IsInterim).HasColumnName("is_interim");
        builder.Property(r => r.LastTestRunId).HasColumnName("last_test_run_id");
        builder.Property(r => r.LastLoadId).HasColumnName("last_load_id");
        builder.Property(r => r.LastExclusionId).HasColumnName("last_exclusion_id");
        builder.Property(r => r.LastAmendmentId).HasColumnName("last_amendment_id");
        builder.Property(r => r.LastWithdrawalId).HasColumnName("last_withdrawal_id");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.Property(r => r.Lines).HasColumnName("lines");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(r => r.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<TestRunRow>().WithMany().HasForeignKey(r => r.LastTestRunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(r => new { r.CampaignId, r.Number }).IsUnique().HasDatabaseName("ux_reviews_number");
    }
}
