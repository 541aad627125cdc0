namespace Permute.Cli;

/// <summary>Commands as one would type them.</summary>
internal static class Quoting
{
    /// <summary>"permute" and its arguments, quoted for a POSIX shell where they need it.</summary>
    public static string Command(IEnumerable<string> args) => string.Join(' ', args.Select(Word).Prepend("permute"));

    private static string Word(string word) =>
        word.Length > 0 && word.All(c => char.IsAsciiLetterOrDigit(c) || "-_./,:=+%@".Contains(c)) ? word : $"'{word.Replace("'", "'\\''")}'";
}
