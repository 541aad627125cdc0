using Permute.Inference;

namespace Permute.Report;

/// <summary>How many voxels or variables a height rule finds: a row of the page and of survivors.tsv.</summary>
internal sealed record SurvivorRow(string Rule, string Controls, int? Survive)
{
    private const string FamilyWise = "family-wise error rate", FalseDiscovery = "false discovery rate";

    /// <summary>A row per rule; null where a rule gives none.</summary>
    public static IReadOnlyList<SurvivorRow> All(SurvivorSummary s) =>
    [
        new(Words.Permutation, FamilyWise, s.Permutation),
        new("permutation, step-down", FamilyWise, s.StepDown),
        new(Words.FieldTheory, FamilyWise, s.FieldTheory),
        new(Words.Bonferroni, FamilyWise, s.Bonferroni),
        new("Benjamini–Hochberg on the uncorrected permutation p", FalseDiscovery, s.FalseDiscoveryPermutation),
        new("Benjamini–Hochberg on the parametric p", FalseDiscovery, s.FalseDiscoveryParametric),
    ];
}
