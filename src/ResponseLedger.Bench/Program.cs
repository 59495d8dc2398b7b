using ResponseLedger.Bench;

return await BenchTool.RunAsync(args, Surroundings.OfThisProcess());
