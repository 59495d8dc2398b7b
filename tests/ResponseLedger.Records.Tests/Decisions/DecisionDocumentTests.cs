using System.Text;
using System.Text.Json;
using ResponseLedger.Engine.Masks;
using ResponseLedger.Ledger;
using ResponseLedger.Records.Decisions;

namespace ResponseLedger.Records.Tests.Decisions;

public sealed class DecisionDocumentTests
{
    private static readonly DecisionRecord Record = SampleDecision.Record;

    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true };

    [Fact]
    public void The_bytes_and_the_digest_of_a_decision_are_exactly_these()
    {
        var document = DecisionDocument.Create(Record);
        Assert.Equal(SampleDecisionBytes.Text, Encoding.UTF8.GetString(document.ToCanonicalBytes()));
        Assert.Equal(SampleDecisionBytes.Sha256, Convert.ToHexStringLower(document.Sha256.Span));
    }

    [Fact]
    public void A_decision_reads_back_from_its_bytes_with_the_same_digest()
    {
        var document = DecisionDocument.Create(Record);
        Assert.True(DecisionDocument.TryParse(document.ToCanonicalBytes(), out var back, out var problems), string.Join("; ", problems));
        Assert.Equal(document.Sha256.ToArray(), back.Sha256.ToArray());
        Assert.Equal(document.ToCanonicalBytes(), DecisionDocument.Create(back.Record).ToCanonicalBytes());
        Assert.Equal(CanonicalJson.Digest(document.ToCanonicalBytes()), back.Sha256.ToArray());
    }

    [Fact]
    public void What_is_read_back_is_what_was_said()
    {
        var record = DecisionDocument.Create(Record).Record;
        Assert.Equal((Record.DecisionId, Record.Lot, Record.Device, Record.Decision), (record.DecisionId, record.Lot, record.Device, record.Decision));
        Assert.Equal((Record.Reason, Record.Signer, Record.Meaning, Record.Rule), (record.Reason, record.Signer, record.Meaning, record.Rule));
        Assert.Equal((Record.EngineVersion, Record.Counts, Record.Recommendation), (record.EngineVersion, record.Counts, record.Recommendation));
        Assert.Equal(Microseconds.Cut(Record.SignedAt), record.SignedAt);
        Assert.Equal(["gain 10", "standard"], record.Conditions.Select(c => c.Name));
        Assert.Equal(["SN-1", "SN-2"], record.Units.Select(u => u.Serial));
        Assert.Null(record.Conditions[1].Golden);
        Assert.Equal(SampleDecision.Hash('b'), record.Conditions[0].Golden!.FilesSha256);
        Assert.Equal(new PinnedWorst("top", null, -0.1, "dB"), record.Units[1].Runs[0].Worst);
        Assert.Equal([OtherRunStanding.Invalidated, OtherRunStanding.Retest], record.Units[0].OtherRuns.Select(r => r.Standing));
    }

    [Fact]
    public void Whatever_order_the_parts_come_in_the_bytes_are_the_same()
    {
        var random = new Random(9162);
        var bytes = DecisionDocument.Create(Record).ToCanonicalBytes();
        for (var round = 0; round < 100; round++)
        {
            var shuffled = Record with
            {
                Conditions = Shuffled(random, Record.Conditions),
                Units = Shuffled(
                    random,
                    [.. Record.Units.Select(u => u with { Runs = Shuffled(random, u.Runs), OtherRuns = Shuffled(random, u.OtherRuns) })]),
            };
            Assert.Equal(bytes, DecisionDocument.Create(shuffled).ToCanonicalBytes());
        }
    }

    [Fact]
    public void The_order_of_a_run_s_files_is_kept()
    {
        var turned = WithUnit(0x41, u => u with { Runs = [.. u.Runs.Select(r => r with { FilesSha256 = [.. r.FilesSha256.Reverse()] })] });
        Assert.NotEqual(DecisionDocument.Create(Record).Sha256.ToArray(), DecisionDocument.Create(turned).Sha256.ToArray());
    }

    [Fact]
    public void Every_single_bit_of_the_bytes_matters()
    {
        var bytes = DecisionDocument.Create(Record).ToCanonicalBytes();
        var digest = CanonicalJson.Digest(bytes);
        for (var i = 0; i < bytes.Length; i++)
        {
            var turned = bytes.ToArray();
            turned[i] ^= (byte)(1 << (i % 8));

            // A turned letter of a text is still a document, but never the one whose digest was signed.
            if (DecisionDocument.TryParse(turned, out var document, out var problems))
                Assert.NotEqual(digest, document.Sha256.ToArray());
            else
                Assert.NotEmpty(problems);
        }
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.NegativeInfinity)]
    public void A_number_that_is_not_finite_is_never_signed(double number)
    {
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(WithWorst(new PinnedWorst("top", number, 0.1, "dB"))));
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(WithWorst(new PinnedWorst("top", 500, number, "dB"))));
    }

    [Fact]
    public void A_text_with_half_a_surrogate_pair_is_never_signed()
        => Assert.Throws<ArgumentException>(() => DecisionDocument.Create(Record with { Reason = "\ud83d" }));

    [Fact]
    public void The_record_that_was_made_has_no_way_back_into_the_bytes()
    {
        var document = DecisionDocument.Create(Record);
        document.ToCanonicalBytes()[0] = 0;
        Assert.Equal((byte)'{', document.ToCanonicalBytes()[0]);
    }

    /// <summary>Each case puts a value in place of one member of the bytes, canonical but for that, and says at which path the problem stands.</summary>
    [Theory]
    [InlineData("format", "\"responseledger.decision/2\"", "format")]
    [InlineData("decisionId", "\"1\"", "decisionId")]
    [InlineData("lot", "null", "lot")]
    [InlineData("lot.size", "2.5", "lot.size")]
    [InlineData("lot.size", "1", "units")]
    [InlineData("lot.decisionOrdinal", "0", "lot.decisionOrdinal")]
    [InlineData("device.kind", "\"network\"", "device.kind")]
    [InlineData("decision", "\"approved\"", "decision")]
    [InlineData("decision", "\"approve\"", "units[1].disposition")]
    [InlineData("reason", "\"\"", "reason")]
    [InlineData("reason", "null", "reason")]
    [InlineData("signer.name", "\"\"", "signer.name")]
    [InlineData("signedAt", "\"2026-03-01T09:30:00Z\"", "signedAt")]
    [InlineData("engineVersion", "\"1\"", "engineVersion")]
    [InlineData("rule.risk", "0.5", "rule.risk")]
    [InlineData("conditions[0].maskSha256", "\"AA\"", "conditions[0].maskSha256")]
    [InlineData("conditions[0].maskRevision", "null", "conditions[0].maskRevision")]
    [InlineData("conditions[0].goldenReadingId", "null", "conditions[0].goldenReadingId")]
    [InlineData("conditions[1].name", "\"gain 10\"", "conditions[1].name")]
    [InlineData("units[0].outcome", "\"ok\"", "units[0].outcome")]
    [InlineData("units[1].outcome", "\"pass\"", "units[1].outcome")]
    [InlineData("units[1].serial", "\"SN-1\"", "units[1].serial")]
    [InlineData("units[1].disposition", "null", "units[1].disposition")]
    [InlineData("units[1].disposition.disposition", "\"keep\"", "units[1].disposition.disposition")]
    [InlineData("units[0].runs[0].files[1]", "7", "units[0].runs[0].files[1]")]
    [InlineData("units[0].runs[0].files", "[]", "units[0].runs[0].files")]
    [InlineData("units[0].runs[0].verdictId", "null", "units[0].runs[0].outcome")]
    [InlineData("units[0].runs[0].worst.margin", "\"0.25\"", "units[0].runs[0].worst.margin")]
    [InlineData("units[0].runs[0].worst.margin", "1e999", "units[0].runs[0].worst.margin")]
    [InlineData("units[0].otherRuns[0].cause", "null", "units[0].otherRuns[0].cause")]
    [InlineData("units[0].otherRuns[0].standing", "\"void\"", "units[0].otherRuns[0].standing")]
    [InlineData("counts.retests", "-1", "counts.retests")]
    [InlineData("counts.concessions", "1", "counts.concessions")]
    [InlineData("recommendation.decision", "\"ship\"", "recommendation.decision")]
    [InlineData("lot.number", "\"\\u004c-0042\"", "")]
    public void A_wrong_member_is_told_by_its_path(string place, string value, string path)
    {
        var bytes = Encoding.UTF8.GetBytes(JsonEdit.Set(SampleDecisionBytes.Text, place, value));
        Assert.False(DecisionDocument.TryParse(bytes, out var document, out var problems));
        Assert.Null(document);
        Assert.Equal(path, problems[0].Path);
    }

    [Fact]
    public void The_same_decision_in_other_bytes_is_refused()
    {
        using var json = JsonDocument.Parse(SampleDecisionBytes.Text);
        var spaced = JsonSerializer.SerializeToUtf8Bytes(json.RootElement, Indented);
        Assert.False(DecisionDocument.TryParse(spaced, out _, out var problems));
        Assert.Contains("not the canonical bytes", Assert.Single(problems).Sentence, StringComparison.Ordinal);
        Assert.True(DecisionDocument.TryParse(CanonicalJson.Serialize(json.RootElement), out _, out _));
    }

    [Fact]
    public void A_rejected_lot_may_have_neither_mask_nor_verdicts()
    {
        var record = Record with
        {
            Decision = DecisionWord.Reject,
            Conditions = [.. Record.Conditions.Select(c => c with { Mask = null, Golden = null })],
            Units = [.. Record.Units.Select(u => u with { Outcome = null, Disposition = null, Runs = [.. u.Runs.Select(WithoutVerdict)] })],
        };
        var back = DecisionDocument.Create(record).Record;
        Assert.All(back.Conditions, c => Assert.Null(c.Mask));
        Assert.All(back.Units, u => Assert.Null(u.Outcome));
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(record with { Reason = " " }));
    }

    [Fact]
    public void A_decision_that_contradicts_itself_is_not_made()
    {
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(Record with { Decision = DecisionWord.Approve }));
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(Record with { Conditions = [Record.Conditions[0]] }));
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(Record with { Units = [Record.Units[0], Record.Units[0]] }));
        Assert.Throws<ArgumentException>(() => DecisionDocument.Create(WithUnit(0x40, u => u with { Outcome = Outcome.Pass })));
        Assert.Throws<ArgumentException>(
            () => DecisionDocument.Create(WithUnit(0x41, u => u with { Runs = [u.Runs[0], u.Runs[1] with { RunId = u.Runs[0].RunId }] })));
        Assert.Throws<ArgumentException>(
            () => DecisionDocument.Create(WithUnit(0x41, u => u with { Runs = [u.Runs[0], u.Runs[1] with { FilesSha256 = [new byte[31]] }] })));
    }

    /// <summary>Each contradiction by itself, in a rejection, where nothing else stands against it.</summary>
    [Fact]
    public void Each_contradiction_is_told_at_its_own_place()
    {
        var rejected = Record with { Decision = DecisionWord.Reject };
        Assert.Equal(DecisionWord.Reject, DecisionDocument.Create(rejected).Record.Decision);
        Refused(rejected with { Units = [Sn1(u => u with { Runs = [u.Runs[0], u.Runs[1] with { Outcome = Outcome.Fail }] })] }, "units[0].outcome: A unit is not better");
        Refused(rejected with { Units = [Sn1(u => u with { Runs = [u.Runs[0]] })] }, "units[0].outcome: A unit passes only");
        Refused(rejected with { Units = [Sn1(u => u with { Outcome = null, Runs = [u.Runs[1] with { VerdictId = null, Outcome = null }] })] }, "units[0].runs[0].worst");
        Refused(rejected with { Conditions = [.. Record.Conditions.Select(c => c with { Mask = null })] }, "units[0].runs[0].outcome: There is no verdict");
        Refused(rejected with { Units = [Sn1(u => u with { OtherRuns = [u.OtherRuns[0] with { ConditionId = SampleDecision.Id(9) }] })] }, "units[0].otherRuns[0].conditionId");

        static DecidedUnit Sn1(Func<DecidedUnit, DecidedUnit> change) => change(Record.Units[1]);

        static void Refused(DecisionRecord record, string place)
            => Assert.Contains(place, Assert.Throws<ArgumentException>(() => DecisionDocument.Create(record)).Message, StringComparison.Ordinal);
    }

    private static CountingRun WithoutVerdict(CountingRun run) => run with { VerdictId = null, Outcome = null, Worst = null };

    private static DecisionRecord WithUnit(int id, Func<DecidedUnit, DecidedUnit> change)
        => Record with { Units = [.. Record.Units.Select(u => u.UnitId == SampleDecision.Id(id) ? change(u) : u)] };

    private static DecisionRecord WithWorst(PinnedWorst worst)
        => WithUnit(0x40, u => u with { Runs = [u.Runs[0] with { Worst = worst }] });

    private static T[] Shuffled<T>(Random random, IReadOnlyList<T> items)
    {
        T[] shuffled = [.. items];
        random.Shuffle(shuffled);
        return shuffled;
    }
}
