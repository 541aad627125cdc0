using System.CommandLine;
using System.CommandLine.Parsing;

namespace Permute.Cli;

/// <summary>Options of each kind of value, and those that several verbs share.</summary>
internal static class Opt
{
    public static Option<string?> Text(string name, string value, string description) => One(name, value, description, Values.Text);

    public static Option<string[]> Texts(string name, string value, string description) => Many(name, value, description, Values.Texts);

    public static Option<double?> Number(string name, string value, string description) => One(name, value, description, Values.Number);

    public static Option<double[]> Numbers(string name, string value, string description) => Many(name, value, description, Values.Numbers);

    public static Option<double[]?> List(string name, string value, int count, string description) =>
        One(name, value, description, Values.List(count));

    public static Option<int> Whole(string name, string value, string description, int standard)
    {
        Option<int> option = One(name, value, description, Values.Whole);
        option.DefaultValueFactory = _ => standard;
        return option;
    }

    public static Option<bool> Flag(string name, string description) => new(name) { Description = description };

    public static Option<T> One<T>(string name, string value, string description, Func<ArgumentResult, T> parse) =>
        new(name) { HelpName = value, Description = description, CustomParser = parse!, Arity = ArgumentArity.ExactlyOne };

    public static Option<string> Choice(string name, string standard, string description, params string[] choices)
    {
        Option<string> option = One(name, string.Join('/', choices), description, r => Values.Choice(r, choices));
        option.DefaultValueFactory = _ => standard;
        return option;
    }

    public static Option<int> Threads()
    {
        Option<int> option = One("--threads", "N", "Threads to use; default: all processors.", Values.Whole);
        option.Validators.Add(r =>
        {
            if (r.Tokens is [var word] && int.TryParse(word.Value, out int n) && n < 1) r.AddError($"--threads must be at least 1, but was {n}");
        });
        return option;
    }

    public static Option<bool> Json() => Flag("--json", "Print summary.json on standard output instead of the tables.");

    public static Option<string> Direction() => Choice(
        "--direction", "both", "Which departures count: greater, less, or both (signs kept apart).", "greater", "less", "both");

    public static Option<double?> Alpha() => Number("--alpha", "A", "Family-wise error rate, between 0 and 1; default 0.05.");

    public static Option<double[]> FormingP() => Numbers(
        "--forming-p", "P", "Cluster-forming thresholds as p of the test made (direction both: two-sided); default 0.01 0.001.");

    public static Option<double[]> FormingValue() => Numbers("--forming-value", "U", "Cluster-forming thresholds as values of the statistic.");

    private static Option<T[]> Many<T>(string name, string value, string description, Func<ArgumentResult, T[]> parse)
    {
        Option<T[]> option = One(name, $"{value}…", description, parse);
        option.Arity = ArgumentArity.OneOrMore;
        option.AllowMultipleArgumentsPerToken = true;
        option.DefaultValueFactory = _ => [];
        return option;
    }
}
