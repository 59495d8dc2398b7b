namespace ResponseLedger.Server.Http;

/// <summary>
/// An expected "no": what stands against the request, told so that the sender can go on. Each is a one-line record beside
/// its feature; <see cref="RefusalMapping"/> is the one place that turns them into problem details.
/// </summary>
/// <param name="Status">HTTP status.</param>
/// <param name="Code">A stable camelCase word for programs.</param>
/// <param name="Sentence">What stands against it and the way on.</param>
internal abstract record Refusal(int Status, string Code, string Sentence)
{
    /// <summary>Problems by field, for 422; keys in the notation of the request, such as <c>limits[0].name</c>.</summary>
    public IReadOnlyDictionary<string, string[]> Errors { get; init; } = new Dictionary<string, string[]>();

    /// <summary>A finer word beside the code, told as the member <c>reason</c>; null where the code says it all.</summary>
    public string? Reason { get; init; }
}

/// <summary>There is nothing under that id.</summary>
internal sealed record NothingThere(string What) : Refusal(StatusCodes.Status404NotFound, "notFound", $"There is no {What} under this id.");

/// <summary>The request is understood, and a field of it cannot stand.</summary>
internal sealed record FieldRefused : Refusal
{
    public FieldRefused(string field, string sentence)
        : base(StatusCodes.Status422UnprocessableEntity, "invalid", sentence) => Errors = new Dictionary<string, string[]> { [field] = [sentence] };

    public FieldRefused(IReadOnlyDictionary<string, string[]> errors)
        : base(StatusCodes.Status422UnprocessableEntity, "invalid", "Some fields cannot stand as they are; each is named with the way to mend it.") => Errors = errors;
}

/// <summary>The server failed: no expected "no", and it stands in the log.</summary>
internal sealed record Fault()
    : Refusal(StatusCodes.Status500InternalServerError, "fault", "The server failed, and its log tells how. Look whether the request was done, and send it again if not.");

/// <summary>The body is larger than its address takes.</summary>
internal sealed record TooLarge(bool HoldsFiles) : Refusal(
    StatusCodes.Status413PayloadTooLarge,
    "tooLarge",
    HoldsFiles
        ? $"The request is larger than {RequestGuard.UploadBodyBytes >> 20} MiB, the most that this server takes at once. Send fewer files at once."
        : $"The body is larger than {RequestGuard.UsualBodyBytes >> 20} MiB, the most that this address takes.");

/// <summary>The signed-in person's roles do not reach, for a reason that the route alone does not tell.</summary>
internal sealed record NotAllowed(string Why) : Refusal(StatusCodes.Status403Forbidden, "notAllowed", Why);

/// <summary>Carries a refusal out of an act, which rolls its transaction back.</summary>
internal sealed class RefusedException(Refusal refusal) : Exception(refusal.Sentence)
{
    public Refusal Refusal { get; } = refusal;
}
