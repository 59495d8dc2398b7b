using System.Runtime.CompilerServices;

[assembly: InternalsVisibleTo("ResponseLedger.Engine.Tests")]
