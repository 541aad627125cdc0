using Permute.Engine;

namespace Permute.Inference;

/// <summary>
/// Step-down adjusted p (Westfall &amp; Young 1993, Resampling-based multiple testing, algorithm 2.8): each voxel is judged by the maximum over itself and
/// those ranked below it, and p never falls along the ranking. Never above the single-step p.
/// </summary>
public static class StepDownP
{
    /// <summary>p of each of the counted voxels, in their order, over <paramref name="relabelings"/> relabelings (the observed one included).</summary>
    public static double[] Of(StepDownCounts counts, int relabelings)
    {
        var p = new double[counts.Counts.Length];
        int most = 1;
        for (int rank = 0; rank < p.Length; rank++)
        {
            most = Math.Max(most, counts.Counts[rank]);
            p[rank] = (double)most / relabelings;
        }
        return p;
    }
}
