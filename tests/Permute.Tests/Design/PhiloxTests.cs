using Permute.Design;

namespace Permute.Tests.Design;

public class PhiloxTests
{
    /// <summary>The known-answer vectors that the authors of Salmon et al. (2011) publish with their code; the printed values are from memory.</summary>
    [Theory]
    [InlineData(0x00000000u, 0x00000000u, 0x00000000u, 0x00000000u, 0x00000000u, 0x00000000u, 0x6627e8d5u, 0xe169c58du, 0xbc57ac4cu, 0x9b00dbd8u)]
    [InlineData(0xffffffffu, 0xffffffffu, 0xffffffffu, 0xffffffffu, 0xffffffffu, 0xffffffffu, 0x408f276du, 0x41c83b0eu, 0xa20bc7c6u, 0x6d5451fdu)]
    [InlineData(0x243f6a88u, 0x85a308d3u, 0x13198a2eu, 0x03707344u, 0xa4093822u, 0x299f31d0u, 0xd16cfe09u, 0x94fdccebu, 0x5001e420u, 0x24126ea1u)]
    public void Blocks_equal_the_published_known_answers(uint c0, uint c1, uint c2, uint c3, uint k0, uint k1, uint a, uint b, uint c, uint d) =>
        Assert.Equal((a, b, c, d), Philox.Block((c0, c1, c2, c3), k0, k1));

    [Fact]
    public void A_stream_depends_on_seed_and_index_alone()
    {
        static uint[] Take(long seed, long index)
        {
            var random = new Philox(seed, index);
            return [.. Enumerable.Range(0, 9).Select(_ => random.Next())];
        }
        Assert.Equal(Take(4, 10), Take(4, 10));
        Assert.NotEqual(Take(4, 10), Take(4, 11));
        Assert.NotEqual(Take(4, 10), Take(5, 10));
        Assert.NotEqual(Take(1L << 40, 10), Take(0, 10));
    }

    [Fact]
    public void Whole_numbers_below_a_bound_are_equally_likely()
    {
        var random = new Philox(2, 0);
        var counts = new int[7];
        for (int i = 0; i < 70000; i++) counts[random.Below(7)]++;
        // χ² with 6 degrees of freedom; 22.46 is its 0.1 % point in any printed table.
        Assert.True(counts.Sum(c => (c - 10000.0) * (c - 10000.0) / 10000) < 22.46);
    }
}
