using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class LedgerConfiguration :
    IEntityTypeConfiguration<LedgerEntryRow>,
    IEntityTypeConfiguration<LedgerPosition>,
    IEntityTypeConfiguration<LedgerQueueRow>
{
    public void Configure(EntityTypeBuilder<LedgerEntryRow> builder)
        => builder.ToTable("ledger_entry", table => table.HasCheckConstraint("ck_ledger_entry_bytes", "octet_length(bytes) > 0"));

    public void Configure(EntityTypeBuilder<LedgerPosition> builder)
    {
        builder.ToTable("ledger_position", table => table.HasCheckConstraint("ck_ledger_position_position", "position >= 0"));
        builder.HasKey(p => p.Position);
        builder.Property(p => p.Position).ValueGeneratedNever();
        builder.HasIndex(p => p.EntryId).IsUnique();
        builder.HasOne<LedgerEntryRow>().WithMany().HasForeignKey(p => p.EntryId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<LedgerQueueRow> builder)
    {
        builder.ToTable("ledger_queue");
        builder.HasKey(q => q.No);
        builder.Property(q => q.No).UseIdentityAlwaysColumn();
        builder.HasIndex(q => q.EntryId).IsUnique();
        builder.HasOne<LedgerEntryRow>().WithMany().HasForeignKey(q => q.EntryId).OnDelete(DeleteBehavior.Restrict);
    }
}
