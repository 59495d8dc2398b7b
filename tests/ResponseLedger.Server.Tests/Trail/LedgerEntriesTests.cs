using System.Net;
using System.Security.Cryptography;
using System.Text.Json;
using Microsoft.Extensions.DependencyInjection;
using ResponseLedger.Ledger;
using ResponseLedger.Store.Acts;

namespace ResponseLedger.Server.Tests.Trail;

public sealed class LedgerEntriesTests(Lab lab)
{
    [Fact]
    public async Task Entries_come_in_the_order_of_their_positions_with_their_exact_bytes()
    {
        var auditor = await lab.SignInAsync("auditor");
        await lab.Services.GetRequiredService<LedgerSequencer>().GiveAsync(TestContext.Current.CancellationToken);
        var expected = 0L;
        JsonElement next = default;
        do
        {
            var after = expected == 0 ? "" : $"&after={next.GetInt64()}";
            var page = await (await auditor.GetAsync($"/api/ledger/entries?limit=2{after}")).ShouldBeAsync(HttpStatusCode.OK);
            foreach (var item in page.GetProperty("items").EnumerateArray())
            {
                Assert.Equal(expected++, item.GetProperty("position").GetInt64());
                var bytes = item.GetProperty("bytes").GetBytesFromBase64();
                Assert.True(CanonicalJson.IsCanonical(bytes), item.ToString());
                Assert.Equal(bytes, CanonicalJson.Serialize(item.GetProperty("entry")));
                Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(bytes)), item.GetProperty("sha256").GetString());
                Assert.Equal(item.GetProperty("kind").GetString(), item.GetProperty("entry").GetProperty("kind").GetString());
                Assert.Equal(item.GetProperty("at").GetString(), item.GetProperty("entry").GetProperty("at").GetString());
            }

            next = page.GetProperty("next");
        }
        while (next.ValueKind != JsonValueKind.Null);
        Assert.True(expected >= 2, $"{expected} entries");
    }

    [Fact]
    public async Task The_first_entry_is_the_server_making_the_first_manager()
    {
        var auditor = await lab.SignInAsync("auditor");

        var page = await (await auditor.GetAsync("/api/ledger/entries?limit=1")).ShouldBeAsync(HttpStatusCode.OK);

        var entry = page.GetProperty("items")[0].GetProperty("entry");
        Assert.Equal("person.created", entry.GetProperty("kind").GetString());
        Assert.Equal("server", entry.GetProperty("actor").GetProperty("kind").GetString());
        Assert.Equal(Lab.ManagerEmail, entry.GetProperty("subject").GetProperty("email").GetString());
    }

    [Fact]
    public async Task Newest_first_is_the_same_ledger_backwards()
    {
        var auditor = await lab.SignInAsync("auditor");
        await lab.Services.GetRequiredService<LedgerSequencer>().GiveAsync(TestContext.Current.CancellationToken);
        var newest = await (await auditor.GetAsync("/api/ledger/entries?order=newest&limit=2")).ShouldBeAsync(HttpStatusCode.OK);
        var size = newest.GetProperty("size").GetInt64();
        var positions = newest.GetProperty("items").EnumerateArray().Select(i => i.GetProperty("position").GetInt64()).ToArray();

        Assert.Equal([size - 1, size - 2], positions);
        var next = newest.GetProperty("next").GetInt64();
        var older = await (await auditor.GetAsync($"/api/ledger/entries?order=newest&limit=500&before={next}")).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal(next - 1, older.GetProperty("items")[0].GetProperty("position").GetInt64());
    }

    [Fact]
    public async Task Entries_are_found_by_kind_and_by_what_stands_in_them()
    {
        var (email, _) = await lab.NewPersonAsync("operator");
        await lab.Services.GetRequiredService<LedgerSequencer>().GiveAsync(TestContext.Current.CancellationToken);
        var auditor = await lab.SignInAsync("auditor");

        foreach (var (query, expected) in new[] { ("", 1), ("&kind=person", 1), ("&kind=person.created", 1), ("&kind=pers", 0), ("&kind=run", 0) })
        {
            var page = await (await auditor.GetAsync($"/api/ledger/entries?search={email}{query}")).ShouldBeAsync(HttpStatusCode.OK);
            Assert.True(page.GetProperty("items").GetArrayLength() == expected, $"{query}: {page}");
        }
    }

    [Theory]
    [InlineData("order=strange", HttpStatusCode.UnprocessableEntity)]
    [InlineData("kind=a%00b", HttpStatusCode.UnprocessableEntity)]
    [InlineData("limit=0", HttpStatusCode.UnprocessableEntity)]
    [InlineData("limit=501", HttpStatusCode.UnprocessableEntity)]
    [InlineData("after=somewhere", HttpStatusCode.BadRequest)]
    public async Task A_page_that_cannot_be_is_refused(string query, HttpStatusCode expected)
    {
        var auditor = await lab.SignInAsync("auditor");

        await (await auditor.GetAsync($"/api/ledger/entries?{query}")).ShouldRefuseAsync(expected);
    }

    [Fact]
    public async Task After_the_last_position_there_is_nothing()
    {
        var auditor = await lab.SignInAsync("auditor");

        var page = await (await auditor.GetAsync($"/api/ledger/entries?after={long.MaxValue}")).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(0, page.GetProperty("items").GetArrayLength());
        Assert.Equal(JsonValueKind.Null, page.GetProperty("next").ValueKind);
    }
}
