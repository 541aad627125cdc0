namespace Permute.Cli;

/// <summary>What the process ends with.</summary>
public static class ExitCode
{
    /// <summary>Done.</summary>
    public const int Done = 0;

    /// <summary>A fault of ours.</summary>
    public const int OurFault = 1;

    /// <summary>The command line is wrong.</summary>
    public const int WrongCommandLine = 2;

    /// <summary>What was given cannot be used, or what was asked for cannot be written.</summary>
    public const int UnusableInput = 3;

    /// <summary>Stopped by the user; the run can be resumed.</summary>
    public const int Stopped = 4;
}
