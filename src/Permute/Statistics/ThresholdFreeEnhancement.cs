using Permute.Data;

namespace Permute.Statistics;

/// <summary>
/// Threshold-free cluster enhancement (Smith &amp; Nichols 2009, NeuroImage 44:83–98, eq. 1): every voxel of height t gets ∫₀ᵗ e(h)^E h^H dh, e(h) being the voxels of its
/// cluster at height h. A cluster changes only at the heights of voxels, so a slab between two of them gives e^E (top^(H+1) − bottom^(H+1))/(H+1) and the integral needs no step. The
/// plain reference, one labelling per distinct height; the engine's fast forms are held to it.
/// </summary>
public static class ThresholdFreeEnhancement
{
    /// <summary>The enhanced value of every voxel (length V): 0 where <paramref name="heights"/> is not positive, ∞ where the height is infinite. The negative side is
    /// enhanced by negating the heights. Neighbours: 6, 18 or 26; exponents positive.</summary>
    public static double[] Of(Mask mask, ReadOnlySpan<double> heights, int neighbours, double e = 0.5, double h = 2)
    {
        var enhanced = new double[mask.Count];
        var above = new bool[mask.Count];
        double bottom = 0;
        foreach (double top in heights.ToArray().Where(t => t > 0).Distinct().Order())
        {
            for (int v = 0; v < above.Length; v++) above[v] = heights[v] >= top;
            ClusterLabels clusters = ClusterLabels.Find(mask, above, neighbours);
            double slab = (Math.Pow(top, h + 1) - Math.Pow(bottom, h + 1)) / (h + 1);
            for (int v = 0; v < above.Length; v++)
                if (above[v]) enhanced[v] += Math.Pow(clusters.Sizes[clusters.Labels[v] - 1], e) * slab;
            bottom = top;
        }
        return enhanced;
    }
}
