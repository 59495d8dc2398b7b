using FluentValidation;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.Runs.Upload;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Benches;

/// <summary>Names of files of which the serial numbers are asked for.</summary>
internal sealed record NamesAsked(IReadOnlyList<string>? FileNames);

internal sealed class NamesAskedValidator : AbstractValidator<NamesAsked>
{
    private const int MostNames = 500;
    private const int LongestName = 1_000;

    public NamesAskedValidator()
        => RuleFor(n => n.FileNames)
            .Must(names => names is { Count: >= 1 and <= MostNames } && names.All(name => name is { Length: >= 1 and <= LongestName }))
            .WithMessage($"Send 1 to {MostNames} names of 1 to {LongestName} characters each.");
}

/// <summary>The serial number that an upload from the bench would take a file for; null where its name has none.</summary>
internal sealed record SerialInName(string FileName, string? Serial);

/// <summary>POST /api/benches/{id}/serials: finds serial numbers in file names as an upload from the bench would, before anything is sent.</summary>
internal static class SerialsInNames
{
    public static async Task<Ok<Page<SerialInName>>> FindAsync(Guid id, NamesAsked asked, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        await ReadBenches.ViewAsync(db, id, cancellationToken);
        var pattern = await db.BenchSettings.Where(s => s.BenchId == id).OrderByDescending(s => s.Number).Select(s => s.SerialPattern).FirstOrDefaultAsync(cancellationToken);
        var found = new List<SerialInName>(asked.FileNames!.Count);
        foreach (var name in asked.FileNames)
        {
            cancellationToken.ThrowIfCancellationRequested();
            found.Add(new SerialInName(name, SerialNumber.In(PartFileName.Clean(name), pattern)));
        }

        return TypedResults.Ok(new Page<SerialInName>(found, null));
    }
}
