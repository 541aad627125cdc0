using Permute.Design;
using Permute.Engine;
using Permute.Tests.Engine;

namespace Permute.Tests.Truth;

/// <summary>False positive rates of single tests with three random covariates, on null data with fixed seeds: too many on few images by sign flips, as the report warns, and near
/// 0.05 on more.</summary>
public class FreedmanLaneTests(Xunit.Abstractions.ITestOutputHelper output)
{
    [Theory]
    [InlineData(8, true, 0.085, 0.12)]
    [InlineData(16, true, 0.04, 0.07)]
    [InlineData(16, false, 0.04, 0.07)]
    [InlineData(24, true, 0.04, 0.07)]
    public void The_false_positive_rate_is_as_expected(int images, bool flips, double least, double most)
    {
        const int Designs = 20, Tests = 300;
        int significant = 0;
        for (int d = 0; d < Designs; d++)
        {
            double[][] c = Made.Rows(4, images, 400 + d);
            double[][] centred = [.. c[..3].Select(column => column.Select(v => v - column.Average()).ToArray())];
            Model model = flips
                ? Questions.Linear([Questions.Ones(images)], centred, Direction.Both, "mean", flips: true)
                : Questions.Linear([c[3]], [Questions.Ones(images), .. centred], Direction.Both, "slope");
            RunResult run = Made.Run(Made.Rows(images, Tests, 900 + d), model, relabelings: 400, uncorrected: true, stepDown: 0);
            significant += run.Uncorrected!.Count(count => count <= 0.05 * run.Maxima.Count);
        }
        double rate = significant / (double)(Designs * Tests);
        output.WriteLine($"{images} images, {(flips ? "flips" : "permutations")}: {rate:F4}");
        Assert.InRange(rate, least, most);
    }
}
