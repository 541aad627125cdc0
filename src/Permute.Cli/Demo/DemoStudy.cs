using System.Text;
using Permute.Data;
using Permute.Design;
using Permute.Nifti;

namespace Permute.Cli.Demo;

/// <summary>Writes the made-up study, and knows the analysis that goes with it. Every run writes the same bytes.</summary>
internal static class DemoStudy
{
    private static readonly double[] FormingP = [0.05, 0.01, 0.001];

    private const int Relabelings = 1 << TeaTasters.Tasters;

    /// <summary>Writes images, table and README below <paramref name="run"/>; returns the path of the table.</summary>
    public static string Write(string run, CancellationToken cancel)
    {
        string folder = Path.Combine(run, "study"), readme = Path.Combine(folder, "README.md"), table = Table(run);
        if (Directory.Exists(run) && Directory.EnumerateFileSystemEntries(run).Any() && !File.Exists(readme))
            throw new InputException($"{run} exists and is not a demo of ours; choose another --out.");
        Directory.CreateDirectory(folder);
        AtomicFile.Write(readme, to => to.Write(Encoding.UTF8.GetBytes(DemoReadme.Text(Quoting.Command(Arguments(run))))));
        var rows = new StringBuilder("taster\timage\tcups_a_day\n");
        for (int i = 0; i < TeaTasters.Tasters; i++)
        {
            cancel.ThrowIfCancellationRequested();
            string name = $"taster-{i + 1:00}", file = $"{name}_after-minus-before.nii.gz";
            var random = new Philox(TeaTasters.Seed, i);
            rows.Append(name).Append('\t').Append(file).Append('\t').Append(1 + random.Below(8)).Append('\n');
            NiftiFile.Write(Path.Combine(folder, file), Header(name), Image(ref random));
        }
        AtomicFile.Write(table, to => to.Write(Encoding.UTF8.GetBytes(rows.ToString())));
        return table;
    }

    /// <summary>The analysis: every sign flip there is.</summary>
    public static AnalysisRequest Request(string run) => new() { Study = Table(run), FormingP = FormingP, Relabelings = Relabelings, Out = run };

    /// <summary>The same as words of the command line.</summary>
    public static string[] Arguments(string run) =>
        ["test", "--study", Table(run), "--forming-p", .. FormingP.Select(p => $"{p}"), "--relabelings", $"{Relabelings}", "--out", run];

    private static string Table(string run) => Path.Combine(run, "study", "study.tsv");

    private static NiftiHeader Header(string name)
    {
        Grid grid = TeaTasters.Grid;
        return NiftiFile.For([grid.Nx, grid.Ny, grid.Nz], grid.Affine) with { Description = $"made-up data: {name}, after minus before" };
    }

    private static double[] Image(ref Philox random)
    {
        Grid grid = TeaTasters.Grid;
        var image = new double[grid.Count];
        foreach (var (share, fwhm) in TeaTasters.Noise)
        {
            double[] noise = SmoothNoise.Draw(grid, fwhm, ref random);
            for (int i = 0; i < image.Length; i++) image[i] += Math.Sqrt(share) * noise[i];
        }
        for (int i = 0; i < image.Length; i++)
        {
            var (x, y, z) = grid.Voxel(i);
            // Exactly 0 outside, as images of a head are once the rest is cut away: the mask is derived from it.
            image[i] = TeaTasters.InHead(x, y, z) ? image[i] + TeaTasters.Effect(x, y, z) : 0;
        }
        return image;
    }
}
