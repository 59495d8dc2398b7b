using System.Buffers;
using System.Security.Cryptography;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>
/// A file part that waits until all fields are known: small ones in memory, others in a temporary file that goes when it is closed.
/// </summary>
internal sealed class SpooledFile : IAsyncDisposable
{
    public const long LargestBytes = 64L << 20;
    public const string LargestWords = "64 MiB";

    private static ReadOnlySpan<byte> ZipMark => "PK\x03\x04"u8;

    private const int InMemoryBytes = 1 << 20;
    private const int ChunkBytes = 64 << 10;
    private const int UsualBytes = 64 << 10;

    private readonly Stream? content;

    private SpooledFile(string name, Stream? content, byte[] sha256, bool isZip)
    {
        Name = name;
        IsZip = isZip;
        this.content = content;
        Sha256 = sha256;
    }

    /// <summary>The file's name without folders.</summary>
    public string Name { get; }

    /// <summary>SHA-256 of the bytes; empty when the file is too large to be taken.</summary>
    public byte[] Sha256 { get; }

    /// <summary>Whether the file is over the limit; then nothing of it was kept.</summary>
    public bool IsTooLarge => content is null;

    /// <summary>Whether it begins as a zip archive does.</summary>
    public bool IsZip { get; }

    /// <summary>Keeps a part until its turn comes.</summary>
    /// <param name="name">The file's name.</param>
    /// <param name="part">The part's body.</param>
    /// <param name="counted">Told the size of every chunk; throws when the request grows too large.</param>
    /// <param name="cancellationToken">Stops the reading.</param>
    public static async Task<SpooledFile> KeepAsync(string name, Stream part, Action<int> counted, CancellationToken cancellationToken)
    {
        using var digest = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        var chunk = ArrayPool<byte>.Shared.Rent(ChunkBytes);
        Stream? kept = new MemoryStream(UsualBytes);
        try
        {
            long length = 0;
            var isZip = false;
            int read;
            while ((read = await part.ReadAsync(chunk, cancellationToken)) > 0)
            {
                counted(read);
                isZip |= length == 0 && chunk.AsSpan(0, read).StartsWith(ZipMark);
                length += read;
                if (length > LargestBytes && kept is not null)
                {
                    await kept.DisposeAsync();
                    kept = null;
                }

                if (kept is null)
                    continue;
                if (length > InMemoryBytes && kept is MemoryStream memory)
                    kept = await MovedToDiskAsync(memory, cancellationToken);
                digest.AppendData(chunk, 0, read);
                await kept.WriteAsync(chunk.AsMemory(0, read), cancellationToken);
            }

            return new SpooledFile(name, kept, kept is null ? [] : digest.GetHashAndReset(), isZip);
        }
        catch
        {
            if (kept is not null)
                await kept.DisposeAsync();
            throw;
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(chunk);
        }
    }

    /// <summary>The bytes, where they are kept in memory; else null.</summary>
    public ReadOnlyMemory<byte>? InMemory => content is MemoryStream memory ? memory.GetBuffer().AsMemory(0, (int)memory.Length) : null;

    /// <summary>All bytes, in an array of exactly their length.</summary>
    public async Task<byte[]> BytesAsync(CancellationToken cancellationToken)
    {
        if (content is MemoryStream memory)
            return memory.ToArray();
        if (content is null)
            throw new InvalidOperationException("A file over the limit was not kept.");
        content.Position = 0;
        var bytes = new byte[content.Length];
        await content.ReadExactlyAsync(bytes, cancellationToken);
        return bytes;
    }

    public ValueTask DisposeAsync() => content?.DisposeAsync() ?? ValueTask.CompletedTask;

    private static async Task<Stream> MovedToDiskAsync(MemoryStream memory, CancellationToken cancellationToken)
    {
        var options = new FileStreamOptions
        {
            Mode = FileMode.CreateNew,
            Access = FileAccess.ReadWrite,
            Options = FileOptions.DeleteOnClose | FileOptions.Asynchronous,
        };
        if (!OperatingSystem.IsWindows())
            options.UnixCreateMode = UnixFileMode.UserRead | UnixFileMode.UserWrite;
        var file = new FileStream(Path.Combine(Path.GetTempPath(), "responseledger-" + Path.GetRandomFileName()), options);
        memory.Position = 0;
        await memory.CopyToAsync(file, cancellationToken);
        await memory.DisposeAsync();
        return file;
    }
}
