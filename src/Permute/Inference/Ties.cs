namespace Permute.Inference;

/// <summary>
/// When two statistics count as equal: the same arrangement reached by different sums differs in its last digits, and an exact small sample must still count it. A
/// value m counts as at least t when m ≥ t − 1e-9 max(1, |t|); an infinity ties with itself alone.
/// </summary>
public static class Ties
{
    private const double Tolerance = 1e-9;

    /// <summary>The smallest value that counts as at least <paramref name="t"/>.</summary>
    public static double Floor(double t) => double.IsInfinity(t) ? t : t - Tolerance * Math.Max(1, Math.Abs(t));

    /// <summary>Whether <paramref name="m"/> counts as at least <paramref name="t"/>.</summary>
    public static bool AtLeast(double m, double t) => m >= Floor(t);
}
