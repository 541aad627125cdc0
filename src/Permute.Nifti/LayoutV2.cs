namespace Permute.Nifti;

/// <summary>Where each field stands in the 540 bytes of a NIfTI-2 header (nifti2.h).</summary>
internal static class LayoutV2
{
    public const int Size = 540;

    /// <summary>Header and the four bytes that announce extensions: the first place voxels may begin in a single file.</summary>
    public const int FirstVoxel = 544;

    /// <summary>False if the bytes behind the magic, which are there to show it, were altered by a transfer as text.</summary>
    public static bool TransferIntact(ReadOnlySpan<byte> header) => header.Slice(7, 5).SequenceEqual("\0\r\n\u001a\n"u8);

    public static NiftiFields Read(ReadOnlySpan<byte> header, bool bigEndian)
    {
        var at = new ByteFields(header, bigEndian);
        var dim = new long[8];
        for (int i = 0; i < 8; i++) dim[i] = at.Int64(16 + 8 * i);
        var srow = new double[3, 4];
        for (int i = 0; i < 12; i++) srow[i / 4, i % 4] = at.Double(400 + 8 * i);
        return new()
        {
            Magic = at.Text(4, 3),
            Datatype = at.Int16(12),
            Bitpix = at.Int16(14),
            Dim = dim,
            IntentP = at.Doubles(80, 3),
            Pixdim = at.Doubles(104, 8),
            VoxOffset = at.Int64(168),
            SclSlope = at.Double(176),
            SclInter = at.Double(184),
            Descrip = at.Text(240, 80),
            QformCode = at.Int32(344),
            SformCode = at.Int32(348),
            Quatern = at.Doubles(352, 3),
            Qoffset = at.Doubles(376, 3),
            Srow = srow,
            XyztUnits = at.Int32(500),
            IntentCode = at.Int32(504),
            IntentName = at.Text(508, 16),
        };
    }
}
