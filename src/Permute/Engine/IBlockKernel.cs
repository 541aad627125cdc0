namespace Permute.Engine;

/// <summary>
/// Values v of many relabelings at some neighbouring voxels: a monotone score of the statistic, the same function at every voxel, in single precision. A kernel takes up a
/// tile of relabelings and then opens block after block of the packed data. One object serves one thread.
/// </summary>
internal unsafe interface IBlockKernel : IDisposable
{
    /// <summary>Voxels worked on at once: a divisor of 64.</summary>
    int Width { get; }

    /// <summary>Takes up the relabelings of a tile: what follows speaks of it by place.</summary>
    void Take(Tile relabelings);

    /// <summary>Turns to the voxels that begin at <paramref name="data"/>, one row of 64 floats per image.</summary>
    void Open(float* data);

    /// <summary>The values of the relabeling at one place of the tile, <see cref="Width"/> of them. Returns the lanes (bit i for lane i) whose value may be further off than the
    /// scoring's margin: only double precision can tell them, and what follows lists their places too.</summary>
    ulong Values(int place, float* to);

    /// <summary>Lists the places whose largest value (or |value|) here is above their floor. Returns how many.</summary>
    int AboveFloor(bool both, float* floor, int* places);

    /// <summary>As <see cref="AboveFloor"/>, and sets the bits of the voxels above each limit, from bit <paramref name="shift"/> of their word; words lie plane by plane
    /// (one plane a limit, and in direction both a last one for negative signs), one word a place, <paramref name="stride"/> words a plane.</summary>
    int AboveFloorAndLimits(bool both, float* floor, int* places, ReadOnlySpan<float> limits, ulong* words, int stride, int shift);

    /// <summary>Adds 1 to <paramref name="counts"/> (<see cref="Width"/> of them) for every relabeling whose value is above <paramref name="observed"/> + margin, and lists the
    /// places with a voxel nearer than the margin, which only double precision can decide. A place with a lane that <see cref="Values"/> reports is listed and not counted at
    /// all. Returns how many are listed.</summary>
    int CountAbove(bool both, float* observed, float margin, float* counts, int* places);
}
