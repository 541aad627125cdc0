namespace Permute.Nifti;

/// <summary>The real scalar voxel types of the standard, by their <c>datatype</c> code (nifti1.h, nifti2.h).</summary>
public enum NiftiType : short
{
    /// <summary>Unsigned 8-bit integer.</summary>
    UInt8 = 2,

    /// <summary>Signed 16-bit integer.</summary>
    Int16 = 4,

    /// <summary>Signed 32-bit integer.</summary>
    Int32 = 8,

    /// <summary>IEEE 754 single precision.</summary>
    Float32 = 16,

    /// <summary>IEEE 754 double precision.</summary>
    Float64 = 64,

    /// <summary>Signed 8-bit integer.</summary>
    Int8 = 256,

    /// <summary>Unsigned 16-bit integer.</summary>
    UInt16 = 512,

    /// <summary>Unsigned 32-bit integer.</summary>
    UInt32 = 768,

    /// <summary>Signed 64-bit integer; beyond 2^53 in size, decoding to double rounds.</summary>
    Int64 = 1024,

    /// <summary>Unsigned 64-bit integer; beyond 2^53, decoding to double rounds.</summary>
    UInt64 = 1280,
}
