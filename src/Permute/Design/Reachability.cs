namespace Permute.Design;

/// <summary>How many images a design needs before any result can reach α.</summary>
public static class Reachability
{
    /// <summary>The smallest number of images (shared between groups as now) whose smallest attainable p is at most <paramref name="alpha"/>.</summary>
    public static int ImagesNeeded(Model model, double alpha)
    {
        for (int n = model.Images; ; n++)
        {
            IRelabelings family = Grown(model, n);
            if ((double)family.Ties(model.Direction) <= alpha * (double)family.Possible) return n;
        }
    }

    private static IRelabelings Grown(Model model, int images)
    {
        if (model.Groups.Count == 0) return new SignFlips(images);
        int first = (int)Math.Round((double)images * model.Groups[0].Images / model.Images);
        bool[] inFirst = [.. Enumerable.Range(0, images).Select(i => i < first)];
        if (model.Relabelings is not GroupSwaps { InBlocks: true }) return new GroupSwaps(inFirst);
        // Blocks that allow an exchange grow in number: as many pairs as fit.
        return new GroupSwaps([.. Enumerable.Range(0, images).Select(i => i % 2 == 0)], [.. Enumerable.Range(0, images).Select(i => i / 2)]);
    }
}
