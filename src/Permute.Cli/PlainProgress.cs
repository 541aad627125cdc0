namespace Permute.Cli;

/// <summary>Progress as lines of text: one at the start, one at each new stage, one every few seconds, one when a stage is done.</summary>
internal sealed class PlainProgress : IProgress<AnalysisProgress>
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(3);
    private readonly TextWriter writer;
    private readonly TimeProvider clock;
    private readonly Lock gate = new();
    private StageClock stage;
    private long spoken;
    private double said;

    public PlainProgress(TextWriter writer, TimeProvider clock)
    {
        (this.writer, this.clock) = (writer, clock);
        stage = new StageClock("", clock);
        Say("checking the inputs");
    }

    public void Report(AnalysisProgress value)
    {
        lock (gate)
        {
            if (value.Caution != null)
            {
                Say($"caution: {value.Caution}");
                return;
            }
            bool fresh = value.Stage != stage.Name;
            if (fresh) (stage, said) = (new StageClock(value.Stage, clock), 0);
            // Threads report as they come: what is older than the last line is old news.
            if (value.Done <= said && !fresh) return;
            if (!fresh && value.Done < value.Total && clock.GetElapsedTime(spoken) < Pause) return;
            said = value.Done;
            Say(stage.Words(value));
        }
    }

    private void Say(string line)
    {
        spoken = clock.GetTimestamp();
        writer.WriteLine($"permute: {line}");
        writer.Flush();
    }
}
