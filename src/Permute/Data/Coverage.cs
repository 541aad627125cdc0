using System.Numerics;
using System.Runtime.CompilerServices;

namespace Permute.Data;

/// <summary>
/// Which voxels every image has data for, and what each image costs. A voxel is lost through an image where its value is not finite, and, for a derived
/// mask, in the image's background.
/// </summary>
internal sealed class Coverage
{
    private readonly VoxelBits[] lost;
    private readonly VoxelBits[] zeros;

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private Coverage(VoxelBits[] lost, VoxelBits[] zeros)
    {
        (this.lost, this.zeros) = (lost, zeros);
        int voxels = lost[0].Count;
        (Inside, AloneCost, InSome) = (new VoxelBits(voxels), new long[lost.Length], 0);
        for (int w = 0; w < Inside.Words.Length; w++)
        {
            ulong once = 0, twice = 0, all = ulong.MaxValue;
            foreach (var image in lost)
            {
                twice |= once & image.Words[w];
                once |= image.Words[w];
                all &= image.Words[w];
            }
            Inside.Words[w] = ~once & Inside.Valid(w);
            InSome += BitOperations.PopCount(once & ~all);
            for (int i = 0; i < lost.Length; i++) AloneCost[i] += BitOperations.PopCount(lost[i].Words[w] & ~twice);
        }
    }

    /// <summary>Voxels lost through no image.</summary>
    public VoxelBits Inside { get; }

    /// <summary>Per image, the voxels lost through it and through no other: what the mask would gain without it.</summary>
    public long[] AloneCost { get; }

    /// <summary>Voxels lost through some images, but not through all.</summary>
    public long InSome { get; }

    /// <summary>Looks at every image of <paramref name="data"/>. <paramref name="background"/>: the grid when the matrix holds it whole and the mask is to be derived; null inside a
    /// given mask. Throws <see cref="InputException"/> naming the images that hold no finite value or nothing but zeros.</summary>
    public static Coverage Of(SubjectMatrix data, Grid? background, IReadOnlyList<string> names, ParallelOptions options)
    {
        var (lost, zeros) = (new VoxelBits[data.Images], new VoxelBits[data.Images]);
        var faults = new string?[data.Images];
        string where = background == null ? " inside the mask" : "";
        Parallel.For(0, data.Images, options, i =>
        {
            var (zero, finite) = (new VoxelBits(data.Voxels), new VoxelBits(data.Voxels));
            data.Classify(i, zero, finite);
            if (finite.Total() == 0) faults[i] = $"{names[i]}: the image has no finite value{where}, only NaN or infinity; leave it out or replace it.";
            else if (zero.Total() == finite.Total()) faults[i] = $"{names[i]}: the image is 0 at every finite voxel{where}; leave it out or replace it.";
            zeros[i] = zero;
            lost[i] = background == null ? new VoxelBits(data.Voxels) : Background.Of(background, zero);
            for (int w = 0; w < finite.Words.Length; w++) lost[i].Words[w] |= ~finite.Words[w] & finite.Valid(w);
        });
        InputException.ThrowIfAny([.. faults.OfType<string>()]);
        return new Coverage(lost, zeros);
    }

    /// <summary>Voxels that one image has data for.</summary>
    public long Own(int image) => lost[image].Count - lost[image].Total();

    /// <summary>Voxels lost through one image, whether through others too or not.</summary>
    public long Cost(int image) => lost[image].Total();

    /// <summary>Exact zeros of one image at the voxels of <paramref name="kept"/>.</summary>
    public long ZerosAt(int image, VoxelBits kept)
    {
        long total = 0;
        for (int w = 0; w < kept.Words.Length; w++) total += BitOperations.PopCount(zeros[image].Words[w] & kept.Words[w]);
        return total;
    }
}
