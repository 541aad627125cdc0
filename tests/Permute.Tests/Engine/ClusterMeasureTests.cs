using Permute.Data;
using Permute.Design;
using Permute.Engine;

namespace Permute.Tests.Engine;

/// <summary>The run-based cluster scan and what the loop records from it, against a plain flood fill.</summary>
public class ClusterMeasureTests
{
    [Theory]
    [InlineData(6)]
    [InlineData(18)]
    [InlineData(26)]
    public void Cluster_measures_equal_a_flood_fill(int neighbours)
    {
        foreach (var (nx, ny, nz) in new[] { (9, 7, 5), (70, 3, 2), (13, 11, 1), (1, 12, 9), (12, 1, 9), (65, 1, 1) })
        {
            Mask mask = Made.Mask(nx, ny, nz);
            double[][] rows = Made.SmoothRows(8, mask, 31);
            foreach (Direction direction in Enum.GetValues<Direction>())
                foreach (Model model in new[] { Questions.Mean(8, direction), Made.Halves(8, direction) })
                {
                    double[] forming = [0.4, 1.2, 2.5];
                    var plan = new RelabelingPlan(model.Relabelings, 40, 3);
                    RunResult run = Made.Run(rows, model, mask, 40, forming, neighbours, mass: true);
                    for (int k = 0; k < plan.Count; k += 3)
                        for (int j = 0; j < forming.Length; j++)
                            Check(Signed(rows, model, plan, k), forming[j], mask, neighbours, model.Direction, run.Maxima.Clusters[j], k);
                }
        }
    }

    [Fact]
    public void Extents_are_the_same_bits_for_any_threads_chunks_and_instruction_set()
    {
        Mask mask = Made.Mask(31, 14, 9);
        double[][] rows = Made.SmoothRows(12, mask, 8);
        Model model = Questions.Mean(12, Direction.Both);
        RunResult first = Made.Run(rows, model, mask, 500, [1.0, 2.2], mass: true);
        foreach (InstructionSet set in InstructionSets.Supported)
            foreach (int threads in new[] { 1, 2, 8 })
                foreach (int chunk in new[] { 33, 500 })
                {
                    RunResult again = Made.Run(rows, model, mask, 500, [1.0, 2.2], mass: true, threads: threads, chunk: chunk, set: set);
                    for (int j = 0; j < 2; j++)
                    {
                        Assert.Equal(first.Maxima.Clusters[j].Extent, again.Maxima.Clusters[j].Extent);
                        Assert.Equal(first.Maxima.Clusters[j].ClusterCount, again.Maxima.Clusters[j].ClusterCount);
                        Assert.Equal(first.Maxima.Clusters[j].VoxelsAbove, again.Maxima.Clusters[j].VoxelsAbove);
                        Assert.Equal(first.Maxima.Clusters[j].Mass, again.Maxima.Clusters[j].Mass);
                    }
                }
    }

    private static double[] Signed(double[][] rows, Model model, RelabelingPlan plan, int k) =>
        model.Direction == Direction.Less
            ? [.. Made.Reference(rows, model, plan, k).Select(t => -t)]
            : Made.Reference(rows, model with { Direction = Direction.Greater }, plan, k);

    private static void Check(double[] t, double u, Mask mask, int neighbours, Direction direction, ClusterMaxima found, int k)
    {
        int extent = 0, count = 0, voxels = 0;
        double mass = 0;
        int[] sides = direction switch { Direction.Greater => [1], Direction.Less => [-1], _ => [1, -1] };
        foreach (int side in sides)
        {
            bool[] above = [.. t.Select(v => side * v > u)];
            int[] labels = Fill(above, mask, neighbours);
            count += labels.Max();
            voxels += above.Count(a => a);
            foreach (var cluster in Enumerable.Range(0, t.Length).Where(v => labels[v] > 0).GroupBy(v => labels[v]))
            {
                extent = Math.Max(extent, cluster.Count());
                mass = Math.Max(mass, cluster.Sum(v => side * t[v] - u));
            }
        }
        Assert.Equal(extent, found.Extent[k]);
        Assert.Equal(count, found.ClusterCount[k]);
        Assert.Equal(voxels, found.VoxelsAbove[k]);
        Assert.Equal(mass, found.Mass![k], 1e-9 * Math.Max(1, mass));
    }

    /// <summary>Labels by flood fill: voxels are neighbours when their offset has no part above 1 and at most one (6), two (18) or three (26) parts.</summary>
    private static int[] Fill(bool[] above, Mask mask, int neighbours)
    {
        int parts = neighbours switch { 6 => 1, 18 => 2, _ => 3 }, label = 0;
        var labels = new int[mask.Count];
        for (int seed = 0; seed < mask.Count; seed++)
        {
            if (!above[seed] || labels[seed] != 0) continue;
            label++;
            var open = new Stack<int>([seed]);
            labels[seed] = label;
            while (open.TryPop(out int p))
            {
                var (x, y, z) = mask.Grid.Voxel(mask.Voxels[p]);
                for (int dz = -1; dz <= 1; dz++)
                    for (int dy = -1; dy <= 1; dy++)
                        for (int dx = -1; dx <= 1; dx++)
                        {
                            if (Math.Abs(dx) + Math.Abs(dy) + Math.Abs(dz) > parts) continue;
                            int q = mask.At(x + dx, y + dy, z + dz);
                            if (q < 0 || !above[q] || labels[q] != 0) continue;
                            labels[q] = label;
                            open.Push(q);
                        }
            }
        }
        return labels;
    }
}
