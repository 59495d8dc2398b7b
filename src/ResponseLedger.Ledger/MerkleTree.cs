using System.Numerics;
using System.Security.Cryptography;

namespace ResponseLedger.Ledger;

/// <summary>The Merkle tree of RFC 9162 section 2.1 (RFC 6962 section 2.1) over SHA-256: hashes, roots and proofs from leaf hashes.</summary>
public static class MerkleTree
{
    /// <summary>Length of every hash, in bytes.</summary>
    public const int HashLength = SHA256.HashSizeInBytes;

    /// <summary>Hash of a leaf: SHA-256 of 0x00 and the entry's bytes.</summary>
    public static byte[] LeafHash(ReadOnlySpan<byte> entry)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData([0x00]);
        hash.AppendData(entry);
        return hash.GetHashAndReset();
    }

    /// <summary>Hash of an inner node: SHA-256 of 0x01 and both children.</summary>
    public static byte[] NodeHash(ReadOnlySpan<byte> left, ReadOnlySpan<byte> right)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hash.AppendData([0x01]);
        hash.AppendData(left);
        hash.AppendData(right);
        return hash.GetHashAndReset();
    }

    /// <summary>Root over leaf hashes in order; of none it is SHA-256 of nothing.</summary>
    public static byte[] Root(IReadOnlyList<byte[]> leafHashes)
    {
        ArgumentNullException.ThrowIfNull(leafHashes);
        return leafHashes.Count == 0 ? SHA256.HashData([]) : Range(leafHashes, 0, leafHashes.Count);
    }

    /// <summary>Audit path of a leaf, from the leaf's sibling up (RFC 9162 section 2.1.3.1).</summary>
    /// <param name="leafIndex">Position of the leaf, from 0.</param>
    /// <param name="leafHashes">All leaf hashes of the tree.</param>
    /// <exception cref="ArgumentOutOfRangeException">The tree has no such leaf.</exception>
    public static IReadOnlyList<byte[]> InclusionProof(int leafIndex, IReadOnlyList<byte[]> leafHashes)
    {
        ArgumentNullException.ThrowIfNull(leafHashes);
        ArgumentOutOfRangeException.ThrowIfNegative(leafIndex);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(leafIndex, leafHashes.Count);
        var path = new List<byte[]>();
        AddPath(path, leafHashes, 0, leafHashes.Count, leafIndex);
        return path;
    }

    /// <summary>Proof that the tree grew from its first leaves without a change (RFC 9162 section 2.1.4.1).</summary>
    /// <param name="fromSize">The earlier size, 1 to the present size; the proof of a tree against itself is empty.</param>
    /// <param name="leafHashes">All leaf hashes of the later tree.</param>
    /// <exception cref="ArgumentOutOfRangeException">The earlier size is under 1 or above the present one.</exception>
    public static IReadOnlyList<byte[]> ConsistencyProof(int fromSize, IReadOnlyList<byte[]> leafHashes)
    {
        ArgumentNullException.ThrowIfNull(leafHashes);
        ArgumentOutOfRangeException.ThrowIfLessThan(fromSize, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(fromSize, leafHashes.Count);
        var proof = new List<byte[]>();
        AddSubproof(proof, leafHashes, 0, leafHashes.Count, fromSize, earlierRootIsKnown: true);
        return proof;
    }

    private static void AddPath(List<byte[]> path, IReadOnlyList<byte[]> leaves, int start, int count, int index)
    {
        if (count == 1)
            return;
        var k = LargestPowerOfTwoBelow(count);
        if (index < k)
        {
            AddPath(path, leaves, start, k, index);
            path.Add(Range(leaves, start + k, count - k));
        }
        else
        {
            AddPath(path, leaves, start + k, count - k, index - k);
            path.Add(Range(leaves, start, k));
        }
    }

    private static void AddSubproof(List<byte[]> proof, IReadOnlyList<byte[]> leaves, int start, int count, int m, bool earlierRootIsKnown)
    {
        if (m == count)
        {
            if (!earlierRootIsKnown)
                proof.Add(Range(leaves, start, count));
            return;
        }

        var k = LargestPowerOfTwoBelow(count);
        if (m <= k)
        {
            AddSubproof(proof, leaves, start, k, m, earlierRootIsKnown);
            proof.Add(Range(leaves, start + k, count - k));
        }
        else
        {
            AddSubproof(proof, leaves, start + k, count - k, m - k, earlierRootIsKnown: false);
            proof.Add(Range(leaves, start, k));
        }
    }

    private static byte[] Range(IReadOnlyList<byte[]> leaves, int start, int count)
    {
        if (count == 1)
            return leaves[start];
        var k = LargestPowerOfTwoBelow(count);
        return NodeHash(Range(leaves, start, k), Range(leaves, start + k, count - k));
    }

    private static int LargestPowerOfTwoBelow(int count) => 1 << BitOperations.Log2((uint)(count - 1));
}
