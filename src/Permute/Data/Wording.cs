namespace Permute.Data;

/// <summary>Small phrases shared by the messages of this room.</summary>
internal static class Wording
{
    /// <summary>"a, b and c"; beyond <paramref name="most"/> items "a, b and 7 more".</summary>
    public static string List(IReadOnlyList<string> items, int most = 5)
    {
        if (items.Count == 1) return items[0];
        return items.Count <= most
            ? string.Join(", ", items.Take(items.Count - 1)) + " and " + items[^1]
            : string.Join(", ", items.Take(most)) + $" and {items.Count - most} more";
    }

    /// <summary>"1 voxel", "3 voxels".</summary>
    public static string Count(long number, string noun) => $"{number:N0} {noun}{(number == 1 ? "" : "s")}";

    /// <summary>"91 × 109 × 91".</summary>
    public static string Size(IEnumerable<long> dimensions) => string.Join(" × ", dimensions);
}
