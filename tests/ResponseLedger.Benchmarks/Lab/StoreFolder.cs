namespace ResponseLedger.Benchmarks.Lab;

/// <summary>Where the benchmark's cluster lives: on a real disk, for a commit in memory costs nothing and would flatter nobody.</summary>
internal static class StoreFolder
{
    /// <summary>Names the temporary folder, unless another one was named from outside.</summary>
    public static void Choose()
    {
        if (string.IsNullOrEmpty(Environment.GetEnvironmentVariable(TestDatabase.TestDatabases.FolderVariable)))
            Environment.SetEnvironmentVariable(TestDatabase.TestDatabases.FolderVariable, Path.GetTempPath());
    }
}
