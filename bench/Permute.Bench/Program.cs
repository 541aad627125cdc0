using BenchmarkDotNet.Configs;
using BenchmarkDotNet.Jobs;
using BenchmarkDotNet.Running;
using Permute.Bench;

// ratios [REPEATS] [EXTENT-RELABELINGS] | growth | tfce [RELABELINGS] | kernels | smoke
string what = args.Length > 0 ? args[0] : "help";
string root = Root();
switch (what)
{
    case "ratios":
        SideBySide.Run(
            args.Length > 1 ? int.Parse(args[1]) : 5, args.Length > 2 ? int.Parse(args[2]) : 500, Path.Combine(root, "bench/baseline/baseline.py"),
            Path.Combine(root, "bench/ratios.md"));
        return 0;
    case "growth":
        Growth.Run();
        return 0;
    case "tfce":
        Enhancement.Run(args.Length > 1 ? int.Parse(args[1]) : 200);
        return 0;
    case "kernels":
        BenchmarkRunner.Run<KernelBenchmarks>();
        return 0;
    case "smoke":
        // Every benchmark once, to see that it runs; the times mean nothing.
        BenchmarkRunner.Run<KernelBenchmarks>(DefaultConfig.Instance.AddJob(Job.Dry));
        return 0;
    default:
        Console.WriteLine("ratios [REPEATS] [EXTENT-RELABELINGS] | growth | tfce [RELABELINGS] | kernels | smoke");
        return 2;
}

static string Root()
{
    for (DirectoryInfo? at = new(AppContext.BaseDirectory); at != null; at = at.Parent)
        if (File.Exists(Path.Combine(at.FullName, "Permute.sln"))) return at.FullName;
    return Directory.GetCurrentDirectory();
}
