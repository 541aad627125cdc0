using MathNet.Numerics.Distributions;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;
using Permute.Statistics;

namespace Permute.Tests.Truth;

/// <summary>Runs only with PERMUTE_TRUTH=all: minutes, not seconds. tests/truth.sh runs it; DEVELOPERS.md has its last result.</summary>
internal sealed class LongTheoryAttribute : TheoryAttribute
{
    public LongTheoryAttribute()
    {
        if (Environment.GetEnvironmentVariable("PERMUTE_TRUTH") != "all") Skip = "Takes minutes: run tests/truth.sh.";
    }
}

/// <summary>Permutation and field theory on simulated null data, with fixed seeds, so that a result never changes by chance.</summary>
public class SimulationTests(Xunit.Abstractions.ITestOutputHelper output)
{
    [Theory]
    [InlineData("mean", Direction.Both)]
    [InlineData("groups", Direction.Greater)]
    public void The_rank_of_the_observed_maximum_is_uniform_on_null_data(string design, Direction direction)
    {
        const int Sets = 2000, Bins = 16;
        Model model = design == "mean" ? Questions.Mean(8, direction) : Questions.TwoGroups([.. Enumerable.Range(0, 8).Select(i => i % 2 == 0)], direction);
        Mask mask = Mask.Whole(Grid.Plain(8, 8, 8));
        var plan = new RelabelingPlan(model.Relabelings, 10000, 1);
        var measures = new Measures { FormingStatistics = [2.0], StepDown = 0 };
        var (bins, height, extent) = (new int[Bins], 0, 0);
        double level = Math.Floor(0.05 * plan.Count / (direction == Direction.Both ? 2 : 1)) * (direction == Direction.Both ? 2 : 1) / plan.Count;
        Parallel.For(0, Sets, set =>
        {
            using SubjectMatrix data = SmoothNoise.Cube(8, 8, 2, 1000 + set);
            using var loop = new RelabelingLoop(data, mask, model, plan, measures, 1);
            Maxima maxima = loop.Run().Maxima;
            int above = maxima.Height.Count(m => m > maxima.Height[0] && !Ties.Reaches(maxima.Height[0], m)), reach = maxima.Height.Count(m => Ties.Reaches(m, maxima.Height[0]));
            var random = new Philox(77, set);
            int rank = above + random.Below(reach - above);
            lock (bins)
            {
                bins[rank * Bins / plan.Count]++;
                if (reach <= level * plan.Count + 1e-9) height++;
                if (maxima.Clusters[0].Extent.Count(e => e >= maxima.Clusters[0].Extent[0]) <= level * plan.Count + 1e-9) extent++;
            }
        });
        // 70 arrangements do not fill 16 bins equally: expect what each bin can hold.
        double[] expected = [.. Enumerable.Range(0, Bins).Select(b => Sets * Enumerable.Range(0, plan.Count).Count(r => r * Bins / plan.Count == b) / (double)plan.Count)];
        double chi = bins.Zip(expected, (o, e) => (o - e) * (o - e) / e).Sum();
        output.WriteLine($"{design} {direction}: χ² {chi:F1} on 15, FWER height {height / (double)Sets:F4}, extent {extent / (double)Sets:F4} at {level:F4}");
        Assert.True(1 - ChiSquared.CDF(Bins - 1, chi) > 1e-4, $"χ² {chi}");
        Assert.InRange(height / (double)Sets, level - 0.0155, level + 0.0165);
        Assert.True(extent / (double)Sets <= level + 0.0165, $"extent {extent / (double)Sets}");
    }

    /// <summary>Rates of false positives of each parametric rule, from an independent simulation of 1,000 sets (n = 40: 500).</summary>
    [Theory]
    [InlineData(3, 12, .006, .045, .17, .06, .045)]
    public void Field_theory_errs_as_an_independent_simulation_found(
        double fwhm, int images, double height, double bonferroni, double p05, double p01, double p001) => Simulate(fwhm, images, height, bonferroni, p05, p01, p001);

    [LongTheory]
    [InlineData(1.5, 8, .000, .050, .33, .14, .59)]
    [InlineData(1.5, 12, .000, .050, .26, .07, .15)]
    [InlineData(2, 12, .002, .043, .21, .065, .070)]
    [InlineData(3, 8, .000, .042, .21, .09, .09)]
    [InlineData(3, 20, .016, .042, .14, .05, .05)]
    [InlineData(3, 40, .026, .039, .14, .05, .05)]
    [InlineData(5, 20, .032, .016, .10, .06, .04)]
    [InlineData(5, 40, .035, .006, .10, .055, .041)]
    public void Field_theory_errs_as_an_independent_simulation_found_in_every_setting(
        double fwhm, int images, double height, double bonferroni, double p05, double p01, double p001) => Simulate(fwhm, images, height, bonferroni, p05, p01, p001);

    private void Simulate(double fwhm, int images, params double[] expected)
    {
        const int Sets = 400, Side = 24;
        Mask mask = Mask.Whole(Grid.Plain(Side, Side, Side));
        Model model = Questions.Mean(images, Direction.Greater);
        var field = new TField(images - 1);
        double[] forming = [field.Quantile(0.05), field.Quantile(0.01), field.Quantile(0.001)];
        var measures = new Measures { FormingStatistics = forming, StepDown = 0 };
        double bonferroni = Bonferroni.Threshold(field, mask.Count, 0.05, 1);
        var broken = new int[5];
        Parallel.For(0, Sets, set =>
        {
            using SubjectMatrix data = SmoothNoise.Cube(images, Side, fwhm, 50_000 + set);
            SmoothnessEstimate smoothness = Smoothness.Estimate(mask, images, images - 1, (v, e) =>
            {
                data.Column(v, e);
                model.FullResiduals(e);
            }, 1);
            ReselCounts resels = ReselCounts.Of(mask, [.. smoothness.FwhmVoxels.Select(f => f!.Value)]);
            // Two relabelings are the fewest a plan has; the first is the data as observed.
            using var loop = new RelabelingLoop(data, mask, model, new RelabelingPlan(model.Relabelings, 2, 1), measures, 1);
            Maxima maxima = loop.Run().Maxima;
            double? threshold = HeightTheory.Threshold(resels, field, 0.05, 1).Critical;
            lock (broken)
            {
                if (maxima.Height[0] > threshold) broken[0]++;
                if (maxima.Height[0] > bonferroni) broken[1]++;
                for (int j = 0; j < 3; j++)
                    if (maxima.Clusters[j].Extent[0] >= new ExtentTheory(resels, field, mask.Count, 3, forming[j], 1).SmallestSurviving(0.05)) broken[2 + j]++;
            }
        });
        output.WriteLine($"FWHM {fwhm}, n {images}: " + string.Join(' ', broken.Select(b => (b / (double)Sets).ToString("F3"))));
        for (int i = 0; i < 5; i++)
        {
            double p = expected[i];
            // ± 3.3 standard errors of a difference of two simulated rates, 400 sets here and 1,000 (n = 40: 500) there; an expected .000 allows 3 of 400.
            double error = 3.3 * Math.Sqrt(p * (1 - p) * (1.0 / Sets + 1.0 / (images == 40 ? 500 : 1000)));
            double allowed = p == 0 ? 3.0 / Sets : Math.Max(error, 3.0 / Sets);
            Assert.True(Math.Abs(broken[i] / (double)Sets - p) <= allowed, $"rule {i}: {broken[i] / (double)Sets} against {p} ± {allowed}");
        }
    }
}
