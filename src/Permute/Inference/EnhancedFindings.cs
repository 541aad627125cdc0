using Permute.Engine;

namespace Permute.Inference;

/// <summary>Threshold-free cluster enhancement: its largest value by permutation, which is the only way there is, and the adjusted p of every voxel's.</summary>
internal sealed class EnhancedFindings
{
    private readonly double[] signed, adjusted;

    private EnhancedFindings(InferenceInput input, double[] enhanced, double[] maxima, RuleRows rules)
    {
        var largest = new NullDistribution(maxima.AsSpan(0, input.Maxima.Count), input.Exhaustive);
        signed = [.. enhanced.Zip(input.Observed, (value, t) => t < 0 ? -value : value)];
        adjusted = [.. enhanced.Select(value => AdjustedP.Of(largest, value))];
        Summary = new HeightSummary
        {
            ObservedMaximum = largest.Observed,
            Permutation = rules.Permutation(largest),
            FieldTheory = new ParametricSummary { Reason = "no field theory for TFCE" },
        };
    }

    /// <summary>The findings; null unless enhanced values were recorded.</summary>
    public static EnhancedFindings? Of(InferenceInput input, RuleRows rules) =>
        input is { Enhanced: { } enhanced, Maxima.Tfce: { } maxima } ? new EnhancedFindings(input, enhanced, maxima, rules) : null;

    public HeightSummary Summary { get; }

    /// <summary>Enhanced values with the sign of T, and their p.</summary>
    public void AddMaps(Dictionary<string, double[]> maps) => (maps["tfce"], maps["tfce-p"]) = (signed, adjusted);
}
