using System.Security.Cryptography;
using System.Text;

namespace ResponseLedger.Server.Http;

/// <summary>The pages' files and the shell page, with the version that stands in their addresses.</summary>
internal sealed class WebRoot
{
    private const string ImportMapStart = "<script type=\"importmap\">";
    private readonly bool fromSource;
    private (string Stamp, Shell Shell)? kept;

    /// <summary>Finds the pages of the server whose program stands in a folder.</summary>
    public WebRoot(string programFolder)
    {
        // A published server has the pages beside it, wherever its folder lies; a link there leads to somebody's source.
        var beside = new DirectoryInfo(Path.Combine(programFolder, "web"));
        var source = beside.Exists ? beside.ResolveLinkTarget(returnFinalTarget: true)?.FullName : InSource(programFolder);
        fromSource = source is not null;
        Folder = source ?? beside.FullName;
    }

    /// <summary>The folder that holds index.html.</summary>
    public string Folder { get; }

    /// <summary>Whether files may be cached for ever under their version; not while somebody edits the source.</summary>
    public bool IsImmutable => !fromSource;

    /// <summary>The content security policy of the shell as last sent; it names the hash of the import map, where there is one. Set on every answer, so it looks at no file.</summary>
    public string Policy => (kept?.Shell ?? Shell).Policy;

    /// <summary>The page that all addresses of the pages begin with.</summary>
    public Shell Shell
    {
        get
        {
            if (kept is { } shell && !fromSource)
                return shell.Shell;

            var files = Directory.Exists(Folder) ? new DirectoryInfo(Folder).GetFiles("*", SearchOption.AllDirectories).OrderBy(f => f.FullName, StringComparer.Ordinal).ToArray() : [];
            var stamp = string.Join('|', files.Select(f => $"{f.FullName}:{f.Length}:{f.LastWriteTimeUtc.Ticks}"));
            if (kept is { } before && before.Stamp == stamp)
                return before.Shell;

            var made = Make(files);
            kept = (stamp, made);
            return made;
        }
    }

    private Shell Make(FileInfo[] files)
    {
        using var all = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var file in files)
        {
            all.AppendData(Encoding.UTF8.GetBytes(Path.GetRelativePath(Folder, file.FullName).Replace('\\', '/')));
            all.AppendData(File.ReadAllBytes(file.FullName));
        }

        var version = Convert.ToHexStringLower(all.GetHashAndReset().AsSpan(0, 6));
        var index = Path.Combine(Folder, "index.html");
        var html = File.Exists(index) ? File.ReadAllText(index).Replace("{version}", version, StringComparison.Ordinal) : "";
        var bytes = Encoding.UTF8.GetBytes(html);
        return new Shell(version, bytes, $"\"{Convert.ToHexStringLower(SHA256.HashData(bytes).AsSpan(0, 16))}\"", PolicyFor(html));
    }

    private static string PolicyFor(string html)
    {
        var from = html.IndexOf(ImportMapStart, StringComparison.Ordinal);
        var hash = "";
        if (from >= 0)
        {
            from += ImportMapStart.Length;
            var map = html[from..html.IndexOf("</script>", from, StringComparison.Ordinal)];
            hash = $" 'sha256-{Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(map)))}'";
        }

        return $"default-src 'none'; script-src 'self'{hash}; style-src 'self'; img-src 'self' data:; connect-src 'self'; form-action 'self'; "
            + "base-uri 'none'; object-src 'none'; frame-ancestors 'none'; require-trusted-types-for 'script'; trusted-types lit-html responseledger";
    }

    private static string? InSource(string programFolder)
    {
        for (var folder = new DirectoryInfo(programFolder); folder is not null; folder = folder.Parent)
        {
            if (File.Exists(Path.Combine(folder.FullName, "ResponseLedger.sln")))
                return Path.Combine(folder.FullName, "web");
        }

        return null;
    }
}

/// <summary>The shell page as it is sent.</summary>
internal sealed record Shell(string Version, byte[] Html, string ETag, string Policy);
