using System.Globalization;
using Permute.Data;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class SmoothnessTests
{
    private static readonly double[][] Stored = ReadFields();

    // Source: Kiebel et al. (1999), Hotelling (1953), Worsley (1999); see smoothness.json.
    [Theory]
    [InlineData("wholeBox")]
    [InlineData("ellipsoid")]
    public void The_stored_fields_have_the_smoothness_found_elsewhere(string region)
    {
        var expected = TheoryValues.Read("smoothness.json").GetProperty(region);
        Mask mask = region == "wholeBox" ? TheoryValues.Box(10, 9, 8) : Ellipsoid();
        SmoothnessEstimate found = Smoothness.Estimate(mask, 8, 7, StoredResiduals(mask), 2);
        int axis = 0;
        foreach (var row in expected.Rows("axes"))
        {
            Assert.Equal((long)row.Value("pairs"), found.Pairs[axis]);
            TheoryValues.Close(row.Value("lagCorrelation"), found.LagCorrelation[axis], 1e-8, "m");
            TheoryValues.Close(row.Value("trueCorrelation"), Smoothness.TrueCorrelation(found.LagCorrelation[axis], 7), 1e-8, "ρ");
            TheoryValues.Close(row.Value("fwhmVoxels"), found.FwhmVoxels[axis]!.Value, 1e-8, "FWHM");
            axis++;
        }
        Assert.Equal(3, axis);
        Assert.Null(found.Reason);
        ResidualSlices.Walk(mask, 8, StoredResiduals(mask), 1, out double[] local);
        double[] there = [.. local.Where(v => !double.IsNaN(v))];
        Assert.Equal((int)expected.GetProperty("localResels").Value("voxels"), there.Length);
        TheoryValues.Close(expected.GetProperty("localResels").Value("mean"), there.Average(), 1e-8, "local resels");
    }

    [Fact]
    public void The_ellipsoid_has_the_voxels_it_should() =>
        Assert.Equal((int)TheoryValues.Read("smoothness.json").Value("ellipsoidVoxels"), Ellipsoid().Count);

    // Source: Hotelling (1953) by SciPy (smoothness.json) and by mpmath near 1 (upper-tails.json).
    [Fact]
    public void Expected_sample_correlations_and_their_inverse_are_those_found_elsewhere()
    {
        foreach (string file in new[] { "smoothness.json", "upper-tails.json" })
            foreach (var row in TheoryValues.Read(file).Rows("expectedCorrelations"))
            {
                double rho = row.Value("trueCorrelation");
                int nu = (int)row.Value("nu");
                TheoryValues.Close(row.Value("expected"), Smoothness.ExpectedSampleCorrelation(rho, nu), 1e-10, row.ToString());
                TheoryValues.Close(1 - rho, 1 - Smoothness.TrueCorrelation(row.Value("expected"), nu), 1e-7, row.ToString());
            }
    }

    // The plain formulas, pair by pair.
    [Fact]
    public void The_sliced_sums_are_those_of_the_plain_formulas()
    {
        Mask mask = TheoryValues.Where(10, 9, 8, (x, y, z) => (x * 7 + y * 5 + z * 3) % 11 != 0);
        ResidualsOf residuals = Without(StoredResiduals(mask), 17, 200, mask.Count - 1);
        SmoothnessEstimate found = Smoothness.Estimate(mask, 8, 7, residuals, 3);
        double[]?[] u = [.. Enumerable.Range(0, mask.Count).Select(v => Normalised(residuals, v))];
        for (int axis = 0; axis < 3; axis++)
            for (int lag = 1; lag <= 3; lag++)
            {
                double sum = 0;
                long pairs = 0;
                for (int p = 0; p < mask.Count; p++)
                {
                    var (x, y, z) = mask.Grid.Voxel(mask.Voxels[p]);
                    int q = mask.At(x + (axis == 0 ? lag : 0), y + (axis == 1 ? lag : 0), z + (axis == 2 ? lag : 0));
                    if (q < 0 || u[p] == null || u[q] == null) continue;
                    sum += u[p]!.Zip(u[q]!, (a, b) => a * b).Sum();
                    pairs++;
                }
                double fwhm = lag * Math.Sqrt(-2 * Math.Log(2) / Math.Log(Smoothness.TrueCorrelation(sum / pairs, 7)));
                double?[] seen = lag == 1 ? found.FwhmVoxels : lag == 2 ? found.Lag2Fwhm : found.Lag3Fwhm;
                TheoryValues.Close(fwhm, seen[axis]!.Value, 1e-10, $"axis {axis}, lag {lag}");
                if (lag == 1) Assert.Equal(pairs, found.Pairs[axis]);
            }
    }

    [Fact]
    public void Threads_change_no_bit()
    {
        Mask mask = Ellipsoid();
        SmoothnessEstimate one = Smoothness.Estimate(mask, 8, 7, StoredResiduals(mask), 1);
        foreach (int threads in new[] { 2, 3, 5, 16 })
        {
            SmoothnessEstimate many = Smoothness.Estimate(mask, 8, 7, StoredResiduals(mask), threads);
            Assert.Equal(one.FwhmVoxels, many.FwhmVoxels);
            Assert.Equal(one.Lag3Fwhm, many.Lag3Fwhm);
            Assert.Equal(one.LocalResels, many.LocalResels);
            Assert.Equal(one.UnevennessCv, many.UnevennessCv);
        }
    }

    [Fact]
    public void Doubling_the_residuals_changes_nothing()
    {
        Mask mask = Ellipsoid();
        ResidualsOf plain = StoredResiduals(mask);
        SmoothnessEstimate once = Smoothness.Estimate(mask, 8, 7, plain, 1);
        SmoothnessEstimate twice = Smoothness.Estimate(mask, 8, 7, (v, e) =>
        {
            plain(v, e);
            for (int i = 0; i < e.Length; i++) e[i] *= 2;
        }, 1);
        Assert.Equal(once.FwhmVoxels, twice.FwhmVoxels);
    }

    [Fact]
    public void An_axis_of_one_voxel_is_skipped()
    {
        Mask slice = TheoryValues.Box(10, 9, 1);
        SmoothnessEstimate found = Smoothness.Estimate(slice, 8, 7, StoredResiduals(slice), 2);
        Assert.NotNull(found.FwhmVoxels[0]);
        Assert.NotNull(found.FwhmVoxels[1]);
        Assert.Null(found.FwhmVoxels[2]);
        Assert.Null(found.Lag2Fwhm[2]);
        Assert.Null(found.Reason);
        TheoryValues.Close(1 / (found.FwhmVoxels[0]!.Value * found.FwhmVoxels[1]!.Value), found.LocalResels.Average(), 1e-12, "mean of local resels");
    }

    [Fact]
    public void Neighbours_without_correlation_have_no_smoothness_and_the_axis_is_named()
    {
        Mask mask = TheoryValues.Box(6, 6, 6);
        // Along y every voxel is the negative of its neighbour.
        SmoothnessEstimate found = Smoothness.Estimate(mask, 4, 3, (v, e) =>
        {
            var (x, y, z) = mask.Grid.Voxel(v);
            for (int i = 0; i < 4; i++) e[i] = (y % 2 == 0 ? 1 : -1) * (i - 1.5 + 0.2 * Math.Sin(x + 2 * z + i));
        }, 1);
        Assert.Null(found.FwhmVoxels[1]);
        Assert.Contains("along y", found.Reason);
        Assert.Empty(found.LocalResels);
    }

    [Fact]
    public void Residuals_that_are_all_zero_give_a_reason_and_no_figures()
    {
        SmoothnessEstimate found = Smoothness.Estimate(TheoryValues.Box(4, 4, 4), 5, 4, (_, e) => e.Clear(), 2);
        Assert.NotNull(found.Reason);
        Assert.All(found.FwhmVoxels, Assert.Null);
        Assert.Equal([0L, 0, 0], found.Pairs);
    }

    // Simulation with a fixed seed; the estimate is held to the sampled kernel's own correlation of neighbours.
    [Theory]
    [InlineData(1.5, 5)]
    [InlineData(3, 6)]
    public void Noise_of_known_smoothness_has_it_within_the_simulation_error(double fwhm, int images)
    {
        const int sets = 8, side = 14;
        Mask mask = TheoryValues.Box(side, side, side);
        double[] found = [.. Enumerable.Range(0, sets).Select(s =>
            Smoothness.Estimate(mask, images, images - 1, new NoiseImages(100 + s, images, side, fwhm).Residuals, 1).FwhmVoxels.Average()!.Value)];
        double mean = found.Average(), error = Math.Sqrt(found.Sum(f => (f - mean) * (f - mean)) / (sets - 1) / sets);
        Assert.InRange(mean / NoiseImages.SampledFwhm(fwhm), 0.99 - 4 * error / fwhm, 1.01 + 4 * error / fwhm);
        Assert.True(4 * error / fwhm < 0.05, "the simulation is too small to tell");
    }

    // Common practice, no source: the smoothness is that of the data and of the kernel together.
    [Fact]
    public void Data_that_were_smooth_already_are_smoother_than_the_kernel_applied()
    {
        SmoothnessEstimate found = Smoothness.Estimate(TheoryValues.Box(14, 14, 14), 8, 7, new NoiseImages(5, 8, 14, 2, 3).Residuals, 2);
        Assert.All(found.FwhmVoxels, f => Assert.InRange(f!.Value, 3.2, 4.2)); // √(2² + 3²) = 3.6
    }

    private static Mask Ellipsoid() => TheoryValues.Where(10, 9, 8, (x, y, z) =>
        Math.Pow((x - 4.5) / 4.6, 2) + Math.Pow((y - 4) / 4.1, 2) + Math.Pow((z - 3.5) / 3.6, 2) <= 1);

    private static ResidualsOf StoredResiduals(Mask mask) => (voxel, e) =>
    {
        int v = mask.Voxels[voxel];
        double mean = Stored.Average(image => image[v]);
        for (int i = 0; i < e.Length; i++) e[i] = Stored[i][v] - mean;
    };

    private static ResidualsOf Without(ResidualsOf residuals, int zero, int alsoZero, int infinite) => (voxel, e) =>
    {
        residuals(voxel, e);
        if (voxel == zero || voxel == alsoZero) e.Clear();
        if (voxel == infinite) e[2] = double.PositiveInfinity;
    };

    private static double[]? Normalised(ResidualsOf residuals, int voxel)
    {
        var e = new double[8];
        residuals(voxel, e);
        double norm = Math.Sqrt(e.Sum(v => v * v));
        return norm == 0 || !double.IsFinite(norm) ? null : [.. e.Select(v => v / norm)];
    }

    private static double[][] ReadFields()
    {
        double[] all = [.. File.ReadLines(Path.Combine(AppContext.BaseDirectory, "Data", "smoothness-fields.txt")).Where(l => !l.StartsWith('#'))
            .SelectMany(l => l.Split(' ', StringSplitOptions.RemoveEmptyEntries)).Select(v => double.Parse(v, CultureInfo.InvariantCulture) / 1000)];
        return [.. Enumerable.Range(0, 8).Select(i => all[(i * 720)..((i + 1) * 720)])];
    }
}
