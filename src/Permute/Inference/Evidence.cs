using Permute.Design;

namespace Permute.Inference;

/// <summary>How a signed T counts as evidence: T, −T or |T| as the direction asks. Critical values and maxima are in these units; maps keep the signed T.</summary>
public static class Evidence
{
    /// <summary>The evidence of a signed T.</summary>
    public static double Of(Direction direction, double t) => direction switch
    {
        Direction.Greater => t,
        Direction.Less => -t,
        _ => Math.Abs(t),
    };

    /// <summary>s: the tails in which evidence is looked for, 2 in direction both, else 1.</summary>
    public static int Sides(Direction direction) => direction == Direction.Both ? 2 : 1;

    /// <summary>The evidence of every voxel.</summary>
    public static double[] Of(Direction direction, double[] t) => [.. t.Select(v => Of(direction, v))];

    /// <summary>Sign of a T: +1 or −1, +1 for zero.</summary>
    public static int Sign(double t) => t < 0 ? -1 : 1;
}
