using System.Security.Claims;
using System.Text.Json;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Benches;
using ResponseLedger.Server.Devices;
using ResponseLedger.Server.Lots;
using ResponseLedger.Server.Masks;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Intake;

namespace ResponseLedger.Server.Demo;

/// <summary>
/// Does what people of the demo lab do, through the same handlers and the same intake as a request. Each step looks first
/// whether it is done, so that a lab that was interrupted while it was made is simply made on.
/// </summary>
internal sealed class DemoHands(
    IDbContextFactory<ResponseLedgerContext> contexts,
    ActRunner acts,
    RunIntake intake,
    ReevaluationAfterChange reevaluation)
{
    public async Task<Guid> DeviceAsync(DemoDevice device, ClaimsPrincipal engineer, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var known = await db.Devices.Where(d => d.PartNumber == device.PartNumber && d.Revision == device.Revision)
            .Select(d => (Guid?)d.Id).SingleOrDefaultAsync(cancellationToken);
        if (known is { } id)
            return id;
        var made = await WriteDevices.CreateAsync(
            new NewDevice(device.PartNumber, device.Revision, device.Title, device.Kind), engineer, acts, db, cancellationToken);
        return made.Value!.Id;
    }

    public async Task<Guid> ConditionAsync(Guid deviceId, string name, ClaimsPrincipal engineer, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var known = await db.Conditions.Where(c => c.DeviceId == deviceId && c.Name == name).Select(c => (Guid?)c.Id).SingleOrDefaultAsync(cancellationToken);
        if (known is { } id)
            return id;
        var added = await WriteDevices.AddConditionAsync(deviceId, new NewCondition(name), engineer, acts, cancellationToken);
        return added.Value!.Id;
    }

    public async Task MaskAsync(Guid deviceId, Guid conditionId, string document, ClaimsPrincipal engineer, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        if (await db.MaskRevisions.AnyAsync(m => m.ConditionId == conditionId, cancellationToken))
            return;
        var draftId = await db.MaskDrafts.Where(d => d.ConditionId == conditionId).Select(d => (Guid?)d.MaskId).SingleOrDefaultAsync(cancellationToken);
        if (draftId is null)
        {
            using var json = JsonDocument.Parse(document);
            var request = new NewMask
            {
                Title = json.RootElement.GetProperty("title").GetString(),
                Condition = conditionId.ToString(),
                Limits = json.RootElement.GetProperty("limits"),
                Requirements = json.RootElement.GetProperty("requirements"),
            };
            var drafted = await DraftMasks.CreateAsync(deviceId, request, engineer, acts, db, new DefaultHttpContext().Response, cancellationToken);
            draftId = ((Created<MaskView>)drafted.Result).Value!.Id;
        }

        await ReleaseMask.ReleaseAsync(
            draftId.Value, new MaskRelease("First release of the acceptance mask"), engineer, acts, db, reevaluation, new DefaultHttpContext().Request, cancellationToken);
    }

    public async Task<Guid> BenchAsync(DemoBench bench, ClaimsPrincipal manager, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var known = await db.Benches.Where(b => b.Name == bench.Name).Select(b => (Guid?)b.Id).SingleOrDefaultAsync(cancellationToken);
        return known ?? (await WriteBenches.CreateAsync(new NewBench(bench.Name), manager, acts, db, cancellationToken)).Value!.Id;
    }

    public async Task<Guid> LotAsync(Guid deviceId, DemoLot lot, ClaimsPrincipal @operator, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        var known = await db.Lots.Where(l => l.DeviceId == deviceId && l.Number == lot.Number).Select(l => (Guid?)l.Id).SingleOrDefaultAsync(cancellationToken);
        return known ?? (await WriteLots.CreateAsync(new NewLot(deviceId, lot.Number, lot.Size), @operator, acts, db, cancellationToken)).Value!.Id;
    }

    public async Task GoldenAsync(Guid deviceId, Guid conditionId, Guid runId, ClaimsPrincipal engineer, CancellationToken cancellationToken)
    {
        await using var db = await contexts.CreateDbContextAsync(cancellationToken);
        if (!await db.GoldenChoices.AnyAsync(g => g.ConditionId == conditionId, cancellationToken))
            await GoldenRuns.SetAsync(deviceId, new NewGolden(runId, "The unit that the design review measured"), engineer, acts, db, reevaluation, cancellationToken);
    }

    /// <summary>Sends one file through the intake; gives the run, whether it was taken now or before.</summary>
    /// <exception cref="InvalidOperationException">The intake refused it: a fault of the demo lab.</exception>
    public async Task<Guid> SendAsync(IntakeOrder order, string serial, byte[] content, ClaimsPrincipal sender, CancellationToken cancellationToken)
    {
        var file = IntakeFile.Of($"{serial}_{order.ConditionName.Replace(' ', '-')}.csv", serial, content);
        var result = (await intake.TakeAsync(People.CurrentActor.Of(sender), order, [file], cancellationToken))[0];
        return result.RunId ?? throw new InvalidOperationException($"The demo lab's file {file.Name} was refused: {string.Join(" ", result.Issues.Select(issue => issue.Message))}");
    }
}
