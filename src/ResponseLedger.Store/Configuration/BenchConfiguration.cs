using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Metadata.Builders;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Configuration;

internal sealed class BenchConfiguration :
    IEntityTypeConfiguration<Bench>,
    IEntityTypeConfiguration<BenchSetting>,
    IEntityTypeConfiguration<BenchUncertainty>,
    IEntityTypeConfiguration<BenchColumns>,
    IEntityTypeConfiguration<BenchToken>,
    IEntityTypeConfiguration<TokenBinding>,
    IEntityTypeConfiguration<TokenRevocation>
{
    public void Configure(EntityTypeBuilder<Bench> builder)
    {
        builder.ToTable("bench", table => table.HasCheckConstraint("ck_bench_name", "name <> ''"));
        builder.Property(b => b.Name).UseCollation(ResponseLedgerContext.ByteOrder);
        builder.HasIndex(b => b.Name).IsUnique();
    }

    public void Configure(EntityTypeBuilder<BenchSetting> builder)
    {
        builder.ToTable("bench_setting");
        builder.HasIndex(s => new { s.BenchId, s.Number }).IsUnique();
        builder.HasOne<Bench>().WithMany().HasForeignKey(s => s.BenchId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<BenchUncertainty> builder)
    {
        builder.ToTable("bench_uncertainty");
        builder.HasIndex(u => new { u.BenchId, u.Number }).IsUnique();
        builder.HasOne<Bench>().WithMany().HasForeignKey(u => u.BenchId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<BenchColumns> builder)
    {
        builder.ToTable("bench_columns");
        builder.HasIndex(c => new { c.BenchId, c.HeadsDigest, c.At });
        builder.HasOne<Bench>().WithMany().HasForeignKey(c => c.BenchId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<BenchToken> builder)
    {
        builder.ToTable("bench_token", table => table.HasCheckConstraint("ck_bench_token_secret_hash", "octet_length(secret_hash) = 32"));
        builder.HasOne<Bench>().WithMany().HasForeignKey(t => t.BenchId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<TokenBinding> builder)
    {
        builder.ToTable("token_binding");
        builder.HasKey(b => b.TokenId);
        builder.HasOne<BenchToken>().WithMany().HasForeignKey(b => b.TokenId).OnDelete(DeleteBehavior.Restrict);
        builder.HasOne<Bench>().WithMany().HasForeignKey(b => b.BenchId).OnDelete(DeleteBehavior.Restrict);
    }

    public void Configure(EntityTypeBuilder<TokenRevocation> builder)
    {
        builder.ToTable("token_revocation");
        builder.HasKey(r => r.TokenId);
        builder.HasOne<BenchToken>().WithMany().HasForeignKey(r => r.TokenId).OnDelete(DeleteBehavior.Restrict);
    }
}
