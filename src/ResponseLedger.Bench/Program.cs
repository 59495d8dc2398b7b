using System.CommandLine;
using ResponseLedger.Bench;

var root = new RootCommand("The bench's side of ResponseLedger: look at sweep files before they are sent, and send them.")
{
    CheckCommand.Create(Console.Out),
    SendCommand.Create(Console.Out, () => new HttpClient()),
};
return await root.Parse(args).InvokeAsync();
