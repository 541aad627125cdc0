using System.Globalization;
using MathNet.Numerics.LinearAlgebra;
using Permute.Data;

namespace Permute.Design;

/// <summary>
/// Any design matrix and contrast, as given. A contrast C splits the model Xβ into the part that is tested, X C⁺ with the coefficients Cβ, and the nuisance X N with N a basis
/// of what C does not see (Cβ = 0).
/// </summary>
internal static class MatrixReader
{
    public static DesignChoice Read(AnalysisRequest request, StudyTable? table, IReadOnlyList<int> readable)
    {
        StudyTable design = StudyTableReader.Read(request.Design!), contrast = StudyTableReader.Read(request.Contrast!);
        string[] names = [.. design.Columns];
        double[][] columns = [.. names.Select(n => StudyColumns.Numbers(design, n))];
        if (design.Cells.Count != readable.Count)
            throw new InputException($"{design.Path}: the design has {design.Cells.Count} rows, expected {readable.Count}, one per image in the order of the images.");
        ThrowIfDeficient(design.Path, names, columns);
        double[][] weights = Weights(contrast, design);
        string? statistic = weights.Length > 1 ? "f" : request.Statistic;
        if (weights.Length > 1 && request.Statistic == "t")
            throw new InputException($"{contrast.Path}: {weights.Length} rows are tested together by an F, and --statistic t takes a contrast of one row.");
        DesignRows.ThrowIfDirected(request with { Statistic = statistic });

        int n = readable.Count, p = names.Length, m = weights.Length;
        Matrix<double> x = Matrix<double>.Build.DenseOfColumnArrays(columns), c = Matrix<double>.Build.DenseOfRowArrays(weights);
        double[][] unseen = [.. new ColumnSpace(p, [.. weights, .. Enumerable.Range(0, p).Select(k => Unit(p, k))]).Basis.Skip(m)];
        double[][] tested = (x * c.Transpose() * (c * c.Transpose()).Inverse()).ToColumnArrays(), nuisance = [.. unseen.Select(u => (x * Vector<double>.Build.Dense(u)).ToArray())];
        if (p >= n) throw new InputException($"{design.Path}: {p} columns for {n} images leave no degrees of freedom; more images or fewer columns are needed.");

        double[] ones = Questions.Ones(n);
        bool flips = new ColumnSpace(n, [.. nuisance, .. tested]).Holds(ones) && !new ColumnSpace(n, nuisance).Holds(ones);
        if (flips && request.ExchangeInside != null)
            throw new InputException("--exchange-inside means nothing here: the contrast tests a mean by sign flips, which move no image from its place; leave it out.");
        if (request.ExchangeInside != null && table == null)
            throw new InputException($"--exchange-inside {request.ExchangeInside} names a column, but there is no table; give one with --study.");
        var cautions = new List<string>();
        int[]? blockOf = table == null ? null
            : DesignRows.Blocks(request, table, readable, [.. Enumerable.Range(0, n).Select(i => string.Join(' ', tested.Select(t => t[i].ToString("R", CultureInfo.InvariantCulture))))], cautions);
        Model model = Questions.Linear(tested, nuisance, request.Direction, Describe(weights, names), blockOf, flips, statistic);
        return new DesignChoice(model with { Notes = cautions }, [.. readable], cautions);
    }

    private static double[][] Weights(StudyTable contrast, StudyTable design)
    {
        string[] missing = [.. design.Columns.Except(contrast.Columns)], unknown = [.. contrast.Columns.Except(design.Columns)];
        if (missing.Length + unknown.Length > 0)
            throw new InputException($"{contrast.Path}: the contrast has {contrast.Columns.Count} columns, expected a weight for each of the {design.Columns.Count} columns of {design.Path}: "
                + string.Join(" and ", new[] { missing.Length > 0 ? $"missing {Wording.List(Quoted(missing))}" : "", unknown.Length > 0 ? $"unknown {Wording.List(Quoted(unknown))}" : "" }.Where(s => s != ""))
                + "; its header names the columns, in any order.");
        double[][] byColumn = [.. design.Columns.Select(name => StudyColumns.Numbers(contrast, name))];
        double[][] weights = [.. Enumerable.Range(0, contrast.Cells.Count).Select(r => byColumn.Select(w => w[r]).ToArray())];
        for (int r = 0; r < weights.Length; r++)
            if (weights[r].All(w => w == 0)) throw new InputException($"{contrast.Path}, line {contrast.Lines[r]}: all weights are 0, so nothing is tested; give at least one column a weight.");
        if (new ColumnSpace(design.Columns.Count, weights).Redundant is [int again, ..])
            throw new InputException($"{contrast.Path}, line {contrast.Lines[again]}: this row can be computed from the rows before it and tests nothing further; leave it out.");
        return weights;
    }

    private static void ThrowIfDeficient(string path, string[] names, double[][] columns)
    {
        int n = columns[0].Length;
        if (new ColumnSpace(n, columns).Redundant is not [int guilty, ..] || guilty >= n) return;
        if (columns[guilty].All(v => v == 0)) throw new InputException($"{path}: column '{names[guilty]}' is 0 in every row; leave it out.");
        // What is left when every column that is not needed to make up the guilty one is gone.
        List<int> parts = [.. Enumerable.Range(0, guilty)];
        foreach (int one in parts.ToArray())
            if (new ColumnSpace(n, parts.Where(i => i != one).Select(i => columns[i])).Holds(columns[guilty])) parts.Remove(one);
        throw new InputException($"{path}: column '{names[guilty]}' can be computed from {Wording.List(Quoted([.. parts.Select(i => names[i])]), 10)}, so the model cannot tell them apart; leave one of them out.");
    }

    private static string Describe(double[][] weights, string[] names)
    {
        string Row(double[] w) => string.Join(", ", names.Zip(w).Where(x => x.Second != 0).Select(x => string.Create(CultureInfo.InvariantCulture, $"{x.Second} × {x.First}")));
        return $"contrast of {string.Join("; ", weights.Select(Row))}";
    }

    private static string[] Quoted(IReadOnlyList<string> names) => [.. names.Select(n => $"'{n}'")];

    private static double[] Unit(int length, int at)
    {
        var unit = new double[length];
        unit[at] = 1;
        return unit;
    }
}
