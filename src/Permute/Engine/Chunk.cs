namespace Permute.Engine;

/// <summary>The recorded maxima of a range of relabelings, and the counts over it: what one chunk file holds.</summary>
internal sealed class Chunk
{
    public Chunk(int first, int count, int thresholds, bool mass, int stepDown, int uncorrected, bool tfce = false)
    {
        (First, Count) = (first, count);
        Height = new double[count];
        Extent = Fill<int>(thresholds, count);
        Clusters = Fill<int>(thresholds, count);
        Voxels = Fill<int>(thresholds, count);
        Mass = mass ? Fill<double>(thresholds, count) : null;
        Tfce = tfce ? new double[count] : null;
        StepDown = new int[stepDown];
        Uncorrected = new int[uncorrected];
    }

    /// <summary>Index of its first relabeling.</summary>
    public int First { get; }

    /// <summary>Relabelings.</summary>
    public int Count { get; }

    /// <summary>Largest evidence of each.</summary>
    public double[] Height { get; }

    /// <summary>Largest cluster, by threshold and relabeling.</summary>
    public int[][] Extent { get; }

    /// <summary>Number of clusters.</summary>
    public int[][] Clusters { get; }

    /// <summary>Voxels above.</summary>
    public int[][] Voxels { get; }

    /// <summary>Largest mass, when recorded.</summary>
    public double[][]? Mass { get; }

    /// <summary>Largest enhanced value of each, when recorded.</summary>
    public double[]? Tfce { get; }

    /// <summary>Per ranked voxel, relabelings of this chunk whose successive maximum reaches it.</summary>
    public int[] StepDown { get; }

    /// <summary>Per voxel, relabelings of this chunk that reach its observed value; empty when not recorded.</summary>
    public int[] Uncorrected { get; }

    private static T[][] Fill<T>(int thresholds, int count) => [.. Enumerable.Range(0, thresholds).Select(_ => new T[count])];
}
