namespace Permute.Nifti;

/// <summary>From the fields as they stand to what they mean, refusing what the standard does not allow.</summary>
internal static class HeaderDecoder
{
    public static NiftiHeader Decode(NiftiFields fields, int version, bool bigEndian, string path)
    {
        CheckMagic(fields, version, path);
        var type = VoxelTypes.Parse(fields, path);
        long[] dimensions = Dimensions(fields, path);
        long offset = Offset(fields, version, path);
        CheckSize(dimensions, type, offset, path);
        var (slope, intercept) = Scaling(fields, path);
        double mm = Millimetres(fields.XyztUnits);
        return new()
        {
            Version = version,
            BigEndian = bigEndian,
            Dimensions = dimensions,
            VoxelSize = [.. dimensions.Select((_, i) => fields.Pixdim[i + 1] * (i < 3 ? mm : 1))],
            Type = type,
            Slope = slope,
            Intercept = intercept,
            DataOffset = offset,
            Affine = Affine(fields, dimensions, mm, path),
            SformCode = Code(fields.SformCode),
            QformCode = Code(fields.QformCode),
            XyztUnits = fields.XyztUnits,
            IntentCode = Code(fields.IntentCode),
            IntentP1 = fields.IntentP[0],
            IntentP2 = fields.IntentP[1],
            IntentP3 = fields.IntentP[2],
            IntentName = fields.IntentName,
            Description = fields.Descrip,
            Stored = fields,
        };
    }

    private static void CheckMagic(NiftiFields fields, int version, string path)
    {
        if (fields.Magic == $"n+{version}" || fields.Magic == $"ni{version}") return;
        throw new NiftiException(version == 1 && fields.Magic is not ("n+2" or "ni2")
            ? $"{path}: has no NIfTI magic (n+1 or ni1), so it is an ANALYZE 7.5 file, which does not say which side is left, or "
                + "damaged; convert it to NIfTI with a program that knows its orientation."
            : $"{path}: has a header of NIfTI-{version}'s size but not its magic (n+{version} or ni{version}); the file is damaged, "
                + "so fetch or write it again.");
    }

    private static long[] Dimensions(NiftiFields fields, string path)
    {
        long count = fields.Dim[0];
        if (count is < 1 or > 7)
            throw new NiftiException($"{path}: says it has {count} dimensions (dim[0]), but NIfTI allows 1 to 7; the header is "
                + "damaged, so write the file anew.");
        for (int i = 1; i <= count; i++)
            if (fields.Dim[i] < 1)
                throw new NiftiException($"{path}: dimension {i} has length {fields.Dim[i]} (dim[{i}]), but a length is at least 1; "
                    + "the header is damaged, so write the file anew.");

        var lengths = fields.Dim.Skip(1).Take((int)count).ToList();
        while (lengths.Count < 3) lengths.Add(1);
        while (lengths.Count > 3 && lengths[^1] == 1) lengths.RemoveAt(lengths.Count - 1);
        return [.. lengths];
    }

    private static long Offset(NiftiFields fields, int version, string path)
    {
        bool single = fields.Magic[1] == '+';
        int first = !single ? 0 : version == 1 ? LayoutV1.FirstVoxel : LayoutV2.FirstVoxel;
        double offset = fields.VoxOffset;
        if (offset >= first && offset < 1L << 62 && offset == Math.Floor(offset)) return (long)offset;
        throw new NiftiException($"{path}: says its voxels begin at byte {offset} (vox_offset), but expected a whole number from "
            + $"{first} on; the header is damaged, so write the file anew.");
    }

    private static void CheckSize(long[] dimensions, NiftiType type, long offset, string path)
    {
        try
        {
            _ = checked(dimensions.Aggregate((long)type.Bytes(), (product, length) => checked(product * length)) + offset);
        }
        catch (OverflowException e)
        {
            throw new NiftiException($"{path}: its dimensions {string.Join(" × ", dimensions)} multiply to more bytes than any file "
                + "holds; the header is damaged, so write the file anew.", e);
        }
    }

    private static (double Slope, double Intercept) Scaling(NiftiFields fields, string path)
    {
        if (fields.SclSlope == 0 || !double.IsFinite(fields.SclSlope)) return (1, 0);
        if (double.IsFinite(fields.SclInter)) return (fields.SclSlope, fields.SclInter);
        throw new NiftiException($"{path}: scales its voxels by {fields.SclSlope} and then adds {fields.SclInter} (scl_inter), but "
            + "expected a finite number; write the file anew.");
    }

    private static double[,] Affine(NiftiFields fields, long[] dimensions, double mm, string path)
    {
        double[] spacing = [.. fields.Pixdim.Skip(1).Take(3).Select(Spacing)];
        var (affine, source) = fields switch
        {
            { SformCode: > 0 } => (Affines.FromRows(fields.Srow), "sform"),
            { QformCode: > 0 } => (Affines.FromQuaternion(fields.Quatern, fields.Qoffset, spacing, fields.Pixdim[0] < 0 ? -1 : 1), "qform"),
            _ => (Affines.Scaling(spacing[0], spacing[1], spacing[2]), "pixdim"),
        };
        for (int r = 0; r < 3; r++)
            for (int c = 0; c < 4; c++) affine[r, c] *= mm;
        double[] lengths = Affines.Spacing(affine);
        if (affine.Cast<double>().All(double.IsFinite) && !lengths.Where((v, i) => v == 0 && dimensions[i] > 1).Any()) return affine;
        throw new NiftiException($"{path}: its {source} does not place the voxels in space (it holds a number that is not finite, "
            + "or lays all voxels of an axis on one spot); correct the header.");
    }

    // A spacing of 0 or none stands in files of one slice; the standard's own code takes 1 for it. A sign tells nothing here: directions
    // are the quaternion's.
    private static double Spacing(double pixdim) => pixdim != 0 && double.IsFinite(pixdim) ? Math.Abs(pixdim) : 1;

    // xyzt_units, bits 0-2. Unknown is taken as mm, the common practice (no source).
    private static double Millimetres(int units) => (units & 7) switch { 1 => 1000, 3 => 0.001, _ => 1 };

    private static short Code(int code) => (short)Math.Clamp(code, short.MinValue, short.MaxValue);
}
