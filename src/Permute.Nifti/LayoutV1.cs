using System.Buffers.Binary;
using System.Text.Unicode;

namespace Permute.Nifti;

/// <summary>Where each field stands in the 348 bytes of a NIfTI-1 header (nifti1.h).</summary>
internal static class LayoutV1
{
    public const int Size = 348;

    /// <summary>Header and the four bytes that announce extensions: the first place voxels may begin in a single file.</summary>
    public const int FirstVoxel = 352;

    public static NiftiFields Read(ReadOnlySpan<byte> header, bool bigEndian)
    {
        var at = new ByteFields(header, bigEndian);
        var dim = new long[8];
        for (int i = 0; i < 8; i++) dim[i] = at.Int16(40 + 2 * i);
        var srow = new double[3, 4];
        for (int i = 0; i < 12; i++) srow[i / 4, i % 4] = at.Single(280 + 4 * i);
        return new()
        {
            Magic = at.Text(344, 4),
            Dim = dim,
            IntentP = at.Singles(56, 3),
            IntentCode = at.Int16(68),
            Datatype = at.Int16(70),
            Bitpix = at.Int16(72),
            Pixdim = at.Singles(76, 8),
            VoxOffset = at.Single(108),
            SclSlope = at.Single(112),
            SclInter = at.Single(116),
            XyztUnits = header[123],
            Descrip = at.Text(148, 80),
            QformCode = at.Int16(252),
            SformCode = at.Int16(254),
            Quatern = at.Singles(256, 3),
            Qoffset = at.Singles(268, 3),
            Srow = srow,
            IntentName = at.Text(328, 16),
        };
    }

    /// <summary>A little-endian header with the empty extension flag behind it; <paramref name="to"/> is all zeros, 352 bytes.</summary>
    public static void Write(NiftiFields fields, Span<byte> to)
    {
        BinaryPrimitives.WriteInt32LittleEndian(to, Size);
        to[38] = (byte)'r'; // "regular", which readers of the format's ancestor expect
        for (int i = 0; i < 8; i++) Int16(to, 40 + 2 * i, fields.Dim[i]);
        Singles(to, 56, fields.IntentP);
        Int16(to, 68, fields.IntentCode);
        Int16(to, 70, fields.Datatype);
        Int16(to, 72, fields.Bitpix);
        Singles(to, 76, fields.Pixdim);
        Singles(to, 108, fields.VoxOffset, fields.SclSlope, fields.SclInter);
        to[123] = (byte)fields.XyztUnits;
        Text(to.Slice(148, 79), fields.Descrip);
        Int16(to, 252, fields.QformCode);
        Int16(to, 254, fields.SformCode);
        Singles(to, 256, fields.Quatern);
        Singles(to, 268, fields.Qoffset);
        for (int i = 0; i < 12; i++) Singles(to, 280 + 4 * i, fields.Srow[i / 4, i % 4]);
        Text(to.Slice(328, 15), fields.IntentName);
        Text(to.Slice(344, 3), fields.Magic);
    }

    private static void Int16(Span<byte> to, int at, long value) =>
        BinaryPrimitives.WriteInt16LittleEndian(to[at..], checked((short)value));

    private static void Singles(Span<byte> to, int at, params ReadOnlySpan<double> values)
    {
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteSingleLittleEndian(to[(at + 4 * i)..], (float)values[i]);
    }

    /// <summary>As many whole characters as fit.</summary>
    private static void Text(Span<byte> to, string text) => Utf8.FromUtf16(text, to, out _, out _);
}
