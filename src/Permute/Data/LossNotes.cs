namespace Permute.Data;

/// <summary>The sentences on what the mask lost and through which images.</summary>
internal static class LossNotes
{
    /// <summary>An image that alone costs the mask more than this share of its voxels is named.</summary>
    private const double Costly = 0.05;

    /// <summary>What coverage cost a derived mask (<paramref name="derived"/>) or a given one.</summary>
    public static IEnumerable<string> OfCoverage(Coverage coverage, bool derived, IReadOnlyList<string> names)
    {
        long inside = coverage.Inside.Total();
        if (derived && coverage.InSome > 0)
            yield return $"The derived mask has {Wording.Count(inside, "voxel")}; {coverage.InSome:N0} more lie in some of the images only"
                + Through(names, [.. coverage.AloneCost], "; lost through one image alone: ") + ".";
        long lost = coverage.Inside.Count - inside;
        if (!derived && lost > 0)
            yield return $"{Wording.Count(lost, "voxel")} of the mask {(lost == 1 ? "is" : "are")} not finite in some image and {(lost == 1 ? "was" : "were")} dropped"
                + Through(names, [.. names.Select((_, i) => coverage.Cost(i))], ": ") + ".";
        for (int i = 0; i < names.Count; i++)
        {
            double share = (double)coverage.AloneCost[i] / Math.Max(1, inside + coverage.AloneCost[i]);
            if (share > Costly)
                yield return $"Caution: {names[i]} alone costs the mask {Wording.Count(coverage.AloneCost[i], "voxel")}, {100 * share:0.#} % of what it would have without this image; look at how much this image covers.";
        }
    }

    /// <summary>The error when coverage leaves nothing.</summary>
    public static string Empty(Coverage coverage, bool derived, IReadOnlyList<string> names)
    {
        string least = Wording.List([.. names.Select((name, i) => (name, own: coverage.Own(i))).OrderBy(n => n.own).Take(3).Select(n => $"{n.name} ({n.own:N0})")]);
        return derived
            ? $"The derived mask is empty: no voxel is finite in every image and outside the background of all (zeros joined to the border of the grid). The images with the fewest voxels of their own are {least}; leave out what covers too little, or check that all images are registered to one space."
            : $"No voxel is left of the mask's {coverage.Inside.Count:N0}: each is not finite in some image. The images with the fewest finite voxels are {least}; leave them out or replace them.";
    }

    /// <summary>What could not be tested among voxels that every image covers.</summary>
    public static IEnumerable<string> OfVoxels(VoxelLoss[] losses)
    {
        (int constant, int explained) = (losses.Count(l => l == VoxelLoss.Constant), losses.Count(l => l == VoxelLoss.Explained));
        if (constant > 0) yield return $"{Wording.Count(constant, "voxel")} of the mask {Has(constant)} the same value in every image and {Was(constant)} dropped.";
        if (explained > 0) yield return $"{Wording.Count(explained, "voxel")} of the mask {Was(explained)} dropped: the reduced model explains {(explained == 1 ? "it" : "them")} fully (residual sum of squares at most 1e-12 of the total).";
    }

    /// <summary>The error when no voxel can be tested.</summary>
    public static string NothingLeft(VoxelLoss[] losses) =>
        $"No voxel is left of the {losses.Length:N0} that every image covers: {losses.Count(l => l == VoxelLoss.Constant):N0} have the same value in every image, "
        + $"{losses.Count(l => l == VoxelLoss.Explained):N0} are fully explained by the reduced model. Check that the images differ and that the nuisance covariates leave something to test.";

    /// <summary>Zeros that were kept as data.</summary>
    public static IEnumerable<string> OfZeros(long[] zeros, long voxels, bool derived, IReadOnlyList<string> names)
    {
        if (zeros.Sum() == 0) yield break;
        yield return $"Zeros inside the mask{(derived ? ", enclosed by other values," : "")} were kept as data" + Through(names, zeros, ": ") + ".";
        for (int i = 0; i < names.Count; i++)
            if (zeros[i] > Costly * voxels)
                yield return $"Caution: {names[i]} is exactly 0 at {Wording.Count(zeros[i], "voxel")} of the mask ({100.0 * zeros[i] / voxels:0.#} %); if 0 means \"no data\" there, leave these voxels out of the mask.";
    }

    private static string Through(IReadOnlyList<string> names, long[] counts, string opening)
    {
        string[] parts = [.. Enumerable.Range(0, counts.Length).Where(i => counts[i] > 0).OrderByDescending(i => counts[i]).Select(i => $"{names[i]} ({counts[i]:N0})")];
        return parts.Length == 0 ? "" : opening + Wording.List(parts);
    }

    private static string Has(int number) => number == 1 ? "has" : "have";

    private static string Was(int number) => number == 1 ? "was" : "were";
}
