using System.Security.Cryptography;
using ResponseLedger.Formats;

namespace ResponseLedger.Store.Intake;

/// <summary>Where the files of one upload belong, and how they are to be read: ids that exist, words that are known.</summary>
/// <param name="DeviceId">The device.</param>
/// <param name="ConditionId">A condition of the device.</param>
/// <param name="ConditionName">Its name, for the ledger.</param>
/// <param name="LotId">A lot of the device; null only where the purpose needs none.</param>
/// <param name="LotNumber">Its number, for the ledger.</param>
/// <param name="BenchId">The bench.</param>
/// <param name="BenchName">Its name, for the ledger.</param>
/// <param name="Purpose">A word of <see cref="RunPurposes"/>.</param>
/// <param name="MeasuredAt">When it was measured; null for the time of receipt.</param>
/// <param name="Circumstances">JSON text, or null.</param>
/// <param name="Columns">The columns chosen, or null where the file or the bench's memory settles them.</param>
/// <param name="NoiseFloorDb">The bench's noise floor in dB, under which phase is absent; null for none.</param>
/// <param name="OtherUnitAcknowledged">Whether the same bytes for another unit of the lot are meant.</param>
public sealed record IntakeOrder(
    Guid DeviceId,
    Guid ConditionId,
    string ConditionName,
    Guid? LotId,
    string? LotNumber,
    Guid BenchId,
    string BenchName,
    string Purpose,
    DateTimeOffset? MeasuredAt = null,
    string? Circumstances = null,
    ColumnChoices? Columns = null,
    double? NoiseFloorDb = null,
    bool OtherUnitAcknowledged = false);

/// <summary>One file of an upload.</summary>
/// <param name="Name">Its own name, without folders.</param>
/// <param name="Serial">Serial number of the unit that it measured.</param>
/// <param name="Sha256">SHA-256 of its bytes, 32 bytes.</param>
/// <param name="Open">Gives the bytes; asked for once, when the file's turn comes.</param>
public sealed record IntakeFile(string Name, string Serial, byte[] Sha256, Func<CancellationToken, Task<byte[]>> Open)
{
    /// <summary>What the bytes were read as with the order's columns, where they were read before their turn; else null.</summary>
    public FileReading? Reading { get; init; }

    /// <summary>A file whose bytes are at hand.</summary>
    public static IntakeFile Of(string name, string serial, byte[] content)
        => new(name, serial, SHA256.HashData(content), _ => Task.FromResult(content));
}
