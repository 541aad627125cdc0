using Permute.Inference;

namespace Permute.Report;

public static partial class HtmlReport
{
    private static void Lists(HtmlPage page, Summary s)
    {
        string P(double? p) => Show.P(p, s.Alpha);
        Func<string[], bool> survives = row => row[^1] != "none";
        if (s.Clusters.Count > 0)
        {
            page.Heading(2, "Clusters").Table(
                ["cluster", "formed at", "sign", "#voxels", "#mass", "#highest", "at, mm", "#permutation p", "#field theory p", .. s.Mass.Count > 0 ? ["#mass p"] : Array.Empty<string>(), "survives"],
                Capped(s.Clusters.Select(c => (string[])
                [
                    $"{c.Id}", Words.FormingShort(Finding.FormingP(s, c), c.FormingStatistic), c.Sign < 0 ? "-" : "+", Show.Count(c.Voxels), Show.Value(c.Mass), Show.Signed(c.Peak),
                    Show.Place(c.PeakMm), P(c.AdjustedP.Permutation), P(c.AdjustedP.FieldTheory), .. s.Mass.Count > 0 ? [P(c.AdjustedP.Mass)] : Array.Empty<string>(), Finding.Of(s, c).SurvivesBy,
                ])), survives);
            More(page, s.Clusters.Count, "clusters.tsv");
        }
        if (s.Peaks.Count > 0)
        {
            page.Heading(2, "Peaks").Table(["at, mm", "voxel", "#value", "in clusters", "#permutation p", "#step-down p", "#field theory p", "#Bonferroni p", "survives"],
                Capped(s.Peaks.Select(p => (string[])
                [
                    Show.Place(p.Mm), string.Join(", ", p.Index), Show.Signed(p.Value), string.Join(", ", p.Clusters), P(p.AdjustedP.Permutation), P(p.AdjustedP.StepDown),
                    P(p.AdjustedP.FieldTheory), P(p.AdjustedP.Bonferroni), Finding.Of(s, p).SurvivesBy,
                ])), survives);
            More(page, s.Peaks.Count, "peaks.tsv");
        }
        if (s.Variables.Count > 0)
        {
            page.Heading(2, "Variables").Table(["variable", "#value", "#uncorrected p", "#false discovery p", "#permutation p", "#step-down p", "#Bonferroni p", "survives"],
                s.Variables.Select(v => (string[])
                [
                    v.Name, Show.Signed(v.Value), P(v.UncorrectedP), P(v.FalseDiscoveryP), P(v.AdjustedP.Permutation), P(v.AdjustedP.StepDown), P(v.AdjustedP.Bonferroni), Finding.Of(s, v).SurvivesBy,
                ]), survives);
        }
    }

    private static void Notes(HtmlPage page, Summary s, IReadOnlyList<string>? commandLine)
    {
        page.Heading(2, "Methods and provenance").List(Methods(s));
        if (s.Smoothness is { Reason: null } smooth)
            page.Heading(3, $"Smoothness ({(smooth.Assumed ? "assumed, not estimated" : "estimated from the residuals")})").Table(["axis", "#FWHM, voxels", "#FWHM, mm"],
                smooth.FwhmVoxels.Select((f, a) => (string[])["xyz"[a].ToString(), Show.Value(f), Show.Value(smooth.FwhmMm[a])]));
        if (s.Smoothness?.Reason is { } reason) page.Paragraph($"Smoothness: {reason}.");
        if (s.Smoothness?.ReselCounts is { } resels)
            page.Paragraph($"Resel counts R0 to R3: {string.Join(", ", resels.Select(r => Show.Value(r)))}; volume in resels {Show.Value(s.Smoothness.VolumeInResels)}.");
        if (s.Data.MaskNotes.Count > 0) page.Heading(3, "Mask").List(s.Data.MaskNotes);
        page.Heading(3, "Where the numbers come from");
        if (commandLine is { Count: > 0 }) page.Paragraph("Command:").Element("code", string.Join(' ', commandLine.Select(Quoted)));
        page.Paragraph($"Seed {s.Relabelings.Seed}." + (s.Provenance is { } p ? $" Permute {p.Version}, made {p.Created}. Fingerprint of data, mask, model, plan and measures: {p.Fingerprint}." : ""));
        if (s.Provenance?.Inputs is { Count: > 0 } inputs)
            page.Table(["input", "SHA-256"], inputs.OrderBy(i => i.Key, StringComparer.Ordinal).Select(i => (string[])[i.Key, i.Value]));
    }

    private static List<string> Methods(Summary s)
    {
        List<string> notes =
        [
            "Adjusted p by permutation: the share of relabelings whose maximum is at least the observed value, the observed one counted (Nichols & Holmes 2002; Phipson & Smyth 2010).",
        ];
        if (s.Height.FieldTheory?.Critical is not null)
            notes.Add("Field theory for height: expected Euler characteristic with all resel counts (Worsley et al. 1996); smoothness from residuals (Kiebel et al. 1999).");
        if (s.Extent.Any(e => e.FieldTheory.SmallestSurviving is not null)) notes.Add("Field theory for extents: Friston et al. (1994), on the t field itself.");
        if (s.Height.Bonferroni is not null) notes.Add($"Bonferroni over {Show.Count(s.Data.Voxels)} tests.");
        if (s.Extent is [var e0, ..]) notes.Add($"Clusters: values strictly above the threshold, joined with {e0.Neighbours} neighbours, each sign apart.");
        if (s.Peaks.Count + s.Variables.Count > 0) notes.Add("Step-down p: Westfall & Young (1993).");
        if (s.Survivors is { FalseDiscoveryParametric: not null } or { FalseDiscoveryPermutation: not null }) notes.Add("False discovery rate: Benjamini & Hochberg (1995).");
        if (Rule.All(s).Any(r => r.Tail is not null))
            notes.Add("Tail approximation: generalised Pareto distribution (Knijnenburg et al. 2009; Winkler et al. 2016) by moments (Hosking & Wallis 1987), for maxima that fewer than 10 random " +
                "ones reach, not for extents (whole numbers); exceedances lowered from 250 or a quarter until the Anderson–Darling test (p by parametric bootstrap) passes at 0.05. It decides nothing. " +
                "Read it as an order of magnitude: it tends to be too small. The counted p beside it is the one to report.");
        if (s.Relabelings.Stop is { } stop) notes.Add($"Early stop: {stop.Rule} Risk at most {Show.Given(stop.Risk)} over all of them.");
        return notes;
    }

    private static string Quoted(string word) => word.Length > 0 && !word.Any(c => char.IsWhiteSpace(c) || "'\"$&|;<>()*?\\`".Contains(c)) ? word : $"'{word.Replace("'", "'\\''")}'";
}
