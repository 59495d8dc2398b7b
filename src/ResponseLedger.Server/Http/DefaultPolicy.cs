using Microsoft.AspNetCore.Authorization;
using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Http;

/// <summary>Makes reading the least that a route of a group asks for.</summary>
internal static class DefaultPolicy
{
    /// <summary>Gives every route that names no policy of its own the policy <see cref="Policies.Read"/>. A plain requirement on the group would add to the routes' own instead of standing in for it.</summary>
    public static RouteGroupBuilder WithReadAsDefault(this RouteGroupBuilder group)
    {
        ((IEndpointConventionBuilder)group).Finally(endpoint =>
        {
            if (!endpoint.Metadata.Any(m => m is IAuthorizeData or IAllowAnonymous))
                endpoint.Metadata.Add(new AuthorizeAttribute(Policies.Read));
        });
        return group;
    }
}
