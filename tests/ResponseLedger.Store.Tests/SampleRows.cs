using System.Security.Cryptography;
using ResponseLedger.Store.Model;

namespace ResponseLedger.Store.Tests;

/// <summary>The rows that others hang on: a device with its condition, a bench, a lot, a unit.</summary>
internal sealed class SampleRows
{
    public static readonly DateTimeOffset At = new(2026, 3, 2, 9, 30, 0, TimeSpan.Zero);

    public Device Device { get; } = new() { Id = NewId(), PartNumber = "PRE-4", Revision = "A", Kind = "transfer", GainUnit = "V/V", At = At, ById = NewId() };
    public Condition Condition => field ??= new() { Id = NewId(), DeviceId = Device.Id, Ordinal = 0, Name = "standard", At = At, ById = NewId() };
    public Bench Bench { get; } = new() { Id = NewId(), Name = "Bench 1", At = At, ById = NewId() };
    public Lot Lot => field ??= new() { Id = NewId(), DeviceId = Device.Id, Number = "L1", Size = 24, At = At, ById = NewId() };
    public Unit Unit => field ??= NewUnit("0001");

    public static Guid NewId() => Guid.CreateVersion7(TimeProvider.System.GetUtcNow());

    public IEnumerable<object> All() => [Device, Condition, Bench, Lot, Unit];

    public Unit NewUnit(string serial) => new() { Id = NewId(), DeviceId = Device.Id, Serial = serial, At = At };

    public Run NewRun(string purpose, Guid? lotId, string content) => new()
    {
        Id = NewId(),
        DeviceId = Device.Id,
        UnitId = Unit.Id,
        LotId = lotId,
        BenchId = Bench.Id,
        Purpose = purpose,
        FilesDigest = SHA256.HashData(System.Text.Encoding.UTF8.GetBytes(content)),
        MeasuredAt = At,
        At = At,
    };
}
