using Permute.Data;

namespace Permute.Tests.DataRoom;

public class SubjectMatrixTests
{
    [Theory]
    [InlineData(0, 200)]
    [InlineData(5, 3)]
    [InlineData(60, 70)]
    [InlineData(64, 128)]
    public void A_run_equals_setting_voxel_by_voxel(int first, int count)
    {
        using SubjectMatrix run = new(3, 200), single = new(3, 200);
        run.KeepSecondParts();
        double[] values = [.. Enumerable.Range(0, count).Select(i => (i % 7 - 3) * 0.1 + 1e-9 * i)];
        if (count > 20) (values[1], values[17]) = (double.NaN, double.PositiveInfinity);
        run.SetRun(1, first, values);
        for (int i = 0; i < count; i++) single[1, first + i] = values[i];
        for (int v = 0; v < 200; v++)
            for (int i = 0; i < 3; i++) Assert.Equal(BitConverter.DoubleToInt64Bits(single[i, v]), BitConverter.DoubleToInt64Bits(run[i, v]));
    }

    [Fact]
    public void Mapped_values_go_to_their_positions_and_others_nowhere()
    {
        using SubjectMatrix matrix = new(2, 3);
        matrix.KeepSecondParts();
        matrix.SetMapped(1, [-1, 0, -1, -1, 2], [9, 0.2, 9, 9, 0.1]);
        Assert.Equal(0.2, matrix[1, 0], 1e-15);
        Assert.Equal(0, matrix[1, 1]);
        Assert.Equal(0.1, matrix[1, 2], 1e-15);
        Assert.Equal(0, matrix[0, 2]);
    }

    [Fact]
    public void A_run_beyond_the_last_voxel_is_refused()
    {
        using SubjectMatrix matrix = new(1, 10);
        Assert.Throws<ArgumentOutOfRangeException>(() => matrix.SetRun(0, 8, new double[3]));
        Assert.Throws<ArgumentOutOfRangeException>(() => matrix.SetRun(1, 0, new double[3]));
        Assert.Throws<ArgumentOutOfRangeException>(() => matrix.SetMapped(0, [10], [1.0]));
        Assert.Throws<ArgumentOutOfRangeException>(() => matrix.SetMapped(0, [3, 5], [1.0, 1.0]));
    }

    [Fact]
    public void Selected_voxels_keep_both_parts()
    {
        using var matrix = SubjectMatrix.FromRows([[.. Enumerable.Range(0, 300).Select(v => v * 0.1)], [.. Enumerable.Range(0, 300).Select(v => -v * 0.3)]]);
        int[] voxels = [.. Enumerable.Range(0, 300).Where(v => v % 3 != 1)];
        using var chosen = matrix.Select(voxels);
        Assert.Equal(voxels.Length, chosen.Voxels);
        for (int v = 0; v < voxels.Length; v++) Assert.Equal((matrix[0, voxels[v]], matrix[1, voxels[v]]), (chosen[0, v], chosen[1, v]));
    }

    [Fact]
    public void Second_parts_that_are_all_zero_are_let_go()
    {
        using var matrix = SubjectMatrix.FromRows([[1, 0.1, 2], [3, 4, 5]]);
        using SubjectMatrix whole = matrix.Select([0, 2]), exact = matrix.Select([1, 2]);
        Assert.Equal(exact.Bytes, 2 * whole.Bytes);
    }

    [Fact]
    public void Images_are_the_same_only_if_every_bit_is()
    {
        double[] values = [.. Enumerable.Range(0, 100).Select(v => v * 0.1)], nearly = [.. values];
        nearly[99] += 1e-13;
        using var matrix = SubjectMatrix.FromRows([values, nearly, values]);
        Assert.True(matrix.SameValues(0, 2));
        Assert.False(matrix.SameValues(0, 1));
    }

    [Fact]
    public void Zeros_and_finite_values_are_told_apart()
    {
        using var matrix = SubjectMatrix.FromRows([[0, -0.0, 1, double.NaN, double.NegativeInfinity, 1e-300, .. new double[65]]]);
        var (zeros, finite) = (new VoxelBits(71), new VoxelBits(71));
        matrix.Classify(0, zeros, finite);
        Assert.Equal([0, 1, 5, .. Enumerable.Range(6, 65)], zeros.Voxels());
        Assert.Equal([0, 1, 2, 5, .. Enumerable.Range(6, 65)], finite.Voxels());
    }
}
