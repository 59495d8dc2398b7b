using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Runs;

internal sealed record NotMultipart()
    : Refusal(StatusCodes.Status415UnsupportedMediaType, "notMultipart", "Send the files as multipart/form-data, each in a part named file.");

internal sealed record TokenOfAnotherBench(string Bench)
    : Refusal(StatusCodes.Status403Forbidden, "tokenOfAnotherBench", $"This token is bound to bench {Bench} and sends for no other.");

internal sealed record LotIsDecided(string Lot)
    : Refusal(StatusCodes.Status409Conflict, "lotDecided", $"Lot {Lot} is decided; nothing under the decision changes. It must be reopened first.");

internal sealed record AlreadyInvalidated()
    : Refusal(StatusCodes.Status409Conflict, "alreadyInvalidated", "The run is invalidated already, with its cause; that stands.");

internal sealed record RunIsGolden(string Condition)
    : Refusal(StatusCodes.Status409Conflict, "goldenInForce", $"This is the golden run of the condition \"{Condition}\", and runs are judged by it. Set another golden run first, then change this one.");

internal sealed record NothingChanges()
    : Refusal(StatusCodes.Status409Conflict, "nothingChanges", "The run stands at this unit, lot and condition already.");

internal sealed record SameFilesThere(Guid RunId)
    : Refusal(StatusCodes.Status409Conflict, "sameFilesThere", $"The same files stand there already as run {RunId}. Invalidate this run instead, with its cause.");

internal sealed record NotWritable(string Word, string Why)
    : Refusal(StatusCodes.Status409Conflict, Word, Why);
