using System.Security.Cryptography;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Store.Model;
using ResponseLedger.TestDatabase;

namespace ResponseLedger.Store.Tests;

public sealed class StoreLawTests
{
    private readonly SampleRows rows = new();

    [Theory]
    [InlineData("production", true)]
    [InlineData("golden", false)]
    public async Task The_same_files_for_the_same_unit_lot_and_purpose_are_one_run_with_or_without_a_lot(string purpose, bool hasLot)
    {
        await using var store = await TestDatabases.CreateAsync();
        await AddAsync(store, [.. rows.All(), rows.NewRun(purpose, hasLot ? rows.Lot.Id : null, "a"), rows.NewRun(purpose, hasLot ? rows.Lot.Id : null, "b")]);
        await RefusesAsync(store, PostgresErrorCodes.UniqueViolation, rows.NewRun(purpose, hasLot ? rows.Lot.Id : null, "a"));
        await AddAsync(store, rows.NewRun("study", null, "a"));
    }

    [Fact]
    public async Task A_basis_without_a_golden_run_is_there_once()
    {
        await using var store = await TestDatabases.CreateAsync();
        var mask = new MaskHead { Id = SampleRows.NewId(), DeviceId = rows.Device.Id, ConditionId = rows.Condition.Id, At = SampleRows.At, ById = SampleRows.NewId() };
        var released = new MaskRevision
        {
            MaskId = mask.Id,
            DeviceId = rows.Device.Id,
            ConditionId = rows.Condition.Id,
            Number = 1,
            Document = "{}"u8.ToArray(),
            Sha256 = SHA256.HashData("{}"u8),
            Reason = "first",
            At = SampleRows.At,
            ById = SampleRows.NewId(),
        };
        Basis NewBasis() => new() { Id = SampleRows.NewId(), ConditionId = rows.Condition.Id, MaskId = mask.Id, DecisionRule = "simple", EngineVersion = 1, At = SampleRows.At };
        await AddAsync(store, [.. rows.All(), mask, released, NewBasis()]);
        await RefusesAsync(store, PostgresErrorCodes.UniqueViolation, NewBasis());
    }

    [Fact]
    public async Task A_file_is_kept_under_the_hash_of_its_very_bytes()
    {
        await using var store = await TestDatabases.CreateAsync();
        var content = "1000,0.0\n"u8.ToArray();
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, new StoredFile { Sha256 = new byte[32], Content = content, At = SampleRows.At });
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, new StoredFile { Sha256 = SHA256.HashData([]), Content = [], At = SampleRows.At });
        await AddAsync(store, new StoredFile { Sha256 = SHA256.HashData(content), Content = content, At = SampleRows.At });
    }

    [Fact]
    public async Task A_grid_holds_as_many_frequencies_as_it_says()
    {
        await using var store = await TestDatabases.CreateAsync();
        var planes = new byte[24];
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, new Grid { Sha256 = SHA256.HashData(planes), Points = 2, Planes = planes });
        await AddAsync(store, new Grid { Sha256 = SHA256.HashData(planes), Points = 3, Planes = planes });
    }

    [Fact]
    public async Task Words_outside_their_lists_are_refused()
    {
        await using var store = await TestDatabases.CreateAsync();
        await AddAsync(store, rows.All());
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, rows.NewRun("Production", rows.Lot.Id, "a"));
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, rows.NewRun("production", null, "a"));
        await RefusesAsync(store, PostgresErrorCodes.CheckViolation, new Lot { Id = SampleRows.NewId(), DeviceId = rows.Device.Id, Number = "L2", Size = 0, At = SampleRows.At, ById = SampleRows.NewId() });
        await RefusesAsync(
            store,
            PostgresErrorCodes.CheckViolation,
            new Disposition { Id = SampleRows.NewId(), LotId = rows.Lot.Id, UnitId = rows.Unit.Id, Number = 1, Kind = "keep", Reason = "", At = SampleRows.At, ById = SampleRows.NewId() });
    }

    [Fact]
    public async Task A_verdict_has_one_margin_outcome_place_and_reason_a_criterion_and_none_is_infinite()
    {
        await using var store = await TestDatabases.CreateAsync();
        await using var owner = await Sql.OpenAsync(store.OwnerConnectionString);

        // Check constraints are met before foreign keys, so the row needs no company; the last one gets as far as its keys.
        const string start = "insert into verdict (id, reading_id, basis_id, at, outcome, worst_index, margins, outcomes, frequencies_hz, reasons) values (gen_random_uuid(), gen_random_uuid(), gen_random_uuid(), now(), ";
        await RefusesAsync(owner, PostgresErrorCodes.CheckViolation, start + "0, 0, '{1,2}', '{0}', '{10}', '{null}')");
        await RefusesAsync(owner, PostgresErrorCodes.CheckViolation, start + "0, 0, '{1}', '{5}', '{10}', '{null}')");
        await RefusesAsync(owner, PostgresErrorCodes.CheckViolation, start + "0, 1, '{1}', '{0}', '{10}', '{null}')");
        await RefusesAsync(owner, PostgresErrorCodes.CheckViolation, start + "0, 0, '{null,NaN}', '{0,0}', '{10,10}', '{null,null}')");
        await RefusesAsync(owner, PostgresErrorCodes.CheckViolation, start + "0, 0, '{1}', '{0}', '{Infinity}', '{null}')");
        await RefusesAsync(owner, PostgresErrorCodes.ForeignKeyViolation, start + "3, 0, '{null,1}', '{3,0}', '{null,10}', '{notSpanned,null}')");
    }

    [Fact]
    public async Task Serials_are_ordered_by_their_bytes_whatever_the_servers_locale()
    {
        await using var store = await TestDatabases.CreateAsync();
        string[] serials = ["a-10", "B-2", "A 3", "Ä1", "a_1", "b1"];
        await AddAsync(store, [rows.Device, .. serials.Select(rows.NewUnit)]);
        await using var db = Contexts.Open(store.ServerConnectionString);
        var read = await db.Units.OrderBy(u => u.Serial).Select(u => u.Serial).ToListAsync(TestContext.Current.CancellationToken);
        Assert.Equal(serials.Order(StringComparer.Ordinal), read);
    }

    private static async Task AddAsync(TestStore store, params IEnumerable<object> added)
    {
        await using var db = Contexts.Open(store.ServerConnectionString);
        db.AddRange(added);
        await db.SaveChangesAsync(TestContext.Current.CancellationToken);
    }

    private static async Task RefusesAsync(TestStore store, string sqlState, object row)
    {
        var refused = await Assert.ThrowsAsync<DbUpdateException>(() => AddAsync(store, row));
        Assert.Equal(sqlState, Assert.IsType<PostgresException>(refused.InnerException).SqlState);
    }

    private static async Task RefusesAsync(NpgsqlConnection connection, string sqlState, string statement)
    {
        var refused = await Assert.ThrowsAsync<PostgresException>(() => Sql.RunAsync(connection, statement));
        Assert.True(refused.SqlState == sqlState, $"{statement}: {refused.Message}");
    }
}
