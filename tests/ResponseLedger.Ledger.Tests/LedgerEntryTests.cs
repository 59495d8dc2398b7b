using System.Text;
using System.Text.Json.Nodes;

namespace ResponseLedger.Ledger.Tests;

public sealed class LedgerEntryTests
{
    private static readonly DateTimeOffset At = new DateTimeOffset(2026, 3, 1, 10, 30, 0, TimeSpan.FromHours(1)).AddTicks(1_234_567);

    private static readonly Guid Person = Guid.Parse("01890a5d-ac96-774b-bcce-b302099a8057");

    [Fact]
    public void The_bytes_of_an_entry_are_exactly_these()
    {
        var entry = LedgerEntry.Create(
            At,
            "maskReleased",
            Actor.Person(Person, "Ina Øst"),
            new JsonObject { ["mask"] = "m-1", ["device"] = "d-1" },
            new JsonObject { ["revision"] = 2, ["before"] = null });

        Assert.Equal(
            """{"actor":{"id":"01890a5d-ac96-774b-bcce-b302099a8057","kind":"person","name":"Ina Øst"},"at":"2026-03-01T09:30:00.123456Z","detail":{"before":null,"revision":2},"kind":"maskReleased","subject":{"device":"d-1","mask":"m-1"},"v":1}""",
            Encoding.UTF8.GetString(entry.Bytes.Span));
        Assert.Equal(CanonicalJson.Digest(entry.Bytes.Span), entry.Sha256.ToArray());
        Assert.Equal(0, entry.At.Ticks % TimeSpan.TicksPerMicrosecond);
        Assert.Equal("maskReleased", entry.Kind);
    }

    [Fact]
    public void The_server_and_a_bench_act_under_their_own_words()
    {
        var server = LedgerEntry.Create(At, "migrated", Actor.Server, [], []);
        var bench = LedgerEntry.Create(At, "runReceived", Actor.Bench(Person, "EOL 3"), [], []);
        Assert.Contains("""{"id":null,"kind":"server","name":"server"}""", Encoding.UTF8.GetString(server.Bytes.Span), StringComparison.Ordinal);
        Assert.Contains("""kind":"bench","name":"EOL 3"}""", Encoding.UTF8.GetString(bench.Bytes.Span), StringComparison.Ordinal);
    }

    [Fact]
    public void An_entry_keeps_no_hold_on_what_it_was_made_of()
    {
        var detail = new JsonObject { ["a"] = 1 };
        var entry = LedgerEntry.Create(At, "noted", Actor.Server, [], detail);
        var before = entry.Bytes.ToArray();
        detail["a"] = 2;
        Assert.Null(detail.Parent);
        Assert.Equal(before, entry.Bytes.ToArray());
    }

    [Fact]
    public void An_entry_without_a_kind_or_a_canonical_form_is_refused()
    {
        Assert.Throws<ArgumentException>(() => LedgerEntry.Create(At, " ", Actor.Server, [], []));
        Assert.Throws<ArgumentException>(() => LedgerEntry.Create(At, "noted", Actor.Person(Person, ""), [], []));
        Assert.Throws<CanonicalJsonException>(
            () => LedgerEntry.Create(At, "noted", Actor.Server, [], new JsonObject { ["margin"] = double.NaN }));
    }
}
