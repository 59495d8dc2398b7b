namespace ResponseLedger.Bench;

/// <summary>The bench's token. It stands in a file or in the environment, never in the call, which others on the machine could read.</summary>
internal static class BenchToken
{
    public const string Variable = "RESPONSELEDGER_TOKEN";

    /// <summary>Reads it.</summary>
    /// <param name="file">The file that holds it, or null for the environment.</param>
    /// <param name="variable">The environment.</param>
    /// <param name="problem">Why there is none; null when there is.</param>
    public static string? Read(string? file, Func<string, string?> variable, out string? problem)
    {
        string? token;
        try
        {
            token = (file is null ? variable(Variable) : File.ReadAllText(file))?.Trim();
        }
        catch (Exception barred) when (barred is IOException or UnauthorizedAccessException)
        {
            problem = $"The token cannot be read. {barred.Message}";
            return null;
        }

        problem = string.IsNullOrEmpty(token) ? file is null ? $"No token: name its file with --token-file, or set {Variable}." : $"{file} holds no token."
            : token.Any(c => c is <= ' ' or > '~') ? $"{(file is null ? Variable : file)} holds more than a token: a token is one word without blanks."
            : null;
        return problem is null ? token : null;
    }
}
