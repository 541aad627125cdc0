using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Tests.Engine;

namespace Permute.Tests.Truth;

/// <summary>What must not change a result, or change it in one known way.</summary>
public class InvarianceTests
{
    private static readonly double[] Forming = [0.9, 2.0];
    private readonly Mask mask = Made.Mask(11, 8, 4);

    public static TheoryData<string> Designs() => ["mean", "groups", "pairs"];

    [Theory]
    [MemberData(nameof(Designs))]
    public void Negating_the_data_mirrors_the_directions(string design)
    {
        double[][] rows = Made.SmoothRows(8, mask, 3), negated = [.. rows.Select(r => r.Select(y => -y).ToArray())];
        Equal(Run(rows, Make(design, Direction.Less)), Run(negated, Make(design, Direction.Greater)));
        Equal(Run(rows, Make(design, Direction.Both)), Run(negated, Make(design, Direction.Both)));
    }

    [Theory]
    [MemberData(nameof(Designs))]
    public void Scaling_any_voxel_changes_no_t(string design)
    {
        // By powers of two, so that the very bits must stay.
        double[][] rows = Made.SmoothRows(8, mask, 4), scaled = [.. rows.Select(r => r.Select((y, v) => Math.ScaleB(y, v % 9 - 4)).ToArray())];
        Equal(Run(rows, Make(design, Direction.Both)), Run(scaled, Make(design, Direction.Both)));
    }

    [Fact]
    public void Permuting_images_with_their_rows_changes_no_exhaustive_result()
    {
        double[][] rows = Made.SmoothRows(8, mask, 5);
        int[] shuffle = [5, 2, 7, 0, 3, 6, 1, 4];
        bool[] first = [true, true, false, true, false, false, true, false];
        RunResult a = Run(rows, Questions.TwoGroups(first, Direction.Both));
        RunResult b = Run([.. shuffle.Select(i => rows[i])], Questions.TwoGroups([.. shuffle.Select(i => first[i])], Direction.Both));
        foreach (var (x, y) in a.Maxima.Height.Order().Zip(b.Maxima.Height.Order())) Assert.Equal(x, y, 1e-9);
        Assert.Equal(a.Maxima.Clusters[0].Extent.Order(), b.Maxima.Clusters[0].Extent.Order());
        Assert.Equal(a.StepDown.Counts, b.StepDown.Counts);
        Assert.Equal(a.StepDown.Voxels, b.StepDown.Voxels);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    public void Turning_the_grid_round_an_axis_changes_no_number_but_indices(int axis)
    {
        double[][] rows = Made.SmoothRows(8, mask, 6);
        Grid g = mask.Grid;
        int Turned(int index)
        {
            var (x, y, z) = g.Voxel(index);
            return axis switch { 0 => g.Index(g.Nx - 1 - x, y, z), 1 => g.Index(x, g.Ny - 1 - y, z), _ => g.Index(x, y, g.Nz - 1 - z) };
        }
        var turned = new Mask(g, [.. Enumerable.Range(0, g.Count).Select(i => mask.Position[Turned(i)] >= 0)]);
        double[][] moved = [.. rows.Select(r => turned.Voxels.Select(v => r[mask.Position[Turned(v)]]).ToArray())];
        foreach (int neighbours in new[] { 6, 18, 26 })
        {
            RunResult a = Made.Run(rows, Make("mean", Direction.Both), mask, 256, Forming, neighbours);
            RunResult b = Made.Run(moved, Make("mean", Direction.Both), turned, 256, Forming, neighbours);
            Assert.Equal(a.Maxima.Height, b.Maxima.Height);
            for (int j = 0; j < Forming.Length; j++)
            {
                Assert.Equal(a.Maxima.Clusters[j].Extent, b.Maxima.Clusters[j].Extent);
                Assert.Equal(a.Maxima.Clusters[j].ClusterCount, b.Maxima.Clusters[j].ClusterCount);
            }
        }
    }

    [Fact]
    public void Pairs_equal_sign_flips_of_the_differences()
    {
        double[][] rows = Made.SmoothRows(12, mask, 7);
        double[][] differences = [.. Enumerable.Range(0, 6).Select(i => rows[i].Zip(rows[i + 6], (a, b) => a - b).ToArray())];
        RunResult pairs = Made.Run(rows, Made.Halves(12, Direction.Both, pairs: true), mask, 64, Forming);
        RunResult flips = Made.Run(differences, Questions.Mean(6, Direction.Both), mask, 64, Forming);
        Assert.Equal(64, pairs.Maxima.Count);
        foreach (var (x, y) in pairs.Maxima.Height.Order().Zip(flips.Maxima.Height.Order())) Assert.Equal(x, y, 1e-9 * x);
        Assert.Equal(pairs.Maxima.Clusters[1].Extent.Order(), flips.Maxima.Clusters[1].Extent.Order());
        Assert.Equal(pairs.StepDown.Counts, flips.StepDown.Counts);
    }

    private static Model Make(string design, Direction direction) => design switch
    {
        "mean" => Questions.Mean(8, direction),
        "groups" => Made.Halves(8, direction),
        _ => Made.Halves(8, direction, pairs: true),
    };

    private RunResult Run(double[][] rows, Model model) => Made.Run(rows, model, mask, 256, Forming, mass: true, uncorrected: true);

    private static void Equal(RunResult a, RunResult b)
    {
        Assert.Equal(a.Maxima.Height, b.Maxima.Height);
        Assert.Equal(a.StepDown.Counts, b.StepDown.Counts);
        Assert.Equal(a.Uncorrected, b.Uncorrected);
        for (int j = 0; j < Forming.Length; j++)
        {
            Assert.Equal(a.Maxima.Clusters[j].Extent, b.Maxima.Clusters[j].Extent);
            Assert.Equal(a.Maxima.Clusters[j].VoxelsAbove, b.Maxima.Clusters[j].VoxelsAbove);
            foreach (var (x, y) in a.Maxima.Clusters[j].Mass!.Zip(b.Maxima.Clusters[j].Mass!)) Assert.Equal(x, y, 1e-9 * Math.Max(1, x));
        }
    }
}
