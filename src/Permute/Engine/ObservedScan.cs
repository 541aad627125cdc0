using System.Numerics;
using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>Which voxels of the observed map lie above a forming threshold, by the loop's own single-precision sums in their canonical order, so that the observed clusters
/// are the ones that relabeling 0 was recorded with.</summary>
internal static unsafe class ObservedScan
{
    /// <summary>Voxels with T &gt; u, and voxels with T &lt; −u; in direction greater or less only the side tested is filled.</summary>
    public static (bool[] Positive, bool[] Negative) Above(LoopData loop, int threshold)
    {
        var up = new bool[loop.Study.Voxels];
        var down = new bool[loop.Study.Voxels];
        using IBlockKernel kernel = loop.Scoring.Kernel(loop.InstructionSet);
        Tile tile = loop.Tile(0, 1);
        kernel.Take(tile);
        float limit = loop.Limits[threshold];
        float* v = stackalloc float[kernel.Width];
        for (int first = 0; first < loop.Study.Voxels; first += kernel.Width)
        {
            kernel.Open(loop.Packed.Block(first / SubjectMatrix.Lanes) + first % SubjectMatrix.Lanes);
            for (ulong m = kernel.Values(0, v); m != 0; m &= m - 1)
            {
                int lane = BitOperations.TrailingZeroCount(m);
                if (first + lane < up.Length) v[lane] = (float)loop.Scoring.ValueAt(loop.Upwards(loop.Observed[first + lane]));
            }
            for (int lane = 0; lane < kernel.Width && first + lane < up.Length; lane++)
            {
                up[first + lane] = v[lane] > limit;
                down[first + lane] = loop.Both && v[lane] < -limit;
            }
        }
        // For less the packed data are negated: what is above is negative.
        return loop.Model.Direction == Direction.Less ? (down, up) : (up, down);
    }
}
