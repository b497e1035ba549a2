using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class ExclusionMapping : IEntityTypeConfiguration<ExclusionRow>
{
    public void Configure(EntityTypeBuilder<ExclusionRow> builder)
    {
        builder.ToTable("exclusions", table =>
        {
            table.HasCheckConstraint("ck_exclusions_is_excluded", "is_excluded in (0, 1)");
            table.HasCheckConstraint("ck_exclusions_line", "line > 0");
            table.HasCheckConstraint("ck_exclusions_words", "length(reason) > 0 and length(named_by) > 0");
        });
        builder.HasKey(r => r.Id);
        builder.Property(r => r.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(r => r.ExperimentId).HasColumnName("experiment_id");
        builder.Property(r => r.LoadId).HasColumnName("load_id");
        builder.Property(r => r.Line).HasColumnName("line");
        builder.Property(r => r.IsExcluded).HasColumnName("is_excluded");
        builder.Property(r => r.GroupLabel).HasColumnName("group_label");
        builder.Property(r => r.Value).HasColumnName("value");
        builder.Property(r => r.Reason).HasColumnName("reason");
        builder.Property(r => r.NamedBy).HasColumnName("named_by");
        builder.Property(r => r.MadeAt).HasColumnName("made_at");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.HasOne<MeasurementRow>().WithMany().HasForeignKey(r => new { r.ExperimentId, r.LoadId }).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(r => new { r.ExperimentId, r.LoadId }).HasDatabaseName("ix_exclusions_measurement");
    }
}
