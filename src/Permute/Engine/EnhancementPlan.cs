using Permute.Data;

namespace Permute.Engine;

/// <summary>
/// What every enhancement of a run's images shares: where the mask's voxels lie in a lattice cropped to them and padded with empty cells (so that a neighbour is a fixed distance
/// away and needs no bounds), who is whose neighbour, and the powers of sizes and heights.
/// </summary>
internal sealed class EnhancementPlan
{
    private readonly double h;

    /// <summary>A plan for the voxels of <paramref name="mask"/> with exponents <paramref name="e"/> of the extent and <paramref name="h"/> of the height.</summary>
    public EnhancementPlan(Mask mask, Neighbourhood neighbourhood, double e, double h)
    {
        this.h = h;
        var at = mask.Voxels.Select(mask.Grid.Voxel).ToArray();
        int x0 = at.Min(a => a.X), y0 = at.Min(a => a.Y), z0 = at.Min(a => a.Z);
        // One empty cell after every row and one empty row after every slice serve both sides.
        int row = at.Max(a => a.X) - x0 + 2, slice = row * (at.Max(a => a.Y) - y0 + 2), lead = slice + row + 1;
        Cell = [.. at.Select(a => lead + a.X - x0 + row * (a.Y - y0) + slice * (a.Z - z0))];
        Cells = Cell[^1] + lead + 1;
        for (int r = 0; r < 9; r++)
        {
            RowBefore[r] = RowsAround[r].Dy * row + RowsAround[r].Dz * slice - 1;
            for (int x = 0; x < 3; x++) Step[3 * r + x] = RowBefore[r] + x;
        }
        int reach = neighbourhood.Count switch { 6 => 1, 18 => 2, _ => 3 };
        for (int a = 0; a < 27; a++)
        {
            int own = Axes(a, 1);
            if (own >= 1 && own <= reach) Around |= 1u << a;
            for (int b = 0; b < 27; b++)
                if (Axes(a, b) <= reach) Touching[a] |= 1u << b;
        }
        Steps = [.. Enumerable.Range(0, 27).Where(b => (Around >> b & 1) != 0).Select(b => Step[b])];
        SizePower = [.. Enumerable.Range(0, mask.Count + 1).Select(n => Math.Pow(n, e))];
    }

    /// <summary>Cell of each mask position.</summary>
    public int[] Cell { get; }

    /// <summary>Cells of the padded lattice.</summary>
    public int Cells { get; }

    /// <summary>Distance to each of the 27 cells around and including one: nine rows of three, its own row first, then those that share a face with it.</summary>
    public int[] Step { get; } = new int[27];

    /// <summary>Distance to the first of the three cells of each of the nine rows around.</summary>
    public int[] RowBefore { get; } = new int[9];

    /// <summary>Distances to the neighbours.</summary>
    public int[] Steps { get; }

    /// <summary>The neighbours among the 27, as bits.</summary>
    public uint Around { get; }

    /// <summary>For each of the 27, itself and those of the others that are its neighbours.</summary>
    public uint[] Touching { get; } = new uint[27];

    /// <summary>size^E.</summary>
    public double[] SizePower { get; }

    /// <summary>H is 2.</summary>
    public bool IsCubic => h == 2;

    /// <summary>height^(H+1)/(H+1), the integral of h^H up to a height.</summary>
    public double HeightPower(double height) => h == 2 ? height * height * height / 3 : Math.Pow(height, h + 1) / (h + 1);

    /// <summary>
    /// How far an enhanced value may move when no height of the image, up to <paramref name="top"/>, moves by more than <paramref name="shift"/>. Enhancement never falls when heights
    /// rise, and with all raised by a it is V^E a^(H+1)/(H+1) + ∫ e^E (h+a)^H dh at most; by Minkowski's inequality the integral is at most
    /// (M^(1/H) + a (∫ e^E dh)^(1/H))^H, and ∫ e^E dh ≤ V^E top. For H below 1, (h+a)^H ≤ h^H + a^H.
    /// </summary>
    public double Margin(double value, double top, double shift)
    {
        if (!double.IsFinite(value + top + shift)) return double.PositiveInfinity;
        double all = SizePower[^1], length = all * top;
        double raised = h < 1 ? value + Math.Pow(shift, h) * length : Math.Pow(Math.Pow(value, 1 / h) + shift * Math.Pow(length, 1 / h), h);
        return raised - value + all * HeightPower(shift);
    }

    private static readonly (int Dy, int Dz)[] RowsAround = [(0, 0), (-1, 0), (1, 0), (0, -1), (0, 1), (-1, -1), (1, -1), (-1, 1), (1, 1)];

    /// <summary>Along how many axes two of the 27 differ; 4, so never neighbours, when they are two apart on any.</summary>
    private static int Axes(int a, int b)
    {
        int x = Math.Abs(a % 3 - b % 3), y = Math.Abs(RowsAround[a / 3].Dy - RowsAround[b / 3].Dy), z = Math.Abs(RowsAround[a / 3].Dz - RowsAround[b / 3].Dz);
        return x > 1 || y > 1 || z > 1 ? 4 : x + y + z;
    }
}
