using System.Numerics;

namespace Permute.Design;

/// <summary>
/// A relabeling family: the arrangements of the design that are as likely as the observed one when the null hypothesis holds. An arrangement
/// describes image i by design row <c>order[i]</c>, with the effect's sign turned where <c>sign[i]</c> is −1. Adding a family is one class that implements this
/// and one line in <see cref="Model"/>'s choice of it.
/// </summary>
public interface IRelabelings
{
    /// <summary>"sign flips", "label swaps", …</summary>
    string Kind { get; }

    /// <summary>The assumption under which the arrangements are equally likely, as words for the report.</summary>
    string Assumption { get; }

    /// <summary>Number of images.</summary>
    int Images { get; }

    /// <summary>Number of distinct arrangements (identical full rows do not count apart).</summary>
    BigInteger Possible { get; }

    /// <summary>Arrangements of the full list whose map equals the observed one: |map| in direction both, the map itself otherwise.</summary>
    BigInteger Ties(Direction direction);

    /// <summary>The arrangement of a rank below <see cref="Possible"/>; rank 0 is the observed one.</summary>
    void Unrank(long rank, Span<int> order, Span<sbyte> sign);

    /// <summary>The same family for another number of images, as like this one as can be, to say how many images a question would need.</summary>
    IRelabelings Grown(int images);

    /// <summary>A uniform random arrangement.</summary>
    void Draw(ref Philox random, Span<int> order, Span<sbyte> sign);
}
