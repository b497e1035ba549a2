using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class ExperimentMapping : IEntityTypeConfiguration<ExperimentRow>
{
    public void Configure(EntityTypeBuilder<ExperimentRow> builder)
    {
        builder.ToTable("experiments", table =>
        {
            table.HasCheckConstraint("ck_experiments_code", "length(code) > 0");
            table.HasCheckConstraint("ck_experiments_groups_are_planned", "groups_are_planned in (0, 1) and (groups_are_planned = 0 or group_set_id is not null)");
            table.HasCheckConstraint("ck_experiments_replicates", "replicates is null or replicates >= 2");
            table.HasCheckConstraint("ck_experiments_smallest_effect", "smallest_effect is null or smallest_effect > 0");
            table.HasCheckConstraint("ck_experiments_assumed_sd", "assumed_sd is null or assumed_sd > 0");
            table.HasCheckConstraint("ck_experiments_weight", "weight is null or weight >= 0");
        });
        builder.HasKey(e => e.Id);
        builder.Property(e => e.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(e => e.CampaignId).HasColumnName("campaign_id");
        builder.Property(e => e.Code).HasColumnName("code");
        builder.Property(e => e.Title).HasColumnName("title");
        builder.Property(e => e.Response).HasColumnName("response");
        builder.Property(e => e.Unit).HasColumnName("unit");
        builder.Property(e => e.GroupSetId).HasColumnName("group_set_id");
        builder.Property(e => e.GroupsArePlanned).HasColumnName("groups_are_planned");
        builder.Property(e => e.Control).HasColumnName("control");
        builder.Property(e => e.Test).HasColumnName("test");
        builder.Property(e => e.FollowUp).HasColumnName("follow_up");
        builder.Property(e => e.Replicates).HasColumnName("replicates");
        builder.Property(e => e.SmallestEffect).HasColumnName("smallest_effect");
        builder.Property(e => e.AssumedStandardDeviation).HasColumnName("assumed_sd");
        builder.Property(e => e.Weight).HasColumnName("weight");
        builder.Property(e => e.Family).HasColumnName("family");
        builder.Property(e => e.Confirms).HasColumnName("confirms");
        builder.Property(e => e.SharedControl).HasColumnName("shared_control");
        builder.Property(e => e.FirstLoadId).HasColumnName("first_load_id");
        builder.Property(e => e.AmendmentId).HasColumnName("amendment_id");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(e => e.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<GroupSetRow>().WithMany().HasForeignKey(e => e.GroupSetId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(e => e.CampaignId).HasDatabaseName("ix_experiments_campaign");

        // Few experiments confirm another one, and every load asks for them.
        builder.HasIndex(e => e.Confirms).HasFilter("confirms is not null").HasDatabaseName("ix_experiments_confirms");
        builder.HasIndex(e => new { e.CampaignId, e.Code }).IsUnique().HasDatabaseName("ux_experiments_code");
    }
}

internal sealed class GroupSetMapping : IEntityTypeConfiguration<GroupSetRow>
{
    public void Configure(EntityTypeBuilder<GroupSetRow> builder)
    {
        builder.ToTable("group_sets");
        builder.HasKey(s => s.Id);
        builder.Property(s => s.Id).HasColumnName("id").ValueGeneratedNever();
        builder.Property(s => s.CampaignId).HasColumnName("campaign_id");
        builder.HasOne<CampaignRow>().WithMany().HasForeignKey(s => s.CampaignId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(s => s.CampaignId).HasDatabaseName("ix_group_sets_campaign");
    }
}

internal sealed class GroupMapping : IEntityTypeConfiguration<GroupRow>
{
    public void Configure(EntityTypeBuilder<GroupRow> builder)
    {
        builder.ToTable("groups", table =>
        {
            table.HasCheckConstraint("ck_groups_position", "position >= 0 and position < 65536");
            table.HasCheckConstraint("ck_groups_label", "length(label) > 0");
        });
        builder.HasKey(g => new { g.GroupSetId, g.Position });
        builder.Property(g => g.GroupSetId).HasColumnName("group_set_id");
        builder.Property(g => g.Position).HasColumnName("position");
        builder.Property(g => g.Label).HasColumnName("label");
        builder.HasOne<GroupSetRow>().WithMany().HasForeignKey(g => g.GroupSetId).OnDelete(DeleteBehavior.Restrict);
        builder.HasIndex(g => new { g.GroupSetId, g.Label }).IsUnique().HasDatabaseName("ux_groups_label");
    }
}
