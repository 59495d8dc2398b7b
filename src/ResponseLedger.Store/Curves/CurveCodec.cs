using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Security.Cryptography;
using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Store.Curves;

/// <summary>The one codec of stored curves and grids: planes of little-endian float64, one after the other.</summary>
public static class CurveCodec
{
    /// <summary>The bytes of a sweep's frequencies.</summary>
    public static byte[] PackGrid(Sweep sweep)
    {
        ArgumentNullException.ThrowIfNull(sweep);
        return Pack(sweep.FrequencyHz, []);
    }

    /// <summary>The bytes of a sweep's kept planes.</summary>
    public static byte[] PackPlanes(Sweep sweep)
    {
        ArgumentNullException.ThrowIfNull(sweep);
        return Pack(sweep.FirstPlane, sweep.SecondPlane);
    }

    /// <summary>The key of a grid: SHA-256 of its bytes.</summary>
    public static byte[] GridKey(ReadOnlySpan<byte> grid) => SHA256.HashData(grid);

    /// <summary>Makes the sweep again that was packed.</summary>
    /// <exception cref="InvalidDataException">The lengths do not fit the form: the store was changed behind the server's back.</exception>
    /// <param name="form">What the planes hold.</param>
    /// <param name="grid">The bytes of the frequencies.</param>
    /// <param name="planes">The bytes of the planes.</param>
    /// <param name="noiseFloorDb">The noise floor in dB that the reading went by, or null.</param>
    public static Sweep Unpack(SweepForm form, ReadOnlySpan<byte> grid, ReadOnlySpan<byte> planes, double? noiseFloorDb)
    {
        var planeCount = form is SweepForm.Level or SweepForm.Ratio ? 1 : 2;
        if (grid.Length % sizeof(double) != 0 || planes.Length != planeCount * grid.Length)
            throw new InvalidDataException($"A curve of form {form} with {grid.Length} bytes of grid cannot have {planes.Length} bytes of planes.");

        var frequencyHz = Doubles(grid);
        var values = Doubles(planes);
        return Sweep.Create(form, frequencyHz, values[..frequencyHz.Length], values[frequencyHz.Length..], phaseFloorDb: noiseFloorDb);
    }

    private static byte[] Pack(ReadOnlySpan<double> first, ReadOnlySpan<double> second)
    {
        var bytes = new byte[(first.Length + second.Length) * sizeof(double)];
        PackInto(bytes, first);
        PackInto(bytes.AsSpan(first.Length * sizeof(double)), second);
        return bytes;
    }

    private static void PackInto(Span<byte> target, ReadOnlySpan<double> plane)
    {
        if (BitConverter.IsLittleEndian)
        {
            MemoryMarshal.AsBytes(plane).CopyTo(target);
            return;
        }

        for (var i = 0; i < plane.Length; i++)
            BinaryPrimitives.WriteDoubleLittleEndian(target[(i * sizeof(double))..], plane[i]);
    }

    private static ReadOnlySpan<double> Doubles(ReadOnlySpan<byte> bytes)
    {
        if (BitConverter.IsLittleEndian)
            return MemoryMarshal.Cast<byte, double>(bytes);

        var values = new double[bytes.Length / sizeof(double)];
        for (var i = 0; i < values.Length; i++)
            values[i] = BinaryPrimitives.ReadDoubleLittleEndian(bytes[(i * sizeof(double))..]);
        return values;
    }
}
