using System.CommandLine.Parsing;
using System.Globalization;

namespace Permute.Cli;

/// <summary>
/// From the words of the command line to values, in the invariant culture. A word that begins with -- is a mistyped option, never a value.
/// </summary>
internal static class Values
{
    public static string? Text(ArgumentResult result) => Words(result) is [var word, ..] ? word : null;

    public static string[] Texts(ArgumentResult result) => Words(result);

    /// <summary>One of <paramref name="choices"/>.</summary>
    public static string Choice(ArgumentResult result, string[] choices)
    {
        if (Words(result) is not [var word, ..]) return choices[0];
        if (!choices.Contains(word)) result.AddError($"{Name(result)} takes {string.Join(", ", choices[..^1])} or {choices[^1]}, but got '{word}'");
        return word;
    }

    public static double? Number(ArgumentResult result) => Numbers(result) is [var number, ..] ? number : null;

    public static double[] Numbers(ArgumentResult result) => Numbers(result, Words(result));

    public static int Whole(ArgumentResult result) => (int)Long(result, int.MinValue, int.MaxValue);

    public static long Long(ArgumentResult result) => Long(result, long.MinValue, long.MaxValue);

    /// <summary>Numbers in one word, separated by commas, exactly <paramref name="count"/> of them.</summary>
    public static Func<ArgumentResult, double[]?> List(int count) => result =>
    {
        if (Words(result) is not [var word]) return null;
        double[] numbers = Numbers(result, word.Split(','));
        if (numbers.Length != count) result.AddError($"{Name(result)} takes {count} numbers separated by commas, but got '{word}'");
        return numbers;
    };

    /// <summary>Two names in one word, separated by a comma.</summary>
    public static string[] Pair(ArgumentResult result)
    {
        if (Words(result) is not [var word]) return [];
        string[] names = word.Split(',', StringSplitOptions.TrimEntries);
        if (names.Length != 2 || names.Contains(""))
            result.AddError($"{Name(result)} takes two levels separated by a comma, such as before,after, but got '{word}'");
        return names;
    }

    private static long Long(ArgumentResult result, long least, long most)
    {
        if (Words(result) is not [var word, ..]) return 0;
        if (!long.TryParse(word, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out long value) || value < least || value > most)
            result.AddError($"{Name(result)} takes a whole number written in digits, but got '{word}'");
        return value;
    }

    private static double[] Numbers(ArgumentResult result, string[] words)
    {
        var numbers = new double[words.Length];
        for (int i = 0; i < words.Length; i++)
        {
            if (double.TryParse(words[i], NumberStyles.Float, CultureInfo.InvariantCulture, out numbers[i])) continue;
            result.AddError($"{Name(result)}: '{words[i]}' is no number; write numbers with a decimal point, such as 0.05");
            break;
        }
        return numbers;
    }

    private static string[] Words(ArgumentResult result)
    {
        string[] words = [.. result.Tokens.Select(t => t.Value)];
        foreach (string word in words.Where(w => w.StartsWith("--", StringComparison.Ordinal)))
        {
            result.AddError($"{word} is no option of this command (it stood where {Name(result)} takes a value; "
                + $"a file of that name can be given as ./{word})");
        }
        return words;
    }

    private static string Name(ArgumentResult result) => result.Parent is OptionResult option ? option.Option.Name : result.Argument.Name;
}
