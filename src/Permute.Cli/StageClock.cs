using System.Globalization;

namespace Permute.Cli;

/// <summary>A stage of the work since it began: how far it has come, in words, and the time it still needs at the rate so far.</summary>
internal sealed class StageClock(string name, TimeProvider clock)
{
    private readonly long start = clock.GetTimestamp();
    private double first = double.NaN;

    public string Name { get; } = name;

    /// <summary>"relabelings 1,200 of 10,000, 40 s left".</summary>
    public string Words(AnalysisProgress p)
    {
        if (double.IsNaN(first)) first = p.Done;
        string line = string.Create(CultureInfo.InvariantCulture, $"{p.Stage} {Math.Floor(p.Done):N0} of {p.Total:N0}");
        double elapsed = clock.GetElapsedTime(start).TotalSeconds;
        return p.Done > first && p.Done < p.Total && elapsed > 0.5 ? $"{line}, {Time(elapsed * (p.Total - p.Done) / (p.Done - first))} left" : line;
    }

    /// <summary>A time as one would say it: 40 s, 12 min, 3 h 20 min.</summary>
    internal static string Time(double seconds) => seconds switch
    {
        < 99.5 => $"{Math.Ceiling(seconds):0} s",
        < 5970 => $"{Math.Round(seconds / 60):0} min",
        _ => $"{Math.Floor(Math.Round(seconds / 60) / 60):0} h {Math.Round(seconds / 60) % 60:0} min",
    };
}
