using ResponseLedger.Server.Http;
using ResponseLedger.Store.Intake;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>Where an upload belongs, out of everything that fits the names in it.</summary>
/// <param name="DeviceId">The device.</param>
/// <param name="Lot">The lot, or null.</param>
/// <param name="Condition">The condition of the device.</param>
internal sealed record UploadPlace(Guid DeviceId, FoundLot? Lot, FoundCondition Condition)
{
    /// <summary>Picks what is meant.</summary>
    /// <exception cref="RefusedException">A name fits nothing or several, or something that is needed was left out.</exception>
    public static UploadPlace Of(UploadFields fields, FoundPlaces found)
    {
        var errors = new Dictionary<string, string[]>(StringComparer.Ordinal);
        var device = DeviceOf(fields.Device, found.Devices, errors);
        var lot = LotOf(fields.Lot, found.Lots, device?.Id, errors);
        if (fields.Device is null && lot is null && !errors.ContainsKey("lot"))
            errors["device"] = ["Name the device: its id, its part number, or PART/REV. It may be left out where a lot names it."];
        if (fields.PurposeWord == RunPurposes.Production && fields.Lot is null)
            errors["lot"] = ["A production run belongs to a lot: send its id or number, or another purpose."];
        var deviceId = device?.Id ?? lot?.DeviceId;
        var condition = deviceId is { } id ? ConditionOf(fields.Condition, [.. found.Conditions.Where(c => c.DeviceId == id)], errors) : null;
        return errors.Count == 0
            ? new UploadPlace(deviceId!.Value, lot, condition!)
            : throw new RefusedException(new FieldRefused(errors));
    }

    private static FoundDevice? DeviceOf(string? name, IReadOnlyList<FoundDevice> found, Dictionary<string, string[]> errors)
    {
        if (name is null)
            return null;
        var byPart = found.Where(d => d.PartNumber == name).ToList();
        var fits = found.FirstOrDefault(d => IsId(name, d.Id)) is { } one ? [one] : byPart.Count > 0 ? byPart : [.. found];
        if (fits.Count == 1)
            return fits[0];
        errors["device"] = [fits.Count == 0
            ? $"There is no device {name}."
            : $"{name} fits several devices: {string.Join(", ", fits.Select(d => $"{d.PartNumber}/{d.Revision}"))}. Send one of these."];
        return null;
    }

    private static FoundLot? LotOf(string? name, IReadOnlyList<FoundLot> found, Guid? deviceId, Dictionary<string, string[]> errors)
    {
        if (name is null)
            return null;
        var fits = found.FirstOrDefault(l => IsId(name, l.Id)) is { } one ? [one] : found;
        List<FoundLot> ofDevice = [.. fits.Where(l => deviceId is null || l.DeviceId == deviceId)];
        if (ofDevice.Count == 1)
            return ofDevice[0];
        errors["lot"] = [fits.Count == 0 ? $"There is no lot {name}."
            : ofDevice.Count == 0 ? $"Lot {name} is a lot of another device."
            : $"Lots of {ofDevice.Count} devices have the number {name}. Name the device too, or send the lot's id."];
        return null;
    }

    private static FoundCondition? ConditionOf(string? name, IReadOnlyList<FoundCondition> ofDevice, Dictionary<string, string[]> errors)
    {
        var condition = name is null ? ofDevice[0] : ofDevice.FirstOrDefault(c => IsId(name, c.Id) || c.Name == name);
        if (condition is null)
            errors["condition"] = [$"The device has no condition {name}. It has {string.Join(", ", ofDevice.Select(c => c.Name))}."];
        return condition;
    }

    private static bool IsId(string text, Guid id) => Guid.TryParse(text, out var parsed) && parsed == id;
}
