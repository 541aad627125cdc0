namespace Permute.Nifti.Tests;

/// <summary>Every voxel type in every version and byte order, from files made byte by byte (offsets of nifti1.h and nifti2.h).</summary>
public class ByteOrderTests
{
    public static TheoryData<NiftiType, int, bool> Everything
    {
        get
        {
            var all = new TheoryData<NiftiType, int, bool>();
            foreach (var type in Enum.GetValues<NiftiType>())
                foreach (int version in new[] { 1, 2 })
                    foreach (bool big in new[] { false, true }) all.Add(type, version, big);
            return all;
        }
    }

    [Theory, MemberData(nameof(Everything))]
    public void Every_type_is_decoded_in_both_versions_and_byte_orders(NiftiType type, int version, bool big)
    {
        (byte[][] voxels, double[] expected) = Samples(type);
        var raw = new RawImage(version, big)
        {
            Dim = [1, voxels.Length, 1, 1, 1, 1, 1, 1],
            Datatype = (short)type,
            Bitpix = (short)(8 * voxels[0].Length),
            Voxels = voxels,
        };
        using var scratch = new Scratch();
        var (header, values) = NiftiFile.ReadAll(scratch.Put("image.nii", raw.File()));
        Assert.Equal((type, version, big), (header.Type, header.Version, header.BigEndian));
        Assert.Equal(expected, values);

        raw.Slope = -0.5;
        raw.Inter = 3;
        Assert.Equal(expected.Select(v => -0.5 * v + 3), NiftiFile.ReadAll(scratch.Put("scaled.nii.gz", Scratch.Gzip(raw.File()))).Values);
    }

    [Theory, InlineData(1), InlineData(2)]
    public void Header_of_high_byte_first_is_decoded(int version)
    {
        var raw = new RawImage(version, bigEndian: true)
        {
            Dim = [4, 2, 3, 2, 2, 1, 1, 1],
            Pixdim = [1, 2, 3, 4, 2.5, 1, 1, 1],
            Units = 10,
        };
        using var scratch = new Scratch();
        var header = NiftiFile.ReadHeader(scratch.Put("image.nii", raw.File()));
        Assert.Equal([2, 3, 2, 2], header.Dimensions);
        Assert.Equal([2, 3, 4, 2.5], header.VoxelSize);
        Assert.Equal([2, 0, 0, -1, 0, 2, 0, -2, 0, 0, 2, -3, 0, 0, 0, 1], header.Affine.Cast<double>());
        Assert.Equal(24, header.VoxelCount);
    }

    [Theory]
    [InlineData(0.0)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void A_slope_of_zero_or_not_finite_means_unscaled(double slope)
    {
        using var scratch = new Scratch();
        var (header, values) = NiftiFile.ReadAll(scratch.Put("image.nii", new RawImage { Slope = slope, Inter = 7 }.File()));
        Assert.Equal((1, 0), (header.Slope, header.Intercept));
        Assert.Equal(Enumerable.Range(0, 24).Select(i => (double)i), values);
    }

    [Theory]
    [InlineData(1, 1000)]
    [InlineData(2, 1)]
    [InlineData(3, 0.001)]
    [InlineData(0, 1)]
    public void Affine_and_voxel_size_are_in_mm_whatever_the_unit_of_the_file(int units, double factor)
    {
        using var scratch = new Scratch();
        var header = NiftiFile.ReadHeader(scratch.Put("image.nii", new RawImage { Units = units | 8 }.File()));
        Assert.Equal([2 * factor, 2 * factor, 2 * factor], header.VoxelSize);
        Assert.Equal([2 * factor, 0, 0, -1 * factor], Enumerable.Range(0, 4).Select(c => header.Affine[0, c]));
    }

    private static (byte[][] Stored, double[] Values) Samples(NiftiType type)
    {
        static (byte[][], double[]) Of<T>(Func<T, byte[]> bytes, Func<T, double> value, params T[] samples) =>
            ([.. samples.Select(bytes)], [.. samples.Select(value)]);
        return type switch
        {
            NiftiType.UInt8 => Of<byte>(v => [v], v => v, 0, 1, 127, 128, 255),
            NiftiType.Int8 => Of<sbyte>(v => [(byte)v], v => v, 0, 1, -1, 127, -128),
            NiftiType.Int16 => Of<short>(BitConverter.GetBytes, v => v, 0, 258, -2, short.MaxValue, short.MinValue),
            NiftiType.UInt16 => Of<ushort>(BitConverter.GetBytes, v => v, 0, 258, 40000, ushort.MaxValue),
            NiftiType.Int32 => Of<int>(BitConverter.GetBytes, v => v, 0, 66051, -2, int.MaxValue, int.MinValue),
            NiftiType.UInt32 => Of<uint>(BitConverter.GetBytes, v => v, 0, 66051, 3_000_000_000, uint.MaxValue),
            NiftiType.Int64 => Of<long>(BitConverter.GetBytes, v => v, 0, 1L << 53, -(1L << 53), 0x01020304050607, long.MinValue),
            NiftiType.UInt64 => Of<ulong>(BitConverter.GetBytes, v => v, 0, 1UL << 53, 1UL << 63, 0x01020304050607),
            NiftiType.Float32 => Of<float>(BitConverter.GetBytes, v => v, 0, 1.5f, -3.25e10f, float.NaN, 1 / 0f, float.Epsilon),
            _ => Of<double>(BitConverter.GetBytes, v => v, 0, 1.5, -3.25e100, double.NaN, double.NegativeInfinity, Math.PI),
        };
    }
}
