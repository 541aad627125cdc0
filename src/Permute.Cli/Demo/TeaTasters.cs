using Permute.Data;

namespace Permute.Cli.Demo;

/// <summary>The made-up scenario: images of tea tasters before and after a tasting course that never took place.</summary>
internal static class TeaTasters
{
    public const string Folder = "permute-demo";

    public const int Tasters = 14;

    /// <summary>Chosen among fourteen because this one study shows false alarms of the theory's rule for extents (README.md of the study says so).</summary>
    public const long Seed = 2;

    /// <summary>Where the course is said to have left its trace: zero-based voxel indices.</summary>
    public static readonly (int X, int Y, int Z) Trace = (27, 29, 20);

    /// <summary>Height of the trace, in standard deviations of one difference image.</summary>
    public const double TraceHeight = 1.7;

    /// <summary>FWHM of the trace, voxels.</summary>
    public const double TraceWidth = 7;

    /// <summary>Share of the noise's variance, and FWHM in voxels, of its fine and of its far-reaching part.</summary>
    public static readonly (double Share, double Fwhm)[] Noise = [(0.75, 2.35), (0.25, 7)];

    /// <summary>40 × 48 × 36 voxels of 4 mm, the origin in the middle.</summary>
    public static readonly Grid Grid = new(40, 48, 36, new double[,] { { 4, 0, 0, -78 }, { 0, 4, 0, -94 }, { 0, 0, 4, -70 }, { 0, 0, 0, 1 } });

    /// <summary>Whether a voxel lies in the head, an ellipsoid.</summary>
    public static bool InHead(int x, int y, int z) => Square((x - 19.5) / 17) + Square((y - 23.5) / 21) + Square((z - 17.5) / 15.5) <= 1;

    /// <summary>The mean difference after the course, in standard deviations of one image.</summary>
    public static double Effect(int x, int y, int z) => TraceHeight * Math.Exp(
        -4 * Math.Log(2) * (Square(x - Trace.X) + Square(y - Trace.Y) + Square(z - Trace.Z)) / Square(TraceWidth));

    private static double Square(double v) => v * v;
}
