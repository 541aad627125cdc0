namespace Permute.Design;

/// <summary>How many images a design needs before any result can reach α.</summary>
public static class Reachability
{
    /// <summary>The smallest number of images (shared between groups as now) whose smallest attainable p is at most <paramref name="alpha"/>.</summary>
    public static int ImagesNeeded(Model model, double alpha)
    {
        for (int n = model.Images; ; n++)
        {
            IRelabelings family = n == model.Images ? model.Relabelings : model.Relabelings.Grown(n);
            if ((double)family.Ties(model.Direction) <= alpha * (double)family.Possible) return n;
        }
    }
}
