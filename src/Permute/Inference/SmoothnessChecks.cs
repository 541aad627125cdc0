using Permute.FieldTheory;

namespace Permute.Inference;

/// <summary>Whether the images are what random field theory assumes: smooth enough, evenly smooth, and with a correlation that dies out fast.</summary>
internal static class SmoothnessChecks
{
    private const double TailLimit = 1.10, UnevenLimit = 1.2;

    public static IEnumerable<CheckSummary> Of(InferenceInput input, ParametricSide theory)
    {
        if (input.UsedFwhm.Min() is { } least) yield return Low(least);
        if (theory.Height is { } height) yield return AgainstBonferroni(height, theory.Bonferroni);
        if (input.Smoothness is not { } smoothness) yield break;
        if (LongTail(smoothness) is { } tail) yield return tail;
        if (Uneven(smoothness) is { } uneven) yield return uneven;
    }

    internal static CheckSummary Low(double least) => Check.Of(
        "smoothness-low", least < 2 ? Check.Warning : least < 3 ? Check.Caution : Check.Good, least, 3,
        "Hayasaka & Nichols 2003, NeuroImage 20:2343–2356 (extents); Nichols & Hayasaka 2003, Stat Methods Med Res 12:419–446 (heights)",
        least < 3
            ? $"The smallest FWHM is {least:0.##} voxels: field theory takes the images for continuous, and on a lattice this coarse its heights are conservative and its extents wrong. Use the permutation results."
            : $"The smallest FWHM is {least:0.##} voxels. With few degrees of freedom even this is not enough for field-theory heights.");

    internal static CheckSummary AgainstBonferroni(double height, double bonferroni) => Check.Of(
        "theory-above-bonferroni", height > bonferroni ? Check.Caution : Check.Good, height, bonferroni,
        "Nichols & Hayasaka 2003, Stat Methods Med Res 12:419–446",
        height > bonferroni
            ? $"The field-theory threshold {height:0.###} is above Bonferroni's {bonferroni:0.###}, which assumes nothing about smoothness: it gives power away here. Use the permutation threshold."
            : $"The field-theory threshold {height:0.###} is not above Bonferroni's {bonferroni:0.###}.");

    internal static CheckSummary? LongTail(SmoothnessEstimate smoothness)
    {
        double worst = new[] { smoothness.Lag2Fwhm, smoothness.Lag3Fwhm }
            .SelectMany(lag => lag.Zip(smoothness.FwhmVoxels, (far, near) => far / near ?? double.NaN))
            .Where(double.IsFinite).DefaultIfEmpty(double.NaN).Max();
        if (double.IsNaN(worst)) return null;
        return Check.Of("autocorrelation-long-tailed", worst > TailLimit ? Check.Caution : Check.Good, worst, TailLimit,
            $"the explanation: Eklund, Nichols & Knutsson 2016, PNAS 113:7900–7905; {Check.OurLimit}",
            worst > TailLimit
                ? $"Seen over two or three voxels the images are {worst:0.##} times as smooth as between neighbours: their correlation has longer tails than the squared exponential that field theory assumes, so its extents come out too small. Use the permutation extents."
                : "The correlation over two and three voxels is what the smoothness between neighbours implies.");
    }

    internal static CheckSummary? Uneven(SmoothnessEstimate smoothness)
    {
        var (spread, expected) = (smoothness.UnevennessCv, smoothness.ExpectedCv);
        if (!double.IsFinite(spread) || !(expected > 0)) return null;
        double limit = UnevenLimit * expected;
        return Check.Of("smoothness-uneven", spread > limit ? Check.Caution : Check.Good, spread, limit,
            $"Hayasaka, Phan, Liberzon, Worsley & Nichols 2004, NeuroImage 22:676–687; {Check.OurLimit}",
            spread > limit
                ? $"The local resels vary more (CV {spread:0.##}) than evenly smooth images of as many degrees of freedom would (about {expected:0.##}): large clusters come easier where the images are smoother, for permutation and field theory alike. See the map local-resels."
                : $"The local resels vary (CV {spread:0.##}) about as they would if the images were evenly smooth ({expected:0.##}).");
    }
}
