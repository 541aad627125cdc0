namespace Permute.Cli.Demo;

/// <summary>The page beside the made-up study that says what it is.</summary>
internal static class DemoReadme
{
    public static string Text(string command) =>
        $"""
        # A made-up study: {TeaTasters.Tasters} tea tasters before and after a tasting course

        Nothing here was measured. The tasters, the course and the images are made up by `permute demo`, from a seeded generator, so that the whole
        job can be tried without a download. Use it for nothing else: these are no data about anyone, and a research statistic is not for the
        diagnosis or care of a person in any case.

        ## What is here
        - `taster-NN_after-minus-before.nii.gz`: one image a taster, the difference after the course minus before it; {TeaTasters.Grid.Nx} × {TeaTasters.Grid.Ny} × {TeaTasters.Grid.Nz} voxels of 4 mm.
          Outside the head, an ellipsoid, all values are exactly 0.
        - `study.tsv`: one row a taster, with the path of the image and a made-up number of cups a day.

        ## How it was made
        - Noise: Gaussian, of variance 1, the sum of a fine part ({TeaTasters.Noise[0].Share:P0} of the variance, smoothed with a FWHM of {TeaTasters.Noise[0].Fwhm} voxels) and a far-reaching part
          ({TeaTasters.Noise[1].Share:P0}, FWHM {TeaTasters.Noise[1].Fwhm} voxels). Together they look about 2.5 to 3 voxels smooth from one voxel to the next, but
          stay correlated over longer distances than random field theory assumes. That is common in real images, and it is where thresholds for the
          extent of clusters by theory go wrong, above all at a low forming threshold.
        - Effect: a bump with its top at voxel ({TeaTasters.Trace.X}, {TeaTasters.Trace.Y}, {TeaTasters.Trace.Z}), zero-based; {TeaTasters.TraceHeight} standard deviations high, with a FWHM of {TeaTasters.TraceWidth} voxels.
          Nothing else differs from 0 in truth, so whatever is found elsewhere is a false alarm.
        - Seed {TeaTasters.Seed}, chosen among fourteen because in this one study the theory's rule for extents raises such false alarms. How often it would
          is not read off one study: that is the empirical FWER in the report.

        ## How it was analysed
        ```
        {command}
        ```
        All 2^{TeaTasters.Tasters} sign flips are made, so the permutation p-values carry no Monte Carlo error. Look in the report at the forming threshold p 0.05: how
        often the theory's rule for extents raises a false alarm (its empirical FWER), and how the permutation threshold differs.

        """;
}
