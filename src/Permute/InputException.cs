namespace Permute;

/// <summary>
/// What the user gave cannot be used. The message is one clear sentence or several, one a line: what, which file or column, what was
/// found, what was expected, what to do. The command line prints it and ends with exit code 3.
/// </summary>
public sealed class InputException : Exception
{
    /// <summary>An unusable input, described in <paramref name="message"/>.</summary>
    public InputException(string message) : base(message) { }

    /// <summary>An unusable input, described in <paramref name="message"/>, found through another error.</summary>
    public InputException(string message, Exception inner) : base(message, inner) { }

    /// <summary>Throws all <paramref name="faults"/> in one go, one a line, or returns when there are none.</summary>
    public static void ThrowIfAny(IReadOnlyCollection<string> faults)
    {
        if (faults.Count > 0) throw new InputException(string.Join('\n', faults));
    }
}
