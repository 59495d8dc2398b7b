using System.Buffers;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Formats;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Store;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Server.Runs;

/// <summary>What leaves the house as a file: the bytes as they came, and the curve in a common form.</summary>
internal static class RunFileRoutes
{
    private const string Bytes = "application/octet-stream";

    public static async Task<FileContentHttpResult> OriginalAsync(Guid id, int? index, HttpResponse response, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var file = await (
            from runFile in db.RunFiles
            join stored in db.Files on runFile.Sha256 equals stored.Sha256
            where runFile.RunId == id && runFile.Ordinal == (index ?? 0)
            select new { runFile.Name, stored.Content }).AsNoTracking().SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("run, or no file of it,"));
        response.Headers.XContentTypeOptions = "nosniff";
        return TypedResults.Bytes(file.Content, Bytes, PartFileName.Clean(file.Name));
    }

    public static async Task<FileContentHttpResult> ExportAsync(Guid id, string? format, HttpResponse response, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var readingId = await ReadRuns.ReadingOfAsync(db, id, cancellationToken);
        if (format is not ("csv" or "touchstone"))
            throw new RefusedException(new FieldRefused("format", "The format is csv or touchstone."));
        var sweep = await db.SweepOfAsync(readingId, cancellationToken) ?? throw new RefusedException(new NothingThere("run"));
        var serial = await (
            from assignment in db.RunAssignments.Where(a => a.RunId == id).OrderByDescending(a => a.Number).Take(1)
            join unit in db.Units on assignment.UnitId equals unit.Id
            select unit.Serial).SingleAsync(cancellationToken);
        var output = new ArrayBufferWriter<byte>();
        if (format == "csv")
            CsvSweepWriter.Write(sweep, output);
        else if (TouchstoneWriter.Write(sweep, output) is { } absent)
            throw new RefusedException(new NotWritable(absent.Code, absent.Sentence));
        response.Headers.XContentTypeOptions = "nosniff";
        return TypedResults.Bytes(output.WrittenMemory.ToArray(), Bytes, PartFileName.Clean(serial.Replace('/', '-').Replace('\\', '-')) + (format == "csv" ? ".csv" : ".s1p"));
    }
}
