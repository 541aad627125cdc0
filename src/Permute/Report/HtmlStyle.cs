namespace Permute.Report;

/// <summary>The page's own look: light, dark and print; no font, image or script is fetched.</summary>
internal static class HtmlStyle
{
    public const string Css = """
        :root { --paper: #fdfcfa; --ink: #23212b; --soft: #6b6675; --line: #d8d4de; --accent: #6a3d9a; --good: #1b7f4b; --shade: #f3f0f7; color-scheme: light dark; }
        @media (prefers-color-scheme: dark) {
          :root { --paper: #1b1a20; --ink: #ece9f2; --soft: #aaa4b8; --line: #3d3a48; --accent: #c3a4ea; --good: #7fd3a5; --shade: #26242e; }
        }
        body { margin: 0 auto; max-width: 62rem; padding: 1.5rem; background: var(--paper); color: var(--ink); font: 1rem/1.55 sans-serif; }
        h1 { font-size: 1.5rem; margin: 0 0 .2rem; }
        h2 { font-size: 1.15rem; margin: 2.4rem 0 .6rem; padding-top: .8rem; border-top: 2px solid var(--accent); }
        h3 { font-size: 1rem; margin: 1.4rem 0 .4rem; }
        .answer { font-size: 1.15rem; background: var(--shade); border-left: 5px solid var(--accent); padding: .8rem 1rem; margin: 1rem 0; }
        .answer p { margin: .2rem 0; }
        .caution { font-weight: bold; }
        .soft, figcaption { color: var(--soft); font-size: .9rem; }
        .scroll { overflow-x: auto; }
        table { border-collapse: collapse; font-size: .9rem; font-variant-numeric: tabular-nums; }
        th { text-align: left; vertical-align: bottom; border-bottom: 2px solid var(--ink); padding: .3rem .7rem .3rem 0; }
        td { border-bottom: 1px solid var(--line); padding: .25rem .7rem .25rem 0; vertical-align: top; }
        th.n, td.n { text-align: right; }
        tr.survives td:first-child { border-left: 4px solid var(--good); padding-left: .5rem; }
        figure { margin: 1.2rem 0; }
        figure svg { display: block; width: 100%; max-width: 760px; height: auto; background: #fff; border: 1px solid var(--line); }
        code { overflow-wrap: anywhere; font-size: .85rem; }
        @media print {
          :root { --paper: #fff; --ink: #000; --soft: #444; --line: #bbb; --accent: #6a3d9a; --shade: #fff; }
          body { max-width: none; padding: 0; font-size: 10pt; }
          figure, tr, .answer { break-inside: avoid; }
          h2, h3 { break-after: avoid; }
          .scroll { overflow: visible; }
        }
        """;
}
