using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class OriginalMapping : IEntityTypeConfiguration<OriginalRow>
{
    public void Configure(EntityTypeBuilder<OriginalRow> builder)
    {
        builder.ToTable("originals", table => table.HasCheckConstraint("ck_originals_pieces", "piece_count > 0"));
        builder.HasKey(r => r.LoadId);
        builder.Property(r => r.LoadId).HasColumnName("load_id").ValueGeneratedNever();
        builder.Property(r => r.Encoding).HasColumnName("encoding");
        builder.Property(r => r.Separator).HasColumnName("separator");
        builder.Property(r => r.DecimalMark).HasColumnName("decimal_mark");
        builder.Property(r => r.Columns).HasColumnName("columns");
        builder.Property(r => r.Compression).HasColumnName("compression");
        builder.Property(r => r.PieceCount).HasColumnName("piece_count");
        builder.HasOne<LoadRow>().WithMany().HasForeignKey(r => r.LoadId).OnDelete(DeleteBehavior.Restrict);
    }
}

internal sealed class OriginalPieceMapping : IEntityTypeConfiguration<OriginalPieceRow>
{
    public void Configure(EntityTypeBuilder<OriginalPieceRow> builder)
    {
        builder.ToTable("original_pieces", table => table.HasCheckConstraint("ck_original_pieces_counts", "position > 0 and byte_count > 0"));
        builder.HasKey(r => new { r.LoadId, r.Position });
        builder.Property(r => r.LoadId).HasColumnName("load_id");
        builder.Property(r => r.Position).HasColumnName("position");
        builder.Property(r => r.ByteCount).HasColumnName("byte_count");
        builder.Property(r => r.Content).HasColumnName("content");
        builder.HasOne<LoadRow>().WithMany().HasForeignKey(r => r.LoadId).OnDelete(DeleteBehavior.Restrict);
    }
}
