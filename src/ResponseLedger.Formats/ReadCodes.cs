namespace ResponseLedger.Formats;

/// <summary>The stable codes of <see cref="ReadIssue"/>: programs may rely on them, sentences may change.</summary>
public static class ReadCodes
{
    /// <summary>The file holds nothing, or nothing but blanks.</summary>
    public const string EmptyFile = "emptyFile";

    /// <summary>The file is not text.</summary>
    public const string BinaryFile = "binaryFile";

    /// <summary>There is text but no row of two or more numbers.</summary>
    public const string NoData = "noData";

    /// <summary>What a column holds cannot be told; the candidates are offered.</summary>
    public const string ColumnsOpen = "columnsOpen";

    /// <summary>The columns or the parameter that were chosen do not fit the file or do not make a sweep.</summary>
    public const string BadChoice = "badChoice";

    /// <summary>Rows of numbers stand before the heads.</summary>
    public const string NumbersBeforeHeads = "numbersBeforeHeads";

    /// <summary>Whether a comma is a decimal mark or groups thousands cannot be told.</summary>
    public const string DecimalOpen = "decimalOpen";

    /// <summary>A number with a mark that groups thousands.</summary>
    public const string ThousandsSeparator = "thousandsSeparator";

    /// <summary>Text where a number is due.</summary>
    public const string BadNumber = "badNumber";

    /// <summary>A field of a used column is empty.</summary>
    public const string EmptyField = "emptyField";

    /// <summary>A row with fewer fields than its column count.</summary>
    public const string ShortRow = "shortRow";

    /// <summary>A row with more fields than its column count.</summary>
    public const string ExtraFields = "extraFields";

    /// <summary>A quotation mark that does not close on its line.</summary>
    public const string UnclosedQuote = "unclosedQuote";

    /// <summary>Not a number (NaN).</summary>
    public const string NotANumber = "notANumber";

    /// <summary>An infinite value, or one beyond the range of a double.</summary>
    public const string Infinite = "infinite";

    /// <summary>An instrument's sentinel for overload or no reading (9.9E37, 9.91E37).</summary>
    public const string Overload = "overload";

    /// <summary>A frequency of zero.</summary>
    public const string ZeroFrequency = "zeroFrequency";

    /// <summary>A negative frequency.</summary>
    public const string NegativeFrequency = "negativeFrequency";

    /// <summary>A frequency that stands in the file twice.</summary>
    public const string DuplicateFrequency = "duplicateFrequency";

    /// <summary>A Touchstone frequency under the one before it.</summary>
    public const string FrequencyFalls = "frequencyFalls";

    /// <summary>A negative magnitude or amplitude.</summary>
    public const string NegativeMagnitude = "negativeMagnitude";

    /// <summary>An input amplitude of zero, by which nothing can be divided.</summary>
    public const string ZeroInput = "zeroInput";

    /// <summary>Fewer than two points.</summary>
    public const string TooFewPoints = "tooFewPoints";

    /// <summary>More points than the reader takes.</summary>
    public const string TooManyPoints = "tooManyPoints";

    /// <summary>More fields in a line than the reader takes.</summary>
    public const string TooManyColumns = "tooManyColumns";

    /// <summary>A Touchstone option line that is missing, or that says something unknown.</summary>
    public const string BadOptionLine = "badOptionLine";

    /// <summary>A Touchstone keyword line that is missing, unknown or has a bad value.</summary>
    public const string BadKeyword = "badKeyword";

    /// <summary>Touchstone parameters other than S.</summary>
    public const string NotScattering = "notScattering";

    /// <summary>The number of ports of a Touchstone file cannot be told.</summary>
    public const string PortsUnknown = "portsUnknown";

    /// <summary>The engine refuses the sweep that the file makes.</summary>
    public const string RefusedSweep = "refusedSweep";
}
