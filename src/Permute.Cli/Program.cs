using Permute.Cli;

using var stop = new StopSignals();
return await CommandLine.RunAsync(args, Console.Out, Console.Error, stop.Token);
