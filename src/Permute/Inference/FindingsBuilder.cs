namespace Permute.Inference;

/// <summary>From what the relabelings gave to findings: every number of the summary and every map.</summary>
public static partial class FindingsBuilder
{
    /// <summary>Builds them; pure arithmetic, no I/O.</summary>
    public static Findings Build(InferenceInput input)
    {
        double smallestP = input.Plan.SmallestP(input.Model.Direction, input.Maxima.Count), alpha = input.Request.Alpha;
        var rules = new RuleRows(alpha, input.Model.Relabelings.Possible, smallestP) { ExtrapolateTail = input.Request.ExtrapolateTail };
        var theory = new ParametricSide(input);
        var height = new HeightFindings(input, theory, rules);
        var maps = new Dictionary<string, double[]>();
        var summary = new Summary
        {
            Alpha = alpha,
            Data = Describe(input.Study),
            Model = Describe(input.Model),
            Relabelings = Describe(input.Plan, input.Model.Direction, input.Maxima.Count) with { Exhaustive = input.Exhaustive },
            Smoothness = DescribeSmoothness(input),
            Height = height.Summary,
            Survivors = height.Survivors,
            Checks = [.. DesignChecks.Of(input, theory, smallestP), .. SmoothnessChecks.Of(input, theory), .. ResidualChecks.Of(input)],
            Provenance = input.Provenance,
        };
        if (input.Study.Mask is not { } mask) summary = summary with { Variables = height.Variables() };
        else
        {
            maps[input.Model.Statistic] = input.Observed;
            if (input.Model.Regressors.Count == 1) maps["estimate"] = input.Estimate; // several tested columns have no one size
            height.AddMaps(maps);
            if (input.Smoothness?.LocalResels is { Length: > 0 } resels) maps["local-resels"] = resels;
            var clusters = new ClusterFindings(input, mask, theory, rules);
            clusters.AddMaps(maps);
            int[] peaks = LocalMaxima.Find(mask, input.Observed, input.Model.Direction, input.Request.Neighbours);
            summary = summary with
            {
                Extent = clusters.Extent,
                Mass = clusters.Mass,
                Clusters = clusters.Rows,
                Peaks = PeakTable.Rows(mask, input.Observed, peaks, clusters.Formed, height.AdjustedAt, height.UncorrectedAt),
                AgreementLabels = maps.ContainsKey("agreement") ? Agreement.Labels : summary.AgreementLabels,
            };
        }
        return new Findings { Summary = Settle(summary, input), Mask = input.Study.Mask, Maps = maps, Maxima = input.Maxima };
    }
}
