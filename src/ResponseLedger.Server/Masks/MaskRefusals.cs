using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Masks;

internal sealed record DraftExists(Guid DraftId, string Condition)
    : Refusal(StatusCodes.Status409Conflict, "draftExists", $"The condition \"{Condition}\" has the draft {DraftId} already. Go on with that one, release it, or discard it.");

internal sealed record MaskReleased(int Number)
    : Refusal(StatusCodes.Status409Conflict, "maskReleased", $"This mask was released as revision {Number} and never changes. Make a new draft from it.");

internal sealed record IfMatchMissing()
    : Refusal(StatusCodes.Status428PreconditionRequired, "ifMatchMissing", "Send the header If-Match with the ETag of the draft that was changed.");

internal sealed record DraftChanged(string ETag)
    : Refusal(StatusCodes.Status412PreconditionFailed, "draftChanged", $"Somebody else saved this draft meanwhile; its ETag is {ETag} now. Fetch it and apply the change again.");
