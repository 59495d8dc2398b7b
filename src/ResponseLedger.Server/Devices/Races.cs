using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Server.Http;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.Devices;

/// <summary>Two people at the same row at once: the loser hears the same refusal as one who came later.</summary>
internal static class Races
{
    /// <summary>Saves what the act has added so far; a unique key that is taken, or a row that changed meanwhile, becomes the refusal.</summary>
    public static async Task SaveOrRefuseAsync(this Act act, Func<Refusal> refusal, CancellationToken cancellationToken)
    {
        try
        {
            await act.Db.SaveChangesAsync(cancellationToken);
        }
        catch (DbUpdateException exception) when (exception is DbUpdateConcurrencyException
            || exception.InnerException is PostgresException { SqlState: PostgresErrorCodes.UniqueViolation })
        {
            throw new RefusedException(refusal());
        }
    }
}
