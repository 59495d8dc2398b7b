using System.Collections.Concurrent;
using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.Identity;

namespace ResponseLedger.Server.People;

/// <summary>Sessions that were signed out before their time: their cookie, should somebody have kept a copy, is worth nothing on this server.</summary>
internal sealed class EndedSessions(TimeProvider time)
{
    /// <summary>The name under which a session's id stands in its ticket.</summary>
    public const string IdProperty = "session";

    private readonly ConcurrentDictionary<string, DateTimeOffset> ended = new();

    /// <summary>Ends a session.</summary>
    public void End(string id)
    {
        var now = time.GetUtcNow();
        foreach (var (old, until) in ended)
        {
            if (until < now)
                ended.TryRemove(old, out _);
        }

        ended[id] = now + PeopleServices.SessionLength;
    }

    /// <summary>Refuses the cookie of an ended session; for others asks the store once a minute whether the account still stands as it did.</summary>
    public static Task ValidateAsync(CookieValidatePrincipalContext context)
    {
        var sessions = context.HttpContext.RequestServices.GetRequiredService<EndedSessions>();
        if (!context.Properties.Items.TryGetValue(IdProperty, out var id) || id is null || sessions.ended.ContainsKey(id))
        {
            context.RejectPrincipal();
            return Task.CompletedTask;
        }

        return SecurityStampValidator.ValidatePrincipalAsync(context);
    }
}
