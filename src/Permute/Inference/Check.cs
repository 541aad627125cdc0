namespace Permute.Inference;

/// <summary>How a check is put into words and a level.</summary>
internal static class Check
{
    public const string Good = "good", Caution = "caution", Warning = "warning";

    /// <summary>The source named where a limit is nobody's but this program's.</summary>
    public const string OurLimit = "the limit is this program's own";

    public static CheckSummary Of(string code, string level, double? measured, double? limit, string source, string message) =>
        new() { Code = code, Level = level, Measured = measured, Limit = limit, Source = source, Message = message };
}
