using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class LotConfiguration :
    IEntityTypeConfiguration<Lot>,
    IEntityTypeConfiguration<Unit>,
    IEntityTypeConfiguration<LotUnit>,
    IEntityTypeConfiguration<Disposition>,
    IEntityTypeConfiguration<Decision>,
    IEntityTypeConfiguration<SecondSignature>,
    IEntityTypeConfiguration<DecisionVerdict>,
    IEntityTypeConfiguration<Reopening>
{
    public void Configure(EntityTypeBuilder<Lot> builder)
    {
        builder.ToTable("lot", table =>
        {
            table.HasCheckConstraint("ck_lot_number", "number <> ''");
            table.HasCheckConstraint("ck_lot_size", "size > 0");
        });
        builder.Property(l => l.Number).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(l => new { l.DeviceId, l.Number }).IsUnique();
        builder.HasIndex(l => l.Number);
        builder.HasOne<Device>().WithMany().HasForeignKey(l => l.DeviceId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Unit> builder)
    {
        builder.ToTable("unit", table => table.HasCheckConstraint("ck_unit_serial", "serial <> ''"));
        builder.Property(u => u.Serial).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(u => new { u.DeviceId, u.Serial }).IsUnique();
        builder.HasIndex(u => u.Serial);
        builder.HasOne<Device>().WithMany().HasForeignKey(u => u.DeviceId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<LotUnit> builder)
    {
        builder.ToTable("lot_unit");
        builder.HasKey(u => new { u.LotId, u.UnitId });
        builder.HasIndex(u => u.UnitId);
        builder.HasOne<Lot>().WithMany().HasForeignKey(u => u.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(u => u.UnitId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Disposition> builder)
    {
        builder.ToTable("disposition", table => table.HasCheckConstraint("ck_disposition_kind", "kind in ('rework', 'scrap', 'return', 'concession')"));
        builder.HasIndex(d => new { d.LotId, d.UnitId, d.Number }).IsUnique();
        builder.HasOne<Lot>().WithMany().HasForeignKey(d => d.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(d => d.UnitId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Decision> builder)
    {
        builder.ToTable("decision", table =>
        {
            table.HasCheckConstraint("ck_decision_kind", "kind in ('approve', 'approveWithConcession', 'reject')");
            table.HasCheckConstraint("ck_decision_ordinal", "ordinal >= 1");
            table.HasCheckConstraint("ck_decision_sha256", "sha256 = sha256(record)");
        });
        builder.HasIndex(d => new { d.LotId, d.Ordinal }).IsUnique();
        builder.HasOne<Lot>().WithMany().HasForeignKey(d => d.LotId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<SecondSignature> builder)
    {
        builder.ToTable("second_signature", table => table.HasCheckConstraint("ck_second_signature_sha256", "sha256 = sha256(record)"));
        builder.HasKey(s => s.DecisionId);
        builder.HasOne<Decision>().WithMany().HasForeignKey(s => s.DecisionId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<DecisionVerdict> builder)
    {
        builder.ToTable("decision_verdict");
        builder.HasKey(v => new { v.DecisionId, v.UnitId, v.ConditionId });
        builder.HasOne<Decision>().WithMany().HasForeignKey(v => v.DecisionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(v => v.UnitId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(v => v.ConditionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Run>().WithMany().HasForeignKey(v => v.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Verdict>().WithMany().HasForeignKey(v => v.VerdictId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(v => v.ReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Reopening> builder)
    {
        builder.ToTable("reopening");
        builder.HasKey(r => r.DecisionId);
        builder.HasOne<Lot>().WithMany().HasForeignKey(r => r.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Decision>().WithMany().HasForeignKey(r => r.DecisionId).OnDelete(DeleteBehavior.Restrict);
    }
}
