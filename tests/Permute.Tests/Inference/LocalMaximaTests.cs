using Permute.Data;
using Permute.Design;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class LocalMaximaTests
{
    private static readonly Mask Slice = Mask.Whole(Grid.Plain(4, 3, 1));

    private static readonly double[] Map =
    [
        5, 1, 0, 3,
        1, 4, 1, 3,
        0, 1, 1, -6,
    ];

    [Fact]
    public void A_peak_is_above_all_its_neighbours_and_a_plateau_counts_once() =>
        Assert.Equal([0, 3], LocalMaxima.Find(Slice, Map, Direction.Greater, 18));

    [Fact]
    public void Fewer_neighbours_make_more_peaks() => Assert.Equal([0, 5, 3], LocalMaxima.Find(Slice, Map, Direction.Greater, 6));

    [Fact]
    public void Both_directions_take_low_values_of_negative_T_too() => Assert.Equal([11, 0, 3], LocalMaxima.Find(Slice, Map, Direction.Both, 18));

    [Fact]
    public void Less_takes_only_negative_T() => Assert.Equal([11], LocalMaxima.Find(Slice, Map, Direction.Less, 18));

    [Fact]
    public void A_plateau_beside_something_higher_is_no_peak()
    {
        var row = Mask.Whole(Grid.Plain(5, 1, 1));
        Assert.Equal([4], LocalMaxima.Find(row, [2, 2, 2, 2, 3], Direction.Greater, 6));
        Assert.Equal([0], LocalMaxima.Find(row, [3, 2, 2, 2, 2], Direction.Greater, 6));
    }

    [Fact]
    public void Infinite_T_is_the_highest_peak()
    {
        var row = Mask.Whole(Grid.Plain(5, 1, 1));
        Assert.Equal([0, 3], LocalMaxima.Find(row, [double.NegativeInfinity, -1, 1, 4, 0], Direction.Both, 6));
    }

    [Fact]
    public void At_least_twenty_peaks_are_listed_and_all_of_formed_clusters()
    {
        var row = Mask.Whole(Grid.Plain(61, 1, 1));
        double[] t = [.. Enumerable.Range(0, 61).Select(x => x % 2 == 0 ? 0.5 : 1 + x / 100.0)];
        int[] peaks = LocalMaxima.Find(row, t, Direction.Greater, 6);
        IReadOnlyList<PeakSummary> Listed(params ObservedClusters[] formed) => PeakTable.Rows(row, t, peaks, formed, _ => new PeakP(1, null, null, null), _ => null);
        Assert.Equal(30, peaks.Length);
        Assert.Equal(20, Listed().Count);
        var wide = ObservedClusters.Form(row, t, new ObservedAbove(0.1, null, null, [.. t.Select(v => v > 0.1)], []), 6, 1);
        var narrow = ObservedClusters.Form(row, t, new ObservedAbove(1.585, null, null, [.. t.Select(v => v > 1.585)], []), 6, 2);
        var all = Listed(wide, narrow);
        Assert.Equal(30, all.Count);
        Assert.Equal([1, 2], all[0].Clusters);
        Assert.Equal([1], all[1].Clusters);
        Assert.Equal([59, 0, 0], all[0].Index);
        Assert.Equal(t[59], all[0].Value);
    }
}
