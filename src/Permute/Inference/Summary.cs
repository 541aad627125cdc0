namespace Permute.Inference;

/// <summary>Every number of the report, in the shape of summary.json (format permute-summary, version 1). Figures that do not exist are null with
/// their reason. Property names in camel case are the file's keys.</summary>
public sealed record Summary
{
    /// <summary>Always "permute-summary".</summary>
    public string Format { get; init; } = "permute-summary";

    /// <summary>Version of the file's shape.</summary>
    public int Version { get; init; } = 1;

    /// <summary>The family-wise error rate asked for.</summary>
    public required double Alpha { get; init; }

    /// <summary>What was analysed.</summary>
    public required DataSummary Data { get; init; }

    /// <summary>What was asked of it.</summary>
    public required ModelSummary Model { get; init; }

    /// <summary>The relabelings made.</summary>
    public required RelabelingSummary Relabelings { get; init; }

    /// <summary>Smoothness and size in resels; null for a table of variables.</summary>
    public SmoothnessSummary? Smoothness { get; init; }

    /// <summary>The maximum statistic and its thresholds.</summary>
    public required HeightSummary Height { get; init; }

    /// <summary>Cluster extent, one entry per forming threshold.</summary>
    public IReadOnlyList<ExtentSummary> Extent { get; init; } = [];

    /// <summary>Cluster mass, one entry per forming threshold, when recorded.</summary>
    public IReadOnlyList<MassSummary> Mass { get; init; } = [];

    /// <summary>Threshold-free cluster enhancement, when recorded.</summary>
    public HeightSummary? Tfce { get; init; }

    /// <summary>Combined height and extent, when recorded.</summary>
    public IReadOnlyList<MassSummary> Combined { get; init; } = [];

    /// <summary>Every formed cluster at every forming threshold, largest first within a threshold.</summary>
    public IReadOnlyList<ClusterSummary> Clusters { get; init; } = [];

    /// <summary>Local maxima, highest first.</summary>
    public IReadOnlyList<PeakSummary> Peaks { get; init; } = [];

    /// <summary>The variables of a table, in the order asked.</summary>
    public IReadOnlyList<VariableSummary> Variables { get; init; } = [];

    /// <summary>The sweep over forming thresholds.</summary>
    public IReadOnlyList<ExtentSummary> Sweep { get; init; } = [];

    /// <summary>Each assumption with the measured figure and its limit.</summary>
    public IReadOnlyList<CheckSummary> Checks { get; init; } = [];

    /// <summary>Meaning of the labels in agreement.nii.gz.</summary>
    public IReadOnlyDictionary<string, string> AgreementLabels { get; init; } = new Dictionary<string, string>();

    /// <summary>How many voxels or variables are tested significant by each height method, and on how many the methods differ; null when not computed.</summary>
    public SurvivorSummary? Survivors { get; init; }

    /// <summary>Where the numbers come from.</summary>
    public ProvenanceSummary? Provenance { get; init; }
}

/// <summary>What was analysed.</summary>
public sealed record DataSummary
{
    /// <summary>n, images (rows) used.</summary>
    public required int Images { get; init; }

    /// <summary>V, voxels or variables tested.</summary>
    public required int Voxels { get; init; }

    /// <summary>Size of the grid in voxels; null for a table.</summary>
    public int[]? Dimensions { get; init; }

    /// <summary>Voxel size, mm; null for a table.</summary>
    public double[]? VoxelSizeMm { get; init; }

    /// <summary>Voxels of the given or derived mask dropped (non-finite, constant, no residual).</summary>
    public int MaskVoxelsDropped { get; init; }

    /// <summary>"given" or "derived"; null for a table.</summary>
    public string? MaskOrigin { get; init; }

    /// <summary>Sentences on what the mask lost and why.</summary>
    public IReadOnlyList<string> MaskNotes { get; init; } = [];
}

/// <summary>The question.</summary>
public sealed record ModelSummary
{
    /// <summary>"mean", or "column: A minus B".</summary>
    public required string Effect { get; init; }

    /// <summary>greater, less or both; none for an F.</summary>
    public required string Direction { get; init; }

    /// <summary>t, welch, smoothed-variance-t or f.</summary>
    public required string Statistic { get; init; }

    /// <summary>ν, or the pair of an F.</summary>
    public required object DegreesOfFreedom { get; init; }

    /// <summary>Whether the relabeling test is exact under its assumption.</summary>
    public required bool Exact { get; init; }

    /// <summary>The assumption under which it is: "errors symmetric about 0", "images exchangeable between groups", and so on.</summary>
    public string Assumption { get; init; } = "";
}

/// <summary>The relabelings made.</summary>
public sealed record RelabelingSummary
{
    /// <summary>"sign flips", "label swaps", "permutations".</summary>
    public required string Kind { get; init; }

    /// <summary>Distinct arrangements, written out (a number when it fits a double exactly, else as text).</summary>
    public required object Possible { get; init; }

    /// <summary>Arrangements planned, the observed one included.</summary>
    public required int Planned { get; init; }

    /// <summary>Arrangements used, the observed one included.</summary>
    public required int Used { get; init; }

    /// <summary>All possible arrangements were used.</summary>
    public required bool Exhaustive { get; init; }

    /// <summary>The seed.</summary>
    public required long Seed { get; init; }

    /// <summary>The smallest p that this design can reach.</summary>
    public required double SmallestP { get; init; }

    /// <summary>The rule for stopping early; null unless asked for.</summary>
    public StopSummary? Stop { get; init; }
}

/// <summary>Smoothness and the search region's size in resels.</summary>
public sealed record SmoothnessSummary
{
    /// <summary>FWHM per axis in voxels; null where the axis has no neighbouring pairs.</summary>
    public required double?[] FwhmVoxels { get; init; }

    /// <summary>FWHM per axis in mm.</summary>
    public required double?[] FwhmMm { get; init; }

    /// <summary>Given by the user instead of estimated.</summary>
    public bool Assumed { get; init; }

    /// <summary>R0 to R3; null when there is no smoothness.</summary>
    public double[]? ReselCounts { get; init; }

    /// <summary>V over the product of the FWHM: a size, no number of independent tests.</summary>
    public double? VolumeInResels { get; init; }

    /// <summary>Why there is none; null when there is.</summary>
    public string? Reason { get; init; }
}

/// <summary>The permutation side of a measure.</summary>
public sealed record PermutationSummary
{
    /// <summary>The (⌊αN⌋+1)-th largest maximum: what is strictly above survives. In evidence units (positive).</summary>
    public required double? Critical { get; init; }

    /// <summary>Extents only: critical + 1.</summary>
    public int? SmallestSurviving { get; init; }

    /// <summary>95 % Monte Carlo interval of the critical value; null when exhaustive; an infinite end is "Infinity".</summary>
    public double[]? CriticalInterval { get; init; }

    /// <summary>FWER-adjusted p of the observed maximum.</summary>
    public required double? AdjustedP { get; init; }

    /// <summary>95 % Clopper–Pearson interval of it; null when exhaustive.</summary>
    public double[]? AdjustedPInterval { get; init; }

    /// <summary>What the interval leaves open: a sentence when it straddles α, with how many relabelings would settle it; else null.</summary>
    public string? Note { get; init; }

    /// <summary>The approximation by a generalised Pareto tail; null unless asked for, and for extents, which are whole numbers.</summary>
    public TailFit? Tail { get; init; }

    /// <summary>Whether p is settled against α by the rule for stopping early; null unless that was asked for.</summary>
    public SettledSummary? Settled { get; init; }
}

/// <summary>Whether an adjusted p is settled against α (<see cref="SequentialStop"/>).</summary>
/// <param name="Side">"at most alpha", "above alpha", or "open".</param>
/// <param name="Relabelings">Relabelings, the observed one included, at which it was found settled; null while open.</param>
public sealed record SettledSummary(string Side, int? Relabelings);

/// <summary>The rule for stopping early and what came of it.</summary>
/// <param name="Stopped">The run ended before the relabelings planned, because every p of interest was settled.</param>
/// <param name="Risk">Bound on the probability that any p of interest is settled on the wrong side of α.</param>
/// <param name="Of">p of interest: those of the observed maxima of height and, at each forming threshold, extent and mass.</param>
/// <param name="SettledOf">How many of them are settled.</param>
/// <param name="Rule">The rule in one sentence.</param>
public sealed record StopSummary(bool Stopped, double Risk, int Of, int SettledOf, string Rule);

/// <summary>A parametric rule beside it: field theory or Bonferroni.</summary>
public sealed record ParametricSummary
{
    /// <summary>Height: the threshold, in evidence units; null with its reason where none exists.</summary>
    public double? Critical { get; init; }

    /// <summary>Extents: the smallest extent with p ≤ α.</summary>
    public int? SmallestSurviving { get; init; }

    /// <summary>Parametric FWER-adjusted p of the observed maximum.</summary>
    public double? AdjustedP { get; init; }

    /// <summary>Fraction of relabelings whose maximum breaks the rule.</summary>
    public double? EmpiricalFwer { get; init; }

    /// <summary>95 % Clopper–Pearson interval of it; null when exhaustive.</summary>
    public double[]? EmpiricalFwerInterval { get; init; }

    /// <summary>liberal, conservative, agrees or undecided.</summary>
    public string? Verdict { get; init; }

    /// <summary>Why a figure is missing or outside its domain; else null.</summary>
    public string? Reason { get; init; }
}

/// <summary>The maximum statistic (or the maximum enhanced value).</summary>
public sealed record HeightSummary
{
    /// <summary>Largest observed value in the direction tested.</summary>
    public required double? ObservedMaximum { get; init; }

    /// <summary>By permutation.</summary>
    public required PermutationSummary Permutation { get; init; }

    /// <summary>By random field theory.</summary>
    public ParametricSummary? FieldTheory { get; init; }

    /// <summary>By Bonferroni over V tests.</summary>
    public ParametricSummary? Bonferroni { get; init; }
}

/// <summary>Cluster extent at one forming threshold.</summary>
public sealed record ExtentSummary
{
    /// <summary>As it was given; null when a value of the statistic was given.</summary>
    public double? FormingP { get; init; }

    /// <summary>The p in each tail used.</summary>
    public double? FormingPPerTail { get; init; }

    /// <summary>u.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>6, 18 or 26.</summary>
    public required int Neighbours { get; init; }

    /// <summary>Largest observed cluster, voxels.</summary>
    public required int ObservedMaximum { get; init; }

    /// <summary>By permutation.</summary>
    public required PermutationSummary Permutation { get; init; }

    /// <summary>By random field theory.</summary>
    public required ParametricSummary FieldTheory { get; init; }

    /// <summary>Which assumption broke: means over relabelings against theory.</summary>
    public required DiagnosisSummary Diagnosis { get; init; }
}

/// <summary>A figure as the relabelings give it and as the theory expects it.</summary>
/// <param name="Relabelings">Mean over relabelings (observed left out in random mode).</param>
/// <param name="Theory">Expected value, both signs together in direction both; null when the theory has none.</param>
public sealed record Expectation(double Relabelings, double? Theory);

/// <summary>Voxels above, clusters, voxels per cluster.</summary>
public sealed record DiagnosisSummary
{
    /// <summary>Against E[N]: the marginal distribution.</summary>
    public required Expectation VoxelsAbove { get; init; }

    /// <summary>Against E[m]: lattice, holes, roughness.</summary>
    public required Expectation ClusterCount { get; init; }

    /// <summary>Against E[N]/E[m].</summary>
    public required Expectation VoxelsPerCluster { get; init; }

    /// <summary>In one plain sentence, what the figures say.</summary>
    public string? Reading { get; init; }
}

/// <summary>A cluster measure that has no parametric side (mass, combined).</summary>
public sealed record MassSummary
{
    /// <summary>As it was given.</summary>
    public double? FormingP { get; init; }

    /// <summary>The p in each tail used.</summary>
    public double? FormingPPerTail { get; init; }

    /// <summary>u.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>6, 18 or 26.</summary>
    public required int Neighbours { get; init; }

    /// <summary>Largest observed value.</summary>
    public required double ObservedMaximum { get; init; }

    /// <summary>By permutation.</summary>
    public required PermutationSummary Permutation { get; init; }

    /// <summary>Which measure: "mass", "tippett", "fisher".</summary>
    public string Measure { get; init; } = "mass";
}

/// <summary>A cluster of the observed map.</summary>
public sealed record ClusterSummary
{
    /// <summary>Number, from 1, unique over all forming thresholds.</summary>
    public required int Id { get; init; }

    /// <summary>u.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>+1 or −1.</summary>
    public required int Sign { get; init; }

    /// <summary>Size.</summary>
    public required int Voxels { get; init; }

    /// <summary>Σ(|T| − u), over finite T.</summary>
    public required double Mass { get; init; }

    /// <summary>Signed T of its highest voxel.</summary>
    public required double Peak { get; init; }

    /// <summary>Zero-based voxel index of it.</summary>
    public required int[] PeakIndex { get; init; }

    /// <summary>Its place in mm.</summary>
    public required double[] PeakMm { get; init; }

    /// <summary>FWER-adjusted p by each method; null where there is none.</summary>
    public required ClusterP AdjustedP { get; init; }
}

/// <summary>Adjusted p of a cluster by each method.</summary>
public sealed record ClusterP(double? Permutation, double? FieldTheory, double? Mass);

/// <summary>A local maximum of the observed map.</summary>
public sealed record PeakSummary
{
    /// <summary>Zero-based voxel index.</summary>
    public required int[] Index { get; init; }

    /// <summary>Place in mm.</summary>
    public required double[] Mm { get; init; }

    /// <summary>Signed T.</summary>
    public required double Value { get; init; }

    /// <summary>+1 or −1.</summary>
    public required int Sign { get; init; }

    /// <summary>Ids of the clusters it belongs to.</summary>
    public required int[] Clusters { get; init; }

    /// <summary>FWER-adjusted p by each method.</summary>
    public required PeakP AdjustedP { get; init; }

    /// <summary>Uncorrected permutation p, when recorded.</summary>
    public double? UncorrectedP { get; init; }
}

/// <summary>Adjusted p of a voxel by each method; null where there is none (step-down: below the 1,000 highest).</summary>
public sealed record PeakP(double? Permutation, double? StepDown, double? FieldTheory, double? Bonferroni);

/// <summary>A variable of a table.</summary>
public sealed record VariableSummary
{
    /// <summary>Its column.</summary>
    public required string Name { get; init; }

    /// <summary>Signed T.</summary>
    public required double Value { get; init; }

    /// <summary>The effect's size: a mean, a difference of means, a slope.</summary>
    public double? Estimate { get; init; }

    /// <summary>+1 or −1.</summary>
    public required int Sign { get; init; }

    /// <summary>Uncorrected permutation p.</summary>
    public required double? UncorrectedP { get; init; }

    /// <summary>The uncorrected p adjusted for the false discovery rate (Benjamini &amp; Hochberg 1995), when recorded.</summary>
    public double? FalseDiscoveryP { get; init; }

    /// <summary>Adjusted p.</summary>
    public required PeakP AdjustedP { get; init; }
}

/// <summary>An assumption looked at.</summary>
public sealed record CheckSummary
{
    /// <summary>Short name with hyphens, stable.</summary>
    public required string Code { get; init; }

    /// <summary>"good", "caution" or "warning".</summary>
    public required string Level { get; init; }

    /// <summary>The measured figure.</summary>
    public double? Measured { get; init; }

    /// <summary>The usual limit.</summary>
    public double? Limit { get; init; }

    /// <summary>Where the limit comes from.</summary>
    public string Source { get; init; } = "";

    /// <summary>What it means here and what to do.</summary>
    public required string Message { get; init; }
}

/// <summary>How many voxels (or variables) each height rule finds.</summary>
/// <param name="Permutation">By the permutation threshold.</param>
/// <param name="StepDown">By step-down.</param>
/// <param name="FieldTheory">By the field-theory threshold; null without one.</param>
/// <param name="Bonferroni">By Bonferroni; null without one.</param>
public sealed record SurvivorSummary(int Permutation, int? StepDown, int? FieldTheory, int? Bonferroni)
{
    /// <summary>With the false discovery rate at α (Benjamini &amp; Hochberg 1995) on the uncorrected permutation p; null unless those were recorded. At a smallest p of 1/N
    /// about V/(αN) voxels must reach it before anything is found.</summary>
    public int? FalseDiscoveryPermutation { get; init; }

    /// <summary>The same on the parametric p of each voxel.</summary>
    public int? FalseDiscoveryParametric { get; init; }
}

/// <summary>Where the numbers come from.</summary>
public sealed record ProvenanceSummary
{
    /// <summary>Version of the program.</summary>
    public required string Version { get; init; }

    /// <summary>When it was made, UTC, ISO 8601.</summary>
    public required string Created { get; init; }

    /// <summary>SHA-256 of each input file by its path.</summary>
    public IReadOnlyDictionary<string, string> Inputs { get; init; } = new Dictionary<string, string>();

    /// <summary>The run's fingerprint: SHA-256 of data, mask, model, plan and measures.</summary>
    public string Fingerprint { get; init; } = "";
}
