using System.Buffers;

namespace Permute.Nifti;

/// <summary>Header and voxels of a NIfTI-1 single file, to a stream.</summary>
internal static class NiftiWriter
{
    /// <summary>The code of <c>xyzt_units</c> for space in mm.</summary>
    public const int Millimetres = 2;

    public static void Write(Stream stream, NiftiHeader header, ReadOnlySpan<double> values, string path)
    {
        // Readers will scale by what single precision leaves of these, so the voxels must be stored by the same.
        header = header with { Slope = (float)header.Slope, Intercept = (float)header.Intercept };
        Span<byte> head = stackalloc byte[LayoutV1.FirstVoxel];
        head.Clear();
        LayoutV1.Write(Fields(header), head);
        stream.Write(head);

        int width = header.Type.Bytes();
        byte[] bytes = ArrayPool<byte>.Shared.Rent(NiftiFile.Slab * width);
        try
        {
            for (int done = 0; done < values.Length; done += NiftiFile.Slab)
            {
                var slab = values[done..Math.Min(values.Length, done + NiftiFile.Slab)];
                VoxelEncoder.Encode(header, slab, done, bytes, path);
                stream.Write(bytes.AsSpan(0, slab.Length * width));
            }
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(bytes);
        }
    }

    private static NiftiFields Fields(NiftiHeader header)
    {
        int rank = header.Dimensions.Length;
        double[] spacing = Affines.Spacing(header.Affine);
        var quaternion = Affines.ToQuaternion(header.Affine);
        // The qform repeats the sform's coordinates, so it must carry the code of their space, whatever an earlier qform said.
        int code = header.SformCode > 0 ? header.SformCode : header.QformCode > 0 ? header.QformCode : 1;
        bool scaled = !header.Type.IsFloating();
        var a = header.Affine;
        return new()
        {
            Magic = "n+1",
            Dim = [rank, .. Enumerable.Range(0, 7).Select(i => i < rank ? header.Dimensions[i] : 1)],
            Pixdim = [quaternion?.Qfac ?? 1, .. spacing, .. header.VoxelSize.Skip(3).Concat([1, 1, 1, 1]).Take(4)],
            Datatype = (short)header.Type,
            Bitpix = (short)(8 * header.Type.Bytes()),
            VoxOffset = LayoutV1.FirstVoxel,
            SclSlope = scaled ? header.Slope : 1,
            SclInter = scaled ? header.Intercept : 0,
            XyztUnits = header.XyztUnits & ~7 | Millimetres,
            IntentCode = header.IntentCode,
            IntentP = [header.IntentP1, header.IntentP2, header.IntentP3],
            IntentName = header.IntentName,
            Descrip = header.Description,
            SformCode = code,
            QformCode = quaternion == null ? 0 : code,
            Quatern = quaternion?.Bcd ?? [0, 0, 0],
            Qoffset = quaternion == null ? [0, 0, 0] : [a[0, 3], a[1, 3], a[2, 3]],
            Srow = a,
        };
    }
}
