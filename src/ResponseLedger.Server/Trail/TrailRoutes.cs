using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Trail;

/// <summary>The ledger, read in the order of its positions.</summary>
internal static class TrailRoutes
{
    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
        => api.MapGet("/ledger/entries", ReadAsync).RequireAuthorization(Policies.Read).WithTags("Ledger")
            .WithName("ReadLedger")
            .WithSummary("Entries after a position, each as JSON and as its exact bytes. Next is the position to go on after, null at the end.")
            .Produces<EntriesPage>()
            .ProducesProblem(StatusCodes.Status422UnprocessableEntity);

    /// <summary>A page of the ledger.</summary>
    internal sealed record EntriesPage(IReadOnlyList<EntryShown> Items, long? Next);

    /// <summary>An entry.</summary>
    /// <param name="Position">Where it stands, from 0 without gaps.</param>
    /// <param name="Kind">What happened.</param>
    /// <param name="At">When.</param>
    /// <param name="Sha256">SHA-256 of its bytes, in hexadecimal.</param>
    /// <param name="Entry">The bytes, read as JSON.</param>
    /// <param name="Bytes">The exact bytes, in base64.</param>
    internal sealed record EntryShown(long Position, string Kind, DateTimeOffset At, string Sha256, JsonElement Entry, byte[] Bytes);

    private static async Task ReadAsync(ResponseLedgerContext db, HttpContext http, long? after, int? limit, CancellationToken cancellationToken)
    {
        var take = Paging.Limit(limit);
        var last = after ?? -1;
        var rows = await (
            from position in db.LedgerPositions
            join entry in db.LedgerEntries on position.EntryId equals entry.Id
            where position.Position > last
            orderby position.Position
            select new { position.Position, entry.Kind, entry.At, entry.Bytes }).AsNoTracking().Take(take + 1).ToListAsync(cancellationToken);

        http.Response.ContentType = "application/json; charset=utf-8";
        await using var writer = new Utf8JsonWriter(http.Response.BodyWriter);
        writer.WriteStartObject();
        writer.WriteStartArray("items");
        foreach (var row in rows.Take(take))
        {
            writer.WriteStartObject();
            writer.WriteNumber("position", row.Position);
            writer.WriteString("kind", row.Kind);
            writer.WriteString("at", Microseconds.Format(row.At));
            writer.WriteString("sha256", Convert.ToHexStringLower(CanonicalJson.Digest(row.Bytes)));
            writer.WritePropertyName("entry");
            writer.WriteRawValue(row.Bytes, skipInputValidation: true);
            writer.WriteBase64String("bytes", row.Bytes);
            writer.WriteEndObject();
        }

        writer.WriteEndArray();
        if (rows.Count > take)
            writer.WriteNumber("next", rows[take - 1].Position);
        else
            writer.WriteNull("next");
        writer.WriteEndObject();
        await writer.FlushAsync(cancellationToken);
    }
}
