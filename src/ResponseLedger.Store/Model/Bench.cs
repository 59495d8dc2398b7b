namespace ResponseLedger.Store.Model;

/// <summary>A test bench.</summary>
public sealed class Bench : IFact
{
    public required Guid Id { get; init; }
    public required string Name { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>What may change of a bench; the highest number is in force.</summary>
public sealed class BenchSetting : IFact
{
    public required Guid Id { get; init; }
    public required Guid BenchId { get; init; }
    public required int Number { get; init; }

    /// <summary>Regular expression whose group "serial" (or whole match) finds the serial number in a file's name.</summary>
    public string? SerialPattern { get; init; }

    /// <summary>Level in dB under which phase is not to be believed.</summary>
    public double? NoiseFloorDb { get; init; }

    /// <summary>Free remark: place, instruments, calibration.</summary>
    public string? Remark { get; init; }

    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A bench's stated uncertainty U(f) and k, as a document; the highest number is in force.</summary>
public sealed class BenchUncertainty : IFact
{
    public required Guid Id { get; init; }
    public required Guid BenchId { get; init; }
    public required int Number { get; init; }
    public required string Document { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>The columns that somebody chose for files with these heads on this bench; the newest is in force.</summary>
public sealed class BenchColumns : IFact
{
    public required Guid Id { get; init; }
    public required Guid BenchId { get; init; }
    public required string HeadsDigest { get; init; }
    public required string Choices { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>A bearer token of a bench. Only a hash of its secret is kept.</summary>
public sealed class BenchToken : IFact
{
    public required Guid Id { get; init; }
    public required string Name { get; init; }

    /// <summary>The bench it is bound to from the start, or null: then its first upload binds it.</summary>
    public Guid? BenchId { get; init; }

    public required string[] Scopes { get; init; }
    public required byte[] SecretHash { get; init; }
    public required DateTimeOffset ExpiresAt { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}

/// <summary>The bench that a token was bound to by its first upload.</summary>
public sealed class TokenBinding : IFact
{
    public required Guid TokenId { get; init; }
    public required Guid BenchId { get; init; }
    public required DateTimeOffset At { get; init; }
}

/// <summary>The end of a token.</summary>
public sealed class TokenRevocation : IFact
{
    public required Guid TokenId { get; init; }
    public required DateTimeOffset At { get; init; }
    public required Guid ById { get; init; }
}
