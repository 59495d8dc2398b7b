using System.Text;
using System.Text.Json;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.Trail;

/// <summary>The ledger, read in the order of its positions.</summary>
internal static class TrailRoutes
{
    private const string Oldest = "oldest";
    private const string Newest = "newest";
    private const int LongestText = 200;

    public static void AddServices(IServiceCollection services)
    {
    }

    public static void Map(IEndpointRouteBuilder api)
        => api.MapGet("/ledger/entries", ReadAsync).RequireAuthorization(Policies.Read).WithTags("Ledger")
            .WithName("ReadLedger")
            .WithSummary("Entries after a position, each as JSON and as its exact bytes. Next is the position to go on after, null at the end. With `order=newest` they come newest first, and next is the position to go on before. `kind` is a kind (run.received) or the part before its point (run); `search` is text that stands in an entry's bytes, such as an id or a serial number.")
            .Produces<EntriesPage>()
            .ProducesProblem(StatusCodes.Status422UnprocessableEntity);

    /// <summary>A page of the ledger.</summary>
    /// <param name="Items">Its entries.</param>
    /// <param name="Next">Where to go on, or null at the end.</param>
    /// <param name="Size">How many entries the ledger has, whatever was asked for.</param>
    internal sealed record EntriesPage(IReadOnlyList<EntryShown> Items, long? Next, long Size);

    /// <summary>An entry.</summary>
    /// <param name="Position">Where it stands, from 0 without gaps.</param>
    /// <param name="Kind">What happened.</param>
    /// <param name="At">When.</param>
    /// <param name="Sha256">SHA-256 of its bytes, in hexadecimal.</param>
    /// <param name="Entry">The bytes, read as JSON.</param>
    /// <param name="Bytes">The exact bytes, in base64.</param>
    internal sealed record EntryShown(long Position, string Kind, DateTimeOffset At, string Sha256, JsonElement Entry, byte[] Bytes);

    private static async Task ReadAsync(
        ResponseLedgerContext db, HttpContext http, long? after, long? before, string? order, string? kind, string? search, int? limit, CancellationToken cancellationToken)
    {
        var take = Paging.Limit(limit);
        if (order is not (null or "" or Oldest or Newest))
            throw new RefusedException(new FieldRefused("order", $"The order is {Oldest} or {Newest}."));
        var size = 1 + (await db.LedgerPositions.MaxAsync(p => (long?)p.Position, cancellationToken) ?? -1);

        // What came meanwhile is left out, so that size and items speak of one moment.
        var end = Math.Min(before ?? size, size);
        var found =
            from position in db.LedgerPositions
            join entry in Entries(db, Given("kind", kind), Given("search", search)) on position.EntryId equals entry.Id
            where position.Position < end && (after == null || position.Position > after)
            select new { position.Position, entry.Kind, entry.At, entry.Bytes };
        var rows = await (order == Newest ? found.OrderByDescending(r => r.Position) : found.OrderBy(r => r.Position))
            .AsNoTracking().Take(take + 1).ToListAsync(cancellationToken);

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
        writer.WriteNumber("size", size);
        writer.WriteEndObject();
        await writer.FlushAsync(cancellationToken);
    }

    private static IQueryable<LedgerEntryRow> Entries(ResponseLedgerContext db, string? kind, string? search)
    {
        var entries = db.LedgerEntries.AsQueryable();
        if (search is not null)
        {
            // Canonical JSON escapes little and orders nothing anew, so that text is found in the bytes as it was written.
            var bytes = Encoding.UTF8.GetBytes(search);
            entries = db.LedgerEntries.FromSql($"select * from ledger_entry where position({bytes} in bytes) > 0");
        }

        return kind is null ? entries : entries.Where(e => e.Kind == kind || e.Kind.StartsWith(kind + "."));
    }

    private static string? Given(string name, string? text)
        => text?.Length > LongestText || text?.Contains('\0', StringComparison.Ordinal) == true
            ? throw new RefusedException(new FieldRefused(name, $"At most {LongestText} characters, none of them zero."))
            : string.IsNullOrWhiteSpace(text) ? null : text.Trim();
}
