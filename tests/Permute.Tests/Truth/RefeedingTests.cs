using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Statistics;
using Permute.Tests.Engine;

namespace Permute.Tests.Truth;

/// <summary>
/// The exact property of a relabeling test, without simulation: with all arrangements listed, each relabeling of the data fed back in as the data finds the same list of
/// maxima, and so no more than ⌊αN⌋ of them reach p ≤ α.
/// </summary>
public class RefeedingTests
{
    public static TheoryData<string, Direction> Designs()
    {
        var all = new TheoryData<string, Direction>();
        foreach (string design in new[] { "mean of 6", "3 against 3", "2 against 4", "4 pairs", "blocks of 3 and 4", "slope", "slope in blocks" })
            foreach (Direction d in Enum.GetValues<Direction>()) all.Add(design, d);
        foreach (string design in new[] { "F of 3 groups", "F in blocks", "F of a mean" }) all.Add(design, Direction.Greater);
        return all;
    }

    [Theory]
    [MemberData(nameof(Designs))]
    public void Every_relabeling_of_the_data_finds_the_same_maxima(string design, Direction direction)
    {
        Model model = Make(design, direction);
        Mask mask = Made.Mask(5, 4, 3);
        double[][] rows = Made.SmoothRows(model.Images, mask, 12);
        var plan = new RelabelingPlan(model.Relabelings, int.MaxValue, 3);
        RunResult observed = Run(rows, model, mask);
        var p = new List<double[]>();
        for (int k = 0; k < plan.Count; k++)
        {
            RunResult again = Run(Relabel(rows, plan, k), model, mask);
            Assert.Equal(plan.Count, again.Maxima.Count);
            Same(observed.Maxima.Height, again.Maxima.Height);
            Assert.Equal(observed.Maxima.Clusters[0].Extent.Order(), again.Maxima.Clusters[0].Extent.Order());
            Same(observed.Maxima.Clusters[0].Mass!, again.Maxima.Clusters[0].Mass!);
            // Enhanced values come from single precision unless near the observed one; with six images that is some 1e-4.
            Same(observed.Maxima.Tfce!, again.Maxima.Tfce!, 1e-3);
            p.Add([P(again.Maxima.Height), P([.. again.Maxima.Clusters[0].Extent.Select(e => (double)e)]), P(again.Maxima.Clusters[0].Mass!), P(again.Maxima.Tfce!)]);
        }
        foreach (double alpha in new[] { 0.05, 0.1, 0.25, 0.5 })
            for (int measure = 0; measure < 4; measure++)
                Assert.True(p.Count(x => x[measure] <= alpha) <= Math.Floor(alpha * plan.Count + 1e-9), $"{design}, measure {measure}, alpha {alpha}");
    }

    private static Model Make(string design, Direction direction) => design switch
    {
        "mean of 6" => Questions.Mean(6, direction),
        "3 against 3" => Made.Halves(6, direction),
        "2 against 4" => Questions.TwoGroups([true, false, false, true, false, false], direction),
        "4 pairs" => Made.Halves(8, direction, pairs: true),
        "slope" => Questions.Linear([[1, 2, 3, 5, 9]], [Questions.Ones(5)], direction, "x"),
        "slope in blocks" => Questions.Linear([[1, 2, 4, 7, 7, 1, 3]], Questions.Indicators([0, 0, 0, 0, 1, 1, 1]), direction, "x", [0, 0, 0, 0, 1, 1, 1]),
        "F of 3 groups" => Questions.Linear(Questions.Indicators([0, 1, 2, 2, 1, 0])[1..], [Questions.Ones(6)], direction, "g"),
        "F in blocks" => Questions.Linear(
            Questions.Indicators([0, 1, 2, 2, 1, 0, 1])[1..], Questions.Indicators([0, 0, 0, 1, 1, 1, 1]), direction, "g", [0, 0, 0, 1, 1, 1, 1]),
        "F of a mean" => Questions.Linear([Questions.Ones(6)], [], direction, "mean", flips: true, statistic: "f"),
        _ => Questions.TwoGroups([true, false, false, true, true, false, false], direction, blockOf: [0, 0, 0, 1, 1, 1, 1]),
    };

    private static RunResult Run(double[][] rows, Model model, Mask mask) =>
        Made.Run(rows, model, mask, int.MaxValue, [1.1], mass: true, threads: 1, tfce: (0.5, 2));

    private static double[][] Relabel(double[][] rows, RelabelingPlan plan, int k)
    {
        var (order, sign) = (new int[rows.Length], new sbyte[rows.Length]);
        plan.Arrange(k, order, sign);
        var moved = new double[rows.Length][];
        for (int i = 0; i < rows.Length; i++) moved[order[i]] = [.. rows[i].Select(y => sign[i] * y)];
        return moved;
    }

    private static double P(double[] maxima) => maxima.Count(m => Ties.Reaches(m, maxima[0])) / (double)maxima.Length;

    private static void Same(double[] a, double[] b, double relative = 1e-9)
    {
        foreach (var (x, y) in a.Order().Zip(b.Order())) Assert.Equal(x, y, relative * Math.Max(1, Math.Abs(x)));
    }
}
