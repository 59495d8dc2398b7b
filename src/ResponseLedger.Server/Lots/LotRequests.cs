using FluentValidation;
using ResponseLedger.Server.Devices;

namespace ResponseLedger.Server.Lots;

/// <summary>A lot to be opened. Texts are trimmed.</summary>
/// <param name="DeviceId">The device.</param>
/// <param name="Number">1 to 100 characters, unique within the device.</param>
/// <param name="Size">Units that the lot has, 1 to 100,000.</param>
/// <param name="Serials">Serial numbers of its units, as far as they are known; at most as many as the lot has units, each once.</param>
internal sealed record NewLot(Guid? DeviceId, string? Number, int? Size, IReadOnlyList<string?>? Serials = null);

internal sealed class NewLotValidator : AbstractValidator<NewLot>
{
    private const int LargestSize = 100_000;

    public NewLotValidator()
    {
        RuleFor(l => l.DeviceId).NotEmpty().WithMessage("A lot is one of a device: give its id.");
        RuleFor(l => l.Number).IsName();
        RuleFor(l => l.Size).Must(size => size is >= 1 and <= LargestSize).WithMessage($"The size is 1 to {LargestSize} units.");
        RuleForEach(l => l.Serials).IsName().When(l => l.Serials is not null);
        RuleFor(l => l.Serials)
            .Must((lot, serials) => serials is null || lot.Size is not { } size || serials.Count <= size)
            .WithMessage("There are more serial numbers than the lot has units.")
            .Must(serials => FirstRepeated(serials) is null)
            .WithMessage(lot => $"The serial number \"{FirstRepeated(lot.Serials)}\" stands twice.");
    }

    private static string? FirstRepeated(IReadOnlyList<string?>? serials)
    {
        var seen = new HashSet<string>(StringComparer.Ordinal);
        foreach (var serial in serials ?? [])
        {
            if (serial is not null && !seen.Add(serial.Trim()))
                return serial.Trim();
        }

        return null;
    }
}
