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
        builder.ToTable("reading", table =>
        {
            table.HasCheckConstraint("ck_reading_form", "form between 1 and 5");
            table.HasCheckConstraint("ck_reading_points", "points >= 2");
        });
        builder.HasIndex(r => new { r.RunId, r.Number }).IsUnique();
        builder.HasOne<Run>().WithMany().HasForeignKey(r => r.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Grid>().WithMany().HasForeignKey(r => r.GridSha256).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(r => r.ThroughReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Grid> builder)
    {
        builder.ToTable("grid", table =>
        {
            table.HasCheckConstraint("ck_grid_planes", "points >= 2 and octet_length(planes) = 8 * points");
            table.HasCheckConstraint("ck_grid_sha256", "sha256 = sha256(planes)");
        });
        builder.HasKey(g => g.Sha256);
    }

    public void Configure(EntityTypeBuilder<Curve> builder)
    {
        builder.ToTable("curve", table => table.HasCheckConstraint("ck_curve_planes", "octet_length(planes) >= 16 and octet_length(planes) % 8 = 0"));
        builder.HasKey(c => c.ReadingId);
        builder.HasOne<Reading>().WithMany().HasForeignKey(c => c.ReadingId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Basis> builder)
    {
        builder.ToTable("basis", table => table.HasCheckConstraint("ck_basis_decision_rule", "decision_rule <> '' and engine_version >= 1"));
        builder.HasIndex(b => new { b.ConditionId, b.MaskId, b.GoldenReadingId, b.GoldenUncertaintyId, b.DecisionRule, b.EngineVersion })
            .IsUnique().AreNullsDistinct(false);
        builder.HasOne<Condition>().WithMany().HasForeignKey(b => b.ConditionId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<MaskRevision>().WithMany().HasForeignKey(b => b.MaskId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Reading>().WithMany().HasForeignKey(b => b.GoldenReadingId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<BenchUncertainty>().WithMany().HasForeignKey(b => b.GoldenUncertaintyId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<Verdict> builder)
    {
        builder.ToTable("verdict", table =>
        {
            table.HasCheckConstraint("ck_verdict_outcome", "outcome between 0 and 4 and 0 <= all (outcomes) and 4 >= all (outcomes)");
            table.HasCheckConstraint(
                "ck_verdict_criteria",
                "cardinality(margins) = cardinality(outcomes) and cardinality(frequencies_hz) = cardinality(outcomes) and cardinality(reasons) = cardinality(outcomes)");
            table.HasCheckConstraint("ck_verdict_worst_index", "worst_index >= 0 and worst_index < cardinality(outcomes)");
            table.HasCheckConstraint("ck_verdict_finite", NoneNonFinite("margins") + " and " + NoneNonFinite("frequencies_hz"));
        });
        builder.HasIndex(v => new { v.ReadingId, v.BasisId, v.UncertaintyId }).IsUnique().AreNullsDistinct(false);
        builder.HasOne<Reading>().WithMany().HasForeignKey(v => v.ReadingId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Basis>().WithMany().HasForeignKey(v => v.BasisId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<BenchUncertainty>().WithMany().HasForeignKey(v => v.UncertaintyId).OnDelete(DeleteBehavior.Restrict);
    }

    // Absent elements are null and make the comparison null, which a check constraint lets pass.
    private static string NoneNonFinite(string column)
        => $"not ('NaN' = any ({column}) or 'Infinity' = any ({column}) or '-Infinity' = any ({column}))";
}
