using System.Runtime.InteropServices;
using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// The data as the kernels read it: every voxel's reduced-model residuals scaled to length 1, so that the partial t is one monotone function of
/// v = Σ sᵢuᵢ, the same at every voxel: r = <see cref="Scale"/> v and t = r √ν / √(1 − r²). For the direction less the data are negated, so evidence is always
/// upwards. Blocks of 64 voxels; the last is padded with its last real voxel.
/// </summary>
internal sealed unsafe class PackedData : IDisposable
{
    private readonly float* data;

    /// <summary>Packs the given voxels of <paramref name="study"/> (all when null).</summary>
    public PackedData(SubjectMatrix study, Model model, int[]? voxels = null, int threads = 1)
    {
        (Images, Voxels) = (study.Images, voxels?.Length ?? study.Voxels);
        Scale = model.CodeScale / Math.Sqrt(model.Regressor.Sum(x => x * x));
        DegreesOfFreedom = model.DegreesOfFreedom;
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

    /// <summary>r per unit of v.</summary>
    public double Scale { get; }

    /// <summary>ν.</summary>
    public int DegreesOfFreedom { get; }

    /// <summary>One row of 64 floats per image.</summary>
    public float* Block(int block) => data + (long)block * Images * SubjectMatrix.Lanes;

    /// <summary>The v that a t of <paramref name="t"/> has: r = t/√(ν + t²), v = r/<see cref="Scale"/>.</summary>
    public double SumAt(double t) => (double.IsInfinity(t) ? Math.Sign(t) : t / Math.Sqrt(DegreesOfFreedom + t * t)) / Scale;

    /// <summary>
    /// Twice the largest error that single precision can make in v, and a little: two sums further apart than this are in their true order. Each of the
    /// <paramref name="depth"/> roundings is at most half a unit in the last place of a partial sum, and no partial sum exceeds Σ|uᵢ| ≤ √n (Higham 2002, Accuracy and
    /// stability of numerical algorithms, §4.2).
    /// </summary>
    public float Margin(int depth) => (float)(2 * (depth + 2) * Math.Pow(2, -24) * Math.Sqrt(Images) + 1e-7);

    /// <inheritdoc/>
    public void Dispose() => NativeMemory.AlignedFree(data);
}
