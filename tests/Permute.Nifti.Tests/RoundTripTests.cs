using FsCheck;
using FsCheck.Xunit;

namespace Permute.Nifti.Tests;

/// <summary>What is written is what is read.</summary>
public class RoundTripTests
{
    private static readonly double[,] Affine = { { -2, 0, 0, 40 }, { 0, 3, 0, -30 }, { 0, 0, 4, 20 }, { 0, 0, 0, 1 } };

    public static TheoryData<NiftiType, string> TypesAndEndings
    {
        get
        {
            var all = new TheoryData<NiftiType, string>();
            foreach (var type in Enum.GetValues<NiftiType>())
                foreach (string ending in new[] { ".nii", ".nii.gz" }) all.Add(type, ending);
            return all;
        }
    }

    [Theory, MemberData(nameof(TypesAndEndings))]
    public void Every_type_comes_back(NiftiType type, string ending)
    {
        // Small whole numbers fit every type.
        double[] values = [.. Enumerable.Range(0, 2 * 3 * 4 * 5).Select(i => (double)i)];
        var header = NiftiFile.For([2, 3, 4, 5], Affine, type) with { VoxelSize = [2, 3, 4, 1.5] };
        var (read, back) = WriteAndRead(header, values, ending);
        Assert.Equal(values, back);
        Assert.Equal(type, read.Type);
        Assert.Equal([2, 3, 4, 5], read.Dimensions);
        Assert.Equal([2, 3, 4, 1.5], read.VoxelSize);
        Assert.Equal(Affine, read.Affine);
        Assert.Equal((1, 1, 2), (read.SformCode, read.QformCode, read.XyztUnits));
        Assert.Equal((1, false, 352), (read.Version, read.BigEndian, read.DataOffset));
    }

    [Property(MaxTest = 50)]
    public void Doubles_come_back_bit_for_bit(NonEmptyArray<double> values, bool gzip)
    {
        var header = NiftiFile.For([values.Get.Length], Affine, NiftiType.Float64);
        var back = WriteAndRead(header, values.Get, gzip ? ".nii.gz" : ".nii").Values;
        Assert.Equal(values.Get.Select(BitConverter.DoubleToInt64Bits), back.Select(BitConverter.DoubleToInt64Bits));
    }

    [Property(MaxTest = 50)]
    public void Floats_come_back(NonEmptyArray<float> values)
    {
        double[] wide = [.. values.Get.Select(v => (double)v)];
        Assert.Equal(wide, WriteAndRead(NiftiFile.For([wide.Length], Affine), wide, ".nii").Values);
    }

    [Property(MaxTest = 50)]
    public void Whole_numbers_come_back(NonEmptyArray<int> values)
    {
        double[] wide = [.. values.Get.Select(v => (double)v)];
        Assert.Equal(wide, WriteAndRead(NiftiFile.For([wide.Length], Affine, NiftiType.Int32), wide, ".nii").Values);
    }

    [Property(MaxTest = 50)]
    public void Scaled_integers_come_back_within_half_a_step(NonEmptyArray<short> steps, PositiveInt slope, short intercept)
    {
        // 0.1 is no number of single precision: what is read must be scaled by what was stored, not by what was asked.
        double step = 0.1 * slope.Get;
        double[] values = [.. steps.Get.Select(s => s * step + intercept)];
        var header = NiftiFile.For([values.Length], Affine, NiftiType.Int32) with { Slope = step, Intercept = intercept };
        var (read, back) = WriteAndRead(header, values, ".nii");
        Assert.Equal((float)step, read.Slope);
        for (int i = 0; i < values.Length; i++) Assert.InRange(Math.Abs(back[i] - values[i]), 0, 0.5001 * step);
    }

    [Theory]
    [InlineData(NiftiType.UInt8, 255, 256)]
    [InlineData(NiftiType.UInt8, 0, -1)]
    [InlineData(NiftiType.Int8, -128, -129)]
    [InlineData(NiftiType.Int16, 32767.4, 32767.6)]
    [InlineData(NiftiType.UInt16, 65535, 65536)]
    [InlineData(NiftiType.Int32, int.MinValue, int.MinValue - 1.0)]
    [InlineData(NiftiType.UInt32, uint.MaxValue, uint.MaxValue + 1.0)]
    [InlineData(NiftiType.Int64, -9223372036854775808.0, 9223372036854775808.0)]
    [InlineData(NiftiType.UInt64, 9223372036854775808.0, 18446744073709551616.0)]
    [InlineData(NiftiType.Int16, 7, double.NaN)]
    [InlineData(NiftiType.Int16, 7, double.PositiveInfinity)]
    public void A_value_that_an_integer_type_cannot_hold_is_refused_and_nothing_is_left(NiftiType type, double fits, double doesNot)
    {
        using var scratch = new Scratch();
        var header = NiftiFile.For([2], Affine, type);
        NiftiFile.Write(scratch["good.nii"], header, [0, fits]);
        Assert.Equal(Math.Round(fits), NiftiFile.ReadAll(scratch["good.nii"]).Values[1]);

        var error = Assert.Throws<NiftiException>(() => NiftiFile.Write(scratch["bad.nii"], header, [0, doesNot]));
        Assert.StartsWith(scratch["bad.nii"] + ": voxel 1 ", error.Message);
        Assert.Contains(type.ToString(), error.Message);
        Assert.Equal(["good.nii"], scratch.Names);
    }

    [Fact]
    public void Intent_and_description_come_back()
    {
        var header = NiftiFile.For([1], Affine) with
        {
            IntentCode = 3, // NIFTI_INTENT_TTEST, whose p1 is the degrees of freedom
            IntentP1 = 11,
            IntentP2 = 0.5,
            IntentP3 = -2,
            IntentName = "mean",
            Description = "one sample",
            SformCode = 4,
        };
        var read = WriteAndRead(header, [1], ".nii").Header;
        Assert.Equal([3, 11, 0.5, -2], new[] { read.IntentCode, read.IntentP1, read.IntentP2, read.IntentP3 });
        Assert.Equal(("mean", "one sample"), (read.IntentName, read.Description));
        // The qform repeats the sform, so it is in the sform's space, not in the one an earlier qform was in.
        Assert.Equal((4, 4), (read.SformCode, read.QformCode));
    }

    [Fact]
    public void Texts_that_are_too_long_end_at_the_last_whole_character_that_fits()
    {
        var header = NiftiFile.For([1], Affine) with { Description = new string('a', 78) + "é and more", IntentName = new string('b', 40) };
        var read = WriteAndRead(header, [1], ".nii").Header;
        Assert.Equal(new string('a', 78), read.Description);
        Assert.Equal(new string('b', 15), read.IntentName);
    }

    [Fact]
    public void A_header_that_was_read_can_be_written_for_another_type()
    {
        using var scratch = new Scratch();
        var source = new RawImage(2, bigEndian: true) { Slope = 3, Inter = 1, Units = 3 };
        var (header, values) = NiftiFile.ReadAll(scratch.Put("source.nii", source.File()));
        var (read, back) = WriteAndRead(header with { Type = NiftiType.Float64 }, values, ".nii.gz");
        Assert.Equal(values, back);
        Assert.Equal((1, 0, NiftiType.Float64), (read.Slope, read.Intercept, read.Type));
        Assert.Equal(2, read.XyztUnits & 7); // was micrometres; the affine is in mm, and says so now
        for (int i = 0; i < 16; i++) Assert.Equal(header.Affine[i / 4, i % 4], read.Affine[i / 4, i % 4], 1e-9);
    }

    [Fact]
    public void Equal_input_gives_equal_bytes_and_replaces_what_was_there()
    {
        using var scratch = new Scratch();
        var header = NiftiFile.For([3], Affine);
        NiftiFile.Write(scratch["a.nii.gz"], header, [1, 2, 3]);
        File.WriteAllText(scratch["b.nii.gz"], "something else");
        NiftiFile.Write(scratch["b.nii.gz"], header, [1, 2, 3]);
        Assert.Equal(File.ReadAllBytes(scratch["a.nii.gz"]), File.ReadAllBytes(scratch["b.nii.gz"]));
        Assert.Equal(["a.nii.gz", "b.nii.gz"], scratch.Names);
    }

    [Theory]
    [InlineData("map.img")]
    [InlineData("map.gz")]
    [InlineData("map")]
    public void Another_ending_is_refused(string name)
    {
        using var scratch = new Scratch();
        var error = Assert.Throws<NiftiException>(() => NiftiFile.Write(scratch[name], NiftiFile.For([1], Affine), [1]));
        Assert.StartsWith(scratch[name], error.Message);
        Assert.Empty(scratch.Names);
    }

    [Fact]
    public void A_dimension_beyond_16_bits_is_refused()
    {
        using var scratch = new Scratch();
        var header = NiftiFile.For([40_000], Affine);
        var error = Assert.Throws<NiftiException>(() => NiftiFile.Write(scratch["long.nii"], header, new double[40_000]));
        Assert.Contains("40000", error.Message);
    }

    [Fact]
    public void A_folder_that_does_not_exist_is_refused_by_the_files_name()
    {
        using var scratch = new Scratch();
        string path = Path.Combine(scratch["nowhere"], "map.nii");
        Assert.StartsWith(path, Assert.Throws<NiftiException>(() => NiftiFile.Write(path, NiftiFile.For([1], Affine), [1])).Message);
    }

    [Fact]
    public void A_wrong_number_of_values_is_refused()
    {
        using var scratch = new Scratch();
        Assert.Throws<ArgumentException>(() => NiftiFile.Write(scratch["map.nii"], NiftiFile.For([2, 2], Affine), [1, 2, 3]));
        Assert.Empty(scratch.Names);
    }

    [Fact]
    public void A_new_header_has_three_dimensions_or_more_and_no_trailing_ones()
    {
        Assert.Equal([7, 1, 1], NiftiFile.For([7], Affine).Dimensions);
        Assert.Equal([5, 4, 1], NiftiFile.For([5, 4, 1, 1], Affine).Dimensions);
        Assert.Equal([5, 4, 1, 2], NiftiFile.For([5, 4, 1, 2, 1], Affine).Dimensions);
        Assert.Throws<ArgumentException>(() => NiftiFile.For([5, 0], Affine));
        Assert.Throws<ArgumentException>(() => NiftiFile.For([1, 1, 1, 1, 1, 1, 1, 1], Affine));
        Assert.Throws<ArgumentException>(() => NiftiFile.For([1], new double[3, 4]));
    }

    private static (NiftiHeader Header, double[] Values) WriteAndRead(NiftiHeader header, double[] values, string ending)
    {
        using var scratch = new Scratch();
        NiftiFile.Write(scratch["image" + ending], header, values);
        return NiftiFile.ReadAll(scratch["image" + ending]);
    }
}
