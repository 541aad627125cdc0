using Permute.Design;

namespace Permute.FieldTheory;

/// <summary>Normal and χ variates of a seed.</summary>
internal struct NormalStream(long seed)
{
    private Philox words = new(seed, 0);
    private double spare = double.NaN;

    /// <summary>A standard normal (Box &amp; Muller 1958).</summary>
    public double Normal()
    {
        if (!double.IsNaN(spare))
        {
            double kept = spare;
            spare = double.NaN;
            return kept;
        }
        double radius = Math.Sqrt(-2 * Math.Log(Uniform())), angle = 2 * Math.PI * Uniform();
        spare = radius * Math.Sin(angle);
        return radius * Math.Cos(angle);
    }

    /// <summary>A χ of <paramref name="k"/> degrees of freedom, 0 for none (Marsaglia &amp; Tsang 2000, ACM Trans Math Softw 26:363).</summary>
    public double Chi(int k)
    {
        if (k <= 0) return 0;
        if (k == 1) return Math.Abs(Normal());
        double d = k / 2.0 - 1 / 3.0, c = 1 / Math.Sqrt(9 * d);
        while (true)
        {
            double x = Normal(), v = 1 + c * x;
            if (v <= 0) continue;
            v = v * v * v;
            if (Math.Log(Uniform()) < x * x / 2 + d * (1 - v + Math.Log(v))) return Math.Sqrt(2 * d * v);
        }
    }

    private double Uniform() => (words.Next() + 0.5) / 4294967296.0;
}
