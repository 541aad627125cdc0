namespace Permute.Inference;

/// <summary>Whether design and relabelings can carry the question.</summary>
internal static class DesignChecks
{
    private const double FormingLimit = 0.001, FormingWarning = 0.005;

    public static IEnumerable<CheckSummary> Of(InferenceInput input, ParametricSide theory, double smallestP)
    {
        double alpha = input.Request.Alpha;
        int used = input.Maxima.Count;
        yield return SmallestP(smallestP, alpha);
        yield return MonteCarloError(used, alpha, input.Exhaustive);
        yield return FewDegreesOfFreedom(input.Model.DegreesOfFreedom);
        if (theory.Undefined == null) yield return FieldTheoryDegreesOfFreedom(input.Model.DegreesOfFreedom);
        if (input.Above.Count > 0)
            yield return FormingP(input.Above.Max(a => a.PPerTail ?? theory.TailP(a.FormingStatistic)));
        if (Approximate(input) is { } approximate) yield return approximate;
        if (input.Study.Mask != null) yield return MaskLosses(input);
    }

    internal static CheckSummary SmallestP(double smallest, double alpha) => Check.Of(
        "smallest-p", smallest > alpha ? Check.Warning : Check.Good, smallest, alpha, "Phipson & Smyth 2010, Stat Appl Genet Mol Biol 9:39",
        smallest > alpha
            ? $"The smallest p that these relabelings can reach is {smallest:0.####}: whatever the data, nothing can be significant at {alpha}. More images (or, if drawn at random, more relabelings) are needed."
            : $"The smallest p that these relabelings can reach is {smallest:0.######}.");

    internal static CheckSummary MonteCarloError(int used, double alpha, bool exhaustive)
    {
        const string code = "monte-carlo-error", source = "Clopper & Pearson 1934, Biometrika 26:404–413; " + Check.OurLimit;
        if (exhaustive) return Check.Of(code, Check.Good, 0, alpha / 4, source, "All possible relabelings were used: p has no Monte Carlo error.");
        double half = HalfWidth(used, alpha);
        if (half <= alpha / 4)
            return Check.Of(code, Check.Good, half, alpha / 4, source, $"A p near {alpha} is known to within {half:0.####}.");
        int enough = used;
        while (HalfWidth(enough, alpha) > alpha / 4 && enough < 100_000_000) enough = enough < 100 ? 100 : enough + enough / 10;
        int rounded = (int)(Math.Ceiling(enough / 100.0) * 100);
        return Check.Of(code, Check.Caution, half, alpha / 4, source,
            $"With {used:N0} relabelings a p near {alpha} is known only to within {half:0.####}. Use about {rounded:N0} (--relabelings).");
    }

    /// <summary>Half the Clopper–Pearson interval of a p at α.</summary>
    private static double HalfWidth(int used, double alpha)
    {
        double[] interval = MonteCarlo.ClopperPearson((int)Math.Round(alpha * (used - 1)), used - 1);
        return (interval[1] - interval[0]) / 2;
    }

    internal static CheckSummary FewDegreesOfFreedom(int degrees) => Check.Of(
        "degrees-of-freedom-low", degrees < 20 ? Check.Caution : Check.Good, degrees, 20, "common practice, no source",
        degrees < 20
            ? $"{degrees} degrees of freedom: variance is poorly known at each voxel, parametric rules lean on normality, and power is low. The permutation results stand without normality."
            : $"{degrees} degrees of freedom.");

    internal static CheckSummary FieldTheoryDegreesOfFreedom(int degrees) => Check.Of(
        "degrees-of-freedom-field-theory", degrees < 8 ? Check.Warning : Check.Good, degrees, 8, Check.OurLimit,
        degrees < 8
            ? $"{degrees} degrees of freedom are too few for field theory to mean much: smoothness is badly known and the field very rough. Use the permutation results."
            : $"{degrees} degrees of freedom allow field theory.");

    internal static CheckSummary FormingP(double perTail)
    {
        bool high = perTail > FormingLimit * (1 + 1e-9);
        return Check.Of("forming-p-high", !high ? Check.Good : perTail > FormingWarning ? Check.Warning : Check.Caution, perTail, FormingLimit,
            "Woo, Krishnan & Wager 2014, NeuroImage 91:412–419; Eklund, Nichols & Knutsson 2016, PNAS 113:7900–7905",
            high
                ? $"The lowest cluster-forming threshold has p {perTail:0.######} in a tail: field-theory extents are often liberal there, and large clusters say little about where the effect is. Prefer a forming p of 0.001 in a tail or less, or the permutation extents."
                : $"No cluster-forming threshold has p above {FormingLimit} in a tail.");
    }

    internal static CheckSummary? Approximate(InferenceInput input)
    {
        var model = input.Model;
        if (model.Exact) return null;
        bool flips = model.Relabelings.Kind == "sign flips";
        if (flips && model.Images < 16)
            return Check.Of("few-images-with-covariates", Check.Warning, model.Images, 16, "simulation; this program's tests hold the figure for 3 covariates at n = 8; Freedman & Lane 1983, J Bus Econ Stat 1:292–298 for the method",
                $"Sign flips with covariates on {model.Images} images: the test is approximate, and at 8 images its false positive rate is near 0.06, 0.08 and 0.10 for 1, 2 and 3 covariates. Use fewer covariates or more images.");
        return Check.Of("relabelings-approximate", Check.Caution, model.Nuisance.Rank, null, "Freedman & Lane 1983, J Bus Econ Stat 1:292–298; Winkler et al. 2014, NeuroImage 92:381–397",
            "Relabeling does not leave the covariates in place, so the test is approximate (residuals of the reduced model are relabeled), even if all relabelings are used. Say so where p is reported.");
    }

    internal static CheckSummary MaskLosses(InferenceInput input)
    {
        double share = (double)input.Study.Dropped / (input.Observed.Length + input.Study.Dropped);
        return Check.Of("mask-losses", share > 0.05 ? Check.Caution : Check.Good, share, 0.05, Check.OurLimit,
            share > 0.05
                ? $"{input.Study.Dropped:N0} voxels of the mask ({100 * share:0.#} %) were dropped. See which images cost them, and leave such an image out or give a smaller mask."
                : $"{input.Study.Dropped:N0} voxels of the mask were dropped.");
    }
}
