using System.Security.Claims;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Ledger;
using ResponseLedger.Server.Demo.Circuits;
using ResponseLedger.Server.Masks;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;
using ResponseLedger.Store.Judging;

namespace ResponseLedger.Server.Demo;

/// <summary>
/// Fills the demo database once: weeks of an invented lab, each act at its invented time, through the real handlers, intake and
/// sign-off. Killed in the midst of it, the next start makes it on; when it is done, the ledger says so and it is left alone.
/// </summary>
internal sealed class DemoLab
{
    private const string DoneKind = "demo.filled";
    private static readonly TimeSpan betweenUnits = TimeSpan.FromSeconds(95);

    private readonly DemoClock clock;
    private readonly ActRunner acts;
    private readonly DemoHands hands;
    private readonly DemoSigning signing;
    private readonly DemoPeople people;
    private readonly IReadOnlyDictionary<string, string> passwords;
    private readonly List<(DateTimeOffset At, Func<CancellationToken, Task> Do)> diary = [];
    private readonly DateTimeOffset today;

    private DemoLab(IServiceProvider services, DemoPeople people, IReadOnlyDictionary<string, string> passwords)
    {
        var time = services.GetRequiredService<TimeProvider>();
        var contexts = services.GetRequiredService<IDbContextFactory<ResponseLedgerContext>>();
        clock = new DemoClock(time);
        today = new DateTimeOffset(time.GetUtcNow().Date, TimeSpan.Zero);
        acts = new ActRunner(contexts, clock, services.GetRequiredService<LedgerSequencer>());
        var intake = new RunIntake(acts, contexts, services.GetRequiredService<JudgingMaterial>(), services.GetRequiredService<ColumnMemory>());
        hands = new DemoHands(contexts, acts, intake, services.GetRequiredService<ReevaluationAfterChange>());
        signing = new DemoSigning(contexts, acts, services.GetRequiredService<PasswordAsked>(), services.GetRequiredService<JudgingMaterial>());
        this.people = people;
        this.passwords = passwords;
    }

    /// <summary>Fills the lab where it is not filled yet; gives the demo people's passwords by e-mail, as far as they are known.</summary>
    public static async Task<IReadOnlyDictionary<string, string>> RunAsync(IServiceProvider services, CancellationToken cancellationToken)
    {
        var contexts = services.GetRequiredService<IDbContextFactory<ResponseLedgerContext>>();
        var people = ActivatorUtilities.CreateInstance<DemoPeople>(services);
        var passwords = await people.EnsureAsync(cancellationToken);
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        if (!await db.LedgerEntries.AnyAsync(entry => entry.Kind == DoneKind, cancellationToken))
            await new DemoLab(services, people, passwords).FillAsync(cancellationToken);
        return passwords;
    }

    private async Task FillAsync(CancellationToken cancellationToken)
    {
        var who = new Dictionary<string, ClaimsPrincipal>();
        foreach (var role in Roles.All)
            who[role] = await people.PrincipalAsync(role, cancellationToken);

        clock.Set(today.AddDays(-50).AddHours(8));
        var benches = new Dictionary<DemoBench, Guid>();
        foreach (var bench in DemoPlan.Devices.SelectMany(device => device.Lots).Select(lot => lot.Bench).Distinct())
            benches[bench] = await hands.BenchAsync(bench, who[Roles.Manager], cancellationToken);
        for (var i = 0; i < DemoPlan.Devices.Count; i++)
            await BeginAsync(DemoPlan.Devices[i], seed: 1000 * (i + 1), benches, who, cancellationToken);

        foreach (var (at, act) in diary.OrderBy(line => line.At).ToList())
        {
            clock.Set(at);
            await act(cancellationToken);
        }

        await acts.RunAsync(
            Actor.Server,
            (act, _) =>
            {
                act.Record(DoneKind, [], new() { ["devices"] = DemoPlan.Devices.Count, ["lots"] = DemoPlan.Devices.Sum(device => device.Lots.Count) });
                return Task.FromResult(true);
            },
            cancellationToken);
    }

    private async Task BeginAsync(
        DemoDevice device, int seed, Dictionary<DemoBench, Guid> benches, Dictionary<string, ClaimsPrincipal> who, CancellationToken cancellationToken)
    {
        var engineer = who[Roles.Engineer];
        var deviceId = await hands.DeviceAsync(device, engineer, cancellationToken);
        var goldenBench = device.Lots[0].Bench;
        var goldenCircuits = device.Build(new Parts(seed) { Spread = 0 }, Fault.None);
        var conditionIds = new List<Guid>();
        for (var i = 0; i < device.Conditions.Count; i++)
        {
            var condition = device.Conditions[i];
            var id = await hands.ConditionAsync(deviceId, condition.Name, engineer, cancellationToken);
            conditionIds.Add(id);
            var order = new IntakeOrder(deviceId, id, condition.Name, null, null, benches[goldenBench], goldenBench.Name, RunPurposes.Golden);
            var content = goldenBench.Sweep(goldenCircuits[i], condition.FrequencyHz, new Parts(seed + 500 + i));
            var run = await hands.SendAsync(order, $"{device.PartNumber}-G01", content, who[Roles.Operator], cancellationToken);
            await hands.GoldenAsync(deviceId, id, run, engineer, cancellationToken);
            await hands.MaskAsync(deviceId, id, condition.Mask, engineer, cancellationToken);
        }

        for (var i = 0; i < device.Lots.Count; i++)
            Plan(device, deviceId, conditionIds, device.Lots[i], seed + (i + 1) * 10, benches[device.Lots[i].Bench], who);
    }

    private void Plan(DemoDevice device, Guid deviceId, List<Guid> conditionIds, DemoLot lot, int seed, Guid benchId, Dictionary<string, ClaimsPrincipal> who)
    {
        var opened = today.AddDays(-lot.DaysAgo).AddHours(7.5);
        var lotId = Guid.Empty;
        diary.Add((opened, async token => lotId = await hands.LotAsync(deviceId, lot, who[Roles.Operator], token)));
        var parts = new Parts(seed);
        for (var place = 1; place <= lot.Tested; place++)
        {
            var circuits = device.Build(parts, lot.Faults.GetValueOrDefault(place));
            var serial = $"{lot.Number}-{place:000}";
            for (var i = 0; i < device.Conditions.Count; i++)
            {
                var condition = device.Conditions[i];
                var content = lot.Bench.Sweep(circuits[i], condition.FrequencyHz, parts, lot.DriftDbPerUnit * (place - 1));
                var measuredAt = opened.AddMinutes(20) + (betweenUnits * (place + ((double)i / device.Conditions.Count)));
                var conditionId = conditionIds[i];
                diary.Add((measuredAt, token => hands.SendAsync(
                    new IntakeOrder(deviceId, conditionId, condition.Name, lotId, lot.Number, benchId, lot.Bench.Name, RunPurposes.Production, measuredAt.AddSeconds(-20)),
                    serial, content, who[Roles.Operator], token)));
            }
        }

        if (lot.Ending != DemoEnding.Open)
            diary.Add((opened.AddDays(1), token => signing.EndAsync(lotId, lot, who[Roles.Quality], passwords.GetValueOrDefault(DemoPeople.EmailOf(Roles.Quality)), token)));
    }
}
