using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Store.Judging;

/// <summary>What runs of a condition are judged by now.</summary>
/// <param name="BasisId">The basis row.</param>
/// <param name="ConditionId">The condition.</param>
/// <param name="MaskId">The newest released mask.</param>
/// <param name="MaskRevision">Its number.</param>
/// <param name="GoldenReadingId">The reading of the golden run in force, or null.</param>
public sealed record CurrentBasis(Guid BasisId, Guid ConditionId, Guid MaskId, int MaskRevision, Guid? GoldenReadingId);

/// <summary>
/// Finds and makes the basis in force of a condition. It is made (once) by the act that changes what it names: a release, a
/// golden unit, a device's rule, or the start of a server with a newer engine; intake and screens only look it up.
/// </summary>
public static class CurrentBases
{
    private static readonly string Sql = $"select f.* from condition c cross join lateral ({InForceOf("$2")}) f where c.id = $1";

    /// <summary>
    /// The row of the basis in force of condition <c>c</c>, for a lateral join: basis, mask, number of the revision, golden reading.
    /// None where no mask is released. Asked for by every upload, so it is prepared: planning takes longer than running it.
    /// </summary>
    /// <param name="engineParameter">The parameter that holds the engine's version.</param>
    internal static string InForceOf(string engineParameter) =>
        $"""
         select b.id as basis_id, m.mask_id, m.number as mask_revision, b.golden_reading_id
         from (select mask_id, number from mask_revision where condition_id = c.id order by number desc limit 1) m
         left join (select reading_id from golden_choice where condition_id = c.id order by number desc limit 1) g on true
         cross join (select decision_rule from device_setting where device_id = c.device_id order by number desc limit 1) s
         join basis b on b.condition_id = c.id and b.mask_id = m.mask_id and b.golden_reading_id is not distinct from g.reading_id
             and b.decision_rule = s.decision_rule and b.engine_version = {engineParameter}
         order by b.at desc
         limit 1
         """;

    /// <summary>Reads such a row; null where there is none.</summary>
    /// <param name="row">The row.</param>
    /// <param name="conditionId">The condition.</param>
    /// <param name="first">The ordinal of its first column.</param>
    internal static CurrentBasis? Read(NpgsqlDataReader row, Guid conditionId, int first)
        => row.IsDBNull(first) ? null : new CurrentBasis(row.GetGuid(first), conditionId, row.GetGuid(first + 1), row.GetInt32(first + 2), row.GuidOrNull(first + 3));

    /// <summary>The basis in force, or null where the condition has no released mask.</summary>
    public static Task<CurrentBasis?> FindAsync(ResponseLedgerContext db, Guid conditionId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(db);
        return db.Database.CurrentTransaction is null
            ? db.Database.CreateExecutionStrategy().ExecuteAsync(token => FindOnceAsync(db, conditionId, token), cancellationToken)
            : FindOnceAsync(db, conditionId, cancellationToken);
    }

    /// <summary>Makes the basis row that is in force after what the act has added; null where no mask is released. Saves what the act has added so far.</summary>
    public static async Task<CurrentBasis?> EnsureAsync(Act act, Guid conditionId, CancellationToken cancellationToken)
    {
        ArgumentNullException.ThrowIfNull(act);
        await act.Db.SaveChangesAsync(cancellationToken);
        var found = await FindAsync(act.Db, conditionId, cancellationToken);
        var named = found is null ? await NamedAsync(act.Db, conditionId, cancellationToken) : null;
        if (found is not null || named is null)
            return found;

        await act.Db.Database.ExecuteSqlAsync(
            $"""
             insert into basis (id, condition_id, mask_id, golden_reading_id, decision_rule, engine_version, at)
             values ({act.NewId()}, {conditionId}, {named.MaskId}, {named.GoldenReadingId}, {named.DecisionRule}, {Judge.EngineVersion}, {act.At})
             on conflict do nothing
             """,
            cancellationToken);
        return await FindAsync(act.Db, conditionId, cancellationToken);
    }

    private static async Task<CurrentBasis?> FindOnceAsync(ResponseLedgerContext db, Guid conditionId, CancellationToken cancellationToken)
    {
        await db.Database.OpenConnectionAsync(cancellationToken);
        try
        {
            await using var batch = PreparedBatch.On(db);
            batch.Add(Sql, PreparedBatch.Of(conditionId), PreparedBatch.Of(Judge.EngineVersion));
            await batch.PrepareAsync(cancellationToken);
            await using var row = await batch.ExecuteReaderAsync(cancellationToken);
            return await row.ReadAsync(cancellationToken) ? Read(row, conditionId, 0) : null;
        }
        finally
        {
            await db.Database.CloseConnectionAsync();
        }
    }

    private static async Task<Named?> NamedAsync(ResponseLedgerContext db, Guid conditionId, CancellationToken cancellationToken)
        => await db.MaskRevisions
            .Where(m => m.ConditionId == conditionId)
            .OrderByDescending(m => m.Number)
            .Select(m => new Named(
                m.MaskId,
                m.Number,
                db.GoldenChoices.Where(g => g.ConditionId == conditionId).OrderByDescending(g => g.Number).Select(g => (Guid?)g.ReadingId).FirstOrDefault(),
                db.DeviceSettings.Where(s => s.DeviceId == m.DeviceId).OrderByDescending(s => s.Number).Select(s => s.DecisionRule).First()))
            .FirstOrDefaultAsync(cancellationToken);

    private sealed record Named(Guid MaskId, int MaskRevision, Guid? GoldenReadingId, string DecisionRule);
}
