using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

public class FindingsBuilderTests
{
    private static readonly Mask Box = Mask.Whole(Grid.Plain(6, 5, 4, 2, 2, 3));

    [Theory]
    [InlineData(Direction.Greater, true)]
    [InlineData(Direction.Greater, false)]
    [InlineData(Direction.Less, true)]
    [InlineData(Direction.Both, true)]
    [InlineData(Direction.Both, false)]
    public void Thresholds_p_and_survivors_agree_with_each_other(Direction direction, bool exhaustive)
    {
        var input = Study(direction, exhaustive, 200);
        Findings found = FindingsBuilder.Build(input);
        Summary s = found.Summary;
        double[] evidence = [.. input.Observed.Select(t => Evidence.Of(direction, t))];
        double[] p = found.Maps["height-p"];
        Assert.Equal(evidence.Max(), s.Height.ObservedMaximum);
        Assert.Equal(p.Min(), s.Height.Permutation.AdjustedP);
        for (int v = 0; v < evidence.Length; v++)
        {
            Assert.Equal(input.Maxima.Height.Count(m => Ties.Reaches(m, evidence[v])) / 200.0, p[v]);
            Assert.Equal(CriticalValue.Survives(evidence[v], s.Height.Permutation.Critical!.Value), p[v] <= 0.05);
        }
        Assert.Equal(p.Count(v => v <= 0.05), s.Survivors!.Permutation);
        Assert.Equal(evidence.Count(e => e >= s.Height.FieldTheory!.Critical), s.Survivors.FieldTheory);
        Assert.Equal(evidence.Count(e => e >= s.Height.Bonferroni!.Critical), s.Survivors.Bonferroni);

        double[] label = found.Maps["agreement"];
        Assert.Equal(s.Survivors.Permutation, label.Count(l => l is 1 or 2));
        Assert.Equal(s.Survivors.FieldTheory, label.Count(l => l is 1 or 3));
        Assert.Equal(4, s.AgreementLabels.Count);

        Assert.Equal(exhaustive, s.Relabelings.Exhaustive);
        Assert.Equal(exhaustive, s.Height.Permutation.CriticalInterval == null);
        Assert.Equal(exhaustive, s.Height.Permutation.AdjustedPInterval == null);
        Assert.Equal(exhaustive, s.Height.Bonferroni!.EmpiricalFwerInterval == null);
        Assert.NotNull(s.Height.Bonferroni.Verdict);
    }

    [Theory]
    [InlineData(Direction.Greater)]
    [InlineData(Direction.Less)]
    [InlineData(Direction.Both)]
    public void Clusters_follow_the_direction_and_their_p_the_map(Direction direction)
    {
        var input = Study(direction, true, 200);
        Findings found = FindingsBuilder.Build(input);
        int[] signs = direction switch { Direction.Greater => [1], Direction.Less => [-1], _ => [1, -1] };
        Assert.Equal(2, found.Summary.Extent.Count);
        Assert.Equal(Enumerable.Range(1, found.Summary.Clusters.Count), found.Summary.Clusters.Select(c => c.Id));
        foreach (ExtentSummary extent in found.Summary.Extent)
        {
            ClusterSummary[] clusters = [.. found.Summary.Clusters.Where(c => c.FormingStatistic == extent.FormingStatistic)];
            Assert.Equal(clusters.Select(c => c.Voxels).OrderDescending(), clusters.Select(c => c.Voxels));
            Assert.Equal(extent.ObservedMaximum, clusters[0].Voxels);
            Assert.Equal(extent.Permutation.AdjustedP, clusters[0].AdjustedP.Permutation);
            Assert.Equal(extent.Permutation.Critical + 1, extent.Permutation.SmallestSurviving);
            Assert.Equal(extent.FieldTheory.AdjustedP, clusters[0].AdjustedP.FieldTheory);
            Assert.Equal(signs.Order(), clusters.Select(c => c.Sign).Distinct().Order());
            Assert.All(clusters, c => Assert.Equal(c.Sign, Math.Sign(c.Peak)));
            Assert.All(clusters, c => Assert.Equal(c.Voxels >= extent.Permutation.SmallestSurviving, c.AdjustedP.Permutation <= 0.05));
        }
        double[] map = found.Maps["extent-p-forming-0p05"];
        ClusterSummary largest = found.Summary.Clusters[0];
        Assert.Equal(largest.AdjustedP.Permutation, map[Box.At(largest.PeakIndex[0], largest.PeakIndex[1], largest.PeakIndex[2])]);
        Assert.Equal(found.Summary.Clusters.Where(c => c.FormingStatistic == found.Summary.Extent[0].FormingStatistic).Sum(c => c.Voxels), map.Zip(input.Above[0].Positive.Zip(input.Above[0].Negative)).Count(v => v.Second.First || v.Second.Second));
        Assert.Contains("extent-p-forming-u3p5", found.Maps.Keys);
        Assert.All(found.Summary.Peaks, peak => Assert.Contains(peak.Sign, signs));
        Assert.Equal(found.Summary.Peaks.Select(q => Math.Abs(q.Value)).OrderDescending(), found.Summary.Peaks.Select(q => Math.Abs(q.Value)));
        Assert.All(found.Summary.Clusters, c => Assert.Contains(found.Summary.Peaks, q => q.Clusters.Contains(c.Id) && q.Index.SequenceEqual(c.PeakIndex)));
        Assert.Equal([2.0 * largest.PeakIndex[0], 2.0 * largest.PeakIndex[1], 3.0 * largest.PeakIndex[2]], largest.PeakMm);
    }

    [Fact]
    public void An_exhaustive_list_stopped_early_counts_as_random_draws()
    {
        var whole = Study(Direction.Both, true, 200);
        var part = whole with
        {
            Complete = false,
            Maxima = whole.Maxima with { Count = 120 },
        };
        Summary s = FindingsBuilder.Build(part).Summary;
        Assert.False(s.Relabelings.Exhaustive);
        Assert.Equal((200, 120), (s.Relabelings.Planned, s.Relabelings.Used));
        Assert.Equal(whole.Maxima.Height.Take(120).Count(m => m >= whole.Maxima.Height[0]) / 120.0, s.Height.Permutation.AdjustedP!.Value, 1e-12);
        Assert.NotNull(s.Height.Permutation.AdjustedPInterval);
        double u = s.Height.Bonferroni!.Critical!.Value;
        Assert.Equal(whole.Maxima.Height.Take(120).Skip(1).Count(m => m >= u) / 119.0, s.Height.Bonferroni.EmpiricalFwer);
    }

    [Fact]
    public void Two_sided_field_theory_counts_both_tails()
    {
        var both = FindingsBuilder.Build(Study(Direction.Both, true, 200)).Summary;
        var greater = FindingsBuilder.Build(Study(Direction.Greater, true, 200, alpha: 0.025)).Summary;
        Assert.Equal(greater.Height.FieldTheory!.Critical!.Value, both.Height.FieldTheory!.Critical!.Value, 1e-9);
        Assert.Equal(greater.Height.Bonferroni!.Critical!.Value, both.Height.Bonferroni!.Critical!.Value, 1e-9);
        Assert.Equal(2 * greater.Extent[1].Diagnosis.VoxelsAbove.Theory!.Value, both.Extent[1].Diagnosis.VoxelsAbove.Theory!.Value, 1e-9);
    }

    [Fact]
    public void Without_smoothness_the_theory_is_missing_with_its_reason()
    {
        var input = Study(Direction.Greater, true, 200) with { Smoothness = null, Resels = null, FwhmVoxels = null };
        Findings found = FindingsBuilder.Build(input);
        Assert.Null(found.Summary.Height.FieldTheory!.Critical);
        Assert.Contains("no smoothness", found.Summary.Height.FieldTheory.Reason);
        Assert.All(found.Summary.Extent, e => Assert.NotNull(e.FieldTheory.Reason));
        Assert.Null(found.Summary.Survivors!.FieldTheory);
        Assert.DoesNotContain("agreement", found.Maps.Keys);
        Assert.Empty(found.Summary.AgreementLabels);
        Assert.NotNull(found.Summary.Smoothness!.Reason);
    }

    [Fact]
    public void Too_few_degrees_of_freedom_leave_no_field_theory_and_no_NaN()
    {
        var input = Study(Direction.Greater, true, 200);
        var family = new Some.Family(200);
        Summary s = FindingsBuilder.Build(input with { Study = Some.Noise(4, Box.Count, Box), Model = Some.Mean(4, family) }).Summary;
        Assert.Null(s.Height.FieldTheory!.Critical);
        Assert.Null(s.Height.FieldTheory.AdjustedP);
        Assert.Contains("degrees of freedom", s.Height.FieldTheory.Reason);
        Assert.All(s.Extent, e => Assert.Equal((null, null), (e.FieldTheory.SmallestSurviving, e.FieldTheory.AdjustedP)));
        Assert.All(s.Extent, e => Assert.Null(e.Diagnosis.ClusterCount.Theory));
    }

    [Fact]
    public void An_infinite_T_is_found_and_ties_with_infinity_alone()
    {
        var input = Study(Direction.Both, true, 200);
        double[] t = [.. input.Observed];
        t[7] = double.NegativeInfinity;
        double[] heights = [.. input.Maxima.Height];
        (heights[0], heights[5]) = (double.PositiveInfinity, double.PositiveInfinity);
        Findings found = FindingsBuilder.Build(input with { Observed = t, Maxima = input.Maxima with { Height = heights } });
        Assert.Equal(double.PositiveInfinity, found.Summary.Height.ObservedMaximum);
        Assert.Equal(0.01, found.Maps["height-p"][7]);
        Assert.Equal(0, found.Summary.Height.FieldTheory!.AdjustedP);
        Assert.Equal(0, found.Summary.Height.Bonferroni!.AdjustedP);
        Assert.Equal(double.NegativeInfinity, found.Summary.Peaks[0].Value);
        Assert.Equal(-1, found.Summary.Peaks[0].Sign);
    }

    [Fact]
    public void Every_check_has_a_level_a_source_and_a_message()
    {
        Summary s = FindingsBuilder.Build(Study(Direction.Both, false, 200)).Summary;
        Assert.True(s.Checks.Count >= 10);
        Assert.Equal(s.Checks.Count, s.Checks.Select(c => c.Code).Distinct().Count());
        Assert.All(s.Checks, c => Assert.True(c.Level is "good" or "caution" or "warning" && c.Source != "" && c.Message != ""));
    }

    [Theory]
    [InlineData(0.001, "extent-p-forming-0p001")]
    [InlineData(0.00001, "extent-p-forming-0p00001")]
    [InlineData(0.05, "extent-p-forming-0p05")]
    public void Maps_are_named_by_the_forming_p_as_given(double p, string name) => Assert.Equal(name, MapNames.Forming("extent", new ObservedAbove(3.1, p, p, [], [])));

    // A box of noise in which every relabeling is another map; a corner of the observed one is raised in the direction tested.
    private static InferenceInput Study(Direction direction, bool exhaustive, int count, double alpha = 0.05)
    {
        var random = new Philox(5, 9);
        double[][] maps = new double[count][];
        for (int k = 0; k < count; k++)
        {
            maps[k] = new double[Box.Count];
            for (int v = 0; v < Box.Count; v++) maps[k][v] = 1.3 * random.Normal();
        }
        for (int v = 0; v < 12; v++) maps[0][Box.At(v % 2, v / 2 % 2, v / 4)] = 4 + v;
        for (int v = 0; v < 4; v++) maps[0][Box.At(5, 4, v)] = -5 - v;
        double[][] oriented = direction == Direction.Less ? [.. maps.Select(m => m.Select(t => -t).ToArray())] : maps;
        (double U, double? P)[] forming = [(1.8, 0.05), (3.5, null)];
        var input = Some.Input(maps[0], [.. maps.Select(m => m.Max(t => Evidence.Of(direction, t)))], Box, direction, exhaustive, alpha);
        return input with
        {
            Maxima = input.Maxima with { Clusters = [.. forming.Select(f => Some.Clusters(Box, oriented, f.U, direction == Direction.Both))] },
            Above = [.. forming.Select(f => new ObservedAbove(f.U, f.P, f.P,
                [.. maps[0].Select(t => direction != Direction.Less && t > f.U)], [.. maps[0].Select(t => direction != Direction.Greater && t < -f.U)]))],
            Smoothness = new SmoothnessEstimate
            {
                FwhmVoxels = [2, 2.1, 1.9],
                LagCorrelation = [0.7, 0.7, 0.7],
                Pairs = [100, 96, 90],
                Lag2Fwhm = [2, 2, 2],
                Lag3Fwhm = [2, 2, null],
                UnevennessCv = 0.7,
                ExpectedCv = 0.8,
                LocalResels = [.. Enumerable.Repeat(0.12, Box.Count)],
            },
            Resels = ReselCounts.Of(Box, [2, 2.1, 1.9]),
            FwhmVoxels = [2, 2.1, 1.9],
        };
    }
}
