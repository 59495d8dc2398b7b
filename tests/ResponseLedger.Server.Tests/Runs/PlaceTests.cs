using System.Net;
using System.Net.Http.Json;
using ResponseLedger.Server.Tests.Reevaluation;

namespace ResponseLedger.Server.Tests.Runs;

/// <summary>How device, lot, condition, bench and serial number are found by what the sender calls them.</summary>
public sealed class PlaceTests(Lab lab)
{
    [Fact]
    public async Task Device_and_lot_go_by_id_or_by_name_and_the_lot_alone_names_the_device()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        (string, string)[][] ways =
        [
            [("device", scene.DeviceId), ("lot", scene.LotId)],
            [("device", scene.PartNumber + "/A"), ("lot", scene.LotNumber)],
            [("device", scene.PartNumber), ("lot", scene.LotNumber)],
            [("lot", scene.LotId)],
            [("lot", scene.LotNumber)],
        ];
        for (var i = 0; i < ways.Length; i++)
        {
            using var response = await RunScene.SendAsync(scene.Engineer, [("bench", scene.Bench), .. ways[i]], [($"W{i}.csv", RunScene.Csv(0, $"{i}"))]);
            await response.ShouldBeAsync(HttpStatusCode.Created);
        }
    }

    [Fact]
    public async Task What_fits_several_or_nothing_is_refused_by_field()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var revisionB = await (await scene.Engineer.PostAsJsonAsync("/api/devices", new { partNumber = scene.PartNumber, revision = "B", title = "T", kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);
        await RunScene.NewLotAsync(scene.Engineer, revisionB.GetProperty("id").GetString()!, scene.LotNumber);
        var other = await RunScene.NewAsync(lab, mask: false);
        await RefusedAsync("device", ("device", scene.PartNumber), ("lot", scene.LotNumber));
        await RefusedAsync("lot", ("lot", scene.LotNumber));
        await RefusedAsync("lot", ("device", scene.PartNumber + "/A"), ("lot", other.LotNumber));
        await RefusedAsync("lot", ("device", scene.PartNumber + "/A"), ("lot", other.LotId));
        await RefusedAsync("lot", ("device", scene.PartNumber + "/A"), ("lot", "no such lot"));
        await RefusedAsync("device", ("device", "no such device"), ("lot", scene.LotId));
        await RefusedAsync("lot", ("device", scene.PartNumber + "/A"));
        await RefusedAsync("device", ("purpose", "study"));

        async Task RefusedAsync(string field, params (string, string)[] fields)
        {
            using var response = await RunScene.SendAsync(scene.Engineer, [("bench", scene.Bench), .. fields], [("A.csv", RunScene.Csv(0))]);
            var problem = await response.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
            Assert.True(problem.GetProperty("errors").TryGetProperty(field, out _), problem.ToString());
        }
    }

    [Fact]
    public async Task A_lot_number_that_many_devices_use_is_found_by_its_device()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        await lab.ActAsync("device.created", act =>
        {
            // More than one look-up reads, and with ids on both sides of the scene's own.
            for (var i = 0; i < 120; i++)
            {
                var id = i % 2 == 0 ? act.NewId() : new Guid(i, 0, 0, new byte[8]);
                act.Db.AddRange(
                    new Store.Model.Device { Id = id, PartNumber = Lab.Unique("MANY"), Revision = "A", Kind = "transfer", GainUnit = "V/V", At = act.At, ById = act.ById },
                    new Store.Model.DeviceSetting { Id = act.NewId(), DeviceId = id, Number = 1, Title = "T", At = act.At, ById = act.ById },
                    new Store.Model.Condition { Id = act.NewId(), DeviceId = id, Ordinal = 0, Name = "standard", At = act.At, ById = act.ById },
                    new Store.Model.Lot { Id = act.NewId(), DeviceId = id, Number = scene.LotNumber, Size = 1, At = act.At, ById = act.ById });
            }

            return true;
        });
        await RunScene.NewLotAsync(scene.Engineer, scene.DeviceId, Lab.Unique("LOT"));

        foreach (var device in new[] { scene.DeviceId, scene.PartNumber, scene.PartNumber + "/A" })
        {
            using var response = await RunScene.SendAsync(
                scene.Engineer, [("device", device), ("lot", scene.LotNumber), ("bench", scene.Bench)], [($"{Lab.Unique("S")}.csv", RunScene.Csv(0, device))]);
            await response.ShouldBeAsync(HttpStatusCode.Created);
        }
    }

    [Fact]
    public async Task A_revision_may_hold_a_slash()
    {
        var engineer = await lab.SignInAsync("engineer");
        var (part, lot) = (Lab.Unique("SLASH"), Lab.Unique("LOT"));
        var device = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = part, revision = "B/2", title = "T", kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);
        var other = await (await engineer.PostAsJsonAsync("/api/devices", new { partNumber = part, revision = "2", title = "T", kind = "transfer" })).ShouldBeAsync(HttpStatusCode.Created);
        await RunScene.NewLotAsync(engineer, device.GetProperty("id").GetString()!, lot);
        await RunScene.NewLotAsync(engineer, other.GetProperty("id").GetString()!, lot);

        using var response = await RunScene.SendAsync(engineer, [("device", $"{part}/B/2"), ("lot", lot), ("bench", Lab.Unique("bench"))], [("S1.csv", RunScene.Csv(0, part))]);

        var runId = (await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results")[0].GetProperty("runId").GetString()!;
        foreach (var list in new[] { "runs", "lots" })
        {
            var page = await (await engineer.GetAsync($"/api/{list}?device={Uri.EscapeDataString($"{part}/B/2")}")).ShouldBeAsync(HttpStatusCode.OK);
            var item = Assert.Single(page.GetProperty("items").EnumerateArray());
            Assert.Equal(device.GetProperty("id").GetString(), item.GetProperty("deviceId").GetString());
            if (list == "runs")
                Assert.Equal(runId, item.GetProperty("id").GetString());
        }
    }

    [Theory, InlineData("golden"), InlineData("through"), InlineData("check"), InlineData("study")]
    public async Task Runs_for_other_purposes_need_no_lot(string purpose)
    {
        var scene = await RunScene.NewAsync(lab);
        using var response = await RunScene.SendAsync(
            scene.Engineer, [("device", scene.PartNumber), ("purpose", purpose), ("bench", scene.Bench)], [("G1.csv", RunScene.Csv(0))]);
        var id = (await response.ShouldBeAsync(HttpStatusCode.Created)).GetProperty("results")[0].GetProperty("runId").GetString()!;
        var run = await scene.RunAsync(id);
        Assert.Equal(("notProduction", purpose), (run.GetProperty("standing").GetString(), run.GetProperty("purpose").GetString()));
        using var again = await RunScene.SendAsync(
            scene.Engineer, [("device", scene.PartNumber), ("purpose", purpose), ("bench", scene.Bench)], [("G1.csv", RunScene.Csv(0))]);
        await again.ShouldBeAsync(HttpStatusCode.OK);
    }

    [Fact]
    public async Task A_new_bench_name_of_a_person_makes_the_bench_once()
    {
        var scene = await RunScene.NewAsync(lab);
        var first = await scene.SendOneAsync("S1.csv", RunScene.Csv(0));
        var second = await scene.SendOneAsync("S2.csv", RunScene.Csv(0, "2"));
        Assert.Contains("benchMade", RunScene.Codes(first, "notes"));
        Assert.DoesNotContain("benchMade", RunScene.Codes(second, "notes"));
        Assert.Single(await lab.LedgerKindsAsync(scene.Bench), "bench.created");
        using var none = await RunScene.SendAsync(scene.Engineer, [("lot", scene.LotId)], [("S3.csv", RunScene.Csv(0, "3"))]);
        Assert.True((await none.ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity)).GetProperty("errors").TryGetProperty("bench", out _));
    }

    [Fact]
    public async Task A_token_is_bound_by_its_first_upload_and_sends_for_no_other_bench()
    {
        var scene = await RunScene.NewAsync(lab);
        await scene.AcceptedAsync("S0.csv", RunScene.Csv(0, "0"));
        var elsewhere = Lab.Unique("bench");
        await (await RunScene.SendAsync(scene.Engineer, [("lot", scene.LotId), ("bench", elsewhere)], [("S9.csv", RunScene.Csv(0, "9"))])).ShouldBeAsync(HttpStatusCode.Created);
        var token = await lab.TokenAsync(["runs"]);
        await (await SendAsync(token, null, "S1")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await SendAsync(token, Lab.Unique("bench"), "S1")).ShouldRefuseAsync(HttpStatusCode.UnprocessableEntity);
        await (await SendAsync(token, scene.Bench, "S1")).ShouldBeAsync(HttpStatusCode.Created);
        var left = await (await SendAsync(token, null, "S2")).ShouldBeAsync(HttpStatusCode.Created);
        await (await SendAsync(token, elsewhere, "S3")).ShouldRefuseAsync(HttpStatusCode.Forbidden, "tokenOfAnotherBench");
        Assert.Equal(scene.Bench, (await scene.RunAsync(left.GetProperty("results")[0].GetProperty("runId").GetString()!)).GetProperty("bench").GetString());
        Assert.Single(await lab.LedgerKindsAsync(scene.Bench), "token.bound");

        Task<HttpResponseMessage> SendAsync(HttpClient client, string? bench, string serial)
            => RunScene.SendAsync(client, bench is null ? [("lot", scene.LotId)] : [("lot", scene.LotId), ("bench", bench)], [($"{serial}.csv", RunScene.Csv(0, serial))]);
    }

    [Theory]
    [InlineData("SN001_ch1_hot.csv", "SN001")]
    [InlineData("SN001.csv", "SN001")]
    [InlineData("SN.001.csv", "SN.001")]
    [InlineData("..\\folder\\SN7_x.csv", "SN7")]
    [InlineData("Größe 1_x.csv", "Größe 1")]
    public async Task The_serial_number_comes_from_the_files_name(string fileName, string serial)
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        Assert.Equal(serial, (await scene.RunAsync(await scene.AcceptedAsync(fileName, RunScene.Csv(0)))).GetProperty("serial").GetString());
    }

    [Fact]
    public async Task A_bench_with_a_pattern_of_its_own_finds_serial_numbers_by_it()
    {
        var scene = await RunScene.NewAsync(lab, mask: false);
        var run = await scene.RunAsync(await scene.AcceptedAsync("S1.csv", RunScene.Csv(0)));
        var manager = await lab.SignInAsync("manager");
        await (await manager.PatchAsJsonAsync($"/api/benches/{run.GetProperty("benchId").GetString()}", new { serialPattern = "-(?<serial>[0-9]{4})-" })).ShouldBeAsync(HttpStatusCode.OK);
        Assert.Equal("4711", (await scene.RunAsync(await scene.AcceptedAsync("lot-4711-a_b.csv", RunScene.Csv(0, "2")))).GetProperty("serial").GetString());
        Assert.Equal(["serialNotFound"], RunScene.Codes(await scene.SendOneAsync("S3_x.csv", RunScene.Csv(0, "3")), "issues"));
    }
}
