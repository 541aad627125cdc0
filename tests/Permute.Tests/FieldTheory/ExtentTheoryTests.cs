using System.Text.Json;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class ExtentTheoryTests
{
    // Source: Friston et al. (1994, 1996), see extent-theory.json. The leading term alone is a region with no other resels.
    [Fact]
    public void All_stored_cases_come_out_with_all_terms_and_with_the_leading_term_alone()
    {
        int cases = 0;
        foreach (var c in TheoryValues.Read("extent-theory.json").Rows("cases"))
        {
            int d = (int)c.Value("dimensions");
            double leading = c.Values("fwhmVoxels").Aggregate(c.Value("voxels"), (r, f) => r / f);
            Check(c, c.GetProperty("allTerms"), TheoryValues.ReselsOf(c.Values("reselCounts")), d);
            Check(c, c.GetProperty("leadingTerm"), d == 2 ? new(0, 0, leading, 0) : new(0, 0, 0, leading), d);
            cases++;
        }
        Assert.Equal(10, cases);
    }

    private static void Check(JsonElement c, JsonElement expected, ReselCounts r, int dimensions)
    {
        string what = $"{c.GetProperty("field")} {c.GetProperty("degreesOfFreedom")} D = {dimensions} u = {c.Value("formingStatistic")}";
        var theory = new ExtentTheory(r, TheoryValues.FieldOf(c), c.Value("voxels"), dimensions, c.Value("formingStatistic"), 1);
        TheoryValues.Close(c.Value("expectedVoxelsAbove"), theory.ExpectedVoxelsAbove, 1e-8, what);
        TheoryValues.Close(expected.Value("expectedClusters"), theory.ExpectedClusters, 1e-8, what);
        TheoryValues.Close(expected.Value("voxelsPerCluster"), theory.VoxelsPerCluster, 1e-8, what);
        TheoryValues.Close(expected.Value("beta"), theory.Beta!.Value, 1e-8, what);
        foreach (var row in expected.Rows("extents"))
        {
            TheoryValues.Close(row.Value("sizeTail"), theory.SizeTail(row.Value("extent")), 1e-8, what);
            TheoryValues.Close(row.Value("p"), theory.P(row.Value("extent"))!.Value, 1e-8, what);
        }
        foreach (var row in expected.Rows("atLeast"))
            TheoryValues.Close(row.Value("p"), theory.AtLeast((int)row.Value("clusters"), row.Value("extent")), 1e-8, what);
        Assert.Equal((int)expected.Value("smallestSurviving"), theory.SmallestSurviving(0.05));
        Assert.Equal(expected.Value("voxelsPerCluster") < 2, theory.OutsideDomain);
    }

    // Source: 400 simulated fields (extent-theory.json); lattice clusters merge, so fewer are counted than theory expects.
    [Fact]
    public void Expected_clusters_and_voxels_are_near_those_of_simulated_fields()
    {
        var mc = TheoryValues.Read("extent-theory.json").GetProperty("monteCarlo");
        ReselCounts r = ReselCounts.Of(TheoryValues.Box(24, 24, 24), [5, 5, 5]);
        var theory = new ExtentTheory(r, new GaussianField(), 24 * 24 * 24, 3, 2.5, 1);
        TheoryValues.Close(mc.Value("expectedClusters"), theory.ExpectedClusters, 1e-8, "clusters");
        TheoryValues.Close(mc.Value("expectedVoxelsAbove"), theory.ExpectedVoxelsAbove, 1e-8, "voxels");
        Assert.InRange(mc.Value("meanClusters"), 0.9 * theory.ExpectedClusters - 4 * mc.Value("standardError"), theory.ExpectedClusters + 4 * mc.Value("standardError"));
        TheoryValues.Close(theory.ExpectedVoxelsAbove, mc.Value("meanVoxelsAbove"), 0.1, "voxels above");
    }

    [Fact]
    public void Both_directions_double_the_expected_counts_and_leave_one_cluster_alone()
    {
        var r = new ReselCounts(1, 29, 280, 899);
        var one = new ExtentTheory(r, new TField(20), 26880, 3, 3.3, 1);
        var both = new ExtentTheory(r, new TField(20), 26880, 3, 3.3, 2);
        Assert.Equal(2 * one.ExpectedClusters, both.ExpectedClusters, 12);
        Assert.Equal(2 * one.ExpectedVoxelsAbove, both.ExpectedVoxelsAbove, 10);
        Assert.Equal(one.Beta, both.Beta);
        Assert.Equal(one.VoxelsPerCluster, both.VoxelsPerCluster);
        foreach (double k in new[] { 1, 8, 20, 60.0 })
        {
            Assert.Equal(one.SizeTail(k), both.SizeTail(k));
            TheoryValues.Close(1 - Math.Pow(1 - one.P(k)!.Value, 2), both.P(k)!.Value, 1e-9, $"k = {k}", 1e-15);
        }
        // Poisson counts of the two signs add: at least one cluster of either sign is the corrected p.
        TheoryValues.Close(both.P(20)!.Value, both.AtLeast(1, 20), 1e-12, "one cluster");
        double mean = both.ExpectedClusters * both.SizeTail(10);
        TheoryValues.Close(1 - Math.Exp(-mean) * (1 + mean + mean * mean / 2), both.AtLeast(3, 10), 1e-8, "three clusters");
    }

    [Fact]
    public void The_smallest_surviving_extent_is_where_p_first_reaches_alpha()
    {
        foreach (double u in new[] { 2, 2.5, 3.1, 4, 7 })
            foreach (double alpha in new[] { 0.001, 0.01, 0.05, 0.2 })
            {
                var theory = new ExtentTheory(new ReselCounts(1, 29, 280, 899), new TField(30), 26880, 3, u, 2);
                int k = theory.SmallestSurviving(alpha)!.Value;
                Assert.True(theory.P(k) <= alpha);
                Assert.True(k == 1 || theory.P(k - 1) > alpha);
            }
    }

    [Fact]
    public void Where_no_clusters_are_expected_the_theory_is_not_defined_and_says_so()
    {
        var none = new ExtentTheory(new ReselCounts(-5, 0.1, 0, 0), new TField(20), 100, 1, 1, 1);
        Assert.Null(none.Beta);
        Assert.Null(none.P(10));
        Assert.Null(none.SmallestSurviving(0.05));
        Assert.Contains("not above 0", none.Reason);
        var few = new ExtentTheory(new ReselCounts(1, 29, 280, 899), new TField(3), 26880, 3, 3, 1);
        Assert.Null(few.P(10));
        Assert.Contains("3 degrees of freedom are too few", few.Reason);
        Assert.NotNull(new ExtentTheory(new ReselCounts(1, 0, 0, 0), new TField(20), 1, 0, 3, 1).Reason);
    }

    [Fact]
    public void Clusters_smaller_than_two_voxels_are_marked_outside_the_domain_and_still_judged()
    {
        ReselCounts r = ReselCounts.Of(TheoryValues.Box(24, 24, 24), [1.5, 1.5, 1.5]);
        var theory = new ExtentTheory(r, new TField(11), 24 * 24 * 24, 3, new TField(11).Quantile(0.001), 1);
        Assert.True(theory.OutsideDomain);
        Assert.Contains("fewer than two", theory.Reason);
        Assert.NotNull(theory.SmallestSurviving(0.05));
    }
}
