using System.Text.Json;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Formats;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Curves;

namespace ResponseLedger.Server.Runs;

/// <summary>A run's curve: null members where the run carries no phase; a null value where a level is -infinity or a phase is absent.</summary>
/// <param name="FrequencyHz">Frequencies in Hz.</param>
/// <param name="GainDb">Levels in dB.</param>
/// <param name="PhaseDeg">Unwrapped phase in degrees, the first in (-180, 180].</param>
/// <param name="Re">Real parts.</param>
/// <param name="Im">Imaginary parts.</param>
/// <param name="Notes">What to know of the curve.</param>
internal sealed record TraceView(
    double[] FrequencyHz, double?[] GainDb, double?[]? PhaseDeg, double?[]? Re, double?[]? Im, IReadOnlyList<ReadNote> Notes)
{
    /// <summary>The trace of a sweep, all of it or reduced to at most so many points.</summary>
    public static TraceView Of(Sweep sweep, int? points, IEnumerable<ReadNote> notes)
    {
        var kept = TraceReduction.Keep(sweep, points ?? sweep.Count);
        double[]? re = null, im = null;
        if (sweep.HasPhase)
        {
            (re, im) = (new double[sweep.Count], new double[sweep.Count]);
            sweep.GetComplex(re, im);
        }

        List<ReadNote> told = [.. notes];
        if (kept.Length < sweep.Count)
            told.Add(new ReadNote("reduced", $"{kept.Length} of {sweep.Count} points are shown: of each stretch of log frequency the least and the greatest level."));
        foreach (var step in sweep.SuspectSteps)
            told.Add(new ReadNote("suspectStep", FormattableString.Invariant($"From {step.FromHz:R} Hz to {step.ToHz:R} Hz the phase steps by {step.StepDeg:F1} degrees; whole turns beyond it are in doubt.")));
        return new TraceView(
            [.. Pick(sweep.FrequencyHz, kept)], Finite(sweep.GainDb, kept), sweep.HasPhase ? Finite(sweep.PhaseDeg, kept) : null,
            re is null ? null : Finite(re, kept), im is null ? null : Finite(im, kept), told);
    }

    private static double[] Pick(ReadOnlySpan<double> plane, int[] kept)
    {
        var values = new double[kept.Length];
        for (var i = 0; i < kept.Length; i++)
            values[i] = plane[kept[i]];
        return values;
    }

    private static double?[] Finite(ReadOnlySpan<double> plane, int[] kept)
    {
        var values = new double?[kept.Length];
        for (var i = 0; i < kept.Length; i++)
            values[i] = double.IsFinite(plane[kept[i]]) ? plane[kept[i]] : null;
        return values;
    }
}

/// <summary>GET /api/runs/{id}/trace.</summary>
internal static class RunTraces
{
    private const int FewestPoints = 2;

    public static async Task<Ok<TraceView>> GetAsync(Guid id, int? points, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        if (points < FewestPoints)
            throw new RefusedException(new FieldRefused("points", $"A trace has {FewestPoints} points or more."));
        var row = await (
            from reading in db.Readings.Where(r => r.RunId == id).OrderByDescending(r => r.Number).Take(1)
            join curve in db.Curves on reading.Id equals curve.ReadingId
            join grid in db.Grids on reading.GridSha256 equals grid.Sha256
            select new { reading.Form, reading.NoiseFloorDb, reading.Notes, Grid = grid.Planes, curve.Planes }).AsNoTracking().SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("run"));
        var sweep = CurveCodec.Unpack((SweepForm)row.Form, row.Grid, row.Planes, row.NoiseFloorDb);
        return TypedResults.Ok(TraceView.Of(sweep, points, JsonSerializer.Deserialize<ReadNote[]>(row.Notes, JsonSerializerOptions.Web)!));
    }
}
