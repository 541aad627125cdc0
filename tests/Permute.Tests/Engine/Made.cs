using Permute.Data;
using Permute.Design;
using Permute.Engine;

namespace Permute.Tests.Engine;

/// <summary>Made-up numbers for tests that compare two computations of ours, where what the numbers are does not matter.</summary>
internal static class Made
{
    /// <summary>n rows of V standard normal numbers from the counter-based generator.</summary>
    public static double[][] Rows(int images, int voxels, long seed, double mean = 0)
    {
        var random = new Philox(seed, 77);
        var rows = new double[images][];
        for (int i = 0; i < images; i++)
        {
            rows[i] = new double[voxels];
            for (int v = 0; v < voxels; v++) rows[i][v] = mean + random.Normal();
        }
        return rows;
    }

    /// <summary>The same smoothed a little along x, y and z (weights 1 2 1), so that clusters form.</summary>
    public static double[][] SmoothRows(int images, Mask mask, long seed)
    {
        double[][] rows = Rows(images, mask.Count, seed);
        return [.. rows.Select(row => Enumerable.Range(0, mask.Count).Select(p =>
        {
            var (x, y, z) = mask.Grid.Voxel(mask.Voxels[p]);
            double sum = 0;
            for (int dz = -1; dz <= 1; dz++)
                for (int dy = -1; dy <= 1; dy++)
                    for (int dx = -1; dx <= 1; dx++)
                        if (mask.At(x + dx, y + dy, z + dz) is >= 0 and var q)
                            sum += row[q] / (1 << (Math.Abs(dx) + Math.Abs(dy) + Math.Abs(dz)));
            return sum;
        }).ToArray())];
    }

    /// <summary>A grid with an irregular mask: about a quarter of its voxels are outside.</summary>
    public static Mask Mask(int nx, int ny, int nz, long seed = 5)
    {
        var random = new Philox(seed, 1);
        Grid grid = Grid.Plain(nx, ny, nz);
        return new Mask(grid, [.. Enumerable.Range(0, grid.Count).Select(_ => random.Below(4) > 0)]);
    }

    /// <summary>The first half of the images against the second.</summary>
    public static Model Halves(int images, Direction direction, bool pairs = false) => Questions.TwoGroups(
        [.. Enumerable.Range(0, images).Select(i => i < images / 2)], direction,
        blockOf: pairs ? [.. Enumerable.Range(0, images).Select(i => i % (images / 2))] : null);

    /// <summary>A run in memory.</summary>
    public static RunResult Run(
        double[][] rows, Model model, Mask? mask = null, int relabelings = 64, double[]? forming = null, int neighbours = 18, bool mass = false,
        bool uncorrected = false, int threads = 1, InstructionSet? set = null, int? chunk = null, int stepDown = 1000, long seed = 3,
        (double E, double H)? tfce = null)
    {
        using var data = SubjectMatrix.FromRows(rows);
        var measures = new Measures
        {
            FormingStatistics = forming ?? [],
            Neighbourhood = Neighbourhood.Of(neighbours),
            Mass = mass,
            Uncorrected = uncorrected,
            StepDown = stepDown,
            Tfce = tfce,
        };
        using var loop = new RelabelingLoop(data, mask, model, new RelabelingPlan(model.Relabelings, relabelings, seed), measures, threads, set);
        return chunk is int size ? loop.Run(size) : loop.Run();
    }

    /// <summary>Evidence of every voxel under relabeling k, by the plain formula applied to relabeled data.</summary>
    public static double[] Reference(double[][] rows, Model model, RelabelingPlan plan, int k)
    {
        var order = new int[model.Images];
        var sign = new sbyte[model.Images];
        plan.Arrange(k, order, sign);
        // Image i is described by design row order[i] with its sign turned: the same as residuals sign·e moved to that row.
        return [.. Enumerable.Range(0, rows[0].Length).Select(v =>
        {
            double[] e = [.. rows.Select(r => r[v])], y = new double[model.Images];
            model.ReducedResiduals(e);
            for (int i = 0; i < y.Length; i++) y[order[i]] = sign[i] * e[i];
            model.ReducedResiduals(y);
            if (model.Statistic == "f")
            {
                // Extra sum of squares.
                double reduced = y.Sum(x => x * x);
                model.FullResiduals(y);
                double full = y.Sum(x => x * x);
                return (reduced - full) / model.Regressors.Count / (full / model.DegreesOfFreedom);
            }
            double t = Permute.Statistics.PartialT.Of(y, model.Regressor, model.DegreesOfFreedom);
            return model.Direction switch { Direction.Greater => t, Direction.Less => -t, _ => Math.Abs(t) };
        })];
    }
}
