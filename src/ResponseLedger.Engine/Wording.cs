using System.Globalization;

namespace ResponseLedger.Engine;

/// <summary>How numbers stand in sentences that people read: seven significant digits and the unit.</summary>
internal static class Wording
{
    internal static string Hz(double frequencyHz) => Number(frequencyHz) + " Hz";

    internal static string Db(double levelDb) => Number(levelDb) + " dB";

    internal static string Deg(double angleDeg) => Number(angleDeg) + " degrees";

    internal static string Number(double value) => value.ToString("G7", CultureInfo.InvariantCulture);
}
