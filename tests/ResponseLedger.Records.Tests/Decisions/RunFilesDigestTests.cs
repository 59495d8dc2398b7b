using ResponseLedger.Records.Decisions;

namespace ResponseLedger.Records.Tests.Decisions;

/// <summary>The expected digests were computed by another program.</summary>
public sealed class RunFilesDigestTests
{
    private static readonly byte[] F = [.. Enumerable.Repeat((byte)0xff, 32)];
    private static readonly byte[] E = [.. Enumerable.Repeat((byte)0xee, 32)];

    [Fact]
    public void The_digest_covers_the_hashes_one_after_the_other()
    {
        Assert.Equal("fd51fdaaab6e53562dd87a55e13a0c5d2c9a23a55ff3a9e40dea44ff30bd8df0", Convert.ToHexStringLower(RunFilesDigest.Of([F, E])));
        Assert.Equal("af9613760f72635fbdb44a5a0a63c39f12af30f950a6ee5c971be188e89c4051", Convert.ToHexStringLower(RunFilesDigest.Of([F])));
    }

    [Fact]
    public void The_order_of_the_files_counts() => Assert.NotEqual(RunFilesDigest.Of([F, E]), RunFilesDigest.Of([E, F]));

    [Fact]
    public void No_file_or_a_hash_of_another_length_is_refused()
    {
        Assert.Throws<ArgumentException>(() => RunFilesDigest.Of([]));
        Assert.Throws<ArgumentException>(() => RunFilesDigest.Of([F, E[..31]]));
    }
}
