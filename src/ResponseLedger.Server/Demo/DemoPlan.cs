using ResponseLedger.Server.Demo.Circuits;

namespace ResponseLedger.Server.Demo;

/// <summary>
/// What the demo lab has: an invented maker of instrument buoys, its devices, masks and lots. Nothing here is real; people
/// are roles.
/// </summary>
internal static class DemoPlan
{
    public const string StandardCondition = "standard";
    public const string HighGainCondition = "gain 40 dB";

    public static readonly DemoBench Bay1 = new("Bay 1", FileDialect.CommaDecibels, 0.004);
    public static readonly DemoBench Bay2 = new("Bay 2", FileDialect.SemicolonGerman, 0.006);
    public static readonly DemoBench Bay3 = new("Bay 3", FileDialect.TwoChannels, 0.005);
    public static readonly DemoBench Bay4 = new("Bay 4", FileDialect.TabComplex, 0.01);

    public static IReadOnlyList<DemoDevice> Devices { get; } =
    [
        new("AAF-210", "B", "Anti-alias filter board, 10 kHz", "transfer",
            [new DemoCondition(StandardCondition, DemoMasks.AntiAliasBoard, DemoBench.Grid(100, 100_000, 241))],
            (parts, fault) => [AntiAliasBoard.Build(parts, fault)],
            [
                new("2641", 48, 48, 36, Bay1, DemoEnding.Approved),
                new("2643", 96, 96, 27, Bay1, DemoEnding.Open) { Faults = { [61] = Fault.WrongCapacitor } },
                new("2645", 96, 96, 12, Bay2, DemoEnding.Open),
                new("2647", 96, 58, 2, Bay1, DemoEnding.Open) { Faults = { [17] = Fault.WrongCapacitor, [40] = Fault.OpenJoint } },
            ]),
        new("HPA-32", "A", "Hydrophone preamplifier", "transfer",
            [
                new DemoCondition(StandardCondition, DemoMasks.PreamplifierStandard, DemoBench.Grid(1, 200_000, 213)),
                new DemoCondition(HighGainCondition, DemoMasks.PreamplifierHighGain, DemoBench.Grid(1, 200_000, 213)),
            ],
            HydrophonePreamplifier.Build,
            [
                new("1207", 24, 24, 33, Bay3, DemoEnding.ApprovedWithConcession) { Faults = { [9] = Fault.WrongCapacitor } },
                new("1209", 32, 32, 18, Bay3, DemoEnding.Open) { Faults = { [5] = Fault.InvertedLeads, [22] = Fault.OpenJoint } },
                new("1211", 24, 13, 4, Bay3, DemoEnding.Open),
            ]),
        new("SVL-07", "C", "Winch servo loop board", "loop",
            [new DemoCondition(StandardCondition, DemoMasks.ServoLoop, DemoBench.Grid(1, 1_000, 181))],
            (parts, fault) => [ServoLoop.Build(parts, fault)],
            [
                new("0318", 24, 24, 22, Bay4, DemoEnding.Open),
                new("0319", 36, 36, 6, Bay4, DemoEnding.Open) { DriftDbPerUnit = 0.026, Faults = { [30] = Fault.WrongCapacitor } },
            ]),
    ];
}

/// <summary>A device of the demo lab; <c>Build</c> draws a unit and gives its circuit in each condition.</summary>
internal sealed record DemoDevice(
    string PartNumber,
    string Revision,
    string Title,
    string Kind,
    IReadOnlyList<DemoCondition> Conditions,
    Func<Parts, Fault, IReadOnlyList<Circuit>> Build,
    IReadOnlyList<DemoLot> Lots);

/// <summary>A condition, its mask as JSON text, and the frequencies that are swept.</summary>
internal sealed record DemoCondition(string Name, string Mask, IReadOnlyList<double> FrequencyHz);

/// <summary>A lot of the demo lab.</summary>
/// <param name="Number">Lot number.</param>
/// <param name="Size">Units in the lot.</param>
/// <param name="Tested">How many were swept so far.</param>
/// <param name="DaysAgo">When the lot was begun.</param>
/// <param name="Bench">Where it is swept.</param>
/// <param name="Ending">What became of it.</param>
internal sealed record DemoLot(string Number, int Size, int Tested, int DaysAgo, DemoBench Bench, DemoEnding Ending)
{
    /// <summary>Faulty units by their place in the lot, from 1.</summary>
    public Dictionary<int, Fault> Faults { get; } = [];

    /// <summary>How much more the bench reads too high with each unit, in dB.</summary>
    public double DriftDbPerUnit { get; init; }
}

/// <summary>What became of a lot.</summary>
internal enum DemoEnding
{
    /// <summary>It waits, or is still being tested.</summary>
    Open,

    /// <summary>Every unit passed, and it was approved.</summary>
    Approved,

    /// <summary>Its failing units were accepted under a concession.</summary>
    ApprovedWithConcession,
}
