using System.Runtime.CompilerServices;

namespace Permute.Data;

/// <summary>
/// Turns the n values of one voxel into the residuals of the reduced model (the model without the tested effect), in place. Called from many threads at once.
/// </summary>
public delegate void ResidualRule(Span<double> y);

/// <summary>Why a voxel cannot be tested.</summary>
internal enum VoxelLoss : byte
{
    /// <summary>It can.</summary>
    None,

    /// <summary>It has the same value in every image.</summary>
    Constant,

    /// <summary>The reduced model explains it: residual sum of squares ≤ 1e-12 of Σy².</summary>
    Explained,
}

/// <summary>Sorts out the voxels whose values leave nothing to test.</summary>
internal static class UsableVoxels
{
    private const double Explained = 1e-12;
    private const int Chunk = 4096;

    /// <summary>The loss of each of the given voxels.</summary>
    public static VoxelLoss[] Losses(SubjectMatrix data, int[] voxels, ResidualRule reduced, ParallelOptions options)
    {
        var losses = new VoxelLoss[voxels.Length];
        Parallel.For(0, (voxels.Length + Chunk - 1) / Chunk, options, () => new double[data.Images], (c, _, y) =>
        {
            for (int v = c * Chunk; v < Math.Min(voxels.Length, (c + 1) * Chunk); v++)
            {
                data.Column(voxels[v], y);
                losses[v] = Loss(y, reduced);
            }
            return y;
        }, _ => { });
        return losses;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static VoxelLoss Loss(double[] y, ResidualRule reduced)
    {
        if (!y.AsSpan().ContainsAnyExcept(y[0])) return VoxelLoss.Constant;
        double largest = 0;
        foreach (double v in y) largest = Math.Max(largest, Math.Abs(v));
        // Scaled to a largest value of 1, so that squares neither vanish nor overflow.
        for (int i = 0; i < y.Length; i++) y[i] /= largest;
        double total = SumOfSquares(y);
        reduced(y);
        return SumOfSquares(y) <= Explained * total ? VoxelLoss.Explained : VoxelLoss.None;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static double SumOfSquares(double[] y)
    {
        double sum = 0;
        foreach (double v in y) sum += v * v;
        return sum;
    }
}
