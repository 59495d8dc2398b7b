using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class DeviceConfiguration :
    IEntityTypeConfiguration<Device>,
    IEntityTypeConfiguration<DeviceSetting>,
    IEntityTypeConfiguration<Condition>,
    IEntityTypeConfiguration<GoldenChoice>
{
    public void Configure(EntityTypeBuilder<Device> builder)
    {
        builder.ToTable("device", table =>
        {
            table.HasCheckConstraint("ck_device_kind", "kind in ('transfer', 'loop')");
            table.HasCheckConstraint("ck_device_critical_phase", "critical_phase_deg is null or (kind = 'loop' and critical_phase_deg in (-180, 0))");
            table.HasCheckConstraint("ck_device_names", "part_number <> '' and revision <> ''");
        });
        builder.Property(d => d.PartNumber).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.Property(d => d.Revision).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(d => new { d.PartNumber, d.Revision }).IsUnique();
    }

    public void Configure(EntityTypeBuilder<DeviceSetting> builder)
    {
        builder.ToTable("device_setting", table =>
        {
            table.HasCheckConstraint("ck_device_setting_decision_rule", "decision_rule in ('simple', 'guarded', 'fourOutcomes')");
            table.HasCheckConstraint("ck_device_setting_retests_allowed", "retests_allowed >= 0");
        });
        builder.HasIndex(s => new { s.DeviceId, s.Number }).IsUnique();
        builder.HasOne<Device>().WithMany().HasForeignKey(s => s.DeviceId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Condition> builder)
    {
        builder.ToTable("condition");
        builder.Property(c => c.Name).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(c => new { c.DeviceId, c.Name }).IsUnique();
        builder.HasIndex(c => new { c.DeviceId, c.Ordinal }).IsUnique();
        builder.HasOne<Device>().WithMany().HasForeignKey(c => c.DeviceId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<GoldenChoice> builder)
    {
        builder.ToTable("golden_choice");
        builder.HasIndex(g => new { g.ConditionId, g.Number }).IsUnique();
        builder.HasOne<Device>().WithMany().HasForeignKey(g => g.DeviceId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(g => g.ConditionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Run>().WithMany().HasForeignKey(g => g.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(g => g.ReadingId).OnDelete(DeleteBehavior.Restrict);
    }
}
