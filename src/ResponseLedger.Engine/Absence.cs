namespace ResponseLedger.Engine;

/// <summary>Why a value is absent, or why a criterion could not be decided: a stable code for programs, a sentence for people.</summary>
/// <param name="Code">A stable camelCase word, such as <c>notReached</c> or <c>phaseAbsent</c>; see <see cref="AbsenceCode"/>.</param>
/// <param name="Sentence">What happened and, where there is one, the remedy; with numbers and units.</param>
public sealed record Absence(string Code, string Sentence);

/// <summary>The stable codes of <see cref="Absence"/>: reasons first, then remarks that travel beside a value.</summary>
public static class AbsenceCode
{
    /// <summary>A cutoff or level is not reached inside the sweep.</summary>
    public const string NotReached = "notReached";

    /// <summary>A stated frequency, band or aperture leaves the sweep.</summary>
    public const string OutsideSweep = "outsideSweep";

    /// <summary>The run carries no phase, or none there.</summary>
    public const string PhaseAbsent = "phaseAbsent";

    /// <summary>The loop has no crossover of the kind asked for inside the sweep.</summary>
    public const string NoCrossover = "noCrossover";

    /// <summary>A gain of exactly zero leaves no finite value.</summary>
    public const string ZeroGain = "zeroGain";

    /// <summary>No golden run is set.</summary>
    public const string NoGoldenRun = "noGoldenRun";

    /// <summary>Points of the run lie too far apart for the limit.</summary>
    public const string GapTooLarge = "gapTooLarge";

    /// <summary>The run, or the golden run, does not span the limit.</summary>
    public const string SpanTooShort = "spanTooShort";

    /// <summary>The level at the edge of the reference band is already under the cutoff: the crossing lies inside the band.</summary>
    public const string CrossingInsideBand = "crossingInsideBand";

    /// <summary>The value exceeds what a double holds.</summary>
    public const string NotFinite = "notFinite";

    /// <summary>Remark: a phase step over 120 degrees lies in the span of the result.</summary>
    public const string SuspectPhase = "suspectPhase";

    /// <summary>Remark: over which frequencies a delay was taken.</summary>
    public const string Aperture = "aperture";

    /// <summary>Remark: the highest level lies at the end of the sweep or of the band.</summary>
    public const string PeakAtEdge = "peakAtEdge";
}
