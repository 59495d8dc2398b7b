using Microsoft.EntityFrameworkCore;
using Microsoft.EntityFrameworkCore.Storage;
using Npgsql;
using NpgsqlTypes;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Store.Reevaluation;

/// <summary>A reading with what it came to.</summary>
internal sealed record JudgedReading(Guid ReadingId, Guid LotId, Judgement Judgement);

/// <summary>Writes verdicts in one round trip; one that is there already stays as it is.</summary>
internal static class VerdictInsert
{
    private const string Sql =
        """
        insert into verdict (id, reading_id, basis_id, uncertainty_id, outcome, worst_index, margins, outcomes, frequencies_hz, reasons, at)
        values ($1, $2, $3, null, $4, $5, $6, $7, $8, $9, $10)
        on conflict do nothing
        """;

    /// <summary>Returns how many were new.</summary>
    public static async Task<int> RunAsync(Act act, Guid basisId, IReadOnlyCollection<JudgedReading> judged, CancellationToken cancellationToken)
    {
        if (judged.Count == 0)
            return 0;
        var connection = (NpgsqlConnection)act.Db.Database.GetDbConnection();
        await using var batch = new NpgsqlBatch(connection, (NpgsqlTransaction)act.Db.Database.CurrentTransaction!.GetDbTransaction());
        foreach (var (readingId, _, (evaluation, stored)) in judged)
        {
            batch.BatchCommands.Add(new NpgsqlBatchCommand(Sql)
            {
                Parameters =
                {
                    new() { Value = act.NewId() },
                    new() { Value = readingId },
                    new() { Value = basisId },
                    new() { Value = (short)stored.Outcome },
                    new() { Value = stored.WorstIndex is { } worst ? (short)worst : DBNull.Value, NpgsqlDbType = NpgsqlDbType.Smallint },
                    new() { Value = stored.Margins },
                    new() { Value = stored.Outcomes },
                    new() { Value = stored.FrequenciesHz },
                    new() { Value = evaluation.Criteria.Select(c => c.Reason?.Code).ToArray(), NpgsqlDbType = NpgsqlDbType.Array | NpgsqlDbType.Text },
                    new() { Value = act.At },
                },
            });
        }

        return await batch.ExecuteNonQueryAsync(cancellationToken);
    }
}
