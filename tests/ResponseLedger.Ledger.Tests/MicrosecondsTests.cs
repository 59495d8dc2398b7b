using CsCheck;

namespace ResponseLedger.Ledger.Tests;

public sealed class MicrosecondsTests
{
    [Fact]
    public void A_time_is_cut_and_never_rounded()
    {
        var at = new DateTimeOffset(2026, 12, 31, 23, 59, 59, TimeSpan.Zero).AddTicks(9_999_999);
        Assert.Equal("2026-12-31T23:59:59.999999Z", Microseconds.Format(at));
        Assert.Equal(at.AddTicks(-9), Microseconds.Cut(at));
    }

    [Fact]
    public void A_time_of_another_zone_is_written_in_utc()
    {
        var at = new DateTimeOffset(2026, 3, 1, 0, 30, 0, TimeSpan.FromHours(5.5));
        Assert.Equal("2026-02-28T19:00:00.000000Z", Microseconds.Format(at));
        Assert.Equal(TimeSpan.Zero, Microseconds.Cut(at).Offset);
    }

    [Fact]
    public void Every_cut_time_reads_back_as_itself()
        => Gen.DateTimeOffset.Sample(
            at => Microseconds.TryParse(Microseconds.Format(at), out var back)
                && back == Microseconds.Cut(at)
                && back.Offset == TimeSpan.Zero
                && Microseconds.Cut(back) == back,
            iter: 2_000,
            threads: 1);

    [Theory]
    [InlineData("2026-03-01T09:30:00Z")]
    [InlineData("2026-03-01T09:30:00.12345Z")]
    [InlineData("2026-03-01T09:30:00.1234567Z")]
    [InlineData("2026-03-01T09:30:00.123456+00:00")]
    [InlineData("2026-03-01t09:30:00.123456z")]
    [InlineData(" 2026-03-01T09:30:00.123456Z")]
    [InlineData("2026-02-30T09:30:00.123456Z")]
    [InlineData("")]
    [InlineData(null)]
    public void Any_other_notation_is_refused(string? text) => Assert.False(Microseconds.TryParse(text, out _));
}
