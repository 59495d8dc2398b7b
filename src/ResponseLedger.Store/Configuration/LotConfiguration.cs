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
    IEntityTypeConfiguration<DecisionVerdict>,
    IEntityTypeConfiguration<Reopening>
{
    public void Configure(EntityTypeBuilder<Lot> builder)
    {
        builder.ToTable("lot");
        builder.Property(l => l.Number).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(l => new { l.DeviceId, l.Number }).IsUnique();
        builder.HasIndex(l => l.Number);
        builder.HasOne<Device>().WithMany().HasForeignKey(l => l.DeviceId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Unit> builder)
    {
        builder.ToTable("unit");
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
        builder.ToTable("disposition");
        builder.HasIndex(d => new { d.LotId, d.UnitId, d.Number }).IsUnique();
        builder.HasOne<Lot>().WithMany().HasForeignKey(d => d.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(d => d.UnitId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Decision> builder)
    {
        builder.ToTable("decision");
        builder.HasIndex(d => new { d.LotId, d.Ordinal }).IsUnique();
        builder.HasOne<Lot>().WithMany().HasForeignKey(d => d.LotId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<DecisionVerdict> builder)
    {
        builder.ToTable("decision_verdict");
        builder.HasKey(v => new { v.DecisionId, v.UnitId, v.ConditionId });
        builder.HasOne<Decision>().WithMany().HasForeignKey(v => v.DecisionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Verdict>().WithMany().HasForeignKey(v => v.VerdictId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(v => v.ReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Reopening> builder)
    {
        builder.ToTable("reopening");
        builder.HasKey(r => r.DecisionId);
        builder.HasIndex(r => r.LotId);
        builder.HasOne<Decision>().WithMany().HasForeignKey(r => r.DecisionId).OnDelete(DeleteBehavior.Restrict);
    }
}
