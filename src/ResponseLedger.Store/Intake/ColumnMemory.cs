using System.Text.Json.Nodes;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Formats;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Intake;

/// <summary>A choice of columns for files with these heads.</summary>
internal sealed record RememberedColumns(string HeadsDigest, ColumnChoices Choices);

/// <summary>What a bench remembers of columns that were open: the choice that was made for files with the same heads.</summary>
public sealed class ColumnMemory(IDbContextFactory<ResponseLedgerContext> contexts)
{
    /// <summary>The newest choice on this bench for these heads, or null.</summary>
    public async Task<ColumnChoices?> RecallAsync(Guid benchId, string headsDigest, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var text = await db.BenchColumns
            .Where(c => c.BenchId == benchId && c.HeadsDigest == headsDigest)
            .OrderByDescending(c => c.At).ThenByDescending(c => c.Id)
            .Select(c => c.Choices)
            .FirstOrDefaultAsync(cancellationToken);
        return text is not null && ColumnChoices.TryParse(text, out var choices, out _) ? choices : null;
    }

    /// <summary>Whether a reading asks which column is which.</summary>
    public static bool IsOpen(FileReading reading)
    {
        ArgumentNullException.ThrowIfNull(reading);
        return reading.Sweep is null && reading.Issues.Any(i => i.Code == ReadCodes.ColumnsOpen);
    }

    internal static void Remember(Act act, IntakeOrder order, RememberedColumns choice)
    {
        var text = choice.Choices.ToJson();
        act.Db.BenchColumns.Add(new BenchColumns
        {
            Id = act.NewId(),
            BenchId = order.BenchId,
            HeadsDigest = choice.HeadsDigest,
            Choices = text,
            At = act.At,
            ById = act.ById,
        });
        act.Record(
            "bench.columnsRemembered",
            new JsonObject { ["benchId"] = order.BenchId.ToString(), ["bench"] = order.BenchName, ["headsDigest"] = choice.HeadsDigest },
            new JsonObject { ["columns"] = JsonNode.Parse(text) });
    }
}
