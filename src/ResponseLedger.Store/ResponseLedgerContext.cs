using Microsoft.AspNetCore.DataProtection.EntityFrameworkCore;
using Microsoft.AspNetCore.Identity;
using Microsoft.AspNetCore.Identity.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store;

/// <summary>The whole model. Tables and columns are in snake case; keys that people type are compared in the C collation.</summary>
public sealed class ResponseLedgerContext(DbContextOptions<ResponseLedgerContext> options)
    : IdentityDbContext<Person, IdentityRole<Guid>, Guid>(options), IDataProtectionKeyContext
{
    /// <summary>Name of the collation in which serials, numbers and names are compared: by bytes.</summary>
    public const string ByteOrder = "C";

    public DbSet<Device> Devices => Set<Device>();
    public DbSet<DeviceSetting> DeviceSettings => Set<DeviceSetting>();
    public DbSet<Condition> Conditions => Set<Condition>();
    public DbSet<GoldenChoice> GoldenChoices => Set<GoldenChoice>();
    public DbSet<MaskHead> Masks => Set<MaskHead>();
    public DbSet<MaskDraft> MaskDrafts => Set<MaskDraft>();
    public DbSet<MaskRevision> MaskRevisions => Set<MaskRevision>();
    public DbSet<Bench> Benches => Set<Bench>();
    public DbSet<BenchSetting> BenchSettings => Set<BenchSetting>();
    public DbSet<BenchUncertainty> BenchUncertainties => Set<BenchUncertainty>();
    public DbSet<BenchColumns> BenchColumns => Set<BenchColumns>();
    public DbSet<BenchToken> BenchTokens => Set<BenchToken>();
    public DbSet<TokenBinding> TokenBindings => Set<TokenBinding>();
    public DbSet<TokenRevocation> TokenRevocations => Set<TokenRevocation>();
    public DbSet<Lot> Lots => Set<Lot>();
    public DbSet<Unit> Units => Set<Unit>();
    public DbSet<LotUnit> LotUnits => Set<LotUnit>();
    public DbSet<Disposition> Dispositions => Set<Disposition>();
    public DbSet<Decision> Decisions => Set<Decision>();
    public DbSet<SecondSignature> SecondSignatures => Set<SecondSignature>();
    public DbSet<DecisionVerdict> DecisionVerdicts => Set<DecisionVerdict>();
    public DbSet<Reopening> Reopenings => Set<Reopening>();
    public DbSet<Run> Runs => Set<Run>();
    public DbSet<StoredFile> Files => Set<StoredFile>();
    public DbSet<RunFile> RunFiles => Set<RunFile>();
    public DbSet<RunAssignment> RunAssignments => Set<RunAssignment>();
    public DbSet<RunInvalidation> RunInvalidations => Set<RunInvalidation>();
    public DbSet<Reading> Readings => Set<Reading>();
    public DbSet<Grid> Grids => Set<Grid>();
    public DbSet<Curve> Curves => Set<Curve>();
    public DbSet<Basis> Bases => Set<Basis>();
    public DbSet<Verdict> Verdicts => Set<Verdict>();
    public DbSet<LedgerEntryRow> LedgerEntries => Set<LedgerEntryRow>();
    public DbSet<LedgerPosition> LedgerPositions => Set<LedgerPosition>();
    public DbSet<LedgerQueueRow> LedgerQueue => Set<LedgerQueueRow>();
    public DbSet<DataProtectionKey> DataProtectionKeys => Set<DataProtectionKey>();

    /// <summary>Whether an act's transaction is open on it, so that its connection must not be opened anew.</summary>
    internal bool HoldsTransaction { get; set; }

    protected override void OnModelCreating(ModelBuilder builder)
    {
        base.OnModelCreating(builder);
        builder.Entity<Person>().ToTable("person");
        builder.Entity<IdentityRole<Guid>>().ToTable("role");
        builder.Entity<IdentityUserRole<Guid>>().ToTable("person_role");
        builder.Entity<IdentityUserClaim<Guid>>().ToTable("person_claim");
        builder.Entity<IdentityUserLogin<Guid>>().ToTable("person_login");
        builder.Entity<IdentityUserToken<Guid>>().ToTable("person_token");
        builder.Entity<IdentityRoleClaim<Guid>>().ToTable("role_claim");
        builder.Entity<DataProtectionKey>().ToTable("data_protection_key");
        builder.ApplyConfigurationsFromAssembly(typeof(ResponseLedgerContext).Assembly);
    }
}
