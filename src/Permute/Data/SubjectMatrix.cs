using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace Permute.Data;

/// <summary>
/// The data Y: n images × V voxels, laid out as the relabeling loop reads them: blocks of 64 neighbouring voxels, in a block one row of 64
/// floats per image, 64-byte aligned. What a float cannot hold of a value (double or scaled integer images, tables) is kept beside it as a
/// second float, so a value read back is exact to about 48 bits; images stored in single precision need no second part.
/// </summary>
public sealed unsafe partial class SubjectMatrix : IDisposable
{
    /// <summary>Voxels per block.</summary>
    public const int Lanes = 64;

    private readonly void* highMemory;
    private readonly float* high;
    private void* lowMemory;
    private float* low;
    private bool disposed;

    /// <summary>A matrix of zeros for <paramref name="images"/> images of <paramref name="voxels"/> voxels.</summary>
    public SubjectMatrix(int images, int voxels)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(images, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(voxels, 1);
        (Images, Voxels) = (images, voxels);
        high = Allocate(out highMemory);
    }

    /// <summary>n, the number of images (rows).</summary>
    public int Images { get; }

    /// <summary>V, the number of voxels or variables (columns).</summary>
    public int Voxels { get; }

    /// <summary>Number of blocks of 64 voxels; the last one is padded with zeros.</summary>
    public int Blocks => (Voxels + Lanes - 1) / Lanes;

    /// <summary>The value of one image at one voxel. Setting keeps 48 bits of it. Setting different images from different threads is safe only through
    /// <see cref="KeepSecondParts"/> called first.</summary>
    public double this[int image, int voxel]
    {
        get
        {
            long at = Offset(image, voxel);
            return low == null ? high[at] : (double)high[at] + low[at];
        }
        set
        {
            long at = Offset(image, voxel);
            float first = (float)value;
            high[at] = first;
            float second = float.IsFinite(first) ? (float)(value - first) : 0;
            if (low != null) low[at] = second;
            else if (second != 0)
            {
                KeepSecondParts();
                low[at] = second;
            }
        }
    }

    /// <summary>Makes room for the second parts now (so that many threads may then set values of different images at once).</summary>
    public void KeepSecondParts()
    {
        if (low == null) low = Allocate(out lowMemory);
    }

    private void ForgetSecondParts()
    {
        NativeMemory.Free(lowMemory);
        lowMemory = low = null;
    }

    /// <summary>Copies the n values of one voxel into <paramref name="column"/> (length n).</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Column(int voxel, Span<double> column)
    {
        long at = Offset(0, voxel);
        for (int i = 0; i < Images; i++, at += Lanes) column[i] = low == null ? high[at] : (double)high[at] + low[at];
    }

    /// <summary>The matrix of the given rows of numbers (image, then voxel).</summary>
    public static SubjectMatrix FromRows(IReadOnlyList<double[]> rows)
    {
        var matrix = new SubjectMatrix(rows.Count, rows[0].Length);
        for (int i = 0; i < rows.Count; i++)
            for (int v = 0; v < rows[i].Length; v++) matrix[i, v] = rows[i][v];
        return matrix;
    }

    /// <summary>Bytes held.</summary>
    public long Bytes => (long)Blocks * Images * Lanes * sizeof(float) * (low == null ? 1 : 2);

    /// <inheritdoc/>
    public void Dispose()
    {
        if (disposed) return;
        disposed = true;
        NativeMemory.Free(highMemory);
        NativeMemory.Free(lowMemory);
        GC.SuppressFinalize(this);
    }

    /// <summary>Frees the native memory.</summary>
    ~SubjectMatrix() => Dispose();

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private long Offset(int image, int voxel) => ((long)(voxel / Lanes) * Images + image) * Lanes + voxel % Lanes;

    /// <summary>Zeros, 64-byte aligned. The system hands out zeroed pages when they are first touched, so nothing is cleared here and many threads share that work.</summary>
    private float* Allocate(out void* memory)
    {
        nuint bytes = (nuint)((long)Blocks * Images * Lanes * sizeof(float));
        memory = NativeMemory.AllocZeroed(bytes + 64);
        return (float*)(((nuint)memory + 63) & ~(nuint)63);
    }
}
