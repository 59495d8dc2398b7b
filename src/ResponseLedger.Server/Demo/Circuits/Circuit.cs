using System.Numerics;

namespace ResponseLedger.Server.Demo.Circuits;

/// <summary>A circuit of the demo lab: its complex gain at a frequency in Hz, out of its component values.</summary>
internal delegate Complex Circuit(double frequencyHz);

/// <summary>What can be wrong with an invented unit.</summary>
internal enum Fault
{
    /// <summary>Nothing: tolerances only.</summary>
    None,

    /// <summary>A capacitor of the next value in the bin was fitted.</summary>
    WrongCapacitor,

    /// <summary>A solder joint is open, so that a part is not in circuit.</summary>
    OpenJoint,

    /// <summary>The output leads are swapped.</summary>
    InvertedLeads,
}

/// <summary>Draws component values: seeded, so that the invented lab is the same on every machine.</summary>
internal sealed class Parts(int seed)
{
    private readonly Random random = new(seed);

    /// <summary>How much of the spread is drawn: 1 for production, 0 for a unit with the nominal values.</summary>
    public double Spread { get; init; } = 1;

    /// <summary>A component of a nominal value whose spread (one standard deviation) is a third of its tolerance.</summary>
    public double Draw(double nominal, double tolerance)
        => nominal * (1 + (Spread * tolerance / 3 * Math.Clamp(Normal(), -3, 3)));

    /// <summary>A normal deviate by the method of Box and Muller (1958).</summary>
    public double Normal()
        => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
