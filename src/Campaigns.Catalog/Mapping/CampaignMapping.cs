using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class CampaignMapping : IEntityTypeConfiguration<CampaignRow>
{
    public void Configure(EntityTypeBuilder<CampaignRow> builder)
    {
        builder.ToTable("campaigns", table =>
        {
            table.HasCheckConstraint("ck_campaigns_code", "length(code) > 0");
            table.HasCheckConstraint("ck_campaigns_error_rate", "error_rate in ('familywise', 'false-discovery')");
            table.HasCheckConstraint("ck_campaigns_level", "level > 0 and level < 1");
            table.HasCheckConstraint("ck_campaigns_exploratory", "is_exploratory in (0, 1)");
            table.HasCheckConstraint("ck_campaigns_sealed", "(sealed_at is null) = (plan_digest is null)");
        });
        builder.HasKey(c => c.Id);
        builder.Property(c => c.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(c => c.Code).HasColumnName("code");
        builder.Property(c => c.Title).HasColumnName("title");
        builder.Property(c => c.Purpose).HasColumnName("purpose");
        builder.Property(c => c.ErrorRate).HasColumnName("error_rate");
        builder.Property(c => c.Level).HasColumnName("level");
        builder.Property(c => c.Correction).HasColumnName("correction");
        builder.Property(c => c.DefaultTest).HasColumnName("default_test");
        builder.Property(c => c.DefaultFollowUp).HasColumnName("default_follow_up");
        builder.Property(c => c.IsExploratory).HasColumnName("is_exploratory");
        builder.Property(c => c.OpenedAt).HasColumnName("opened_at");
        builder.Property(c => c.SealedAt).HasColumnName("sealed_at");
        builder.Property(c => c.PlanDigest).HasColumnName("plan_digest");
        builder.HasIndex(c => c.Code).IsUnique().HasDatabaseName("ux_campaigns_code");
    }
}
