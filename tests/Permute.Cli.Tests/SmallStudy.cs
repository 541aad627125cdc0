using System.Globalization;
using Permute.Data;
using Permute.Design;
using Permute.Nifti;

namespace Permute.Cli.Tests;

/// <summary>A study small enough for a test: images of independent noise on 6 × 5 × 4 voxels, all inside, and their table.</summary>
internal static class SmallStudy
{
    /// <summary>Writes <paramref name="images"/> images, the first half "wet" and the others "dry"; returns the table's path.</summary>
    public static string Write(Scratch scratch, int images = 10)
    {
        var lines = new List<string> { "image\tweather\train" };
        for (int i = 0; i < images; i++)
        {
            var random = new Philox(7, i);
            var values = new double[6 * 5 * 4];
            for (int v = 0; v < values.Length; v++) values[v] = random.Normal() + (v == 33 ? 2 : 0);
            string file = $"walk-{i:00}.nii.gz";
            NiftiFile.Write(scratch[file], NiftiFile.For([6, 5, 4], Grid.Plain(6, 5, 4, 2, 2, 2).Affine), values);
            lines.Add(string.Create(CultureInfo.InvariantCulture, $"{file}\t{(i < images / 2 ? "wet" : "dry")}\t{random.Uniform():0.000}"));
        }
        File.WriteAllLines(scratch["study.tsv"], lines);
        return scratch["study.tsv"];
    }
}
