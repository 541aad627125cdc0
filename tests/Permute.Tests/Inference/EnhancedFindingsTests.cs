using Permute.Data;
using Permute.Design;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class EnhancedFindingsTests
{
    private static readonly Mask Box = Mask.Whole(Grid.Plain(3, 2, 1));

    [Fact]
    public void Every_voxel_is_judged_by_the_largest_enhanced_values_and_keeps_the_sign_of_its_t()
    {
        double[] maxima = [9, .. Enumerable.Range(0, 39).Select(k => k / 5.0)];
        var input = Input(maxima, exhaustive: true);
        Findings found = FindingsBuilder.Build(input);
        Assert.Equal([9, -7.4, 0, 4, -0.1, 0], found.Maps["tfce"]);
        Assert.Equal([1, 3, 40, 20, 39, 40], found.Maps["tfce-p"].Select(p => (int)Math.Round(40 * p)));
        HeightSummary s = found.Summary.Tfce!;
        Assert.Equal(9, s.ObservedMaximum);
        // α 0.05 of 40 allows two: the third largest is critical, and what equals it does not survive.
        Assert.Equal(7.4, s.Permutation.Critical);
        Assert.Equal(1 / 40.0, s.Permutation.AdjustedP);
        Assert.Null(s.Permutation.AdjustedPInterval);
        Assert.NotNull(FindingsBuilder.Build(Input(maxima, exhaustive: false)).Summary.Tfce!.Permutation.AdjustedPInterval);
        Assert.Null(s.FieldTheory!.Critical);
        Assert.Equal("no field theory for TFCE", s.FieldTheory.Reason);
        Assert.Null(s.Bonferroni);
    }

    [Fact]
    public void Without_enhanced_values_there_is_neither_summary_nor_map()
    {
        Findings found = FindingsBuilder.Build(Input([9, 1], exhaustive: true) with { Enhanced = null });
        Assert.Null(found.Summary.Tfce);
        Assert.DoesNotContain("tfce", found.Maps.Keys);
    }

    private static InferenceInput Input(double[] maxima, bool exhaustive)
    {
        InferenceInput input = Some.Input([3, -2.5, 0, 2, -0.2, 0], [.. maxima.Select((_, k) => 3.0 - k / 50.0)], Box, Direction.Both, exhaustive);
        return input with { Enhanced = [9, 7.4, 0, 4, 0.1, 0], Maxima = input.Maxima with { Tfce = maxima } };
    }
}
