using Permute.Nifti;

namespace Permute.Cli;

/// <summary>The one place where an exception becomes words and an exit code.</summary>
internal static class Faults
{
    /// <summary>Says what went wrong, on standard error, and returns the exit code.</summary>
    public static int Tell(Exception fault, Session session)
    {
        if (fault is AggregateException { InnerExceptions: [var only] }) return Tell(only, session);
        if (Environment.GetEnvironmentVariable("PERMUTE_TRACE") == "1") session.Error.WriteLine(fault);
        switch (fault)
        {
            case OperationCanceledException:
                session.Say(Kept(session.RunFolder));
                return ExitCode.Stopped;
            case InputException or NiftiException:
                foreach (string line in fault.Message.Split('\n')) session.Say(line);
                return ExitCode.UnusableInput;
            case IOException or UnauthorizedAccessException:
                session.Say($"reading or writing failed: {OneLine(fault)}; check that the disk has room and that the folder may be written.");
                return ExitCode.UnusableInput;
            case OutOfMemoryException:
                session.Say("the memory does not suffice; give a smaller --mask or fewer --threads (permute preview says how much is needed).");
                return ExitCode.UnusableInput;
            default:
                session.Say($"a fault of ours ({fault.GetType().Name}: {OneLine(fault)}); "
                    + "please report it with your command, and with what PERMUTE_TRACE=1 adds.");
                return ExitCode.OurFault;
        }
    }

    private static string Kept(string? run) => run != null && Directory.Exists(Path.Combine(run, "chunks"))
        ? $"stopped; the chunks done are kept in {run}: the same command resumes, `{Quoting.Command(["finish", run])}` reports what is there."
        : "stopped before anything was computed.";

    private static string OneLine(Exception fault) => fault.Message.ReplaceLineEndings(" ").TrimEnd('.', ' ');
}
