using Microsoft.EntityFrameworkCore;
using ResponseLedger.Store;

namespace ResponseLedger.Server.Devices;

/// <summary>A device as the API shows it.</summary>
internal sealed record DeviceView(
    Guid Id,
    string PartNumber,
    string Revision,
    string Title,
    string Kind,
    string GainUnit,
    short? CriticalPhaseDeg,
    IReadOnlyList<DeviceConditionView> Conditions,
    bool SigningNeedsQuality,
    bool SigningNeedsTwo,
    bool SigningExcludesOwnRuns,
    int? RetestsAllowed,
    string DecisionRule,
    bool Inverting,
    DateTimeOffset CreatedAt);

/// <summary>A condition with what is in force for it.</summary>
internal sealed record DeviceConditionView(Guid Id, string Name, int? MaskRevision, Guid? MaskId, Guid? DraftId, GoldenView? Golden);

/// <summary>A golden run: which, why, since when and by whom.</summary>
internal sealed record GoldenView(Guid RunId, Guid UnitId, string Serial, bool Invalidated, string Reason, DateTimeOffset SetAt, string? SetBy);

/// <summary>Puts device views together: a fixed number of queries, however many devices.</summary>
internal static class DeviceViews
{
    /// <summary>The views of these devices, by id.</summary>
    public static async Task<Dictionary<Guid, DeviceView>> OfAsync(ResponseLedgerContext db, IReadOnlyList<Guid> ids, CancellationToken cancellationToken)
    {
        var devices = await (
            from device in db.Devices
            where ids.Contains(device.Id)
            select new
            {
                Device = device,
                Setting = db.DeviceSettings.Where(s => s.DeviceId == device.Id).OrderByDescending(s => s.Number).First(),
            }).AsNoTracking().ToListAsync(cancellationToken);
        var conditions = await ConditionsAsync(db, ids, cancellationToken);
        return devices.ToDictionary(row => row.Device.Id, row => new DeviceView(
            row.Device.Id,
            row.Device.PartNumber,
            row.Device.Revision,
            row.Setting.Title,
            row.Device.Kind,
            row.Device.GainUnit,
            row.Device.CriticalPhaseDeg,
            [.. conditions[row.Device.Id]],
            row.Setting.SigningNeedsQuality,
            row.Setting.SigningNeedsTwo,
            row.Setting.SigningExcludesOwnRuns,
            row.Setting.RetestsAllowed,
            row.Setting.DecisionRule,
            row.Setting.Inverting,
            row.Device.At));
    }

    /// <summary>The conditions of these devices in their order, by device.</summary>
    public static async Task<ILookup<Guid, DeviceConditionView>> ConditionsAsync(ResponseLedgerContext db, IReadOnlyList<Guid> deviceIds, CancellationToken cancellationToken)
    {
        var rows = await (
            from condition in db.Conditions
            where deviceIds.Contains(condition.DeviceId)
            orderby condition.DeviceId, condition.Ordinal
            select new
            {
                condition.Id,
                condition.DeviceId,
                condition.Name,
                Mask = db.MaskRevisions.Where(m => m.ConditionId == condition.Id).OrderByDescending(m => m.Number)
                    .Select(m => new { m.MaskId, m.Number }).FirstOrDefault(),
                DraftId = db.MaskDrafts.Where(d => d.ConditionId == condition.Id).Select(d => (Guid?)d.MaskId).FirstOrDefault(),
            }).AsNoTracking().ToListAsync(cancellationToken);
        var golden = await GoldenAsync(db, deviceIds, inForceOnly: true, cancellationToken);
        return rows.ToLookup(
            row => row.DeviceId,
            row => new DeviceConditionView(row.Id, row.Name, row.Mask?.Number, row.Mask?.MaskId, row.DraftId, golden[row.Id].FirstOrDefault()));
    }

    /// <summary>Golden runs of these devices by condition, newest first.</summary>
    public static async Task<ILookup<Guid, GoldenView>> GoldenAsync(
        ResponseLedgerContext db, IReadOnlyList<Guid> deviceIds, bool inForceOnly, CancellationToken cancellationToken)
    {
        var rows = await (
            from choice in db.GoldenChoices
            where deviceIds.Contains(choice.DeviceId)
                && (!inForceOnly || !db.GoldenChoices.Any(later => later.ConditionId == choice.ConditionId && later.Number > choice.Number))
            orderby choice.ConditionId, choice.Number descending
            let unitId = db.RunAssignments.Where(a => a.RunId == choice.RunId).OrderByDescending(a => a.Number).Select(a => a.UnitId).First()
            select new
            {
                choice.ConditionId,
                choice.RunId,
                UnitId = unitId,
                Serial = db.Units.Where(u => u.Id == unitId).Select(u => u.Serial).First(),
                Invalidated = db.RunInvalidations.Any(i => i.RunId == choice.RunId),
                choice.Reason,
                choice.At,
                By = db.Users.Where(p => p.Id == choice.ById).Select(p => p.DisplayName).FirstOrDefault(),
            }).AsNoTracking().ToListAsync(cancellationToken);
        return rows.ToLookup(
            row => row.ConditionId,
            row => new GoldenView(row.RunId, row.UnitId, row.Serial, row.Invalidated, row.Reason, row.At, row.By));
    }
}
