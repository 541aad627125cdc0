namespace Permute.Inference;

/// <summary>What the empirical FWER of a parametric rule says about it on these data.</summary>
public static class Verdict
{
    /// <summary>Broken more often than α allows.</summary>
    public const string Liberal = "liberal";

    /// <summary>Broken more rarely than α allows.</summary>
    public const string Conservative = "conservative";

    /// <summary>Broken about as often.</summary>
    public const string Agrees = "agrees";

    /// <summary>Too few relabelings to tell.</summary>
    public const string Undecided = "undecided";

    /// <summary>
    /// With an interval: liberal when it lies above α, conservative when below, agrees when it contains α and its half-width is at most α/4, else undecided. Exhaustive
    /// (no interval): the rate is what it is. Above α is liberal; agrees is the largest rate up to α that these relabelings can
    /// show (rates come in steps of the smallest p, <paramref name="step"/>); anything less is conservative.
    /// </summary>
    public static string Of(double rate, double[]? interval, double alpha, double step)
    {
        if (interval == null)
            return rate > alpha + Rounding ? Liberal : rate + step > alpha + Rounding ? Agrees : Conservative;
        if (interval[0] > alpha) return Liberal;
        if (interval[1] < alpha) return Conservative;
        return interval[1] - interval[0] <= alpha / 2 ? Agrees : Undecided;
    }

    private const double Rounding = 1e-12;
}
