using ResponseLedger.Engine.Sweeps;
using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Curves;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Store.Intake;

/// <summary>What the processor makes of a sweep for its rows: the verdict and the packed planes. It depends on nothing that an act reads, so it is made once however often the act is tried.</summary>
/// <param name="Judged">What the run came to; null where there is no basis.</param>
/// <param name="Verdict">The verdict's row; null where there is none.</param>
/// <param name="Grid">The packed frequencies.</param>
/// <param name="GridKey">Their SHA-256.</param>
/// <param name="Planes">The packed planes.</param>
internal sealed record IntakeWork(IntakeVerdict? Judged, StoredVerdictRow? Verdict, byte[] Grid, byte[] GridKey, byte[] Planes)
{
    public static IntakeWork Of(Sweep sweep, CurrentBasis? current, JudgementBasis? basis)
    {
        var judged = basis is null ? null : new IntakeVerdict(Judge.Evaluate(sweep, basis), basis);
        var verdict = judged is null ? null : new StoredVerdictRow(current!.BasisId, judged.Judgement);
        var grid = CurveCodec.PackGrid(sweep);
        return new IntakeWork(judged, verdict, grid, CurveCodec.GridKey(grid), CurveCodec.PackPlanes(sweep));
    }
}
