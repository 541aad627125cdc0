using System.Runtime.InteropServices;
using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// The data as the kernels read it: every voxel's reduced-model residuals scaled to length 1, so that a partial correlation is one and the same function of sums over
/// them at every voxel. For the direction less the data are negated, so evidence is always upwards. Blocks of 64 voxels; the last is padded with its last real voxel.
/// </summary>
internal sealed unsafe class PackedData : IDisposable
{
    private readonly float* data;

    /// <summary>Packs the given voxels of <paramref name="study"/> (all when null).</summary>
    public PackedData(SubjectMatrix study, Model model, int[]? voxels = null, int threads = 1)
    {
        (Images, Voxels) = (study.Images, voxels?.Length ?? study.Voxels);
        data = (float*)NativeMemory.AlignedAlloc((nuint)((long)Blocks * Images * SubjectMatrix.Lanes * sizeof(float)), 64);
        double sign = model.Direction == Direction.Less ? -1 : 1;
        Parallel.For(0, Blocks, new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) }, block =>
        {
            Span<double> y = stackalloc double[Images];
            float* to = Block(block);
            for (int lane = 0; lane < SubjectMatrix.Lanes; lane++)
            {
                int at = Math.Min(block * SubjectMatrix.Lanes + lane, Voxels - 1);
                study.Column(voxels == null ? at : voxels[at], y);
                model.ReducedResiduals(y);
                double square = 0;
                foreach (double v in y) square += v * v;
                double scale = square > 0 ? sign / Math.Sqrt(square) : 0;
                for (int i = 0; i < y.Length; i++) to[i * SubjectMatrix.Lanes + lane] = (float)(y[i] * scale);
            }
        });
    }

    /// <summary>n.</summary>
    public int Images { get; }

    /// <summary>V.</summary>
    public int Voxels { get; }

    /// <summary>Blocks of 64 voxels.</summary>
    public int Blocks => (Voxels + SubjectMatrix.Lanes - 1) / SubjectMatrix.Lanes;

    /// <summary>One row of 64 floats per image.</summary>
    public float* Block(int block) => data + (long)block * Images * SubjectMatrix.Lanes;

    /// <inheritdoc/>
    public void Dispose() => NativeMemory.AlignedFree(data);
}
