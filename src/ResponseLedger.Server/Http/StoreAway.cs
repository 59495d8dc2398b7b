using Microsoft.EntityFrameworkCore.Storage;
using Npgsql;

namespace ResponseLedger.Server.Http;

/// <summary>The database did not answer for longer than a request waits, as while it starts again after a crash.</summary>
internal sealed record StoreAway() : Refusal(
    StatusCodes.Status503ServiceUnavailable,
    "storeAway",
    "The database does not answer at the moment. Whether this request was done is not known; send it again in a moment: a file that was taken is answered as a duplicate.")
{
    /// <summary>When to come again, as the header says it.</summary>
    public const string RetryAfterSeconds = "2";

    /// <summary>Whether an exception comes from the database being away or too busy, so that the same request may go through later.</summary>
    public static bool Caused(Exception exception)
    {
        for (var cause = exception; cause is not null; cause = cause.InnerException)
        {
            if (cause is RetryLimitExceededException or NpgsqlException { IsTransient: true } or TimeoutException)
                return true;
        }

        return false;
    }
}
