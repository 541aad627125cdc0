using System.Diagnostics;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;

namespace Permute.Bench;

/// <summary>How time and memory grow with voxels, relabelings and images: height, and extent at p 0.01, two threads.</summary>
internal static class Growth
{
    public static void Run()
    {
        Console.WriteLine("| images | voxels | relabelings | height, s | with extent at p 0.01, s | memory of data and loop, MB |");
        Console.WriteLine("|---|---|---|---|---|---|");
        foreach (var (images, voxels, relabelings) in new[]
            { (20, 50_000, 10_000), (20, 200_000, 10_000), (20, 200_000, 40_000), (10, 200_000, 1024), (40, 200_000, 10_000), (20, 400_000, 10_000) })
        {
            using var work = new Work(images, voxels);
            double u = new TField(images - 1).Quantile(0.01);
            var (height, _) = Time(work, relabelings, []);
            var (extent, bytes) = Time(work, relabelings, [u]);
            Console.WriteLine($"| {images} | {work.Mask.Count:N0} | {relabelings:N0} | {height:F2} | {extent:F2} | {bytes / 1e6:F0} |");
        }
    }

    private static (double Seconds, long Bytes) Time(Work work, int relabelings, double[] forming)
    {
        var seconds = new List<double>();
        long bytes = 0;
        for (int i = 0; i < 3; i++)
        {
            long start = Stopwatch.GetTimestamp();
            using var loop = new RelabelingLoop(
                work.Data, work.Mask, work.Model, new RelabelingPlan(work.Model.Relabelings, relabelings, 1), new Measures { FormingStatistics = forming }, 2);
            bytes = loop.Bytes + work.Data.Bytes;
            loop.Run();
            seconds.Add(Stopwatch.GetElapsedTime(start).TotalSeconds);
        }
        return (seconds.Order().ElementAt(1), bytes);
    }
}
