using System.Numerics;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

/// <summary>Small made-up pieces of an analysis.</summary>
internal static class Some
{
    /// <summary>A family with a stated number of arrangements; findings never ask it for one.</summary>
    public sealed record Family(BigInteger Possible, int Tied = 1, string Kind = "sign flips") : IRelabelings
    {
        public string Assumption => "errors symmetric about 0";

        public int Images => 12;

        public BigInteger Ties(Direction direction) => Tied;

        public void Unrank(long rank, Span<int> order, Span<sbyte> sign) => throw new NotSupportedException();

        public IRelabelings Grown(int images) => this;

        public void Draw(ref Philox random, Span<int> order, Span<sbyte> sign) => throw new NotSupportedException();
    }

    /// <summary>A mean over n images.</summary>
    public static Model Mean(int images, IRelabelings family, Direction direction = Direction.Greater) => new()
    {
        Effect = "mean",
        Direction = direction,
        Images = images,
        Regressor = [.. Enumerable.Repeat(1.0, images)],
        Nuisance = new ColumnSpace(images, []),
        Relabelings = family,
        Codes = [.. Enumerable.Repeat((sbyte)1, images)],
        CodeScale = 1,
    };

    /// <summary>n images of normal noise, as a map over the mask or as a table of variables.</summary>
    public static Study Noise(int images, int voxels, Mask? mask, long seed = 7)
    {
        var random = new Philox(seed, 0);
        var data = new SubjectMatrix(images, voxels);
        data.KeepSecondParts();
        for (int v = 0; v < voxels; v++)
            for (int i = 0; i < images; i++) data[i, v] = random.Normal();
        return new Study
        {
            Data = data,
            Mask = mask,
            Rows = [.. Enumerable.Range(1, images).Select(i => $"image-{i}")],
            Variables = mask == null ? [.. Enumerable.Range(1, voxels).Select(v => $"v{v}")] : [],
            MaskOrigin = mask == null ? null : "given",
        };
    }

    /// <summary>Largest, count and total of the clusters of each row's voxels above u, both signs apart but counted together.</summary>
    public static ClusterMaxima Clusters(Mask mask, IReadOnlyList<double[]> maps, double u, bool both, int neighbours = 18)
    {
        var scans = maps.Select(t => (both ? new[] { 1, -1 } : [1])
            .SelectMany(sign => ClusterLabels.Find(mask, [.. t.Select(v => sign * v > u)], neighbours).Sizes).ToArray()).ToArray();
        return new ClusterMaxima
        {
            FormingStatistic = u,
            Extent = [.. scans.Select(sizes => sizes.DefaultIfEmpty().Max())],
            ClusterCount = [.. scans.Select(sizes => sizes.Length)],
            VoxelsAbove = [.. scans.Select(sizes => sizes.Sum())],
        };
    }

    /// <summary>An input without clusters or theory on which a test hangs what it needs.</summary>
    public static InferenceInput Input(double[] observed, double[] heights, Mask? mask, Direction direction = Direction.Greater, bool exhaustive = true, double alpha = 0.05)
    {
        var family = new Family(exhaustive ? heights.Length : BigInteger.Pow(2, 80), direction == Direction.Both ? 2 : 1);
        return new InferenceInput
        {
            Request = new AnalysisRequest { Alpha = alpha, Direction = direction, Neighbours = 18 },
            Study = Noise(12, observed.Length, mask),
            Model = Mean(12, family, direction),
            Plan = new RelabelingPlan(family, heights.Length, 1),
            Maxima = new Maxima { Count = heights.Length, Height = heights },
            Complete = true,
            Observed = observed,
            Estimate = new double[observed.Length],
            Provenance = new ProvenanceSummary { Version = "test", Created = "" },
        };
    }
}
