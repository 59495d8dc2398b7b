using System.Security.Cryptography;

namespace ResponseLedger.Records.Decisions;

/// <summary>
/// One digest for the files of a run: SHA-256 over the 32-byte SHA-256 hashes of the files, one after the other in the order
/// in which the run keeps them, with nothing between. A run of one file therefore has another digest than its file.
/// </summary>
public static class RunFilesDigest
{
    /// <summary>The digest, 32 bytes.</summary>
    /// <param name="fileSha256">SHA-256 of each file, 32 bytes each, 1 or more, in the run's order.</param>
    /// <exception cref="ArgumentException">There is no hash, or one is not 32 bytes long.</exception>
    public static byte[] Of(IReadOnlyList<byte[]> fileSha256)
    {
        ArgumentNullException.ThrowIfNull(fileSha256);
        if (fileSha256.Count == 0 || fileSha256.Any(h => h is not { Length: SHA256.HashSizeInBytes }))
            throw new ArgumentException("A run has one file or more, each with a hash of 32 bytes.", nameof(fileSha256));
        using var digest = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var hash in fileSha256)
            digest.AppendData(hash);
        return digest.GetHashAndReset();
    }
}
