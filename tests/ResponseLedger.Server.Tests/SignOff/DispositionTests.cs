using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using ResponseLedger.Server.Tests.Lots;

namespace ResponseLedger.Server.Tests.SignOff;

public sealed class DispositionTests(Lab lab)
{
    [Theory]
    [InlineData("rework", 1)]
    [InlineData("scrap", 1)]
    [InlineData("return", 1)]
    [InlineData("concession", 0)]
    public async Task A_unit_that_does_not_pass_gets_a_disposition(string disposition, int withdrawn)
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 3);

        var made = await (await scene.DispositionAsync("a", disposition)).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(disposition, made.GetProperty("disposition").GetString());
        Assert.Equal(1, made.GetProperty("number").GetInt32());
        Assert.Equal($"1 1 0 1 0 {withdrawn} 0", await scene.CountsAsync());
        Assert.Equal(disposition, (await scene.UnitAsync("a")).GetProperty("disposition").GetProperty("disposition").GetString());
    }

    [Fact]
    public async Task The_newest_disposition_is_in_force()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 3);
        await (await scene.DispositionAsync("a", "scrap")).ShouldBeAsync(HttpStatusCode.Created);

        var second = await (await scene.DispositionAsync("a", "concession")).ShouldBeAsync(HttpStatusCode.Created);

        Assert.Equal(2, second.GetProperty("number").GetInt32());
        Assert.Equal(["concessionNeeded"], await scene.BlockersAsync());
    }

    [Fact]
    public async Task A_unit_that_passes_gets_none()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 0);

        await (await scene.DispositionAsync("a", "scrap")).ShouldRefuseAsync(HttpStatusCode.Conflict, "unitPasses");
    }

    [Fact]
    public async Task A_unit_of_another_lot_is_not_found()
    {
        var scene = await LotScene.NewAsync(lab, 1, ["a"]);
        var unit = (await scene.UnitAsync("a")).GetProperty("unitId").GetString();
        await scene.NextLotAsync(1, ["b"]);

        await (await scene.Engineer.PostAsJsonAsync($"/api/lots/{scene.LotId}/units/{unit}/disposition", new { disposition = "scrap", reason = "x" })).ShouldRefuseAsync(HttpStatusCode.NotFound);
    }

    [Theory]
    [InlineData("burn", "x", "disposition")]
    [InlineData("scrap", "", "reason")]
    public async Task A_disposition_that_cannot_stand_is_refused_by_the_field(string disposition, string reason, string field)
    {
        var scene = await LotScene.NewAsync(lab, 1, ["a"]);
        var unit = (await scene.UnitAsync("a")).GetProperty("unitId").GetString();

        var problem = await (await scene.Engineer.PostAsJsonAsync($"/api/lots/{scene.LotId}/units/{unit}/disposition", new { disposition, reason })).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);

        Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
    }

    [Fact]
    public async Task A_scrapped_unit_stays_withdrawn_when_a_wider_mask_lets_its_old_run_pass()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 1.5);
        await (await scene.DispositionAsync("a", "scrap")).ShouldBeAsync(HttpStatusCode.Created);

        await scene.ReleaseAsync(2);

        Assert.Equal("1 1 1 0 0 1 0", await scene.CountsAsync());
    }

    [Fact]
    public async Task A_reworked_unit_that_passes_on_a_later_run_is_back_in_the_lot()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        var bad = await scene.SendAsync("a", 3);
        await (await scene.DispositionAsync("a", "rework")).ShouldBeAsync(HttpStatusCode.Created);
        await scene.SendAsync("a", 0);
        await scene.InvalidateAsync(bad);

        Assert.Equal("1 1 1 0 0 0 0", await scene.CountsAsync());
        Assert.Equal(JsonValueKind.Null, (await scene.UnitAsync("a")).GetProperty("disposition").ValueKind);
    }

    [Fact]
    public async Task A_concession_falls_away_when_the_unit_passes()
    {
        var scene = await LotScene.NewAsync(lab, 1);
        await scene.SendAsync("a", 1.5);
        await (await scene.DispositionAsync("a", "concession")).ShouldBeAsync(HttpStatusCode.Created);

        await scene.ReleaseAsync(2);

        Assert.Empty(await scene.BlockersAsync());
    }

    [Fact]
    public async Task An_approval_is_possible_exactly_when_nothing_stands_against_it()
    {
        var random = new Random(20260301);
        for (var round = 0; round < 12; round++)
        {
            var size = random.Next(1, 4);
            var scene = await LotScene.NewAsync(lab, size, mask: random.Next(6) > 0, furtherConditions: random.Next(3) == 0 ? ["hot"] : null);
            string[] conditions = [.. (await scene.LotAsync()).GetProperty("conditions").EnumerateArray().Select(c => c.GetProperty("name").GetString()!)];
            for (var unit = 0; unit < size; unit++)
            {
                if (random.Next(8) == 0)
                    continue;
                foreach (var condition in conditions.Where(_ => random.Next(8) > 0))
                    await scene.SendAsync($"u{unit}", random.Next(3) == 0 ? 3 : 0, condition);
            }

            foreach (var unit in (await scene.UnitsAsync()).GetProperty("items").EnumerateArray().Where(u => u.GetProperty("outcome").GetString() != "pass" && random.Next(3) > 0))
                await (await scene.DispositionAsync(unit.GetProperty("serial").GetString()!, random.Next(4) == 0 ? "concession" : "scrap")).ShouldBeAsync(HttpStatusCode.Created);

            var blockers = await scene.BlockersAsync();
            var answer = await scene.DecideAsync("approve");

            if (blockers.Length == 0)
            {
                await answer.ShouldBeAsync(HttpStatusCode.Created);
                continue;
            }

            // A finer word than the code is told as the reason.
            var problem = await answer.ShouldRefuseAsync(HttpStatusCode.Conflict);
            var code = problem.GetProperty("code").GetString();
            Assert.Equal(blockers[0], problem.TryGetProperty("reason", out var reason) ? reason.GetString() : code);
            if (blockers[0] is "noReleasedMask" or "concessionNeeded")
                Assert.Equal("unitsNotPassed", code);
        }
    }
}
