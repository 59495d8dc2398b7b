using System.Security.Claims;
using FluentValidation;
using Microsoft.AspNetCore.Http.HttpResults;
using ResponseLedger.Formats;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>POST /api/runs: fields and files in any order; each file is taken or refused for itself.</summary>
internal sealed class UploadRoute(
    ResponseLedgerContext db, UploadBenches benches, RunIntake intake, RunVerdicts verdicts, IValidator<UploadFields> validator)
{
    public static async Task<Results<JsonHttpResult<UploadAnswer>, ProblemHttpResult>> HandleAsync(
        HttpContext http, UploadRoute route, CancellationToken cancellationToken)
    {
        await using var form = await UploadForm.ReadAsync(http.Request, UploadFields.Names, cancellationToken);
        var answer = await route.TakeAsync(http.User, form, cancellationToken);
        return answer.Status == StatusCodes.Status422UnprocessableEntity
            ? TypedResults.Problem(
                "No file was taken; each is named with what is wrong and how to mend it.",
                statusCode: answer.Status,
                type: "about:blank",
                extensions: new Dictionary<string, object?> { ["code"] = "nothingTaken", ["results"] = answer.Results })
            : TypedResults.Json(answer, statusCode: answer.Status);
    }

    private async Task<UploadAnswer> TakeAsync(ClaimsPrincipal user, UploadForm form, CancellationToken cancellationToken)
    {
        var fields = UploadFields.Of(form.Fields);
        var judged = await validator.ValidateAsync(fields, cancellationToken);
        if (!judged.IsValid)
            throw new RefusedException(new FieldRefused(judged.Errors
                .GroupBy(e => char.ToLowerInvariant(e.PropertyName[0]) + e.PropertyName[1..], e => e.ErrorMessage)
                .ToDictionary(g => g.Key, g => g.ToArray())));

        var (found, early) = await WhileWaiting.DoAsync(
            IntakeLookup.FindAsync(
                db,
                new PlaceNames(fields.Device, fields.Lot, fields.Bench, CurrentActor.BoundBench(user), CurrentActor.TokenId(user)),
                cancellationToken),
            () => EarlyReading(form.Files, fields, cancellationToken));
        var place = UploadPlace.Of(fields, found);
        var bench = await benches.OfAsync(user, fields.Bench, found.Benches, cancellationToken);
        var order = new IntakeOrder(
            place.DeviceId, place.Condition.Id, place.Condition.Name, place.Lot?.Id, place.Lot?.Number, bench.Id, bench.Name, fields.PurposeWord,
            fields.MeasuredAtTime, fields.KeptCircumstances, fields.ColumnChoices, bench.NoiseFloorDb, fields.Acknowledge is not null);
        return new UploadAnswer(await TakeAsync(user, order, place.Condition.Basis, bench, fields.Serial?.Trim(), form.Files, early, cancellationToken));
    }

    private async Task<IReadOnlyList<UploadResult>> TakeAsync(
        ClaimsPrincipal user, IntakeOrder order, CurrentBasis? current, UploadBench bench, string? serial, IReadOnlyList<SpooledFile> files,
        FileReading? early, CancellationToken cancellationToken)
    {
        var results = new IntakeResult?[files.Count];
        var sound = new List<(int At, IntakeFile File)>(files.Count);
        for (var i = 0; i < files.Count; i++)
        {
            var file = files[i];
            var fileSerial = serial ?? SerialNumber.In(file.Name, bench.SerialPattern);
            results[i] = Unfit(file, fileSerial, bench);
            if (results[i] is null)
                sound.Add((i, new IntakeFile(file.Name, fileSerial!, file.Sha256, file.BytesAsync) { Reading = early }));
        }

        var taken = await intake.TakeAsync(CurrentActor.Of(user), order, current, [.. sound.Select(s => s.File)], cancellationToken);
        for (var i = 0; i < sound.Count; i++)
            results[sound[i].At] = taken[i];

        ReadNote[] notes = bench.IsNew ? [new ReadNote("benchMade", $"The bench {bench.Name} was new and has been made.")] : [];
        var answers = new List<UploadResult>(files.Count);
        foreach (var result in results)
        {
            var first = result is { Outcome: IntakeOutcome.Duplicate, RunId: { } runId } ? await verdicts.OfAsync(runId, cancellationToken) : null;
            answers.Add(UploadResult.Of(result!, first, notes));
        }

        return answers;
    }

    // A bench sends one small file as a rule: it is read while the store looks up where it belongs.
    private static FileReading? EarlyReading(IReadOnlyList<SpooledFile> files, UploadFields fields, CancellationToken cancellationToken)
        => files is [{ IsZip: false, InMemory: { } content } file] ? SweepFileReader.Read(content, file.Name, fields.ColumnChoices, cancellationToken) : null;

    private static IntakeResult? Unfit(SpooledFile file, string? serial, UploadBench bench)
    {
        if (file.IsTooLarge)
            return IntakeResult.Refused(file.Name, serial, "fileTooLarge", $"The file is larger than {SpooledFile.LargestWords}. Send one sweep a file.");
        if (file.IsZip)
            return IntakeResult.Refused(file.Name, serial, "zipNotTaken", "Zip archives are not taken. Unpack it and send the files themselves.");
        return serial is not null ? null : IntakeResult.Refused(
            file.Name, null, "serialNotFound",
            bench.SerialPattern is null
                ? "No serial number stands in the file's name. Send it in the field serial, or name the file SERIAL_anything."
                : $"The pattern of bench {bench.Name} finds no serial number in this file's name. Send it in the field serial, or mend the pattern.");
    }
}
