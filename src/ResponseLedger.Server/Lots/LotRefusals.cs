using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Lots;

internal sealed record LotExists(string Number)
    : Refusal(StatusCodes.Status409Conflict, "lotExists", $"The device has a lot \"{Number}\" already.");

internal sealed record NoGoldenRun(string Condition)
    : Refusal(StatusCodes.Status409Conflict, "noGoldenRun", $"There is no golden run in the condition \"{Condition}\" to compare with. Set one, or ask for basis=asMeasured.");
