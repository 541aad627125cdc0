using System.Text.Json;
using Permute.Design;
using Permute.Engine;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

/// <summary>
/// All 4,096 sign flips of ten diabetes variables (source in the file): counts by enumeration in NumPy, against findings made of maxima enumerated here.
/// </summary>
public class PublishedTableTests
{
    [Theory]
    [InlineData("one_sided_greater", Direction.Greater)]
    [InlineData("two_sided", Direction.Both)]
    public void Findings_of_a_table_have_the_counts_of_the_full_enumeration(string side, Direction direction)
    {
        JsonElement expected = Reference.Json("diabetes-one-sample.json").GetProperty("expected").GetProperty(side);
        double[][] t = Flips();
        double[][] evidence = [.. t.Select(row => row.Select(v => Evidence.Of(direction, v)).ToArray())];
        InferenceInput input = Some.Input(t[0], [.. evidence.Select(row => row.Max())], null, direction) with
        {
            StepDown = SuccessiveMaxima(evidence),
            UncorrectedCounts = [.. Enumerable.Range(0, 10).Select(v => evidence.Count(row => Ties.Reaches(row[v], evidence[0][v])))],
        };
        Findings found = FindingsBuilder.Build(input);
        for (int v = 0; v < 10; v++)
        {
            VariableSummary variable = found.Summary.Variables[v];
            Assert.Equal(expected.Ints("count_fwer_single_step")[v] / 4096.0, variable.AdjustedP.Permutation!.Value, 1e-12);
            Assert.Equal(expected.Ints("count_fwer_step_down")[v] / 4096.0, variable.AdjustedP.StepDown!.Value, 1e-12);
            Assert.Equal(expected.Ints("count_uncorrected")[v] / 4096.0, variable.UncorrectedP!.Value, 1e-12);
            Assert.Null(variable.AdjustedP.FieldTheory);
            Assert.Equal(t[0][v], variable.Value);
        }
        var maxima = expected.GetProperty("max_distribution");
        Assert.Equal(maxima.Double("critical_0p05"), found.Summary.Height.Permutation.Critical!.Value, 1e-9);
        var strict = FindingsBuilder.Build(input with { Request = input.Request with { Alpha = 0.01 } });
        Assert.Equal(maxima.Double("critical_0p01"), strict.Summary.Height.Permutation.Critical!.Value, 1e-9);
        int surviving = expected.Ints("count_fwer_single_step").Count(c => c <= 204);
        SurvivorSummary survivors = found.Summary.Survivors!;
        Assert.Equal((surviving, surviving, null), (survivors.Permutation, survivors.StepDown, survivors.FieldTheory));
        double[] falseDiscovery = BenjaminiHochberg.Adjust([.. expected.Ints("count_uncorrected").Select(c => c / 4096.0)]);
        Assert.Equal(falseDiscovery, found.Summary.Variables.Select(v => v.FalseDiscoveryP!.Value));
        Assert.Equal(falseDiscovery.Count(p => p <= 0.05), survivors.FalseDiscoveryPermutation);
        Assert.Empty(found.Maps);
        Assert.Contains("table of variables", found.Summary.Height.FieldTheory!.Reason);
    }

    private static double[][] Flips()
    {
        double[][] y = [.. Reference.Table("diabetes-one-sample.tsv").Rows.Select(row => row[^10..].Select(Reference.Number).ToArray())];
        double[] ones = [.. Enumerable.Repeat(1.0, 12)];
        return [.. Enumerable.Range(0, 4096).Select(flip => Enumerable.Range(0, 10)
            .Select(v => PartialT.Of([.. y.Select((row, i) => (flip >> i & 1) == 1 ? -row[v] : row[v])], ones, 11)).ToArray())];
    }

    // Westfall & Young 1993: for each rank the maximum over that and all later ranks.
    private static StepDownCounts SuccessiveMaxima(double[][] evidence)
    {
        int[] ranked = [.. Enumerable.Range(0, 10).OrderByDescending(v => evidence[0][v])];
        return new StepDownCounts
        {
            Voxels = ranked,
            Counts = [.. ranked.Select((v, rank) => evidence.Count(row => Ties.Reaches(ranked[rank..].Max(w => row[w]), evidence[0][v])))],
        };
    }
}
