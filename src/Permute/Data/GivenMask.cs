using Permute.Nifti;

namespace Permute.Data;

/// <summary>Reads a given mask: any finite value other than zero is inside.</summary>
internal static class GivenMask
{
    /// <summary>The region of the mask in <paramref name="path"/>, which lies on <paramref name="grid"/>; oddities become notes. Throws when nothing is inside.</summary>
    public static Mask Read(string path, Grid grid, List<string> notes)
    {
        var inside = new bool[grid.Count];
        long voxels = 0, others = 0, infinite = 0;
        (double least, double most) = (double.PositiveInfinity, double.NegativeInfinity);
        try
        {
            NiftiFile.Read(path, (_, offset, values) =>
            {
                for (int i = 0; i < values.Length; i++)
                {
                    double v = values[i];
                    if (v == 0) continue;
                    if (!double.IsFinite(v))
                    {
                        infinite++;
                        continue;
                    }
                    inside[offset + i] = true;
                    voxels++;
                    if (Math.Abs(v - 1) > 1e-6) others++;
                    (least, most) = (Math.Min(least, v), Math.Max(most, v));
                }
            });
        }
        catch (NiftiException e)
        {
            throw new InputException(e.Message, e);
        }
        if (voxels == 0)
            throw new InputException($"{path}: the mask is empty: none of its {grid.Count:N0} voxels has a finite value other than 0{(infinite > 0 ? $" ({infinite:N0} are not finite)" : "")}; expected 1 inside the search region.");
        if (others > 0)
            notes.Add($"Caution: {path}: {others:N0} of the {voxels:N0} non-zero voxels of the mask are not 1 (values from {least:G4} to {most:G4}); every non-zero voxel counts as inside, so threshold the mask first if that is not meant.");
        if (infinite > 0) notes.Add($"{path}: {Wording.Count(infinite, "voxel")} of the mask {(infinite == 1 ? "is" : "are")} not finite and count{(infinite == 1 ? "s" : "")} as outside.");
        return new Mask(grid, inside);
    }
}
