namespace ResponseLedger.Ledger;

/// <summary>Checks proofs of a Merkle tree without its leaves. A malformed proof is a wrong one: nothing here throws on its contents.</summary>
public static class MerkleProof
{
    /// <summary>Whether a leaf stands at a position of the tree with that root (RFC 9162 section 2.1.3.2).</summary>
    /// <param name="leafIndex">Position of the leaf, from 0.</param>
    /// <param name="treeSize">Leaves in the tree.</param>
    /// <param name="leafHash">Hash of the leaf.</param>
    /// <param name="path">The audit path, from the leaf's sibling up.</param>
    /// <param name="root">Root of the tree.</param>
    public static bool VerifyInclusion(
        long leafIndex,
        long treeSize,
        ReadOnlySpan<byte> leafHash,
        IReadOnlyList<byte[]> path,
        ReadOnlySpan<byte> root)
    {
        ArgumentNullException.ThrowIfNull(path);
        if (leafIndex < 0 || leafIndex >= treeSize || !AreHashes(path) || leafHash.Length != MerkleTree.HashLength)
            return false;

        var fn = leafIndex;
        var sn = treeSize - 1;
        var r = leafHash.ToArray();
        foreach (var p in path)
        {
            if (sn == 0)
                return false;
            if ((fn & 1) == 1 || fn == sn)
            {
                r = MerkleTree.NodeHash(p, r);
                while ((fn & 1) == 0 && fn != 0)
                {
                    fn >>= 1;
                    sn >>= 1;
                }
            }
            else
            {
                r = MerkleTree.NodeHash(r, p);
            }

            fn >>= 1;
            sn >>= 1;
        }

        return sn == 0 && root.SequenceEqual(r);
    }

    /// <summary>Whether the tree of the later root begins with the tree of the earlier one (RFC 9162 section 2.1.4.2).</summary>
    /// <param name="fromSize">Leaves in the earlier tree, 1 or more.</param>
    /// <param name="toSize">Leaves in the later tree.</param>
    /// <param name="fromRoot">Root of the earlier tree.</param>
    /// <param name="toRoot">Root of the later tree.</param>
    /// <param name="proof">The consistency proof; empty where both sizes are equal.</param>
    public static bool VerifyConsistency(
        long fromSize,
        long toSize,
        ReadOnlySpan<byte> fromRoot,
        ReadOnlySpan<byte> toRoot,
        IReadOnlyList<byte[]> proof)
    {
        ArgumentNullException.ThrowIfNull(proof);
        if (fromSize < 1 || fromSize > toSize || !AreHashes(proof) || fromRoot.Length != MerkleTree.HashLength)
            return false;
        if (fromSize == toSize)
            return proof.Count == 0 && fromRoot.SequenceEqual(toRoot);

        // An earlier tree of a power of two is itself a node of the later one, so its root leads the proof unsaid.
        var hashes = new List<byte[]>(proof.Count + 1);
        if ((fromSize & (fromSize - 1)) == 0)
            hashes.Add(fromRoot.ToArray());
        hashes.AddRange(proof);
        if (hashes.Count == 0)
            return false;

        var fn = fromSize - 1;
        var sn = toSize - 1;
        while ((fn & 1) == 1)
        {
            fn >>= 1;
            sn >>= 1;
        }

        var fr = hashes[0];
        var sr = hashes[0];
        foreach (var c in hashes.Skip(1))
        {
            if (sn == 0)
                return false;
            if ((fn & 1) == 1 || fn == sn)
            {
                fr = MerkleTree.NodeHash(c, fr);
                sr = MerkleTree.NodeHash(c, sr);
                while ((fn & 1) == 0 && fn != 0)
                {
                    fn >>= 1;
                    sn >>= 1;
                }
            }
            else
            {
                sr = MerkleTree.NodeHash(sr, c);
            }

            fn >>= 1;
            sn >>= 1;
        }

        return sn == 0 && fromRoot.SequenceEqual(fr) && toRoot.SequenceEqual(sr);
    }

    private static bool AreHashes(IReadOnlyList<byte[]> hashes) => hashes.All(h => h is { Length: MerkleTree.HashLength });
}
