using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>All that is wrong with a <see cref="TheoryRequest"/>, one sentence each.</summary>
internal static class TheoryFaults
{
    /// <summary>The faults; none when the request can be answered.</summary>
    public static List<string> Of(TheoryRequest r)
    {
        var faults = new List<string>();
        Check(r.Alpha is > 0 and <= 0.5, $"The error rate alpha must be above 0 and at most 0.5, but is {r.Alpha}.");
        Check(r.DegreesOfFreedom >= 1, $"The degrees of freedom must be at least 1, but are {r.DegreesOfFreedom}.");
        foreach (double p in r.FormingP ?? []) Check(p is > 0 and < 0.5, $"A cluster-forming p must lie between 0 and 0.5, but one is {p}.");
        foreach (double u in r.FormingValues ?? [])
            Check(u > 0 && double.IsFinite(u), $"A cluster-forming value must be above 0, but one is {u}; clusters of either sign are formed from its size.");
        Check(r.Mask != null ^ r.Resels != null, "Give the search region either as a mask or as resel counts with the number of voxels.");
        Check(r.FwhmMm == null || r.FwhmVoxels == null, "Give the smoothness (FWHM) either in mm or in voxels, not both.");
        if (r.Resels is { } resels)
        {
            Check(r.Voxels >= 1, $"Resel counts need the number of voxels beside them, at least 1, but got {r.Voxels?.ToString() ?? "none"}.");
            Check(resels.ToArray().All(double.IsFinite), $"The four resel counts must be finite numbers, but are {resels}.");
        }
        if (r.Mask is { } mask)
        {
            Check(mask.Count > 0, "The mask has no voxels.");
            Check(r.FwhmMm != null || r.FwhmVoxels != null, "Without images the smoothness can't be estimated: give its FWHM along x, y and z, in mm or in voxels.");
        }
        if ((r.FwhmMm ?? r.FwhmVoxels) is { } fwhm)
        {
            bool[] along = r.Mask == null ? [true, true, true] : Along(r.Mask);
            Check(fwhm.Length == 3, $"The smoothness (FWHM) needs three numbers, along x, y and z, but has {fwhm.Length}.");
            for (int axis = 0; fwhm.Length == 3 && axis < 3; axis++)
                Check(!along[axis] || (fwhm[axis] > 0 && double.IsFinite(fwhm[axis])), $"The FWHM along {"xyz"[axis]} must be above 0, but is {fwhm[axis]}.");
        }
        return faults;

        void Check(bool right, string fault)
        {
            if (!right) faults.Add(fault);
        }
    }

    /// <summary>Along which axes the mask has neighbouring voxels.</summary>
    public static bool[] Along(Mask mask)
    {
        LatticeCells cells = LatticeCells.Count(mask);
        return [cells.Ex > 0, cells.Ey > 0, cells.Ez > 0];
    }
}
