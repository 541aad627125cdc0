using Permute.Data;
using Permute.Design;
using Permute.Statistics;

namespace Permute.Inference;

/// <summary>
/// The peaks of a map: voxels whose evidence is above that of all their neighbours in the mask. A plateau of equal voxels counts once, by its first voxel, and only
/// if nothing beside it is higher. In direction both a negative T is a peak when it is lower than its neighbours.
/// </summary>
public static class LocalMaxima
{
    /// <summary>Mask positions of the peaks of the signed map <paramref name="t"/> (length V), highest |T| first, equals by place.</summary>
    public static int[] Find(Mask mask, double[] t, Direction direction, int neighbours)
    {
        var steps = NeighbourOffsets.Of(neighbours);
        var peaks = new List<int>();
        var seen = new HashSet<int>();
        for (int v = 0; v < t.Length; v++)
        {
            if (!(Evidence.Of(direction, t[v]) > 0)) continue;
            int sign = Evidence.Sign(t[v]);
            var (higher, equal) = Compare(mask, t, v, sign, steps);
            if (higher || (equal && !IsFirstOfTop(mask, t, v, sign, steps, seen))) continue;
            peaks.Add(v);
        }
        return [.. peaks.OrderByDescending(v => Math.Abs(t[v])).ThenBy(v => v)];
    }

    private static (bool Higher, bool Equal) Compare(Mask mask, double[] t, int v, int sign, (int X, int Y, int Z)[] steps)
    {
        var (x, y, z) = mask.Grid.Voxel(mask.Voxels[v]);
        bool equal = false;
        foreach (var (dx, dy, dz) in steps)
        {
            int next = mask.At(x + dx, y + dy, z + dz);
            if (next < 0) continue;
            if (sign * t[next] > sign * t[v]) return (true, false);
            equal |= t[next] == t[v];
        }
        return (false, equal);
    }

    private static bool IsFirstOfTop(Mask mask, double[] t, int first, int sign, (int X, int Y, int Z)[] steps, HashSet<int> seen)
    {
        if (!seen.Add(first)) return false;
        bool top = true;
        var open = new Stack<int>([first]);
        while (open.TryPop(out int v))
        {
            top &= !Compare(mask, t, v, sign, steps).Higher;
            var (x, y, z) = mask.Grid.Voxel(mask.Voxels[v]);
            foreach (var (dx, dy, dz) in steps)
            {
                int next = mask.At(x + dx, y + dy, z + dz);
                if (next >= 0 && t[next] == t[v] && seen.Add(next)) open.Push(next);
            }
        }
        return top;
    }
}
