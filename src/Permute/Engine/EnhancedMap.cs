namespace Permute.Engine;

/// <summary>
/// The enhanced value of every voxel in double precision: voxels join from the highest down, each becoming the root of the clusters it touches, so that a voxel's value is what its
/// own slab gives and all that lies below it in the tree (a max-tree: Salembier, Oliveras &amp; Garrido 1998). One object serves one thread.
/// </summary>
internal sealed class EnhancedMap(EnhancementPlan plan)
{
    private readonly int[] voxelAt = VoxelAt(plan);
    private readonly int[] root = new int[plan.Cell.Length], below = new int[plan.Cell.Length], size = new int[plan.Cell.Length], order = new int[plan.Cell.Length];
    private readonly double[] height = new double[plan.Cell.Length];

    /// <summary>Writes the enhanced values of the positive <paramref name="heights"/> times <paramref name="sign"/> into <paramref name="values"/>, leaving the other voxels as they
    /// are; returns the largest, 0 without one.</summary>
    public double Of(ReadOnlySpan<double> heights, int sign, Span<double> values)
    {
        int count = 0;
        Array.Fill(root, -1);
        for (int v = 0; v < heights.Length; v++)
            if (sign * heights[v] > 0) (height[count], order[count++]) = (-sign * heights[v], v);
        Array.Sort(height, order, 0, count);
        for (int i = 0; i < count; i++) Join(order[i]);
        double largest = 0;
        for (int i = count - 1; i >= 0; i--)
        {
            int v = order[i], next = below[v];
            double own = sign * heights[v], bottom = next < 0 ? 0 : sign * heights[next];
            // No slab between equal heights, infinite ones among them.
            double slab = own == bottom ? 0 : plan.SizePower[size[v]] * (plan.HeightPower(own) - plan.HeightPower(bottom));
            values[v] = slab + (next < 0 ? 0 : values[next]);
            largest = Math.Max(largest, values[v]);
        }
        return largest;
    }

    private void Join(int v)
    {
        (root[v], below[v], size[v]) = (v, -1, 1);
        foreach (int step in plan.Steps)
        {
            int other = voxelAt[plan.Cell[v] + step];
            if (other < 0 || root[other] < 0) continue;
            int top = Root(other);
            if (top == v) continue;
            (root[top], below[top]) = (v, v);
            size[v] += size[top];
        }
    }

    private int Root(int v)
    {
        while (root[v] != v) v = root[v] = root[root[v]];
        return v;
    }

    private static int[] VoxelAt(EnhancementPlan plan)
    {
        var at = new int[plan.Cells];
        Array.Fill(at, -1);
        for (int v = 0; v < plan.Cell.Length; v++) at[plan.Cell[v]] = v;
        return at;
    }
}
