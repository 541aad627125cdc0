namespace Permute.Nifti;

/// <summary>
/// What a NIfTI header says, decoded and checked: a record to read from, and to alter by <c>with</c> before writing.
/// The undecoded fields stand in <see cref="Stored"/>.
/// </summary>
public sealed record NiftiHeader
{
    /// <summary>1 or 2: the version of the standard the file follows. Writing is always version 1.</summary>
    public int Version { get; init; } = 1;

    /// <summary>True if the file's numbers have their high byte first. Writing is always little-endian.</summary>
    public bool BigEndian { get; init; }

    /// <summary>
    /// Length along each dimension, x first: at least three entries, missing ones 1; beyond three, trailing ones of length 1 are left out.
    /// </summary>
    public long[] Dimensions { get; init; } = [1, 1, 1];

    /// <summary>
    /// <c>pixdim</c> of each entry of <see cref="Dimensions"/>; the first three in mm whatever <c>xyzt_units</c> says, the fourth in its
    /// time unit.
    /// </summary>
    public double[] VoxelSize { get; init; } = [1, 1, 1];

    /// <summary>How a voxel is stored.</summary>
    public NiftiType Type { get; init; } = NiftiType.Float32;

    /// <summary>Factor from stored to true value; 1 where <c>scl_slope</c> is 0 or not finite, as the standard asks.</summary>
    public double Slope { get; init; } = 1;

    /// <summary>What is added after <see cref="Slope"/>; 0 where <c>scl_slope</c> is 0 or not finite.</summary>
    public double Intercept { get; init; }

    /// <summary>Where the voxels begin in their file, bytes.</summary>
    public long DataOffset { get; init; } = 352;

    /// <summary>
    /// 4 × 4, zero-based voxel indices (x, y, z, 1) to mm: the sform if its code is above 0, else the qform if its code is, else plain
    /// scaling by pixdim without an origin ("method 1" of nifti1.h).
    /// </summary>
    public double[,] Affine { get; init; } = Affines.Scaling(1, 1, 1);

    /// <summary><c>sform_code</c>: 0 none, 1 scanner, 2 aligned, 3 Talairach, 4 MNI 152 space, 5 another template.</summary>
    public short SformCode { get; init; }

    /// <summary><c>qform_code</c>, coded like <see cref="SformCode"/>.</summary>
    public short QformCode { get; init; }

    /// <summary><c>xyzt_units</c>: bits 0–2 space (1 m, 2 mm, 3 µm), bits 3–5 time (8 s, 16 ms, 24 µs).</summary>
    public int XyztUnits { get; init; }

    /// <summary><c>intent_code</c>: what the values are, e.g. 3 t, 4 F, 22 p-value, 1002 label.</summary>
    public short IntentCode { get; init; }

    /// <summary><c>intent_p1</c>: the intent's first parameter, e.g. degrees of freedom.</summary>
    public double IntentP1 { get; init; }

    /// <summary><c>intent_p2</c>.</summary>
    public double IntentP2 { get; init; }

    /// <summary><c>intent_p3</c>.</summary>
    public double IntentP3 { get; init; }

    /// <summary><c>intent_name</c>; up to 15 bytes are written.</summary>
    public string IntentName { get; init; } = "";

    /// <summary><c>descrip</c>; up to 79 bytes are written.</summary>
    public string Description { get; init; } = "";

    /// <summary>The fields as they stood in the file; null for a header that was not read from one.</summary>
    public NiftiFields? Stored { get; init; }

    /// <summary>Number of voxels: the product of <see cref="Dimensions"/>.</summary>
    public long VoxelCount => Dimensions.Aggregate(1L, (product, length) => checked(product * length));
}
