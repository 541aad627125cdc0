using Permute.Statistics;

namespace Permute.Inference;

/// <summary>Where the permutation threshold and the field-theory threshold find the same voxels and where they part.</summary>
public static class Agreement
{
    /// <summary>Meaning of the labels.</summary>
    public static readonly IReadOnlyDictionary<string, string> Labels = new Dictionary<string, string>
    {
        ["0"] = "found by neither",
        ["1"] = "found by permutation and by field theory",
        ["2"] = "found by permutation only",
        ["3"] = "found by field theory only",
    };

    /// <summary>The label of each voxel, from its evidence, the permutation's critical value (strictly above survives) and the theory's threshold
    /// (reaching it survives).</summary>
    public static double[] Map(double[] evidence, double permutationCritical, double theoryThreshold) =>
        [.. evidence.Select(e => (CriticalValue.Survives(e, permutationCritical), Ties.Reaches(e, theoryThreshold)) switch
        {
            (true, true) => 1.0,
            (true, false) => 2.0,
            (false, true) => 3.0,
            _ => 0.0,
        })];
}
