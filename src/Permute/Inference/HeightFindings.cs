using Permute.Statistics;

namespace Permute.Inference;

/// <summary>The maximum statistic: its thresholds side by side, the adjusted p of every voxel, and what survives by each method.</summary>
internal sealed class HeightFindings
{
    private readonly InferenceInput input;
    private readonly ParametricSide theory;
    private readonly double[] evidence, adjusted;
    private readonly Dictionary<int, double> stepDown = [];
    private readonly double[]? uncorrected, falseDiscovery;
    private readonly double critical;

    public HeightFindings(InferenceInput input, ParametricSide theory, RuleRows rules)
    {
        (this.input, this.theory) = (input, theory);
        int count = input.Maxima.Count;
        var maxima = new NullDistribution(input.Maxima.Height.AsSpan(0, count), input.Exhaustive);
        evidence = Evidence.Of(input.Model.Direction, input.Observed);
        adjusted = [.. evidence.Select(e => AdjustedP.Of(maxima, e))];
        uncorrected = input.UncorrectedCounts?.Select(c => (double)Math.Max(1, c) / count).ToArray();
        falseDiscovery = uncorrected == null ? null : BenjaminiHochberg.Adjust(uncorrected);
        critical = CriticalValue.Of(maxima, rules.Alpha);
        if (input.StepDown is { } counts)
        {
            double[] p = StepDownP.Of(counts, count);
            for (int rank = 0; rank < p.Length; rank++) stepDown[counts.Voxels[rank]] = p[rank];
        }
        Summary = new HeightSummary
        {
            ObservedMaximum = maxima.Observed,
            Permutation = rules.Permutation(maxima),
            FieldTheory = rules.Height(maxima, theory.Height, theory.HeightP(maxima.Observed), theory.Undefined ?? theory.HeightReason),
            Bonferroni = rules.Height(maxima, theory.Bonferroni, theory.BonferroniP(maxima.Observed), null),
        };
        int surviving = evidence.Count(e => CriticalValue.Survives(e, critical));
        Survivors = new SurvivorSummary(
            surviving,
            input.StepDown == null ? null : Math.Max(surviving, stepDown.Values.Count(p => p <= rules.Alpha)),
            theory.Height is { } u ? evidence.Count(e => Ties.Reaches(e, u)) : null,
            evidence.Count(e => Ties.Reaches(e, theory.Bonferroni)))
        {
            FalseDiscoveryPermutation = falseDiscovery?.Count(p => p <= rules.Alpha),
            FalseDiscoveryParametric = BenjaminiHochberg.Rejected(evidence, rules.Alpha, theory.HeightAt),
        };
    }

    public HeightSummary Summary { get; }

    /// <summary>Step-down rejects whatever single step rejects, beyond the voxels it counted too.</summary>
    public SurvivorSummary Survivors { get; }

    public void AddMaps(Dictionary<string, double[]> maps)
    {
        maps["height-p"] = adjusted;
        if (uncorrected != null) maps["uncorrected-p"] = uncorrected;
        if (theory.Height is { } u) maps["agreement"] = Agreement.Map(evidence, critical, u);
    }

    public PeakP AdjustedAt(int voxel) => new(
        adjusted[voxel],
        stepDown.TryGetValue(voxel, out double p) ? p : null,
        theory.HeightP(evidence[voxel]),
        theory.BonferroniP(evidence[voxel]));

    public double? UncorrectedAt(int voxel) => uncorrected?[voxel];

    public IReadOnlyList<VariableSummary> Variables() =>
        [.. input.Study.Variables.Select((name, v) => new VariableSummary
        {
            Name = name,
            Value = input.Observed[v],
            Estimate = input.Model.Regressors.Count == 1 ? input.Estimate[v] : null,
            Sign = Evidence.Sign(input.Observed[v]),
            UncorrectedP = UncorrectedAt(v),
            FalseDiscoveryP = falseDiscovery?[v],
            AdjustedP = AdjustedAt(v),
        })];
}
