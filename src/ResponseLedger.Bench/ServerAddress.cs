namespace ResponseLedger.Bench;

/// <summary>The address that runs are sent to.</summary>
internal static class ServerAddress
{
    /// <summary>Where it is when nothing else is said: the server of this machine.</summary>
    public const string Usual = "http://127.0.0.1:5080";

    /// <summary>Reads an address; a path in it is where a proxy has put the server.</summary>
    /// <param name="text">The address.</param>
    /// <param name="plainAllowed">Whether http may leave this machine.</param>
    /// <param name="problem">What is wrong with it; null when it serves.</param>
    /// <returns>The address, ending in a slash.</returns>
    public static Uri? Read(string text, bool plainAllowed, out string? problem)
    {
        if (!Uri.TryCreate(text, UriKind.Absolute, out var address) || address.Scheme is not ("http" or "https") || address.Host.Length == 0)
            problem = $"\"{text}\" is no address of a server. Write it as https://lab.example or {Usual}.";
        else if (address.Scheme == "http" && !address.IsLoopback && !plainAllowed)
            problem = $"To {address} the token and the files would go unencrypted. Use https, or say --allow-plain-http where the network is yours alone.";
        else
            problem = null;
        return problem is null ? new UriBuilder(address!) { Path = address!.AbsolutePath.TrimEnd('/') + "/", Query = "", Fragment = "" }.Uri : null;
    }
}
