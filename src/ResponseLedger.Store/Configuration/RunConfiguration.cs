using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class RunConfiguration :
    IEntityTypeConfiguration<Run>,
    IEntityTypeConfiguration<StoredFile>,
    IEntityTypeConfiguration<RunFile>,
    IEntityTypeConfiguration<RunAssignment>,
    IEntityTypeConfiguration<RunInvalidation>
{
    public void Configure(EntityTypeBuilder<Run> builder)
    {
        builder.ToTable("run", table =>
        {
            table.HasCheckConstraint("ck_run_purpose", "purpose in ('production', 'golden', 'through', 'check', 'study')");
            table.HasCheckConstraint("ck_run_lot", "purpose <> 'production' or lot_id is not null");
            table.HasCheckConstraint("ck_run_files_digest", "octet_length(files_digest) = 32");
            table.HasCheckConstraint("ck_run_sender", "num_nonnulls(by_id, token_id) <= 1");
        });
        builder.Property(r => r.ReceivedNo).UseIdentityAlwaysColumn();
        builder.HasIndex(r => r.ReceivedNo).IsUnique();
        builder.HasIndex(r => new { r.UnitId, r.LotId, r.Purpose, r.FilesDigest }).IsUnique().AreNullsDistinct(false);
        builder.HasIndex(r => new { r.LotId, r.FilesDigest });
        builder.HasIndex(r => new { r.DeviceId, r.ReceivedNo });
        builder.HasIndex(r => new { r.BenchId, r.ReceivedNo });
        builder.HasOne<Device>().WithMany().HasForeignKey(r => r.DeviceId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(r => r.UnitId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Lot>().WithMany().HasForeignKey(r => r.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Bench>().WithMany().HasForeignKey(r => r.BenchId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<BenchToken>().WithMany().HasForeignKey(r => r.TokenId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<StoredFile> builder)
    {
        builder.ToTable("file", table =>
        {
            table.HasCheckConstraint("ck_file_content", "octet_length(content) > 0");
            table.HasCheckConstraint("ck_file_sha256", "sha256 = sha256(content)");
        });
        builder.HasKey(f => f.Sha256);
    }

    public void Configure(EntityTypeBuilder<RunFile> builder)
    {
        builder.ToTable("run_file", table => table.HasCheckConstraint("ck_run_file_ordinal", "ordinal >= 0"));
        builder.HasKey(f => new { f.RunId, f.Ordinal });
        builder.HasIndex(f => f.Sha256);
        builder.HasOne<Run>().WithMany().HasForeignKey(f => f.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<StoredFile>().WithMany().HasForeignKey(f => f.Sha256).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<RunAssignment> builder)
    {
        builder.ToTable("run_assignment", table => table.HasCheckConstraint("ck_run_assignment_number", "number >= 0"));
        builder.HasKey(a => new { a.RunId, a.Number });
        builder.HasIndex(a => new { a.LotId, a.UnitId, a.ConditionId });
        builder.HasIndex(a => a.UnitId);
        builder.HasOne<Run>().WithMany().HasForeignKey(a => a.RunId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Unit>().WithMany().HasForeignKey(a => a.UnitId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Lot>().WithMany().HasForeignKey(a => a.LotId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Condition>().WithMany().HasForeignKey(a => a.ConditionId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<RunInvalidation> builder)
    {
        builder.ToTable("run_invalidation");
        builder.HasKey(i => i.RunId);
        builder.HasOne<Run>().WithMany().HasForeignKey(i => i.RunId).OnDelete(DeleteBehavior.Restrict);
    }
}
