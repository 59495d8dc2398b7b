namespace ResponseLedger.Store.Queries;

/// <summary>Work for the processor while a question to the database is under way.</summary>
public static class WhileWaiting
{
    /// <summary>Does the work and gives both results. The question is waited for even where the work throws: a connection takes one thing at a time.</summary>
    /// <param name="underWay">The question, already sent.</param>
    /// <param name="work">The work; it must not use the connection.</param>
    public static async Task<(TAnswer Answer, TWork Work)> DoAsync<TAnswer, TWork>(Task<TAnswer> underWay, Func<TWork> work)
    {
        ArgumentNullException.ThrowIfNull(underWay);
        ArgumentNullException.ThrowIfNull(work);
        TWork done;
        try
        {
            done = work();
        }
        finally
        {
            await ((Task)underWay).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }

        return (await underWay, done);
    }
}
