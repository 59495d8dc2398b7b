using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class ReadingConfiguration :
    IEntityTypeConfiguration<Reading>,
    IEntityTypeConfiguration<Grid>,
    IEntityTypeConfiguration<Curve>,
    IEntityTypeConfiguration<Basis>,
    IEntityTypeConfiguration<Verdict>
{
    public void Configure(EntityTypeBuilder<Reading> builder)
    {
        builder.ToTable("reading");
        builder.HasIndex(r => new { r.RunId, r.Number }).IsUnique();
        builder.HasOne<Run>().WithMany().HasForeignKey(r => r.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Grid>().WithMany().HasForeignKey(r => r.GridSha256).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(r => r.ThroughReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Grid> builder)
    {
        builder.ToTable("grid");
        builder.HasKey(g => g.Sha256);
    }

    public void Configure(EntityTypeBuilder<Curve> builder)
    {
        builder.ToTable("curve");
        builder.HasKey(c => c.ReadingId);
        builder.HasOne<Reading>().WithMany().HasForeignKey(c => c.ReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Basis> builder)
    {
        builder.ToTable("basis");
        builder.HasIndex(b => new { b.ConditionId, b.MaskId, b.GoldenReadingId, b.DecisionRule, b.EngineVersion })
            .IsUnique().AreNullsDistinct(false);
        builder.HasOne<Condition>().WithMany().HasForeignKey(b => b.ConditionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<MaskRevision>().WithMany().HasForeignKey(b => b.MaskId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(b => b.GoldenReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Verdict> builder)
    {
        builder.ToTable("verdict");
        builder.HasIndex(v => new { v.ReadingId, v.BasisId, v.UncertaintyId }).IsUnique().AreNullsDistinct(false);
        builder.HasOne<Reading>().WithMany().HasForeignKey(v => v.ReadingId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Basis>().WithMany().HasForeignKey(v => v.BasisId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<BenchUncertainty>().WithMany().HasForeignKey(v => v.UncertaintyId).OnDelete(DeleteBehavior.Restrict);
    }
}
