using System.Diagnostics;

namespace Permute.Cli.Tests;

/// <summary>The program, called as a function or as a process of its own.</summary>
internal static class Cli
{
    public sealed record Result(int Code, string Out, string Err)
    {
        public string[] Complaints => Err.Split('\n', StringSplitOptions.RemoveEmptyEntries);
    }

    public static Task<Result> Run(params string[] args) => Run(CancellationToken.None, args);

    public static async Task<Result> Run(CancellationToken cancel, params string[] args)
    {
        StringWriter output = new(), error = new();
        int code = await CommandLine.RunAsync(args, output, TextWriter.Synchronized(error), cancel);
        return new Result(code, output.ToString(), error.ToString());
    }

    public static Process Start(string folder, params string[] args)
    {
        var start = new ProcessStartInfo("dotnet")
        {
            WorkingDirectory = folder,
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        foreach (string arg in args.Prepend(typeof(CommandLine).Assembly.Location)) start.ArgumentList.Add(arg);
        return Process.Start(start)!;
    }

    public static async Task<Result> End(Process process)
    {
        Task<string> output = process.StandardOutput.ReadToEndAsync(), error = process.StandardError.ReadToEndAsync();
        await process.WaitForExitAsync();
        return new Result(process.ExitCode, await output, await error);
    }
}
