using System.Security.Claims;
using System.Text.Json.Nodes;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.EntityFrameworkCore;
using ResponseLedger.Server.Http;
using ResponseLedger.Server.People;
using ResponseLedger.Store;
using ResponseLedger.Store.Acts;
using ResponseLedger.Store.Model;
using ResponseLedger.Store.Reevaluation;

namespace ResponseLedger.Server.Devices;

/// <summary>Makes and changes devices and their conditions.</summary>
internal static class WriteDevices
{
    public static async Task<Created<DeviceView>> CreateAsync(
        NewDevice request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        var (part, revision) = (request.PartNumber!.Trim(), request.Revision!.Trim());
        var id = await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            if (await act.Db.Devices.AnyAsync(d => d.PartNumber == part && d.Revision == revision, token))
                throw new RefusedException(new DeviceExists(part, revision));

            var device = new Device
            {
                Id = act.NewId(),
                PartNumber = part,
                Revision = revision,
                Kind = request.Kind!,
                GainUnit = request.GainUnit?.Trim() ?? DeviceKinds.UsualGainUnit,
                CriticalPhaseDeg = request.Kind == DeviceKinds.Loop ? (short)(request.CriticalPhaseDeg ?? DeviceKinds.UsualCriticalPhaseDeg) : null,
                At = act.At,
                ById = act.ById,
            };
            var title = request.Title!.Trim();
            var condition = new Condition { Id = act.NewId(), DeviceId = device.Id, Ordinal = 0, Name = DeviceKinds.FirstCondition, At = act.At, ById = act.ById };
            act.Db.AddRange(
                device,
                new DeviceSetting { Id = act.NewId(), DeviceId = device.Id, Number = 1, Title = title, At = act.At, ById = act.ById },
                condition);
            act.Record(
                "device.created",
                new JsonObject { ["deviceId"] = device.Id.ToString("D"), ["partNumber"] = part, ["revision"] = revision },
                new JsonObject
                {
                    ["title"] = title,
                    ["kind"] = device.Kind,
                    ["gainUnit"] = device.GainUnit,
                    ["criticalPhaseDeg"] = device.CriticalPhaseDeg,
                    ["condition"] = new JsonObject { ["conditionId"] = condition.Id.ToString("D"), ["name"] = condition.Name },
                });
            await act.SaveOrRefuseAsync(() => new DeviceExists(part, revision), token);
            return device.Id;
        }, cancellationToken);
        return TypedResults.Created($"/api/devices/{id}", await ReadDevices.ViewAsync(db, id, cancellationToken));
    }

    public static async Task<Ok<DeviceView>> ChangeAsync(
        Guid id, DeviceChange request, ClaimsPrincipal user, ActRunner acts, ResponseLedgerContext db, CancellationToken cancellationToken)
    {
        RefuseRole(request, user);
        var present = await db.DeviceSettings.AsNoTracking().Where(s => s.DeviceId == id).OrderByDescending(s => s.Number).FirstOrDefaultAsync(cancellationToken)
            ?? throw new RefusedException(new NothingThere("device"));
        var (before, after) = (Told(present), Told(Changed(present, request, present.Id, present.At, present.ById)));
        if (JsonNode.DeepEquals(before, after))
            return TypedResults.Ok(await ReadDevices.ViewAsync(db, id, cancellationToken));

        await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            act.Db.Add(Changed(present, request, act.NewId(), act.At, act.ById));
            act.Record("device.changed", new JsonObject { ["deviceId"] = id.ToString("D") }, new JsonObject { ["before"] = before.DeepClone(), ["after"] = after.DeepClone() });
            await act.SaveOrRefuseAsync(() => new SettingsChanged(), token);
            return true;
        }, cancellationToken);
        return TypedResults.Ok(await ReadDevices.ViewAsync(db, id, cancellationToken));
    }

    public static async Task<Created<ConditionAdded>> AddConditionAsync(
        Guid id, NewCondition request, ClaimsPrincipal user, ActRunner acts, CancellationToken cancellationToken)
    {
        var name = request.Name!.Trim();
        var added = await acts.RunAsync(CurrentActor.Of(user), async (act, token) =>
        {
            await Turn.TakeAsync(act.Db, id, token);
            var present = await act.Db.Conditions.Where(c => c.DeviceId == id).Select(c => new { c.Ordinal, c.Name }).ToListAsync(token);
            if (present.Count == 0)
                throw new RefusedException(new NothingThere("device"));
            if (present.Any(c => c.Name == name))
                throw new RefusedException(new ConditionExists(name));

            var condition = new Condition
            {
                Id = act.NewId(),
                DeviceId = id,
                Ordinal = present.Max(c => c.Ordinal) + 1,
                Name = name,
                At = act.At,
                ById = act.ById,
            };
            act.Db.Add(condition);
            act.Record(
                "condition.added",
                new JsonObject { ["deviceId"] = id.ToString("D"), ["conditionId"] = condition.Id.ToString("D") },
                new JsonObject { ["name"] = name });
            return new ConditionAdded(condition.Id, id, name);
        }, cancellationToken);
        return TypedResults.Created($"/api/devices/{id}/conditions", added);
    }

    // Whoever signs must not be able to lift the rules that they sign under.
    private static void RefuseRole(DeviceChange request, ClaimsPrincipal user)
    {
        if ((request.SigningNeedsQuality ?? request.SigningNeedsTwo ?? request.SigningExcludesOwnRuns) is not null && !CurrentActor.Holds(user, Roles.Quality))
            throw new RefusedException(new NotAllowed("Who may sign is set by the role quality; an engineer changes the other settings."));
        if ((request.Title is not null || request.DecisionRule is not null || request.Inverting is not null || request.RetestsAllowed.IsGiven)
            && !CurrentActor.Holds(user, Roles.Engineer))
            throw new RefusedException(new NotAllowed("The role quality sets who may sign; the other settings are an engineer's."));
    }

    private static DeviceSetting Changed(DeviceSetting present, DeviceChange change, Guid id, DateTimeOffset at, Guid byId) => new()
    {
        Id = id,
        DeviceId = present.DeviceId,
        Number = present.Number + 1,
        Title = change.Title?.Trim() ?? present.Title,
        SigningNeedsQuality = change.SigningNeedsQuality ?? present.SigningNeedsQuality,
        SigningNeedsTwo = change.SigningNeedsTwo ?? present.SigningNeedsTwo,
        SigningExcludesOwnRuns = change.SigningExcludesOwnRuns ?? present.SigningExcludesOwnRuns,
        RetestsAllowed = change.RetestsAllowed.Or(present.RetestsAllowed),
        DecisionRule = change.DecisionRule ?? present.DecisionRule,
        ConditionalIsNonconforming = present.ConditionalIsNonconforming,
        Inverting = change.Inverting ?? present.Inverting,
        At = at,
        ById = byId,
    };

    private static JsonObject Told(DeviceSetting setting) => new()
    {
        ["title"] = setting.Title,
        ["signingNeedsQuality"] = setting.SigningNeedsQuality,
        ["signingNeedsTwo"] = setting.SigningNeedsTwo,
        ["signingExcludesOwnRuns"] = setting.SigningExcludesOwnRuns,
        ["retestsAllowed"] = setting.RetestsAllowed,
        ["decisionRule"] = setting.DecisionRule,
        ["inverting"] = setting.Inverting,
    };
}

/// <summary>A condition that was added.</summary>
internal sealed record ConditionAdded(Guid Id, Guid DeviceId, string Name);
