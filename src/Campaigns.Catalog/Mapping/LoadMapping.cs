using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class LoadMapping : IEntityTypeConfiguration<LoadRow>
{
    public void Configure(EntityTypeBuilder<LoadRow> builder)
    {
        builder.ToTable("loads", table =>
        {
            table.HasCheckConstraint("ck_loads_sha256", "length(sha256) = 64");
            table.HasCheckConstraint("ck_loads_counts", "byte_count >= 0 and row_count > 0 and missing_count between 0 and row_count and experiment_count > 0");
            table.HasCheckConstraint("ck_loads_reason", "amendment_reason is null or length(amendment_reason) > 0");
        });
        builder.HasKey(l => l.Id);
        builder.Property(l => l.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(l => l.CampaignId).HasColumnName("campaign_id");
        builder.Property(l => l.FileName).HasColumnName("file_name");
        builder.Property(l => l.Sha256).HasColumnName("sha256");
        builder.Property(l => l.ByteCount).HasColumnName("byte_count");
        builder.Property(l => l.RowCount).HasColumnName("row_count");
        builder.Property(l => l.MissingCount).HasColumnName("missing_count");
        builder.Property(l => l.ExperimentCount).HasColumnName("experiment_count");
        builder.Property(l => l.LoadedAt).HasColumnName("loaded_at");
        builder.Property(l => l.AmendmentReason).HasColumnName("amendment_reason");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(l => l.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(l => new { l.CampaignId, l.Sha256 }).IsUnique().HasDatabaseName("ux_loads_sha256");
    }
}

internal sealed class MeasurementMapping : IEntityTypeConfiguration<MeasurementRow>
{
    public void Configure(EntityTypeBuilder<MeasurementRow> builder)
    {
        builder.ToTable("measurements", table =>
            table.HasCheckConstraint("ck_measurements_counts", "value_count >= 0 and missing_count >= 0 and value_count + missing_count > 0"));
        builder.HasKey(m => new { m.ExperimentId, m.LoadId });
        builder.Property(m => m.ExperimentId).HasColumnName("experiment_id");
        builder.Property(m => m.LoadId).HasColumnName("load_id");
        builder.Property(m => m.ValueCount).HasColumnName("value_count");
        builder.Property(m => m.MissingCount).HasColumnName("missing_count");
        builder.Property(m => m.Packed).HasColumnName("packed");
        builder.Property(m => m.GroupSetId).HasColumnName("group_set_id");
        builder.HasOne<ExperimentRow>().WithMany().HasForeignKey(m => m.ExperimentId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<LoadRow>().WithMany().HasForeignKey(m => m.LoadId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(m => m.LoadId).HasDatabaseName("ix_measurements_load");
    }
}
