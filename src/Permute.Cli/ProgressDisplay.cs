namespace Permute.Cli;

/// <summary>Chooses how progress is shown: a live bar on a terminal, plain lines anywhere else.</summary>
internal static class ProgressDisplay
{
    /// <summary>Does <paramref name="work"/> and shows how far it has come on standard error.</summary>
    public static T While<T>(Session session, Func<IProgress<AnalysisProgress>, T> work)
    {
        // The terminal library takes its time to load, so only the live display touches it.
        if (ReferenceEquals(session.Error, Console.Error) && !Console.IsErrorRedirected
            && Environment.GetEnvironmentVariable("TERM") is not (null or "" or "dumb"))
            return LiveProgress.While(work);
        return work(new PlainProgress(session.Error, TimeProvider.System));
    }
}
