using System.Buffers.Text;
using System.Security.Cryptography;

namespace ResponseLedger.Server.People;

/// <summary>
/// A bench token: <c>rl1_</c>, its id and 256 random bits, both in base64url. The id finds the row, so that no search runs over
/// secrets; of the rest only a SHA-256 is kept, which is enough for bits that nobody can guess.
/// </summary>
internal static class TokenSecret
{
    private const string Mark = "rl1_";
    private const int SecretBytes = 32;
    private const int IdLetters = 22;
    private const int SecretLetters = 43;

    /// <summary>Makes a token: the text to hand out once, and the hash to keep.</summary>
    public static (string Token, byte[] Hash) Make(Guid id)
    {
        var secret = RandomNumberGenerator.GetBytes(SecretBytes);
        return ($"{Prefix(id)}_{Base64Url.EncodeToString(secret)}", SHA256.HashData(secret));
    }

    /// <summary>The part of a token that may be shown.</summary>
    public static string Prefix(Guid id) => Mark + Base64Url.EncodeToString(id.ToByteArray(bigEndian: true));

    /// <summary>Takes a token apart; false when it is none.</summary>
    public static bool TryRead(ReadOnlySpan<char> token, out Guid id, out byte[] hash)
    {
        id = Guid.Empty;
        hash = [];
        Span<byte> idBytes = stackalloc byte[16];
        Span<byte> secret = stackalloc byte[SecretBytes];
        if (token.Length != Mark.Length + IdLetters + 1 + SecretLetters || !token.StartsWith(Mark, StringComparison.Ordinal) || token[Mark.Length + IdLetters] != '_'
            || !TryDecode(token.Slice(Mark.Length, IdLetters), idBytes) || !TryDecode(token[^SecretLetters..], secret))
            return false;

        id = new Guid(idBytes, bigEndian: true);
        hash = SHA256.HashData(secret);
        return true;
    }

    private static bool TryDecode(ReadOnlySpan<char> letters, Span<byte> into)
        => Base64Url.IsValid(letters, out var length) && length == into.Length && Base64Url.TryDecodeFromChars(letters, into, out _);
}
