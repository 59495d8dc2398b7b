using System.Text.Json;
using System.Text.Json.Nodes;
using FluentValidation;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Measures;
using ResponseLedger.Records.Measures;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Server.Runs;

/// <summary>Measures that somebody asks for: <c>{measures:[{measure, parameters}]}</c>.</summary>
internal sealed record MeasuresAsked(IReadOnlyList<JsonElement>? Measures);

/// <summary>Judges every call before any curve is read.</summary>
internal sealed class MeasuresAskedValidator : AbstractValidator<MeasuresAsked>
{
    private const int MostMeasures = 100;

    public MeasuresAskedValidator()
    {
        RuleFor(m => m.Measures)
            .Must(m => m is { Count: >= 1 and <= MostMeasures }).WithMessage($"Ask for 1 to {MostMeasures} measures.");
        RuleFor(m => m.Measures).Custom((calls, context) =>
        {
            for (var i = 0; i < Math.Min(calls?.Count ?? 0, MostMeasures); i++)
            {
                if (!MeasureCallJson.TryParse(calls![i], out var call, out var problems))
                {
                    foreach (var problem in problems)
                        context.AddFailure(problem.Path.Length == 0 ? $"measures[{i}]" : $"measures[{i}].{problem.Path}", problem.Sentence);
                    continue;
                }

                foreach (var problem in MeasureCatalogue.ProblemsOf(call))
                    context.AddFailure($"measures[{i}]", problem);
            }
        });
    }
}

/// <summary>POST /api/runs/{id}/measures and GET /api/measures: what masks can require, on demand.</summary>
internal static class RunMeasures
{
    public static async Task<Ok<JsonObject>> EvaluateAsync(Guid id, MeasuresAsked asked, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var readingId = await ReadRuns.ReadingOfAsync(db, id, cancellationToken);
        var sweep = await db.SweepOfAsync(readingId, cancellationToken) ?? throw new RefusedException(new NothingThere("run"));
        var device = await (
            from run in db.Runs
            join owner in db.Devices on run.DeviceId equals owner.Id
            where run.Id == id
            select new { owner.Kind, owner.CriticalPhaseDeg }).SingleAsync(cancellationToken);
        var traits = new DeviceTraits(device.Kind == "loop", device.CriticalPhaseDeg ?? -180);
        var results = new JsonArray();
        foreach (var json in asked.Measures!)
        {
            if (!MeasureCallJson.TryParse(json, out var call, out _))
                throw new InvalidOperationException("A call passed validation and cannot be read.");
            results.Add(MeasureCallJson.Write(MeasureCatalogue.Evaluate(sweep, call, traits)));
        }

        return TypedResults.Ok(new JsonObject { ["results"] = results });
    }

    public static Ok<MeasureList> Catalogue() => TypedResults.Ok(new MeasureList(MeasureCatalogue.All));
}

/// <summary>Every measure with its parameters and outputs.</summary>
internal sealed record MeasureList(IReadOnlyList<MeasureDefinition> Items);
