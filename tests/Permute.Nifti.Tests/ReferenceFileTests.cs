using System.Text.Json;
using System.Text.Json.Nodes;

namespace Permute.Nifti.Tests;

/// <summary>
/// Small files written and read by nibabel 5.0.0, a general-purpose library for neuroimaging files; case11_nifti.json holds what it
/// reads from each, and what stands in the bytes. Tolerances as stated there: header fields exact, affine absolute 1e-5,
/// voxels relative 1e-6.
/// </summary>
public class ReferenceFileTests
{
    private static readonly JsonArray Files = JsonNode.Parse(File.ReadAllText(Where("case11_nifti.json")))!["files"]!.AsArray();

    public static TheoryData<string> Names => [.. Files.Select(f => (string)f!["file"]!)];

    [Fact]
    public void There_are_22_reference_files() => Assert.Equal(22, Names.Count);

    [Theory, MemberData(nameof(Names))]
    public void Header_fields_are_read_as_they_stand(string name)
    {
        var expected = Expected(name)["header"]!;
        var header = NiftiFile.ReadHeader(Where(name));
        var stored = header.Stored!;
        Assert.Equal((int)expected["sizeof_hdr"]!, header.Version == 1 ? 348 : 540);
        Assert.Equal(Numbers(expected["dim"]!), stored.Dim.Select(d => (double)d));
        Assert.Equal((short)expected["datatype"]!, stored.Datatype);
        Assert.Equal((short)expected["datatype"]!, (short)header.Type);
        Assert.Equal((short)expected["bitpix"]!, stored.Bitpix);
        Assert.Equal(Numbers(expected["pixdim"]!), stored.Pixdim);
        Assert.Equal((double)expected["vox_offset_in_file"]!, header.DataOffset);
        Assert.Equal((int)expected["qform_code"]!, header.QformCode);
        Assert.Equal((int)expected["sform_code"]!, header.SformCode);
        // The JSON gives 12 significant digits of single-precision numbers.
        Near([.. "bcd".Select(c => (double)expected["quatern_" + c]!)], stored.Quatern, 1e-11);
        Near([.. "xyz".Select(c => (double)expected["qoffset_" + c]!)], stored.Qoffset, 1e-11);
        Near([.. "xyz".SelectMany(c => Numbers(expected["srow_" + c]!))], [.. stored.Srow.Cast<double>()], 1e-11);
        Assert.Equal((int)expected["xyzt_units"]!, header.XyztUnits);
        Assert.Equal((string)expected["magic"]!, stored.Magic);
        Assert.Equal((string)expected["descrip"]!, header.Description);
        Assert.Equal((double)expected["scl_slope_in_file"]!, stored.SclSlope);
        Assert.Equal((double)expected["scl_inter_in_file"]!, stored.SclInter);
    }

    [Theory, MemberData(nameof(Names))]
    public void Decoded_header_agrees(string name)
    {
        var expected = Expected(name);
        var header = NiftiFile.ReadHeader(Where(name));
        Assert.Equal((string)expected["endianness"]! == "big", header.BigEndian);
        // A trailing dimension of length 1 is no dimension to us, so 5×4×3×1 is 5×4×3.
        double[] shape = name == "f32_4d_single.nii" ? [5, 4, 3] : Numbers(expected["shape"]!);
        Assert.Equal(shape, header.Dimensions.Select(d => (double)d));
        Assert.Equal(Numbers(expected["zooms"]!)[..shape.Length], header.VoxelSize);
        // Without form codes the standard's method 1 holds, plain scaling by pixdim, where the library centres the grid and reverses x.
        double[] affine = name == "no_form_codes.nii"
            ? [2, 0, 0, 0, 0, 3, 0, 0, 0, 0, 4, 0, 0, 0, 0, 1]
            : [.. expected["affine"]!.AsArray().SelectMany(row => Numbers(row!))];
        Near(affine, [.. header.Affine.Cast<double>()], 1e-5);
    }

    [Theory, MemberData(nameof(Names))]
    public void Voxels_agree(string name)
    {
        var expected = Expected(name);
        var (header, values) = NiftiFile.ReadAll(Where(name));
        foreach (var voxel in expected["voxels"]!.AsArray())
        {
            double[] index = Numbers(voxel!["index"]!);
            long at = 0;
            double[] shape = Numbers(expected["shape"]!);
            for (int d = index.Length - 1; d >= 0; d--) at = (long)index[d] + at * (long)shape[d];
            if (voxel["value"]!.GetValueKind() == JsonValueKind.String)
                Assert.Equal((string)voxel["value"]! == "nan" ? double.NaN : double.PositiveInfinity, values[at]);
            else Near([(double)voxel["value"]!], [values[at]], 1e-6 * Math.Abs((double)voxel["value"]!));
        }
        double sum = (double)expected["sum_of_finite"]!;
        Near([sum], [values.Where(double.IsFinite).Sum()], 1e-6 * Math.Abs(sum));
        Assert.Equal((int)expected["nan_count"]!, values.Count(double.IsNaN));
        Assert.Equal((int)expected["inf_count"]!, values.Count(double.IsInfinity));
    }

    private static string Where(string name) => Path.Combine(AppContext.BaseDirectory, "Data", name);

    private static JsonNode Expected(string name) => Files.Single(f => (string)f!["file"]! == name)!;

    private static double[] Numbers(JsonNode array) => [.. array.AsArray().Select(v => (double)v!)];

    private static void Near(double[] expected, double[] actual, double tolerance)
    {
        Assert.Equal(expected.Length, actual.Length);
        for (int i = 0; i < expected.Length; i++)
            Assert.True(Math.Abs(expected[i] - actual[i]) <= tolerance, $"Entry {i}: expected {expected[i]}, found {actual[i]}.");
    }
}
