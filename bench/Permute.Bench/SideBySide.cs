using System.Diagnostics;
using System.Globalization;
using System.Text;
using System.Text.Json;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;

namespace Permute.Bench;

/// <summary>The engine and the NumPy/SciPy baseline on the same work in one run, in turn, both on two threads: medians and the median of the pairs' ratios.</summary>
internal static class SideBySide
{
    private const int Threads = 2, Relabelings = 10_000, Shares = 10;

    /// <summary>Runs everything <paramref name="repeats"/> times and writes the table to standard output and to <paramref name="report"/>.</summary>
    public static void Run(int repeats, int extentRelabelings, string baseline, string report)
    {
        using var work = new Work(20, 200_000);
        string input = Path.Combine(Path.GetTempPath(), $"permute-bench-{Environment.ProcessId}.bin");
        work.WriteBaselineInput(input, Relabelings);
        try
        {
            var field = new TField(work.Model.DegreesOfFreedom);
            double[] one = [field.Quantile(0.01)], five = [.. new[] { 0.05, 0.02, 0.01, 0.005, 0.001 }.Select(field.Quantile)];
            Engine(work, Relabelings / 10, one);
            var rows = new List<(string What, double[] Ours, double[] Theirs)>
            {
                Pairs("height", repeats, () => Engine(work, Relabelings, []), () => Baseline(baseline, input, "height", [], Relabelings)),
                Pairs("extent at p 0.01, with height", repeats, () => Engine(work, Relabelings, one),
                    () => Baseline(baseline, input, "extent", one.Select(u => R(u, 19)), extentRelabelings)),
                Pairs("TFCE, exact against steps of 0.1, with height", repeats, () => Shares * Engine(work, Relabelings / Shares, [], tfce: true),
                    () => Baseline(baseline, input, "tfce", [], Math.Max(2, extentRelabelings / 25))),
                Pairs("five forming p at once (0.05 to 0.001), against 0.01 alone", repeats, () => Engine(work, Relabelings, five), () => Engine(work, Relabelings, one)),
            };
            var text = new StringBuilder();
            text.AppendLine(CultureInfo.InvariantCulture, $"{Processor()}, {InstructionSets.Best}, {Threads} threads; 20 images × {work.Mask.Count:N0} voxels × {Relabelings:N0} sign flips; medians of {repeats} runs");
            text.AppendLine(CultureInfo.InvariantCulture, $"Baseline: {described} (extents timed on {extentRelabelings:N0} relabelings and scaled, TFCE on {Math.Max(2, extentRelabelings / 25):N0}, ours on {Relabelings / Shares:N0})");
            text.AppendLine().AppendLine("| job | permute, s | compared with, s | ratio (median of pairs) |").AppendLine("|---|---|---|---|");
            foreach (var (what, ours, theirs) in rows)
            {
                double ratio = what.StartsWith("five", StringComparison.Ordinal) ? Median(ours.Zip(theirs, (a, b) => a / b)) : Median(theirs.Zip(ours, (a, b) => a / b));
                text.AppendLine(CultureInfo.InvariantCulture, $"| {what} | {Median(ours):F3} | {Median(theirs):F2} | {ratio:F1} |");
            }
            Console.Write(text);
            File.WriteAllText(report, text.ToString());
        }
        finally
        {
            File.Delete(input);
        }
    }

    private static string described = "";

    private static (string, double[], double[]) Pairs(string what, int repeats, Func<double> ours, Func<double> theirs)
    {
        var (a, b) = (new double[repeats], new double[repeats]);
        for (int i = 0; i < repeats; i++) (a[i], b[i]) = (ours(), theirs());
        return (what, a, b);
    }

    /// <summary>Seconds of the whole loop: packing, tables, maxima, clusters, decisions in double and step-down. The baseline warms itself up on a search for its fastest
    /// form before it counts; here a tenth of the work does.</summary>
    private static double Engine(Work work, int relabelings, double[] forming, bool tfce = false)
    {
        Seconds(work, relabelings / 10, forming, tfce);
        return Seconds(work, relabelings, forming, tfce);
    }

    private static double Seconds(Work work, int relabelings, double[] forming, bool tfce)
    {
        var measures = new Measures { FormingStatistics = forming, Tfce = tfce ? (0.5, 2) : null };
        long start = Stopwatch.GetTimestamp();
        using var loop = new RelabelingLoop(work.Data, work.Mask, work.Model, new RelabelingPlan(work.Model.Relabelings, relabelings, 1), measures, Threads);
        loop.Run();
        return Stopwatch.GetElapsedTime(start).TotalSeconds;
    }

    private static double Baseline(string script, string input, string what, IEnumerable<double> formingR, int relabelings)
    {
        var start = new ProcessStartInfo("/usr/bin/python3") { RedirectStandardOutput = true };
        foreach (string argument in new[] { script, "--data", input, "--what", what, "--relabelings", $"{relabelings}", "--threads", $"{Threads}", "--repeat", "1" })
            start.ArgumentList.Add(argument);
        if (formingR.Any())
        {
            start.ArgumentList.Add("--forming-r");
            start.ArgumentList.Add(string.Join(',', formingR.Select(r => r.ToString("R", CultureInfo.InvariantCulture))));
        }
        using Process process = Process.Start(start)!;
        string output = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        if (process.ExitCode != 0) throw new InvalidOperationException("The baseline failed; it needs Debian's python3-numpy and python3-scipy.");
        using JsonDocument json = JsonDocument.Parse(output.Trim().Split('\n')[^1]);
        JsonElement root = json.RootElement;
        described = $"NumPy {root.GetProperty("numpy")}, SciPy {root.GetProperty("scipy")}, {root.GetProperty("blas")}";
        return root.GetProperty("seconds").EnumerateArray().Min(s => s.GetDouble()) * Relabelings / relabelings;
    }

    /// <summary>The sum of unit-norm data at a one-sample t: √n · t/√(ν + t²).</summary>
    private static double R(double t, int nu) => Math.Sqrt(nu + 1) * t / Math.Sqrt(nu + t * t);

    private static double Median(IEnumerable<double> values)
    {
        double[] sorted = [.. values.Order()];
        return (sorted[(sorted.Length - 1) / 2] + sorted[sorted.Length / 2]) / 2;
    }

    private static string Processor() => File.Exists("/proc/cpuinfo")
        ? File.ReadLines("/proc/cpuinfo").First(l => l.StartsWith("model name", StringComparison.Ordinal)).Split(':')[1].Trim()
        : "unknown processor";
}
