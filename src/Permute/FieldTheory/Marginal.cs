using Permute.Design;

namespace Permute.FieldTheory;

/// <summary>The field that a model's statistic forms under the null hypothesis and normal errors.</summary>
internal static class Marginal
{
    /// <summary>t(ν) or F(k, ν).</summary>
    public static Field Of(Model model) => model.Statistic == "f" ? new FField(model.Regressors.Count, model.DegreesOfFreedom) : new TField(model.DegreesOfFreedom);
}
