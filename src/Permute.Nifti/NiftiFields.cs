namespace Permute.Nifti;

/// <summary>
/// The fields of a header as they stand in the file, byte order apart, in the wider types of NIfTI-2 so that both versions fit. Names
/// follow the standard (nifti1.h, nifti2.h). <see cref="NiftiHeader"/> says what they mean.
/// </summary>
public sealed record NiftiFields
{
    /// <summary><c>magic</c>: n+1, ni1, n+2 or ni2.</summary>
    public string Magic { get; init; } = "n+1";

    /// <summary><c>dim[0..7]</c>: the number of dimensions, then their lengths.</summary>
    public long[] Dim { get; init; } = [3, 1, 1, 1, 1, 1, 1, 1];

    /// <summary><c>pixdim[0..7]</c>: qfac, then the grid spacings.</summary>
    public double[] Pixdim { get; init; } = [1, 1, 1, 1, 1, 1, 1, 1];

    /// <summary><c>datatype</c> code.</summary>
    public short Datatype { get; init; }

    /// <summary><c>bitpix</c>: bits per voxel.</summary>
    public short Bitpix { get; init; }

    /// <summary><c>vox_offset</c>: where the voxels begin, bytes.</summary>
    public double VoxOffset { get; init; }

    /// <summary><c>scl_slope</c>.</summary>
    public double SclSlope { get; init; }

    /// <summary><c>scl_inter</c>.</summary>
    public double SclInter { get; init; }

    /// <summary><c>xyzt_units</c>: bits 0–2 space, bits 3–5 time.</summary>
    public int XyztUnits { get; init; }

    /// <summary><c>intent_code</c>.</summary>
    public int IntentCode { get; init; }

    /// <summary><c>intent_p1..3</c>.</summary>
    public double[] IntentP { get; init; } = [0, 0, 0];

    /// <summary><c>intent_name</c>.</summary>
    public string IntentName { get; init; } = "";

    /// <summary><c>descrip</c>.</summary>
    public string Descrip { get; init; } = "";

    /// <summary><c>qform_code</c>.</summary>
    public int QformCode { get; init; }

    /// <summary><c>sform_code</c>.</summary>
    public int SformCode { get; init; }

    /// <summary><c>quatern_b, quatern_c, quatern_d</c>.</summary>
    public double[] Quatern { get; init; } = [0, 0, 0];

    /// <summary><c>qoffset_x, qoffset_y, qoffset_z</c>.</summary>
    public double[] Qoffset { get; init; } = [0, 0, 0];

    /// <summary><c>srow_x, srow_y, srow_z</c>: the first three rows of an affine.</summary>
    public double[,] Srow { get; init; } = new double[3, 4];
}
