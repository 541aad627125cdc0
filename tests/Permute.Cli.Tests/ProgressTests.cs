namespace Permute.Cli.Tests;

public sealed class ProgressTests : IDisposable
{
    private readonly StringWriter writer = new();
    private readonly HandClock clock = new();

    public void Dispose() => writer.Dispose();

    [Fact]
    public void A_line_at_the_start_then_one_every_few_seconds_then_one_at_the_end()
    {
        var progress = new PlainProgress(writer, clock);
        progress.Report(new("relabelings", 0, 10_000));
        for (int second = 1; second <= 10; second++)
        {
            clock.Now += TimeSpan.FromSeconds(1);
            progress.Report(new("relabelings", second * 999.9, 10_000));
        }
        progress.Report(new("relabelings", 10_000, 10_000));

        Assert.Equal(
            [
                "permute: checking the inputs",
                "permute: relabelings 0 of 10,000",
                "permute: relabelings 2,999 of 10,000, 8 s left",
                "permute: relabelings 5,999 of 10,000, 5 s left",
                "permute: relabelings 8,999 of 10,000, 2 s left",
                "permute: relabelings 10,000 of 10,000",
            ],
            Lines());
    }

    [Fact]
    public void Each_stage_speaks_at_once_and_old_news_is_left_out()
    {
        var progress = new PlainProgress(writer, clock);
        progress.Report(new("reading images", 1, 2));
        progress.Report(new("reading images", 2, 2));
        progress.Report(new("reading images", 1, 2));
        progress.Report(new("relabelings", 5, 50));

        Assert.Equal(["checking the inputs", "reading images 1 of 2", "reading images 2 of 2", "relabelings 5 of 50"], Lines().Select(l => l["permute: ".Length..]));
    }

    [Theory]
    [InlineData(0.2, "1 s")]
    [InlineData(40, "40 s")]
    [InlineData(99.4, "100 s")]
    [InlineData(100, "2 min")]
    [InlineData(1800, "30 min")]
    [InlineData(5969, "99 min")]
    [InlineData(5970, "1 h 40 min")]
    [InlineData(12_000, "3 h 20 min")]
    [InlineData(14_390, "4 h 0 min")]
    public void Times_are_said_as_people_say_them(double seconds, string words) => Assert.Equal(words, StageClock.Time(seconds));

    [Theory]
    [InlineData("permute test --images 'a b.nii' --out 'it'\\''s'", "test", "--images", "a b.nii", "--out", "it's")]
    [InlineData("permute test --images '*.nii.gz' ''", "test", "--images", "*.nii.gz", "")]
    [InlineData("permute finish run-1/x_y", "finish", "run-1/x_y")]
    public void Commands_are_quoted_for_a_shell(string command, params string[] args) => Assert.Equal(command, Quoting.Command(args));

    private string[] Lines() => writer.ToString().Split('\n', StringSplitOptions.RemoveEmptyEntries);

    private sealed class HandClock : TimeProvider
    {
        public TimeSpan Now { get; set; }

        public override long GetTimestamp() => Now.Ticks;

        public override long TimestampFrequency => TimeSpan.TicksPerSecond;
    }
}
