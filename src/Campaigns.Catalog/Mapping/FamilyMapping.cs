using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class FamilyMapping : IEntityTypeConfiguration<FamilyRow>
{
    public void Configure(EntityTypeBuilder<FamilyRow> builder)
    {
        builder.ToTable("families", table =>
        {
            table.HasCheckConstraint("ck_families_position", "position > 0");
            table.HasCheckConstraint("ck_families_name", "length(name) > 0");
            table.HasCheckConstraint("ck_families_level", "level is null or (level > 0 and level < 1)");
            table.HasCheckConstraint("ck_families_opens", "opens_when in ('any', 'all') and opens_after is not name");
        });
        builder.HasKey(f => new { f.CampaignId, f.Position });
        builder.Property(f => f.CampaignId).HasColumnName("campaign_id");
        builder.Property(f => f.Position).HasColumnName("position");
        builder.Property(f => f.Name).HasColumnName("name");
        builder.Property(f => f.Correction).HasColumnName("correction");
        builder.Property(f => f.Level).HasColumnName("level");
        builder.Property(f => f.OpensAfter).HasColumnName("opens_after");
        builder.Property(f => f.OpensWhen).HasColumnName("opens_when");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(f => f.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(f => new { f.CampaignId, f.Name }).IsUnique().HasDatabaseName("ux_families_name");
    }
}

internal sealed class ReviewFamilyMapping : IEntityTypeConfiguration<ReviewFamilyRow>
{
    public void Configure(EntityTypeBuilder<ReviewFamilyRow> builder)
    {
        builder.ToTable("review_families", table =>
        {
            table.HasCheckConstraint("ck_review_families_level", "level > 0 and level < 1");
            table.HasCheckConstraint("ck_review_families_counts", "tested_count between 0 and family_size and family_size <= planned_count and survivor_count between 0 and tested_count");
            table.HasCheckConstraint("ck_review_families_open", "is_open in (0, 1) and (is_open = 1 or survivor_count = 0)");
        });
        builder.HasKey(f => new { f.ReviewId, f.Position });
        builder.Property(f => f.ReviewId).HasColumnName("review_id");
        builder.Property(f => f.Position).HasColumnName("position");
        builder.Property(f => f.Name).HasColumnName("name");
        builder.Property(f => f.Correction).HasColumnName("correction");
        builder.Property(f => f.Level).HasColumnName("level");
        builder.Property(f => f.FamilySize).HasColumnName("family_size");
        builder.Property(f => f.PlannedCount).HasColumnName("planned_count");
        builder.Property(f => f.TestedCount).HasColumnName("tested_count");
        builder.Property(f => f.SurvivorCount).HasColumnName("survivor_count");
        builder.Property(f => f.IsOpen).HasColumnName("is_open");
        builder.HasOne<ReviewRow>().WithMany().HasForeignKey(f => f.ReviewId).OnDelete(DeleteBehavior.Restrict);
    }
}
