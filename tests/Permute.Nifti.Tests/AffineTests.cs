using FsCheck.Xunit;

namespace Permute.Nifti.Tests;

/// <summary>Placement in space: the qform written must place voxels where the sform does (nifti1.h, methods 2 and 3).</summary>
public class AffineTests
{
    /// <summary>
    /// Rotation by angles about x, y and z, spacing 2, 3, 4 mm, any axis reversed: the composition of elementary rotations, no quaternion
    /// in it.
    /// </summary>
    [Property(MaxTest = 100)]
    public void Qform_alone_places_voxels_as_the_sform_does(int ax, int ay, int az, bool reversed) =>
        QformAgrees(Oblique(ax, ay, az, reversed));

    [Theory]
    [InlineData(0, 0, 0)]
    [InlineData(180, 0, 0)]
    [InlineData(0, 180, 0)]
    [InlineData(0, 0, 180)]
    [InlineData(90, 0, 90)]
    [InlineData(180, 180, 0)]
    [InlineData(0, 0, 179)]
    [InlineData(-120, 45, 181)]
    public void Qform_agrees_at_right_angles_and_half_turns(int ax, int ay, int az)
    {
        QformAgrees(Oblique(ax, ay, az, false));
        QformAgrees(Oblique(ax, ay, az, true));
    }

    [Fact]
    public void A_sheared_affine_is_kept_in_the_sform_and_gets_no_qform()
    {
        double[,] sheared = { { 2, 0.1, 0, -10 }, { 0, 3, 0, 5 }, { 0, 0, 4, -7.5 }, { 0, 0, 0, 1 } };
        using var scratch = new Scratch();
        NiftiFile.Write(scratch["image.nii"], NiftiFile.For([1], sheared), [1]);
        var read = NiftiFile.ReadHeader(scratch["image.nii"]);
        Assert.Equal((1, 0), (read.SformCode, read.QformCode));
        Near(sheared, read.Affine, 1e-5);
    }

    private static void QformAgrees(double[,] affine)
    {
        using var scratch = new Scratch();
        string path = scratch["image.nii"];
        NiftiFile.Write(path, NiftiFile.For([5, 4, 3], affine), new double[60]);
        var written = NiftiFile.ReadHeader(path);
        Near(affine, written.Affine, 1e-5);

        byte[] bytes = File.ReadAllBytes(path);
        bytes.AsSpan(254, 2).Clear(); // sform_code
        bytes.AsSpan(280, 48).Clear(); // srow_x, srow_y, srow_z
        // a = √(1 − b² − c² − d²) is not stored; near half a turn single precision leaves it half its digits: √(3·2⁻²⁴)·2·4 mm is 3e-3.
        bool halfTurn = written.Stored!.Quatern.Sum(v => v * v) > 0.99;
        Near(affine, NiftiFile.ReadHeader(scratch.Put("qform.nii", bytes)).Affine, halfTurn ? 4e-3 : 2e-5);
    }

    private static double[,] Oblique(int ax, int ay, int az, bool reversed)
    {
        double[,] r = Times(Times(Turn(0, ax), Turn(1, ay)), Turn(2, az));
        double[] spacing = [reversed ? -2 : 2, 3, 4], origin = [-10, 5, -7.5];
        var affine = new double[4, 4];
        for (int i = 0; i < 3; i++)
        {
            for (int j = 0; j < 3; j++) affine[i, j] = r[i, j] * spacing[j];
            affine[i, 3] = origin[i];
        }
        affine[3, 3] = 1;
        return affine;
    }

    private static double[,] Turn(int axis, int degrees)
    {
        var (sin, cos) = Math.SinCos(degrees * Math.PI / 180);
        int a = (axis + 1) % 3, b = (axis + 2) % 3;
        var turn = new double[3, 3];
        (turn[axis, axis], turn[a, a], turn[b, b], turn[b, a], turn[a, b]) = (1, cos, cos, sin, -sin);
        return turn;
    }

    private static double[,] Times(double[,] a, double[,] b)
    {
        var product = new double[3, 3];
        for (int i = 0; i < 3; i++)
            for (int j = 0; j < 3; j++)
                for (int k = 0; k < 3; k++) product[i, j] += a[i, k] * b[k, j];
        return product;
    }

    private static void Near(double[,] expected, double[,] actual, double tolerance)
    {
        for (int i = 0; i < 16; i++) Assert.Equal(expected[i / 4, i % 4], actual[i / 4, i % 4], tolerance);
    }
}
