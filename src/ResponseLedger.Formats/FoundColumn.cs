namespace ResponseLedger.Formats;

/// <summary>A column of a delimited file as it was read.</summary>
/// <param name="Column">The 1-based column.</param>
/// <param name="Head">Its head as it stands in the file; empty where there is none.</param>
/// <param name="Quantity">What it was taken for; <see cref="ColumnQuantity.Ignore"/> when it was left aside or is open.</param>
/// <param name="Unit">The unit it was taken in; empty when left aside or open.</param>
public sealed record FoundColumn(int Column, string Head, ColumnQuantity Quantity, string Unit);
