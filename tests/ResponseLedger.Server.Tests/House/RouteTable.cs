namespace ResponseLedger.Server.Tests.House;

/// <summary>Who may call which route, as the contract says it. A route that is not here fails the walk: whoever adds one writes down first who may call it.</summary>
internal static class RouteTable
{
    public const string Anyone = "anyone";

    /// <summary>The callers of the walk; "nobody" has no session, "none" a session without a role, "token:x" is a bench token with the scope x.</summary>
    public static readonly string[] Callers = ["nobody", "none", "operator", "engineer", "quality", "manager", "auditor", "token:runs", "token:read"];

    /// <summary>The callers that each policy lets in.</summary>
    public static readonly Dictionary<string, string[]> Admits = new()
    {
        [Anyone] = Callers,
        ["read"] = ["operator", "engineer", "quality", "manager", "auditor", "token:read"],
        ["person"] = ["none", "operator", "engineer", "quality", "manager", "auditor"],
        ["sendRuns"] = ["operator", "engineer", "quality", "manager", "token:runs"],
        ["operate"] = ["operator", "engineer", "quality", "manager"],
        ["engineer"] = ["engineer", "manager"],
        ["sign"] = ["engineer", "quality", "manager"],
        ["quality"] = ["quality", "manager"],
        ["oversee"] = ["manager", "auditor"],
        ["manage"] = ["manager"],
    };

    /// <summary>The policy of each route.</summary>
    public static readonly Dictionary<string, string> Policies = new()
    {
        ["GET /"] = Anyone,
        ["GET /openapi/{documentName}.json"] = Anyone,
        ["GET /health/live"] = Anyone,
        ["GET /health/ready"] = Anyone,
        ["GET /api/about"] = Anyone,
        ["POST /api/session"] = Anyone,
        ["GET /api/session"] = "person",
        ["DELETE /api/session"] = "person",
        ["POST /api/session/password"] = "person",
        ["GET /api/people"] = "oversee",
        ["POST /api/people"] = "manage",
        ["PATCH /api/people/{id}"] = "manage",
        ["GET /api/tokens"] = "oversee",
        ["POST /api/tokens"] = "manage",
        ["DELETE /api/tokens/{id}"] = "manage",
        ["GET /api/devices"] = "read",
        ["POST /api/devices"] = "engineer",
        ["GET /api/devices/{id}"] = "read",
        ["PATCH /api/devices/{id}"] = "sign",
        ["GET /api/devices/{id}/conditions"] = "read",
        ["POST /api/devices/{id}/conditions"] = "engineer",
        ["GET /api/devices/{id}/masks"] = "read",
        ["POST /api/devices/{id}/masks"] = "engineer",
        ["GET /api/devices/{id}/golden"] = "read",
        ["PUT /api/devices/{id}/golden"] = "engineer",
        ["GET /api/masks/{id}"] = "read",
        ["PUT /api/masks/{id}"] = "engineer",
        ["DELETE /api/masks/{id}"] = "engineer",
        ["GET /api/reevaluation"] = "read",
        ["POST /api/masks/{id}/release"] = "engineer",
        ["GET /api/benches"] = "read",
        ["POST /api/benches"] = "manage",
        ["GET /api/benches/{id}"] = "read",
        ["PATCH /api/benches/{id}"] = "engineer",
        ["POST /api/benches/{id}/serials"] = "operate",
        ["GET /api/lots"] = "read",
        ["POST /api/lots"] = "operate",
        ["GET /api/lots/{id}"] = "read",
        ["GET /api/lots/{id}/units"] = "read",
        ["GET /api/lots/{id}/statistics"] = "read",
        ["GET /api/lots/{id}/overlay"] = "read",
        ["POST /api/lots/{id}/units/{unitId}/disposition"] = "sign",
        ["POST /api/lots/{id}/decisions"] = "sign",
        ["GET /api/lots/{id}/signing"] = "sign",
        ["GET /api/lots/{id}/decisions"] = "read",
        ["GET /api/decisions/{id}"] = "read",
        ["GET /api/decisions/{id}/record"] = "read",
        ["POST /api/lots/{id}/reopenings"] = "quality",
        ["POST /api/runs"] = "sendRuns",
        ["GET /api/runs"] = "read",
        ["GET /api/runs/{id}"] = "read",
        ["GET /api/runs/{id}/trace"] = "read",
        ["GET /api/runs/{id}/overlay"] = "read",
        ["GET /api/runs/{id}/file"] = "read",
        ["GET /api/runs/{id}/export"] = "read",
        ["GET /api/measures"] = "read",
        ["GET /api/runs/{id}/verdict"] = "read",
        ["POST /api/runs/{id}/measures"] = "read",
        ["POST /api/runs/{id}/invalidation"] = "engineer",
        ["POST /api/runs/{id}/reassignment"] = "engineer",
        ["POST /api/runs/preview"] = "operate",
        ["GET /api/ledger/entries"] = "read",
    };
}
