using System.Globalization;
using ResponseLedger.Formats.Text;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>The keyword lines of Touchstone 2.0, and the place in the file that they set.</summary>
internal sealed class TouchstoneKeywords(IssueList issues)
{
    private int referenceCount;
    private bool inReference;

    // Room for the resistances of every port; a longer line is no keyword.
    private const int LongestLine = 16_384;

    public bool IsVersion2 { get; private set; }

    public int? Ports { get; private set; }

    /// <summary>Whether two ports stand as S11 S21 S12 S22; null while not said.</summary>
    public bool? ColumnsFirst { get; private set; }

    public MatrixFormat Format { get; private set; }

    public int? FrequencyCount { get; private set; }

    public int? FrequencyCountLine { get; private set; }

    public bool InInformation { get; private set; }

    public bool InNetworkData { get; private set; }

    public bool InNoiseData { get; private set; }

    public bool Ended { get; private set; }

    /// <summary>Whether a keyword was refused, so that nothing after it can be trusted.</summary>
    public bool Refused { get; private set; }

    /// <summary>Whether lines of numbers still belong to [Reference].</summary>
    public bool TakesReference => inReference && referenceCount < (Ports ?? 0);

    public static bool NeedsOption(ReadOnlySpan<char> line) => Part(line, out _) is "network data";

    public void Read(ReadOnlySpan<char> line, int number)
    {
        string? name = Part(line, out string value);
        if (InInformation && name != "end information")
            return;
        if (inReference && TakesReference && name is not null)
            Refuse(number, $"[Reference] gives {referenceCount} of {Ports} resistances; give one a port.");
        inReference = false;
        switch (name)
        {
            case "version":
                IsVersion2 = value is "2.0" or "2.1";
                if (!IsVersion2)
                    Refuse(number, "The version is unknown; 2.0 is read, and 1.1 without this keyword.");
                break;
            case "number of ports":
                Ports = Count(value, 1, NetworkShape.MostPorts, number, "[Number of Ports]");
                break;
            case "two-port data order" or "two-port order":
                ColumnsFirst = value == "21_12" ? true : value == "12_21" ? false : null;
                if (ColumnsFirst is null)
                    Refuse(number, "[Two-Port Data Order] is neither 12_21 nor 21_12; state one of them.");
                break;
            case "number of frequencies":
                FrequencyCount = Count(value, 1, SweepFileReader.MostPoints, number, "[Number of Frequencies]");
                FrequencyCountLine = number;
                break;
            case "number of noise frequencies":
                Count(value, 0, int.MaxValue, number, "[Number of Noise Frequencies]");
                break;
            case "reference":
                inReference = true;
                referenceCount = 0;
                if (value.Length > 0)
                    ReadReference(value, number);
                break;
            case "matrix format":
                if (!Enum.TryParse(value, ignoreCase: true, out MatrixFormat format) || !Enum.IsDefined(format) || char.IsAsciiDigit(value[0]))
                    Refuse(number, "[Matrix Format] is neither Full, Lower nor Upper; state one of them.");
                else
                    Format = format;
                break;
            case "mixed-mode order":
                Refuse(number, "Mixed-mode parameters are not read; export single-ended S-parameters.");
                break;
            case "begin information":
                InInformation = true;
                break;
            case "end information":
                InInformation = false;
                break;
            case "network data":
                InNetworkData = true;
                if (!IsVersion2 || Ports is null)
                    Refuse(number, IsVersion2 ? "[Number of Ports] is missing before [Network Data]; state it." : "[Version] 2.0 is missing before [Network Data]; state it first.");
                break;
            case "noise data":
                InNetworkData = false;
                InNoiseData = true;
                break;
            case "end":
                Ended = true;
                break;
            default:
                Refuse(number, "The keyword is unknown to Touchstone 2.0; take the line out or correct it.");
                break;
        }
    }

    public void ReadReference(ReadOnlySpan<char> line, int number)
    {
        foreach (Range part in line.SplitAny(' ', '\t'))
        {
            ReadOnlySpan<char> word = line[part].Trim();
            if (word.IsEmpty)
                continue;
            referenceCount++;
            if (NumberText.Read(word, decimalComma: false, out double ohm) != NumberKind.Number || ohm <= 0)
                Refuse(number, "[Reference] holds something other than a positive resistance; correct it.");
        }

        if (Ports is { } ports && referenceCount > ports)
            Refuse(number, $"[Reference] gives {referenceCount} resistances for {ports} ports; give one a port.");
    }

    private int? Count(string value, int least, int most, int line, string keyword)
    {
        if (int.TryParse(value, NumberStyles.None, CultureInfo.InvariantCulture, out int count) && count >= least && count <= most)
            return count;
        Refuse(line, $"{keyword} is not a whole number from {least} to {most}; correct it.");
        return null;
    }

    private void Refuse(int line, string message)
    {
        issues.Add(line, null, ReadCodes.BadKeyword, message);
        Refused = true;
    }

    private static string? Part(ReadOnlySpan<char> line, out string value)
    {
        if (line.Length > LongestLine)
        {
            value = "";
            return null;
        }

        int close = line.IndexOf(']');
        value = close < 0 ? "" : line[(close + 1)..].Trim().ToString();
        return close < 0 || close > 64 ? null : line[1..close].Trim().ToString().ToLowerInvariant();
    }
}
