using Campaigns.Catalog.Rows;
using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;

namespace Campaigns.Catalog.Mapping;

internal sealed class LedgerMapping : IEntityTypeConfiguration<LedgerRow>
{
    public void Configure(EntityTypeBuilder<LedgerRow> builder)
    {
        builder.ToTable("ledger", table =>
        {
            table.HasCheckConstraint("ck_ledger_sequence", "sequence > 0");
            table.HasCheckConstraint("ck_ledger_words", "length(account) > 0 and length(program_version) > 0 and length(action) > 0");
            table.HasCheckConstraint("ck_ledger_hash", "length(hash) = 64");
        });
        builder.HasKey(r => r.Sequence);
        builder.Property(r => r.Sequence).HasColumnName("sequence").ValueGeneratedNever();
        builder.Property(r => r.At).HasColumnName("at");
        builder.Property(r => r.Account).HasColumnName("account");
        builder.Property(r => r.ActingAs).HasColumnName("acting_as");
        builder.Property(r => r.ProgramVersion).HasColumnName("program_version");
        builder.Property(r => r.Action).HasColumnName("action");
        builder.Property(r => r.Campaign).HasColumnName("campaign");
        builder.Property(r => r.Subject).HasColumnName("subject");
        builder.Property(r => r.Reason).HasColumnName("reason");
        builder.Property(r => r.Hash).HasColumnName("hash");
    }
}

internal sealed class LedgerChangeMapping : IEntityTypeConfiguration<LedgerChangeRow>
{
    public void Configure(EntityTypeBuilder<LedgerChangeRow> builder)
    {
        builder.ToTable("ledger_changes");
        builder.HasKey(r => new { r.Sequence, r.Position });
        builder.Property(r => r.Sequence).HasColumnName("sequence");
        builder.Property(r => r.Position).HasColumnName("position");
        builder.Property(r => r.What).HasColumnName("what");
        builder.Property(r => r.Before).HasColumnName("before");
        builder.Property(r => r.After).HasColumnName("after");
        builder.HasOne<LedgerRow>().WithMany().HasForeignKey(r => r.Sequence).OnDelete(DeleteBehavior.Restrict);
    }
}

internal sealed class LedgerEvidenceMapping : IEntityTypeConfiguration<LedgerEvidenceRow>
{
    public void Configure(EntityTypeBuilder<LedgerEvidenceRow> builder)
    {
        builder.ToTable("ledger_evidence", table =>
        {
            table.HasCheckConstraint("ck_ledger_evidence_range", "first between 0 and last");
            table.HasCheckConstraint("ck_ledger_evidence_digest", "length(digest) = 64");
        });
        builder.HasKey(r => new { r.Sequence, r.Position });
        builder.Property(r => r.Sequence).HasColumnName("sequence");
        builder.Property(r => r.Position).HasColumnName("position");
        builder.Property(r => r.Kind).HasColumnName("kind");
        builder.Property(r => r.Owner).HasColumnName("owner");
        builder.Property(r => r.First).HasColumnName("first");
        builder.Property(r => r.Last).HasColumnName("last");
        builder.Property(r => r.Digest).HasColumnName("digest");
        builder.HasOne<LedgerRow>().WithMany().HasForeignKey(r => r.Sequence).OnDelete(DeleteBehavior.Restrict);
    }
}
