using Spectre.Console;

namespace Permute.Cli;

/// <summary>Progress as a bar that redraws itself on a terminal, and is gone when the work is done.</summary>
internal sealed class LiveProgress : IProgress<AnalysisProgress>
{
    private readonly ProgressContext context;
    private readonly Lock gate = new();
    private StageClock stage = new("", TimeProvider.System);
    private ProgressTask task;

    private readonly IAnsiConsole console;

    private LiveProgress(IAnsiConsole console, ProgressContext context) =>
        (this.console, this.context, task) = (console, context, context.AddTask("checking the inputs").IsIndeterminate());

    public static T While<T>(Func<IProgress<AnalysisProgress>, T> work)
    {
        IAnsiConsole console = AnsiConsole.Create(new AnsiConsoleSettings { Out = new AnsiConsoleOutput(Console.Error) });
        return console.Progress().AutoClear(true)
            .Columns(new TaskDescriptionColumn { Alignment = Justify.Left }, new ProgressBarColumn(), new SpinnerColumn())
            .Start(context => work(new LiveProgress(console, context)));
    }

    public void Report(AnalysisProgress value)
    {
        lock (gate)
        {
            if (value.Caution != null)
            {
                console.WriteLine($"permute: caution: {value.Caution}");
                return;
            }
            if (value.Stage != stage.Name)
            {
                stage = new StageClock(value.Stage, TimeProvider.System);
                task.StopTask();
                task = context.AddTask(Markup.Escape(value.Stage), maxValue: value.Total);
            }
            if (value.Done < task.Value) return;
            task.Value = value.Done;
            task.Description = Markup.Escape(stage.Words(value));
        }
    }
}
