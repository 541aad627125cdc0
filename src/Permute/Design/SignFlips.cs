using System.Numerics;

namespace Permute.Design;

/// <summary>Every image's sign may turn: errors are symmetric about 0, and under the null hypothesis so are the data (Fisher 1935, The Design of Experiments, §21).</summary>
public sealed class SignFlips(int images) : IRelabelings
{
    /// <inheritdoc/>
    public string Kind => "sign flips";

    /// <inheritdoc/>
    public string Assumption => "errors independent and symmetric about 0";

    /// <inheritdoc/>
    public int Images => images;

    /// <inheritdoc/>
    public BigInteger Possible => BigInteger.One << images;

    /// <inheritdoc/>
    /// <remarks>Turning every sign negates the map, which ties with it in direction both.</remarks>
    public BigInteger Ties(Direction direction) => direction == Direction.Both ? 2 : 1;

    /// <inheritdoc/>
    public void Unrank(long rank, Span<int> order, Span<sbyte> sign)
    {
        for (int i = 0; i < images; i++) (order[i], sign[i]) = (i, (rank >> i & 1) == 0 ? (sbyte)1 : (sbyte)-1);
    }

    /// <inheritdoc/>
    public void Draw(ref Philox random, Span<int> order, Span<sbyte> sign)
    {
        uint bits = 0;
        for (int i = 0; i < images; i++, bits >>= 1)
        {
            if (i % 32 == 0) bits = random.Next();
            (order[i], sign[i]) = (i, (bits & 1) == 0 ? (sbyte)1 : (sbyte)-1);
        }
    }

    /// <inheritdoc/>
    public IRelabelings Grown(int images) => new SignFlips(images);
}
