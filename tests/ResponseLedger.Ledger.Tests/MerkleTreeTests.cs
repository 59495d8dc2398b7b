using System.Text;
using CsCheck;

namespace ResponseLedger.Ledger.Tests;

public sealed class MerkleTreeTests
{
    private static readonly MerkleVectors Published = MerkleVectors.Published;

    private static byte[][] Leaves(int count) => [.. Published.Inputs.Take(count).Select(input => MerkleTree.LeafHash(input))];

    [Fact]
    public void The_vectors_are_all_there()
    {
        Assert.Equal(8, Published.Inputs.Count);
        Assert.Equal(4, Published.Inclusion.Count);
        Assert.Equal(4, Published.Consistency.Count);
    }

    [Fact]
    public void Leaf_and_node_hashes_come_out_as_published()
    {
        for (var i = 0; i < 8; i++)
            Assert.Equal(Published[$"L{i}"], MerkleTree.LeafHash(Published.Inputs[i]));
        for (var i = 0; i < 4; i++)
            Assert.Equal(Published[$"M{i}"], MerkleTree.NodeHash(Published[$"L{2 * i}"], Published[$"L{(2 * i) + 1}"]));
        Assert.Equal(Published["Q1"], MerkleTree.NodeHash(Published["M2"], Published["M3"]));
        Assert.Equal(Published["leaf(\"L123456\")"], MerkleTree.LeafHash("L123456"u8));
        Assert.Equal(Published["node(\"N123\",\"N456\")"], MerkleTree.NodeHash("N123"u8, "N456"u8));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    [InlineData(5)]
    [InlineData(6)]
    [InlineData(7)]
    [InlineData(8)]
    public void Roots_come_out_as_published(int size) => Assert.Equal(Published.Root(size), MerkleTree.Root(Leaves(size)));

    [Fact]
    public void Inclusion_proofs_come_out_as_published_and_verify()
    {
        foreach (var (index, size, path) in Published.Inclusion)
        {
            Assert.Equal(path, MerkleTree.InclusionProof(index, Leaves(size)));
            Assert.True(MerkleProof.VerifyInclusion(index, size, Published[$"L{index}"], path, Published.Root(size)));
        }
    }

    [Fact]
    public void Consistency_proofs_come_out_as_published_and_verify()
    {
        foreach (var (from, to, path) in Published.Consistency)
        {
            Assert.Equal(path, MerkleTree.ConsistencyProof(from, Leaves(to)));
            Assert.True(MerkleProof.VerifyConsistency(from, to, Published.Root(from), Published.Root(to), path));
        }
    }

    [Fact]
    public void Every_leaf_and_every_earlier_tree_of_small_trees_is_proved()
    {
        var leaves = Enumerable.Range(0, 40).Select(i => MerkleTree.LeafHash(Encoding.UTF8.GetBytes($"entry {i}"))).ToArray();
        for (var size = 1; size <= leaves.Length; size++)
        {
            var tree = leaves[..size];
            var root = MerkleTree.Root(tree);
            for (var i = 0; i < size; i++)
            {
                Assert.True(MerkleProof.VerifyInclusion(i, size, leaves[i], MerkleTree.InclusionProof(i, tree), root));
                var earlier = MerkleTree.Root(leaves[..(i + 1)]);
                Assert.True(MerkleProof.VerifyConsistency(i + 1, size, earlier, root, MerkleTree.ConsistencyProof(i + 1, tree)));
            }
        }
    }

    [Fact]
    public void A_proof_with_one_bit_turned_proves_nothing()
    {
        var draws =
            from size in Gen.Int[2, 40]
            from index in Gen.Int[0, size - 1]
            from bit in Gen.Int[0, (32 * 8) - 1]
            from pick in Gen.Int[0, 100]
            select (size, index, bit, pick);
        draws.Sample(
            draw =>
            {
                var leaves = Enumerable.Range(0, draw.size).Select(i => MerkleTree.LeafHash([(byte)i])).ToArray();
                var root = MerkleTree.Root(leaves);
                var path = Turned(MerkleTree.InclusionProof(draw.index, leaves), draw.pick, draw.bit);
                Assert.False(MerkleProof.VerifyInclusion(draw.index, draw.size, leaves[draw.index], path, root));
                if (draw.index + 1 == draw.size)
                    return;
                var earlier = MerkleTree.Root(leaves[..(draw.index + 1)]);
                var proof = Turned(MerkleTree.ConsistencyProof(draw.index + 1, leaves), draw.pick, draw.bit);
                Assert.False(MerkleProof.VerifyConsistency(draw.index + 1, draw.size, earlier, root, proof));
            },
            iter: 500,
            threads: 1);
    }

    [Fact]
    public void A_leaf_is_not_proved_at_another_place_or_in_another_tree()
    {
        var leaves = Leaves(7);
        var root = MerkleTree.Root(leaves);
        var path = MerkleTree.InclusionProof(3, leaves);
        for (var index = -1; index < 9; index++)
            Assert.Equal(index == 3, MerkleProof.VerifyInclusion(index, 7, leaves[3], path, root));
        Assert.False(MerkleProof.VerifyInclusion(3, 7, leaves[2], path, root));
        Assert.False(MerkleProof.VerifyInclusion(3, 7, leaves[3], path, MerkleTree.Root(Leaves(8))));
        Assert.False(MerkleProof.VerifyInclusion(3, 7, leaves[3], [.. path.Skip(1)], root));
        Assert.False(MerkleProof.VerifyInclusion(3, 7, leaves[3], [.. path, path[0]], root));
        Assert.False(MerkleProof.VerifyInclusion(3, 7, leaves[3], [[], .. path.Skip(1)], root));
        Assert.False(MerkleProof.VerifyInclusion(0, 0, leaves[3], [], root));
    }

    [Fact]
    public void A_proof_does_not_hold_for_a_tree_said_to_be_larger()
    {
        var leaves = Leaves(4);
        var path = MerkleTree.InclusionProof(0, leaves);
        Assert.True(MerkleProof.VerifyInclusion(0, 4, leaves[0], path, MerkleTree.Root(leaves)));
        Assert.False(MerkleProof.VerifyInclusion(0, 8, leaves[0], path, MerkleTree.Root(leaves)));
    }

    [Fact]
    public void A_rewritten_history_is_not_consistent()
    {
        var leaves = Leaves(8);
        var rewritten = Leaves(8);
        rewritten[1] = MerkleTree.LeafHash("another entry"u8);
        for (var from = 2; from < 8; from++)
        {
            var proof = MerkleTree.ConsistencyProof(from, rewritten);
            Assert.False(MerkleProof.VerifyConsistency(from, 8, MerkleTree.Root(leaves[..from]), MerkleTree.Root(rewritten), proof));
        }

        Assert.False(MerkleProof.VerifyConsistency(8, 8, MerkleTree.Root(leaves), MerkleTree.Root(rewritten), []));
        Assert.False(MerkleProof.VerifyConsistency(0, 8, MerkleTree.Root([]), MerkleTree.Root(leaves), []));
        Assert.False(MerkleProof.VerifyConsistency(3, 8, MerkleTree.Root(leaves[..3]), MerkleTree.Root(leaves), []));
    }

    [Fact]
    public void A_proof_of_what_the_tree_does_not_hold_is_not_made()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => MerkleTree.InclusionProof(3, Leaves(3)));
        Assert.Throws<ArgumentOutOfRangeException>(() => MerkleTree.InclusionProof(-1, Leaves(3)));
        Assert.Throws<ArgumentOutOfRangeException>(() => MerkleTree.ConsistencyProof(0, Leaves(3)));
        Assert.Throws<ArgumentOutOfRangeException>(() => MerkleTree.ConsistencyProof(4, Leaves(3)));
    }

    private static byte[][] Turned(IReadOnlyList<byte[]> proof, int pick, int bit)
    {
        byte[][] turned = [.. proof.Select(h => h.ToArray())];
        turned[pick % turned.Length][bit / 8] ^= (byte)(1 << (bit % 8));
        return turned;
    }
}
