namespace Permute.Inference;

/// <summary>Whether the errors look as the relabelings assume, and whether one image stands apart.</summary>
internal static class ResidualChecks
{
    private const double SkewnessLimit = 0.5, VarianceLimit = 2, OutlierLimit = 3.5;
    private const int FewestImages = 6, FewestVoxels = 50; // an image's mean and spread over less say little

    public static IEnumerable<CheckSummary> Of(InferenceInput input)
    {
        var sample = new ResidualSample(input.Study.Data, e => input.Model.FullResiduals(e));
        if (sample.Voxels.Count == 0) yield break;
        if (input.Model.Relabelings.Kind == "sign flips") yield return Symmetry(sample.Skewness);
        else if (input.Model is { Groups.Count: 2, Codes: { } codes }) yield return EqualVariances(sample, codes, input.Model.Groups);
        if (input.Model.Images < FewestImages || sample.Voxels.Count < FewestVoxels) yield break;
        yield return Outlier("image-mean-outlying", "mean", sample.ImageMeans, input.Study.Rows);
        yield return Outlier("image-spread-outlying", "spread", [.. sample.ImageSquares.Select(v => Math.Log(Math.Max(v, 1e-300)) / 2)], input.Study.Rows);
    }

    internal static CheckSummary Symmetry(double skewness)
    {
        bool skewed = Math.Abs(skewness) > SkewnessLimit;
        return Check.Of("residual-symmetry", skewed ? Check.Caution : Check.Good, skewness, SkewnessLimit,
            $"sign flips assume symmetric errors: Nichols & Holmes 2002, Hum Brain Mapp 15:1–25; {Check.OurLimit}",
            skewed
                ? $"The residuals are skewed (mean skewness {skewness:0.##}): sign flips assume errors symmetric about 0. Look for images that stand apart, or transform the data."
                : $"The residuals are about symmetric (mean skewness {skewness:0.##}), as sign flips assume.");
    }

    internal static CheckSummary EqualVariances(ResidualSample sample, sbyte[] codes, IReadOnlyList<(string Level, int Images)> groups)
    {
        double[] squares = sample.ImageSquares;
        double Variance(int sign) => Enumerable.Range(0, codes.Length).Where(i => codes[i] == sign).Sum(i => squares[i]) / Math.Max(1, codes.Count(c => c == sign) - 1);
        double first = Variance(1), second = Variance(-1), ratio = Math.Max(first, second) / Math.Max(1e-300, Math.Min(first, second));
        string larger = first > second ? groups[0].Level : groups[1].Level;
        bool unequal = ratio > VarianceLimit, sizes = groups[0].Images != groups[1].Images;
        return Check.Of("equal-variances", !unequal ? Check.Good : sizes ? Check.Warning : Check.Caution, ratio, VarianceLimit,
            $"label swaps assume exchangeable errors: Nichols & Holmes 2002, Hum Brain Mapp 15:1–25; {Check.OurLimit}",
            unequal
                ? $"Over the mask the residual variance in '{larger}' is {ratio:0.##} times that of the other group: label swaps assume the same in both"
                    + (sizes ? ", and with unequal group sizes the test goes wrong. Make the groups equal in size or find the cause." : ". With equal group sizes this matters little.")
                : $"The residual variances of the groups are within a factor of {ratio:0.##}, as label swaps assume.");
    }

    /// <summary>The image furthest out by the modified z-score, 0.6745 (x − median)/MAD.</summary>
    internal static CheckSummary Outlier(string code, string what, double[] values, IReadOnlyList<string> rows)
    {
        double median = Median(values), mad = Median([.. values.Select(v => Math.Abs(v - median))]);
        double[] scores = [.. values.Select(v => v == median ? 0 : 0.6745 * Math.Abs(v - median) / Math.Max(mad, 1e-12))];
        int worst = Array.IndexOf(scores, scores.Max());
        bool outlying = scores[worst] > OutlierLimit;
        return Check.Of(code, outlying ? Check.Caution : Check.Good, scores[worst], OutlierLimit, "Iglewicz & Hoaglin 1993, How to detect and handle outliers (modified z-score)",
            outlying
                ? $"The residuals of image '{rows[worst]}' stand apart in their {what} (score {scores[worst]:0.#}): one image may carry the result. Look at it, and see whether the findings hold without it."
                : $"No image's residuals stand apart in their {what} (largest score {scores[worst]:0.#}, '{rows[worst]}').");
    }

    private static double Median(double[] values)
    {
        double[] sorted = [.. values.Order()];
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }
}
