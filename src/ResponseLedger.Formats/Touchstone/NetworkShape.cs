using System.Globalization;

namespace ResponseLedger.Formats.Touchstone;

/// <summary>Which entries of the matrix a file holds.</summary>
internal enum MatrixFormat
{
    Full,
    Lower,
    Upper,
}

/// <summary>Where the pair of a parameter stands in a record of frequency and pairs.</summary>
/// <param name="Ports">Number of ports, 1 or more.</param>
/// <param name="Format">Which entries the file holds.</param>
/// <param name="ColumnsFirst">Two ports in the order S11 S21 S12 S22, as version 1 has it.</param>
internal readonly record struct NetworkShape(int Ports, MatrixFormat Format, bool ColumnsFirst)
{
    /// <summary>More ports than any lab has; bounds the record.</summary>
    public const int MostPorts = 256;

    public int PairCount => Format == MatrixFormat.Full ? Ports * Ports : Ports * (Ports + 1) / 2;

    /// <summary>Numbers of one record: the frequency and the pairs.</summary>
    public int NumberCount => 1 + 2 * PairCount;

    /// <summary>The 0-based pair of S(row, column), both 1-based. A triangular file is symmetric.</summary>
    public int PairOf(int row, int column)
    {
        switch (Format)
        {
            case MatrixFormat.Lower:
                (int below, int right) = row >= column ? (row, column) : (column, row);
                return below * (below - 1) / 2 + right - 1;
            case MatrixFormat.Upper:
                (int above, int beyond) = row <= column ? (row, column) : (column, row);
                return (above - 1) * Ports - (above - 1) * (above - 2) / 2 + beyond - above;
            default:
                return ColumnsFirst ? (column - 1) * Ports + row - 1 : (row - 1) * Ports + column - 1;
        }
    }

    /// <summary>Reads "S21", "s2,1", "S(10,1)", "S10_1" for this number of ports.</summary>
    public bool TryParameter(string text, out int row, out int column)
    {
        row = column = 0;
        string inner = text.Trim();
        if (inner.Length is < 3 or > 16 || inner[0] is not ('S' or 's'))
            return false;
        inner = inner[1..].Trim('(', ')', '[', ']', ' ');
        string[] parts = inner.Split(',', '_');
        // Without a mark only two digits are clear.
        if (parts.Length == 1 && inner.Length == 2)
            parts = [inner[..1], inner[1..]];
        return parts.Length == 2
            && int.TryParse(parts[0], NumberStyles.AllowLeadingWhite | NumberStyles.AllowTrailingWhite, CultureInfo.InvariantCulture, out row)
            && int.TryParse(parts[1], NumberStyles.AllowLeadingWhite | NumberStyles.AllowTrailingWhite, CultureInfo.InvariantCulture, out column)
            && row >= 1 && row <= Ports && column >= 1 && column <= Ports;
    }

    public static string NameOf(int row, int column) => row > 9 || column > 9 ? $"S{row},{column}" : $"S{row}{column}";
}
