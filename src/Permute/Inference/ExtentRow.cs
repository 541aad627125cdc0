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
            observed == 0 && extentTheory != null ? 1 : extentTheory?.P(observed),
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
                theory.Sides * extentTheory?.ExpectedVoxelsAbove, theory.Sides * extentTheory?.ExpectedClusters, fieldTheory.Verdict),
        };
    }
}
