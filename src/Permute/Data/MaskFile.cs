using Permute.Nifti;

namespace Permute.Data;

/// <summary>A search region read on its own, where no images give the grid.</summary>
public static class MaskFile
{
    /// <summary>The region of the 3-D image at <paramref name="path"/> (every finite value other than zero is inside), and what is odd about it.</summary>
    /// <exception cref="InputException">The file cannot be read, is not 3-D, or has nothing inside.</exception>
    public static (Mask Mask, IReadOnlyList<string> Notes) Read(string path)
    {
        NiftiHeader header;
        try
        {
            header = NiftiFile.ReadHeader(path);
        }
        catch (NiftiException e)
        {
            throw new InputException(e.Message, e);
        }
        Grid grid = GridMatch.Of(path, header);
        if (header.VoxelCount != grid.Count)
            throw new InputException($"{path}: the mask has {Wording.Size(header.Dimensions)} voxels, expected three dimensions; give one volume of it.");
        var notes = new List<string>();
        return (GivenMask.Read(path, grid, notes), notes);
    }
}
