namespace ResponseLedger.Server.People;

/// <summary>The roles, and which of them a policy asks for. A manager holds operator, engineer and quality too; an auditor only reads.</summary>
internal static class Roles
{
    public const string Operator = "operator";
    public const string Engineer = "engineer";
    public const string Quality = "quality";
    public const string Manager = "manager";
    public const string Auditor = "auditor";

    public static IReadOnlyList<string> All { get; } = [Operator, Engineer, Quality, Manager, Auditor];
}

/// <summary>Policies by what they let one do; set once on a route group or route.</summary>
internal static class Policies
{
    /// <summary>Every person who has a role, and bench tokens with the scope <c>read</c>.</summary>
    public const string Read = "read";

    /// <summary>Every signed-in person; no token. For the account itself.</summary>
    public const string Person = "person";

    /// <summary>Send runs and open lots: operator, engineer, quality, and bench tokens with the scope <c>runs</c>.</summary>
    public const string SendRuns = "sendRuns";

    /// <summary>Open lots, look at files before they are sent: operator, engineer, quality; no token.</summary>
    public const string Operate = "operate";

    /// <summary>Devices, masks, golden unit, invalidation, reassignment: engineer.</summary>
    public const string Engineer = "engineer";

    /// <summary>Sign a lot, disposition units: engineer or quality.</summary>
    public const string Sign = "sign";

    /// <summary>Reopen a decided lot: quality.</summary>
    public const string Quality = "quality";

    /// <summary>See people and tokens: manager, and auditor, who reads everything.</summary>
    public const string Oversee = "oversee";

    /// <summary>People, tokens, benches: manager.</summary>
    public const string Manage = "manage";
}

/// <summary>What a bench token may be allowed.</summary>
internal static class Scopes
{
    /// <summary>Send runs.</summary>
    public const string Runs = "runs";

    /// <summary>Read what a signed-in auditor may read.</summary>
    public const string Read = "read";

    public static IReadOnlyList<string> All { get; } = [Runs, Read];
}
