using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// The statistic of one voxel under one relabeling in double precision, by the reference formula. It decides what the single-precision loop nominates. One
/// object serves one thread.
/// </summary>
internal interface IExactStatistic
{
    /// <summary>Takes up a relabeling: the design row that describes each image, and the image's sign.</summary>
    void Arrange(ReadOnlySpan<int> rows, ReadOnlySpan<sbyte> signs);

    /// <summary>The statistic of a voxel, signed, under the relabeling last taken up.</summary>
    double Signed(int voxel);

    /// <summary>It as evidence: T, −T or |T|.</summary>
    double Evidence(int voxel);
}

/// <summary>How a signed statistic counts.</summary>
internal static class Oriented
{
    /// <summary>A signed T as evidence in a direction.</summary>
    public static double Of(double t, Direction direction) => direction switch
    {
        Direction.Greater => t,
        Direction.Less => -t,
        _ => Math.Abs(t),
    };
}
