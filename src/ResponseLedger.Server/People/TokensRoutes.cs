using System.Security.Claims;
using System.Text.Json.Nodes;
using FluentValidation;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using Npgsql;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>Bench tokens, for managers; auditors see them.</summary>
internal static class TokensRoutes
{
    private const int UsualDays = 365;
    private const int MostDays = 730;
    private const int LongestName = 200;

    private static readonly Dictionary<string, string> ScopeWords = new(StringComparer.Ordinal)
    {
        [Scopes.Runs] = Scopes.Runs,
        ["runs:write"] = Scopes.Runs,
        [Scopes.Read] = Scopes.Read,
        ["runs:read"] = Scopes.Read,
    };

    public static void Map(IEndpointRouteBuilder api)
    {
        var tokens = api.MapGroup("/tokens").WithTags("Tokens");
        tokens.MapGet("", ListAsync).RequireAuthorization(Policies.Oversee)
            .WithName("ListTokens").WithSummary("The bench tokens, in the order in which they were made; never their secrets.")
            .ProducesProblem(StatusCodes.Status422UnprocessableEntity);
        tokens.MapPost("", CreateAsync).Validated<NewToken>().RequireAuthorization(Policies.Manage)
            .WithName("CreateToken").WithSummary("Makes a bench token and tells it, once. Without a bench its first upload binds it to one.");
        tokens.MapDelete("/{id:guid}", RevokeAsync).RequireAuthorization(Policies.Manage)
            .WithName("RevokeToken").WithSummary("Ends a token at once.")
            .ProducesProblem(StatusCodes.Status404NotFound);
    }

    internal sealed record NewToken(string? Name, IReadOnlyList<string>? Scopes, string? Bench, int? ExpiresInDays);

    /// <summary>A token as it may be shown.</summary>
    internal record TokenShown(
        Guid Id, string Name, string Prefix, IReadOnlyList<string> Scopes, Guid? BenchId, string? Bench, DateTimeOffset CreatedAt, DateTimeOffset ExpiresAt, DateTimeOffset? RevokedAt);

    /// <summary>A token at its making, with its secret.</summary>
    internal sealed record TokenMade(
        Guid Id, string Name, string Prefix, IReadOnlyList<string> Scopes, Guid? BenchId, string? Bench, DateTimeOffset CreatedAt, DateTimeOffset ExpiresAt, string Token)
        : TokenShown(Id, Name, Prefix, Scopes, BenchId, Bench, CreatedAt, ExpiresAt, null);

    internal sealed class NewTokenValidator : AbstractValidator<NewToken>
    {
        public NewTokenValidator()
        {
            // It stands in the ledger beside what the token did.
            RuleFor(r => r.Name).IsName(LongestName);
            RuleFor(r => r.Bench).IsName().When(r => !string.IsNullOrEmpty(r.Bench));
            RuleFor(r => r.Scopes)
                .NotEmpty().WithMessage(KnownScopes)
                .Must(scopes => scopes is null || scopes.All(scope => scope is not null && ScopeWords.ContainsKey(scope))).WithMessage(KnownScopes);
            RuleFor(r => r.ExpiresInDays).InclusiveBetween(1, MostDays).WithMessage($"A token lives 1 to {MostDays} days.");
        }

        private static string KnownScopes => $"Scopes are {Scopes.Runs} (or runs:write), to send runs, and {Scopes.Read} (or runs:read), to read.";
    }

    private static async Task<Page<TokenShown>> ListAsync(ResponseLedgerContext db, string? cursor, int? limit, CancellationToken cancellationToken)
    {
        var take = Paging.Limit(limit);
        var after = Paging.Key<string>(cursor) is { } key ? Guid.TryParse(key, out var id) ? id : throw new RefusedException(new FieldRefused("cursor", "This cursor was not given by this list.")) : Guid.Empty;
        var rows = await (
            from token in db.BenchTokens.AsNoTracking()
            join binding in db.TokenBindings on token.Id equals binding.TokenId into bindings
            from binding in bindings.DefaultIfEmpty()
            join revocation in db.TokenRevocations on token.Id equals revocation.TokenId into revocations
            from revocation in revocations.DefaultIfEmpty()
            where token.Id > after
            orderby token.Id
            select new
            {
                token,
                BenchId = token.BenchId ?? (binding == null ? null : (Guid?)binding.BenchId),
                Bench = db.Benches.Where(b => b.Id == (token.BenchId ?? binding!.BenchId)).Select(b => b.Name).FirstOrDefault(),
                RevokedAt = revocation == null ? null : (DateTimeOffset?)revocation.At,
            }).Take(take + 1).ToListAsync(cancellationToken);
        return Paging.Cut(
            rows,
            take,
            row => new TokenShown(row.token.Id, row.token.Name, TokenSecret.Prefix(row.token.Id), row.token.Scopes, row.BenchId, row.Bench, row.token.At, row.token.ExpiresAt, row.RevokedAt),
            row => row.token.Id.ToString());
    }

    private static async Task<Created<TokenMade>> CreateAsync(
        NewToken request, ClaimsPrincipal user, ResponseLedgerContext db, ActRunner acts, CancellationToken cancellationToken)
    {
        string[] scopes = [.. request.Scopes!.Select(scope => ScopeWords[scope]).Distinct().Order(StringComparer.Ordinal)];
        var bench = await FindBenchAsync(db, request.Bench?.Trim(), cancellationToken);
        var made = await acts.RunAsync(CurrentActor.Of(user), async (act, ct) =>
        {
            var id = act.NewId();
            var (text, hash) = TokenSecret.Make(id);
            var token = new BenchToken
            {
                Id = id,
                Name = request.Name!.Trim(),
                BenchId = bench?.Id,
                Scopes = scopes,
                SecretHash = hash,
                ExpiresAt = act.At.AddDays(request.ExpiresInDays ?? UsualDays),
                At = act.At,
                ById = act.ById,
            };
            act.Db.BenchTokens.Add(token);
            act.Record(
                "token.created",
                new JsonObject { ["tokenId"] = id.ToString(), ["name"] = token.Name, ["benchId"] = bench?.Id.ToString() },
                new JsonObject { ["scopes"] = Accounts.Words(scopes), ["expiresAt"] = Ledger.Microseconds.Format(token.ExpiresAt) });
            await act.Db.SaveChangesAsync(ct);
            return new TokenMade(id, token.Name, TokenSecret.Prefix(id), scopes, bench?.Id, bench?.Name, token.At, token.ExpiresAt, text);
        }, cancellationToken);
        return TypedResults.Created($"/api/tokens/{made.Id}", made);
    }

    private static async Task<Bench?> FindBenchAsync(ResponseLedgerContext db, string? named, CancellationToken cancellationToken)
    {
        if (string.IsNullOrEmpty(named))
            return null;

        var byId = Guid.TryParse(named, out var id);
        return await db.Benches.AsNoTracking().FirstOrDefaultAsync(b => byId ? b.Id == id : b.Name == named, cancellationToken)
            ?? throw new RefusedException(new FieldRefused("bench", "There is no bench under this id or name. Make it first, or leave it out: the first upload binds the token."));
    }

    private static async Task<NoContent> RevokeAsync(Guid id, ClaimsPrincipal user, ResponseLedgerContext db, ActRunner acts, CancellationToken cancellationToken)
    {
        var name = await db.BenchTokens.Where(t => t.Id == id).Select(t => t.Name).SingleOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("token"));
        if (await db.TokenRevocations.AnyAsync(r => r.TokenId == id, cancellationToken))
            return TypedResults.NoContent();

        try
        {
            await acts.RunAsync(CurrentActor.Of(user), (act, _) =>
            {
                act.Db.TokenRevocations.Add(new TokenRevocation { TokenId = id, At = act.At, ById = act.ById });
                act.Record("token.revoked", new JsonObject { ["tokenId"] = id.ToString(), ["name"] = name }, []);
                return Task.FromResult(id);
            }, cancellationToken);
        }
        catch (DbUpdateException race) when (race.InnerException is PostgresException { SqlState: PostgresErrorCodes.UniqueViolation })
        {
            // Somebody else revoked it at the same moment; it is revoked.
        }

        return TypedResults.NoContent();
    }
}
