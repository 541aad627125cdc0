using System.Globalization;
using Permute.Design;
using Permute.Inference;
using Permute.Report;

namespace Permute.Tests.Truth;

/// <summary>Whole runs over a small table that stop when settled.</summary>
public sealed class StoppingRunTests : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory().FullName;

    public void Dispose() => Directory.Delete(folder, true);

    [Fact]
    public void A_run_without_effect_stops_after_its_first_chunk()
    {
        Summary s = Analysis.Test(Request("a", rows: 20)).Summary;
        Assert.Equal((1280, 10_000), (s.Relabelings.Used, s.Relabelings.Planned));
        Assert.True(s.Relabelings.Stop!.Stopped);
        Assert.Equal(new SettledSummary("above alpha", 1280), s.Height.Permutation.Settled);
        Assert.True(s.Height.Permutation.AdjustedP > 0.05);
        Assert.Single(Directory.GetFiles(Path.Combine(folder, "a", "chunks")));
    }

    [Fact]
    public void A_strong_effect_stops_the_run_too_and_survives()
    {
        Summary s = Analysis.Test(Request("a", rows: 20, effect: 2)).Summary;
        Assert.True(s.Relabelings.Stop!.Stopped);
        Assert.Equal("at most alpha", s.Height.Permutation.Settled!.Side);
        Assert.True(s.Height.Permutation.AdjustedP <= 0.05);
    }

    [Fact]
    public void Threads_machines_and_the_order_of_chunks_change_nothing()
    {
        string one = Numbers(Analysis.Test(Request("one", rows: 20) with { Threads = 1 }));
        Assert.Equal(one, Numbers(Analysis.Test(Request("three", rows: 20) with { Threads = 3 })));

        // Another machine has filled every second chunk before the first of all is there: none of them counts.
        string run = Analysis.Prepare(Request("parts", rows: 20));
        Analysis.Work(run, 2, 2, 1);
        Assert.Equal(4, Directory.GetFiles(Path.Combine(run, "chunks")).Length);
        Analysis.Work(run, 1, 2, 1);
        Assert.Equal(5, Directory.GetFiles(Path.Combine(run, "chunks")).Length);
        Assert.Equal(one, Numbers(Analysis.Finish(run)));
    }

    [Fact]
    public void All_chunks_there_already_change_nothing_either()
    {
        string stopped = Numbers(Analysis.Test(Request("a", rows: 20)));
        AnalysisRequest whole = Request("b", rows: 20) with { StopWhenSettled = false };
        Assert.Equal(10_000, Analysis.Test(whole).Summary.Relabelings.Used);
        Assert.Equal(stopped, Numbers(Analysis.Test(whole with { StopWhenSettled = true })));
    }

    [Fact]
    public void A_p_at_alpha_is_never_settled_and_the_run_uses_all()
    {
        AnalysisRequest request = Request("a", rows: 20) with { Relabelings = 3000, StopWhenSettled = false };
        double p = Analysis.Test(request).Summary.Height.Permutation.AdjustedP!.Value;
        Summary s = Analysis.Test(request with { Alpha = p, StopWhenSettled = true }).Summary;
        Assert.Equal(3000, s.Relabelings.Used);
        Assert.False(s.Relabelings.Stop!.Stopped);
        Assert.Equal(new SettledSummary("open", null), s.Height.Permutation.Settled);
        Assert.Contains("do not settle", s.Height.Permutation.Note);
    }

    [Fact]
    public void A_list_of_all_arrangements_that_stops_early_is_a_random_subset()
    {
        // 12 rows have 4,096 sign flips, fewer than asked for.
        Summary stopped = Analysis.Test(Request("a", rows: 12)).Summary, whole = Analysis.Test(Request("b", rows: 12) with { StopWhenSettled = false }).Summary;
        Assert.True(whole.Relabelings.Exhaustive);
        Assert.Equal((1024, 4096, false), (stopped.Relabelings.Used, stopped.Relabelings.Planned, stopped.Relabelings.Exhaustive));
        double[] interval = stopped.Height.Permutation.AdjustedPInterval!;
        Assert.InRange(whole.Height.Permutation.AdjustedP!.Value, interval[0], interval[1]);
    }

    [Fact]
    public void The_tail_of_a_run_stands_in_its_summary_and_is_called_an_approximation()
    {
        var findings = Analysis.Test(Request("a", rows: 20, effect: 2) with { StopWhenSettled = false, ExtrapolateTail = true });
        TailFit tail = findings.Summary.Height.Permutation.Tail!;
        Assert.True(tail.P > 0 || tail.Reason != null);
        ReportWriter.Write(findings, folder);
        var screen = new StringWriter();
        Screen.Write(findings.Summary, screen, 4000);
        foreach (string text in new[] { screen.ToString(), File.ReadAllText(Path.Combine(folder, "report.html")) })
            Assert.Contains("approximation by a generalised Pareto tail", text);
        Assert.Equal(tail, SummaryJson.Read(Path.Combine(folder, "summary.json")).Height.Permutation.Tail);
    }

    private AnalysisRequest Request(string run, int rows, double effect = 0) => new()
    {
        Study = Table(rows, effect),
        Variables = ["cups", "steps", "songs"],
        Relabelings = 10_000,
        Threads = 1,
        StopWhenSettled = true,
        Out = Path.Combine(folder, run),
    };

    private string Table(int rows, double effect)
    {
        string path = Path.Combine(folder, "table.tsv");
        var random = new Philox(11, 0);
        string Number() => (effect + random.Normal()).ToString("R", CultureInfo.InvariantCulture);
        File.WriteAllLines(path, ["cups\tsteps\tsongs", .. Enumerable.Range(0, rows).Select(_ => $"{Number()}\t{Number()}\t{Number()}")]);
        return path;
    }

    private static string Numbers(Findings findings) => SummaryJson.Text(findings.Summary with { Provenance = null });
}
