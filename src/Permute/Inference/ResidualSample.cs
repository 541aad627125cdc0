using Permute.Data;

namespace Permute.Inference;

/// <summary>Residuals of the full model at up to 2,000 voxels spread evenly over the mask, scaled to unit length at each voxel, for a look at the errors.</summary>
internal sealed class ResidualSample
{
    private const int Most = 2000;

    /// <summary>Takes them; <paramref name="residuals"/> turns the n data of a voxel into the residuals of the full model in place. Voxels without residual are left out.</summary>
    public ResidualSample(SubjectMatrix data, Action<double[]> residuals)
    {
        int count = Math.Min(Most, data.Voxels);
        var rows = new List<double[]>(count);
        for (int s = 0; s < count; s++)
        {
            var e = new double[data.Images];
            data.Column((int)((long)s * data.Voxels / count), e);
            double total = e.Sum(v => v * v);
            residuals(e);
            double rest = e.Sum(v => v * v);
            if (!(rest > 1e-12 * total)) continue;
            double norm = Math.Sqrt(rest);
            rows.Add([.. e.Select(v => v / norm)]);
        }
        Voxels = rows;
    }

    /// <summary>u = e/‖e‖ per voxel, length n each.</summary>
    public IReadOnlyList<double[]> Voxels { get; }

    /// <summary>Mean over voxels of the residuals' skewness, n^½ Σ u³.</summary>
    public double Skewness => Voxels.Average(u => Math.Sqrt(u.Length) * u.Sum(v => v * v * v));

    /// <summary>Mean residual of each image.</summary>
    public double[] ImageMeans => PerImage(v => v);

    /// <summary>Mean square of each image's residuals.</summary>
    public double[] ImageSquares => PerImage(v => v * v);

    private double[] PerImage(Func<double, double> of) =>
        [.. Enumerable.Range(0, Voxels.Count == 0 ? 0 : Voxels[0].Length).Select(i => Voxels.Average(u => of(u[i])))];
}
