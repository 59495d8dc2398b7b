using ResponseLedger.Records.Verdicts;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Judging;

/// <summary>Makes verdict rows out of judgements.</summary>
public static class VerdictRows
{
    /// <summary>The row of what a reading came to on a basis.</summary>
    public static Verdict Of(Act act, Guid readingId, Guid basisId, Judgement judgement)
    {
        ArgumentNullException.ThrowIfNull(act);
        ArgumentNullException.ThrowIfNull(judgement);
        var stored = judgement.Stored;
        return new Verdict
        {
            Id = act.NewId(),
            ReadingId = readingId,
            BasisId = basisId,
            Outcome = (short)stored.Outcome,
            WorstIndex = (short?)stored.WorstIndex,
            Margins = stored.Margins,
            Outcomes = stored.Outcomes,
            FrequenciesHz = stored.FrequenciesHz,
            Reasons = [.. judgement.Evaluation.Criteria.Select(c => c.Reason?.Code)],
            At = act.At,
        };
    }
}
