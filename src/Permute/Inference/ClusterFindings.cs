using Permute.Data;

namespace Permute.Inference;

/// <summary>Clusters at every forming threshold: thresholds by each method, the diagnosis, the table and the maps.</summary>
internal sealed class ClusterFindings
{
    private readonly List<ObservedClusters> formed = [];
    private readonly List<IReadOnlyList<ClusterSummary>> tables = [];
    private readonly List<ExtentSummary> extent = [];
    private readonly List<MassSummary> mass = [];

    public ClusterFindings(InferenceInput input, Mask mask, ParametricSide theory, RuleRows rules)
    {
        int count = input.Maxima.Count, neighbours = input.Request.Neighbours;
        foreach (var (above, maxima) in input.Above.Zip(input.Maxima.Clusters))
        {
            var extents = NullDistribution.OfExtents(maxima.Extent.AsSpan(0, count), input.Exhaustive);
            var masses = maxima.Mass == null ? null : new NullDistribution(maxima.Mass.AsSpan(0, count), input.Exhaustive);
            var clusters = ObservedClusters.Form(mask, input.Observed, above, neighbours, 1 + formed.Sum(f => f.Clusters.Count));
            formed.Add(clusters);
            tables.Add(ClusterTable.Rows(mask, input.Observed, clusters, extents, masses, theory.Extent(above.FormingStatistic)));
            extent.Add(ExtentRow.Of(above, neighbours, maxima, extents, theory, rules));
            if (masses == null) continue;
            mass.Add(new MassSummary
            {
                FormingP = above.FormingP,
                FormingPPerTail = above.PPerTail,
                FormingStatistic = above.FormingStatistic,
                Neighbours = neighbours,
                ObservedMaximum = masses.Observed,
                Permutation = rules.Permutation(masses),
            });
        }
    }

    /// <summary>The clusters at each forming threshold, in the order asked.</summary>
    public IReadOnlyList<ObservedClusters> Formed => formed;

    public IReadOnlyList<ExtentSummary> Extent => extent;

    public IReadOnlyList<MassSummary> Mass => mass;

    /// <summary>All clusters, largest first within a threshold.</summary>
    public IReadOnlyList<ClusterSummary> Rows => [.. tables.SelectMany(rows => rows)];

    public void AddMaps(Dictionary<string, double[]> maps)
    {
        foreach (var (clusters, rows) in formed.Zip(tables))
        {
            maps[MapNames.Forming("extent", clusters.Above)] = ClusterTable.Map(clusters, rows, p => p.Permutation);
            if (mass.Count > 0) maps[MapNames.Forming("mass", clusters.Above)] = ClusterTable.Map(clusters, rows, p => p.Mass);
        }
    }
}
