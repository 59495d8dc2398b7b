using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.Authentication.Cookies;
using Microsoft.AspNetCore.Authorization;
using Microsoft.AspNetCore.DataProtection;
using Microsoft.AspNetCore.Identity;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Server.People;

/// <summary>Registers accounts, the session cookie, bench tokens, policies and rate limits.</summary>
internal static class PeopleServices
{
    /// <summary>The session cookie's name; no __Host- prefix, which browsers refuse on plain http.</summary>
    public const string CookieName = "responseledger";

    /// <summary>How long a session lasts: a working day, whether or not it is used.</summary>
    public static readonly TimeSpan SessionLength = TimeSpan.FromHours(8);

    /// <summary>How soon a changed password, changed roles or a disabled account end or change a session.</summary>
    public static readonly TimeSpan StampInterval = TimeSpan.FromMinutes(1);

    /// <summary>Rounds of PBKDF2 with HMAC-SHA-512; at least 210,000 (OWASP Password Storage).</summary>
    public const int HashIterations = 210_000;

    private const string AnyScheme = "cookieOrBearer";

    public static void Add(IServiceCollection services, IConfiguration configuration)
    {
        services.AddIdentityCore<Person>(options => options.ClaimsIdentity.UserNameClaimType = System.Security.Claims.ClaimTypes.Name)
            .AddRoles<IdentityRole<Guid>>()
            .AddEntityFrameworkStores<ResponseLedgerContext>()
            .AddSignInManager()
            .AddClaimsPrincipalFactory<PersonClaims>();
        services.AddScoped<ISecurityStampValidator, SessionStamp>();
        services.Configure<PasswordHasherOptions>(options => options.IterationCount = HashIterations);
        services.AddSingleton<IPasswordHasher<Person>, PasswordHasher<Person>>();
        services.Configure<SecurityStampValidatorOptions>(options => options.ValidationInterval = StampInterval);
        services.AddSingleton<PasswordRules>();
        services.AddSingleton<PasswordCheck>();
        services.AddSingleton<PasswordAsked>();
        services.AddSingleton<EndedSessions>();
        services.AddSingleton<FirstPeople>();
        services.AddSingleton<Accounts>();

        AddSchemes(services);
        AddPolicies(services);
        RateLimits.Add(services, configuration);
        services.AddDataProtection().SetApplicationName("ResponseLedger").PersistKeysToDbContext<ResponseLedgerContext>();

        // The framework would load the key ring before the server listens, when the first start has no table for it yet.
        services.Remove(services.Single(service => service.ImplementationType?.Name == "DataProtectionHostedService"));
    }

    private static void AddSchemes(IServiceCollection services)
    {
        services.AddAuthentication(AnyScheme)
            .AddPolicyScheme(AnyScheme, null, options => options.ForwardDefaultSelector =
                http => RequestGuard.IsByBearer(http.Request) ? TokenScheme.Name : IdentityConstants.ApplicationScheme)
            .AddScheme<AuthenticationSchemeOptions, TokenScheme>(TokenScheme.Name, null)
            .AddCookie(IdentityConstants.ApplicationScheme, options =>
            {
                options.Cookie.Name = CookieName;
                options.Cookie.HttpOnly = true;

                // Strict costs nothing here: a link from elsewhere opens the shell page, and the shell's own requests are same-site.
                options.Cookie.SameSite = SameSiteMode.Strict;
                options.Cookie.SecurePolicy = CookieSecurePolicy.SameAsRequest;
                options.ExpireTimeSpan = SessionLength;
                options.SlidingExpiration = false;
                options.Events.OnValidatePrincipal = EndedSessions.ValidateAsync;
            });
        services.AddOptions<CookieAuthenticationOptions>(IdentityConstants.ApplicationScheme)
            .Configure<TimeProvider>((options, time) => options.TimeProvider = time);
        services.AddOptions<SecurityStampValidatorOptions>().Configure<TimeProvider>((options, time) => options.TimeProvider = time);
        services.AddSingleton<IAuthorizationMiddlewareResultHandler, NoEntry>();
    }

    private static void AddPolicies(IServiceCollection services)
    {
        services.AddAuthorizationBuilder()
            .AddPolicy(Policies.Read, policy => policy.RequireAssertion(c => Settled(c) && (Holds(c, [.. Roles.All]) || Has(c, Scopes.Read))))
            .AddPolicy(Policies.Person, policy => policy.RequireAssertion(IsPerson))
            .AddPolicy(Policies.SendRuns, policy => policy.RequireAssertion(c => Settled(c) && (Has(c, Scopes.Runs) || Holds(c, Roles.Operator, Roles.Engineer, Roles.Quality))))
            .AddPolicy(Policies.Operate, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Operator, Roles.Engineer, Roles.Quality)))
            .AddPolicy(Policies.Engineer, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Engineer)))
            .AddPolicy(Policies.Sign, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Engineer, Roles.Quality)))
            .AddPolicy(Policies.Quality, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Quality)))
            .AddPolicy(Policies.Oversee, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Manager, Roles.Auditor)))
            .AddPolicy(Policies.Manage, policy => policy.RequireAssertion(c => Settled(c) && Holds(c, Roles.Manager)));
    }

    private static bool IsPerson(AuthorizationHandlerContext context)
        => context.User.Identity is { IsAuthenticated: true } && CurrentActor.TokenId(context.User) is null;

    private static bool Has(AuthorizationHandlerContext context, string scope) => context.User.HasClaim(CurrentActor.ScopeClaim, scope);

    private static bool Holds(AuthorizationHandlerContext context, params ReadOnlySpan<string> roles)
        => IsPerson(context) && CurrentActor.Holds(context.User, roles);

    private static bool Settled(AuthorizationHandlerContext context) => !context.User.HasClaim(PersonClaims.MustChangePassword, "true");
}
