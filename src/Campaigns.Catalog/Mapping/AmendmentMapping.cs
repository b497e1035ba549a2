using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class PlanAmendmentMapping : IEntityTypeConfiguration<PlanAmendmentRow>
{
    public void Configure(EntityTypeBuilder<PlanAmendmentRow> builder)
    {
        builder.ToTable("plan_amendments", table =>
        {
            table.HasCheckConstraint("ck_plan_amendments_number", "number > 0");
            table.HasCheckConstraint("ck_plan_amendments_words", "length(reason) > 0 and length(named_by) > 0");
        });
        builder.HasKey(r => r.Id);
        builder.Property(r => r.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(r => r.CampaignId).HasColumnName("campaign_id");
        builder.Property(r => r.Number).HasColumnName("number");
        builder.Property(r => r.Reason).HasColumnName("reason");
        builder.Property(r => r.NamedBy).HasColumnName("named_by");
        builder.Property(r => r.MadeAt).HasColumnName("made_at");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(r => r.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(r => new { r.CampaignId, r.Number }).IsUnique().HasDatabaseName("ux_plan_amendments_number");
    }
}

internal sealed class PlanAmendmentChangeMapping : IEntityTypeConfiguration<PlanAmendmentChangeRow>
{
    public void Configure(EntityTypeBuilder<PlanAmendmentChangeRow> builder)
    {
        builder.ToTable("plan_amendment_changes");
        builder.HasKey(r => new { r.AmendmentId, r.ExperimentId, r.Field });
        builder.Property(r => r.AmendmentId).HasColumnName("amendment_id");
        builder.Property(r => r.ExperimentId).HasColumnName("experiment_id");
        builder.Property(r => r.Field).HasColumnName("field");
        builder.Property(r => r.Before).HasColumnName("before");
        builder.Property(r => r.After).HasColumnName("after");
        builder.HasOne<PlanAmendmentRow>().WithMany().HasForeignKey(r => r.AmendmentId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<ExperimentRow>().WithMany().HasForeignKey(r => r.ExperimentId).OnDelete(DeleteBehavior.Restrict);
    }
}

internal sealed class WithdrawalMapping : IEntityTypeConfiguration<WithdrawalRow>
{
    public void Configure(EntityTypeBuilder<WithdrawalRow> builder)
    {
        builder.ToTable("withdrawals", table =>
        {
            table.HasCheckConstraint("ck_withdrawals_truths", "is_withdrawn in (0, 1) and had_data in (0, 1)");
            table.HasCheckConstraint("ck_withdrawals_words", "length(reason) > 0 and length(named_by) > 0");
        });
        builder.HasKey(r => r.Id);
        builder.Property(r => r.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(r => r.ExperimentId).HasColumnName("experiment_id");
        builder.Property(r => r.IsWithdrawn).HasColumnName("is_withdrawn");
        builder.Property(r => r.HadData).HasColumnName("had_data");
        builder.Property(r => r.Reason).HasColumnName("reason");
        builder.Property(r => r.NamedBy).HasColumnName("named_by");
        builder.Property(r => r.MadeAt).HasColumnName("made_at");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.HasOne<ExperimentRow>().WithMany().HasForeignKey(r => r.ExperimentId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(r => r.ExperimentId).HasDatabaseName("ix_withdrawals_experiment");
    }
}
