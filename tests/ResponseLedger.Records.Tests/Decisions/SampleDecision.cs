using System.Globalization;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Records.Decisions;

namespace ResponseLedger.Records.Tests.Decisions;

/// <summary>A decision on a lot of two units in two conditions, with a retest, an invalidated run and a concession.</summary>
internal static class SampleDecision
{
    public static Guid Id(int number) => Guid.Parse($"01890a5d-ac96-774b-bcce-{number:x12}");

    public static byte[] Hash(char digit) => Convert.FromHexString(new string(digit, 64));

    public static DateTimeOffset Time(string text) => DateTimeOffset.Parse(text, CultureInfo.InvariantCulture);

    public static DecisionRecord Record { get; } = new(
        Id(1),
        new DecidedLot(Id(2), "L-0042", 2, 1),
        new DecidedDevice(Id(3), "AAF-10", "B", "transfer"),
        DecisionWord.ApproveWithConcession,
        "SN-2 is for the lab's own use.",
        new Signer(Id(4), "Ina Øst", "ina@lab.example"),
        "I have reviewed the evidence and release this lot.",
        Time("2026-03-01T10:30:00.1234567+01:00"),
        1,
        new DecisionRule("simpleAcceptance", "A value on the limit passes; at the limit the risk of a false decision is up to 50 %."),
        [
            new DecidedCondition(Id(0x10), "standard", new PinnedMask(Id(0x20), 1, Hash('c')), null),
            new DecidedCondition(Id(0x11), "gain 10", new PinnedMask(Id(0x21), 3, Hash('a')), new PinnedGolden(Id(0x31), Id(0x32), Hash('b'))),
        ],
        [
            new DecidedUnit(
                Id(0x40),
                "SN-2",
                Outcome.Fail,
                new UnitDisposition("concession", "0.1 dB is harmless here."),
                [Run(0x11, 4, 2, "2026-02-28T08:02:00Z", "2026-02-28T08:02:01Z", Outcome.Fail, new PinnedWorst("top", null, -0.1, "dB"), '4')],
                []),
            new DecidedUnit(
                Id(0x41),
                "SN-1",
                Outcome.Pass,
                null,
                [
                    Run(0x10, 0, 0, "2026-02-28T08:01:00Z", "2026-02-28T08:01:01Z", Outcome.Pass, null, '1'),
                    Run(0x11, 1, 1, "2026-02-28T08:00:00Z", "2026-02-28T08:00:01.5Z", Outcome.Pass, new PinnedWorst("top", 500, 0.25, "dB"), 'f', 'e'),
                ],
                [
                    new OtherRun(
                        Id(0x10), Id(0x53), OtherRunStanding.Retest, null, "An earlier run counts.", [Hash('3')],
                        Time("2026-02-28T09:00:00Z"), Time("2026-02-28T09:00:01Z")),
                    new OtherRun(
                        Id(0x10), Id(0x52), OtherRunStanding.Invalidated, "fixture", "The clip was loose.", [Hash('2')],
                        Time("2026-02-28T07:00:00Z"), Time("2026-02-28T07:00:01Z")),
                ]),
        ],
        new DecisionCounts(2, 1, 1, 1, 0, 0, 1),
        new Recommendation(null, "One unit does not pass."));

    private static CountingRun Run(
        int condition, int run, int reading, string measuredAt, string receivedAt, Outcome outcome, PinnedWorst? worst, params char[] files)
        => new(
            Id(condition), Id(0x50 + run), Id(0x60 + reading), Id(0x70 + reading), [.. files.Select(Hash)], outcome, worst,
            Time(measuredAt), Time(receivedAt));
}
