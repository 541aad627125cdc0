using Permute.Engine;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class DiagnosisTests
{
    private static readonly ClusterMaxima Recorded = new()
    {
        FormingStatistic = 3.1,
        Extent = [90, 2, 3, 4],
        ClusterCount = [9, 3, 4, 5],
        VoxelsAbove = [900, 11, 12, 13],
    };

    [Fact]
    public void Means_leave_the_observed_relabeling_out_when_drawn_at_random()
    {
        var drawn = Diagnosis.Of(Recorded, 4, false, 12, 4, null);
        Assert.Equal(new Expectation(12, 12), drawn.VoxelsAbove);
        Assert.Equal(new Expectation(4, 4), drawn.ClusterCount);
        Assert.Equal(new Expectation(3, 3), drawn.VoxelsPerCluster);
        Assert.Equal(234, Diagnosis.Of(Recorded, 4, true, 12, 4, null).VoxelsAbove.Relabelings);
    }

    [Theory]
    [InlineData(6.0, 4.0, null, "marginal distribution")]
    [InlineData(12.0, 8.0, null, "lattice")]
    [InlineData(12.5, 3.7, null, "a cluster holds")]
    [InlineData(12.0, 4.0, "liberal", "tail")]
    public void The_reading_names_the_first_assumption_that_differs(double voxels, double clusters, string? verdict, string word)
    {
        Assert.Contains(word, Diagnosis.Of(Many(), 400, false, voxels, clusters, verdict).Reading);
    }

    [Theory]
    [InlineData(12.0, 4.0, "agrees")]
    [InlineData(12.9, 4.2, null)]
    [InlineData(null, null, "liberal")]
    public void There_is_no_reading_when_nothing_differs_or_there_is_no_theory(double? voxels, double? clusters, string? verdict) =>
        Assert.Null(Diagnosis.Of(Many(), 400, false, voxels, clusters, verdict).Reading);

    [Fact]
    public void A_difference_that_chance_explains_gets_no_reading() => Assert.Null(Diagnosis.Of(Recorded with { VoxelsAbove = [900, 2, 30, 4], ClusterCount = [9, 1, 9, 2] }, 4, false, 10, 3.3, null).Reading);

    private static ClusterMaxima Many() => new()
    {
        FormingStatistic = 3.1,
        Extent = new int[400],
        ClusterCount = [.. Enumerable.Range(0, 400).Select(k => k == 0 ? 99 : 4)],
        VoxelsAbove = [.. Enumerable.Range(0, 400).Select(k => k == 0 ? 999 : 12)],
    };
}
