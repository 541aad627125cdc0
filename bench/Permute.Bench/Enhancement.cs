using System.Diagnostics;
using Permute.Design;
using Permute.Engine;

namespace Permute.Bench;

/// <summary>What threshold-free cluster enhancement costs on one thread, by direction and neighbourhood, in processor time per relabeling.</summary>
internal static class Enhancement
{
    /// <summary>Writes the table for this many relabelings.</summary>
    public static void Run(int relabelings)
    {
        using var work = new Work(20, 200_000);
        Console.WriteLine("| direction | neighbours | processor ms per relabeling |\n|---|---|---|");
        foreach (Direction direction in new[] { Direction.Greater, Direction.Both })
            foreach (int neighbours in new[] { 6, 18, 26 })
            {
                double per = Math.Min(Time(work, relabelings, direction, neighbours), Time(work, relabelings, direction, neighbours));
                Console.WriteLine($"| {direction} | {neighbours} | {per:F2} |");
            }
    }

    /// <summary>What more relabelings cost, so that what is done once does not count.</summary>
    private static double Time(Work work, int relabelings, Direction direction, int neighbours) =>
        (Whole(work, 20 + relabelings, direction, neighbours) - Whole(work, 20, direction, neighbours)) / relabelings;

    private static double Whole(Work work, int relabelings, Direction direction, int neighbours)
    {
        Model model = Questions.Mean(work.Data.Images, direction);
        var measures = new Measures { Neighbourhood = Neighbourhood.Of(neighbours), Tfce = (0.5, 2) };
        using var loop = new RelabelingLoop(work.Data, work.Mask, model, new RelabelingPlan(model.Relabelings, relabelings, 1), measures, 1);
        TimeSpan start = Process.GetCurrentProcess().TotalProcessorTime;
        loop.Run();
        return (Process.GetCurrentProcess().TotalProcessorTime - start).TotalMilliseconds;
    }
}
