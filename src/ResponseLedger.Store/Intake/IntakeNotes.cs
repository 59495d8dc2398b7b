using ResponseLedger.Formats;

namespace ResponseLedger.Store.Intake;

/// <summary>The notes and refusals of the intake itself; those about a file's content come from its reader.</summary>
public static class IntakeNotes
{
    /// <summary>Refusal: the lot was decided.</summary>
    public const string LotDecided = "lotDecided";

    /// <summary>Refusal: the same bytes were sent for another unit of the lot. Also the note, when that was acknowledged.</summary>
    public const string SameFileOtherUnit = "sameFileOtherUnit";

    /// <summary>Note: a first valid run of the unit in the condition stands already.</summary>
    public const string RetestDoesNotCount = "retestDoesNotCount";

    /// <summary>Note: the bench's remembered choice of columns was used.</summary>
    public const string ColumnsRemembered = "columnsRemembered";

    internal static ReadNote PlacedElsewhere { get; } = new(
        "reassigned",
        "These bytes were taken before; the run has since been reassigned to another unit, lot or condition.");

    internal static ReadNote Retest(Guid firstRunId, string condition) => new(
        RetestDoesNotCount,
        $"A run of this unit in the condition \"{condition}\" counts already ({firstRunId}); this one is kept as a retest. It can come to count only after an engineer has invalidated the earlier one.");

    internal static ReadNote Acknowledged(string otherSerial) => new(
        SameFileOtherUnit,
        $"The same bytes stand in this lot for unit {otherSerial}; they were taken because that was acknowledged.");

    internal static string OtherUnitSentence(string otherSerial)
        => $"The same bytes stand in this lot for unit {otherSerial}. Measure this unit, or send the file again with acknowledge={SameFileOtherUnit} if both are meant.";

    internal static string DecidedSentence(string lotNumber)
        => $"Lot {lotNumber} is decided and takes no runs. It must be reopened first.";

    internal static ReadNote Remembered(string benchName) => new(
        ColumnsRemembered,
        $"The columns were open; the choice that was made before on bench {benchName} for files with the same heads was used.");
}
