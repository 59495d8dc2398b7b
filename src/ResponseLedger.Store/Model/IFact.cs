namespace ResponseLedger.Store.Model;

/// <summary>
/// A row that is written once. Triggers refuse UPDATE, DELETE and TRUNCATE on its table, and the server's
/// database role holds only SELECT and INSERT there; a change of state is a new row.
/// </summary>
public interface IFact;
