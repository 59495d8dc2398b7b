using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class MaskConfiguration :
    IEntityTypeConfiguration<MaskHead>,
    IEntityTypeConfiguration<MaskDraft>,
    IEntityTypeConfiguration<MaskRevision>
{
    public void Configure(EntityTypeBuilder<MaskHead> builder)
    {
        builder.ToTable("mask");
        builder.HasIndex(m => m.DeviceId);
        builder.HasOne<Device>().WithMany().HasForeignKey(m => m.DeviceId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(m => m.ConditionId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<MaskDraft> builder)
    {
        builder.ToTable("mask_draft");
        builder.HasKey(d => d.MaskId);
        builder.HasIndex(d => d.ConditionId).IsUnique();
        builder.Property(d => d.Version).IsConcurrencyToken();
        builder.HasOne<MaskHead>().WithMany().HasForeignKey(d => d.MaskId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(d => d.ConditionId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<MaskRevision> builder)
    {
        builder.ToTable("mask_revision", table =>
        {
            table.HasCheckConstraint("ck_mask_revision_number", "number >= 1");
            table.HasCheckConstraint("ck_mask_revision_sha256", "sha256 = sha256(document)");
        });
        builder.HasKey(r => r.MaskId);
        builder.HasIndex(r => new { r.ConditionId, r.Number }).IsUnique();
        builder.HasOne<MaskHead>().WithMany().HasForeignKey(r => r.MaskId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Device>().WithMany().HasForeignKey(r => r.DeviceId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(r => r.ConditionId).OnDelete(DeleteBehavior.Restrict);
    }
}
