using FsCheck.Xunit;
using Permute.Data;
using Permute.Design;
using Permute.Statistics;

namespace Permute.Tests.Statistics;

public class ClusterLabelsTests
{
    // Of the 3 × 3 × 3 block 6 voxels share a face with the middle one, 12 more an edge, 8 more a corner.
    [Theory]
    [InlineData(6)]
    [InlineData(18)]
    [InlineData(26)]
    public void A_voxel_has_as_many_neighbours_as_its_neighbourhood_says(int neighbours)
    {
        var mask = Mask.Whole(Grid.Plain(3, 3, 3));
        int joined = 0;
        for (int v = 0; v < 27; v++)
        {
            if (v == 13) continue;
            var above = new bool[27];
            above[13] = above[v] = true;
            if (ClusterLabels.Find(mask, above, neighbours).Sizes.Length == 1) joined++;
        }
        Assert.Equal(neighbours, joined);
    }

    [Theory]
    [InlineData(6, 2)]
    [InlineData(18, 1)]
    [InlineData(26, 1)]
    public void On_one_slice_a_corner_joins_unless_only_faces_do(int neighbours, int clusters)
    {
        var mask = Mask.Whole(Grid.Plain(2, 2, 1));
        Assert.Equal(clusters, ClusterLabels.Find(mask, [true, false, false, true], neighbours).Sizes.Length);
    }

    [Fact]
    public void Voxels_outside_the_mask_join_nothing()
    {
        var mask = new Mask(Grid.Plain(3, 1, 1), [true, false, true]);
        Assert.Equal([1, 1], ClusterLabels.Find(mask, [true, true], 26).Sizes);
    }

    [Fact]
    public void Another_neighbourhood_is_refused() =>
        Assert.Throws<ArgumentOutOfRangeException>(() => ClusterLabels.Find(Mask.Whole(Grid.Plain(1, 1, 1)), [true], 8));

    // Brute force: every pair of voxels that differ by at most one step on each axis and on few enough axes is united.
    [Property(MaxTest = 60)]
    public bool Clusters_are_those_of_a_union_over_all_pairs(int seed)
    {
        var random = new Philox(seed, 5);
        var grid = Grid.Plain(1 + random.Below(5), 1 + random.Below(5), 1 + random.Below(4));
        var inside = new bool[grid.Count];
        for (int i = 0; i < inside.Length; i++) inside[i] = random.Below(5) > 0;
        var mask = new Mask(grid, inside);
        var above = new bool[mask.Count];
        for (int i = 0; i < above.Length; i++) above[i] = random.Below(2) == 0;
        return new[] { (6, 1), (18, 2), (26, 3) }.All(n => Same(ClusterLabels.Find(mask, above, n.Item1), Union(mask, above, n.Item2)));
    }

    private static int[] Union(Mask mask, bool[] above, int mostAxes)
    {
        var parent = Enumerable.Range(0, above.Length).ToArray();
        int Root(int v) => parent[v] == v ? v : Root(parent[v]);
        for (int a = 0; a < above.Length; a++)
            for (int b = 0; b < a; b++)
            {
                var (p, q) = (mask.Grid.Voxel(mask.Voxels[a]), mask.Grid.Voxel(mask.Voxels[b]));
                int[] apart = [Math.Abs(p.X - q.X), Math.Abs(p.Y - q.Y), Math.Abs(p.Z - q.Z)];
                if (above[a] && above[b] && apart.Max() == 1 && apart.Sum() <= mostAxes)
                    parent[Math.Max(Root(a), Root(b))] = Math.Min(Root(a), Root(b));
            }
        return [.. Enumerable.Range(0, above.Length).Select(v => above[v] ? Root(v) : -1)];
    }

    private static bool Same(ClusterLabels found, int[] roots)
    {
        int[] firsts = [.. roots.Where(r => r >= 0).Distinct().Order()]; // the root is a cluster's first voxel
        return Enumerable.Range(0, roots.Length).All(v => found.Labels[v] == Array.IndexOf(firsts, roots[v]) + 1)
            && found.Sizes.SequenceEqual(firsts.Select(f => roots.Count(r => r == f)));
    }
}
