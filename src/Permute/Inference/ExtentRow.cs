using Permute.Engine;

namespace Permute.Inference;

/// <summary>Cluster extent at one forming threshold: the permutation test, the field theory, and why they part.</summary>
internal static class ExtentRow
{
    public static ExtentSummary Of(ObservedAbove above, int neighbours, ClusterMaxima maxima, NullDistribution extents, ParametricSide theory, RuleRows rules)
    {
        var extentTheory = theory.Extent(above.FormingStatistic);
        int observed = (int)extents.Observed;
        var fieldTheory = rules.Extent(
            extents,
            extentTheory?.SmallestSurviving(rules.Alpha),
            extentTheory?.Beta == null ? null : observed == 0 ? 1 : extentTheory.P(observed),
            theory.Undefined ?? extentTheory?.Reason);
        return new ExtentSummary
        {
            FormingP = above.FormingP,
            FormingPPerTail = above.PPerTail,
            FormingStatistic = above.FormingStatistic,
            Neighbours = neighbours,
            ObservedMaximum = observed,
            Permutation = rules.ExtentPermutation(extents),
            FieldTheory = fieldTheory,
            Diagnosis = Diagnosis.Of(
                maxima, extents.Count, extents.Exhaustive,
                Known(extentTheory?.ExpectedVoxelsAbove), Known(extentTheory?.ExpectedClusters), fieldTheory.Verdict),
        };
    }

    private static double? Known(double? value) => value is { } v && double.IsFinite(v) ? v : null;
}
