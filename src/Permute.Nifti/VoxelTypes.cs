namespace Permute.Nifti;

/// <summary>What is known of a <c>datatype</c> code: its width, or why it is refused.</summary>
internal static class VoxelTypes
{
    /// <summary>Bytes per voxel.</summary>
    public static int Bytes(this NiftiType type) => type switch
    {
        NiftiType.UInt8 or NiftiType.Int8 => 1,
        NiftiType.Int16 or NiftiType.UInt16 => 2,
        NiftiType.Int32 or NiftiType.UInt32 or NiftiType.Float32 => 4,
        NiftiType.Int64 or NiftiType.UInt64 or NiftiType.Float64 => 8,
        _ => throw new ArgumentOutOfRangeException(nameof(type), type, "Not a voxel type of NIfTI."),
    };

    /// <summary>True for the two types that hold fractions, NaN and infinities.</summary>
    public static bool IsFloating(this NiftiType type) => type is NiftiType.Float32 or NiftiType.Float64;

    /// <summary>The type a header declares, or a <see cref="NiftiException"/> that names what it declares instead.</summary>
    public static NiftiType Parse(NiftiFields fields, string path)
    {
        var type = (NiftiType)fields.Datatype;
        if (!Enum.IsDefined(type))
            throw new NiftiException(Refused(fields.Datatype) is { } name
                ? $"{path}: holds {name} voxels (datatype {fields.Datatype}), but only real numbers of up to 64 bits can be read; "
                    + "convert the image to float32 first."
                : $"{path}: datatype {fields.Datatype} is not a voxel type of the NIfTI standard; the header is damaged or the file "
                    + "was not written as NIfTI.");
        if (fields.Bitpix != 8 * type.Bytes())
            throw new NiftiException(
                $"{path}: the header contradicts itself: datatype {fields.Datatype} ({type}) has {8 * type.Bytes()} bits per voxel, "
                    + $"but bitpix says {fields.Bitpix}; write the file anew.");
        return type;
    }

    private static string? Refused(short datatype) => datatype switch
    {
        1 => "1-bit",
        32 => "complex64",
        128 => "RGB colour",
        1536 => "float128",
        1792 => "complex128",
        2048 => "complex256",
        2304 => "RGBA colour",
        _ => null,
    };
}
