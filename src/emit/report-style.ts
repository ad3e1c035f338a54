/** The report's own style sheet. Text and steps in one column, reasons in the margin; below 60rem the reasons follow. */

const LIGHT = `color-scheme: light;
  --paper: #fcfbf8; --panel: #f4f2ec; --ink: #22262b; --muted: #5d656d; --line: #dbd8d0;
  --accent: #17616e; --good: #2c6a3d; --bad: #a3281f; --warn: #8a5600;`;
const DARK = `color-scheme: dark;
  --paper: #14181c; --panel: #1b2126; --ink: #dee2e5; --muted: #9aa4ad; --line: #303840;
  --accent: #7cc4cf; --good: #86c79a; --bad: #ef9a92; --warn: #e0b465;`;

export const REPORT_STYLE = `
:root { ${LIGHT}
  --text: "Iowan Old Style", "Palatino Linotype", Palatino, "Book Antiqua", "TeX Gyre Pagella", P052, KaTeX_Main, serif;
  --label: system-ui, -apple-system, "Segoe UI", Roboto, "Helvetica Neue", Arial, sans-serif;
  --fixed: ui-monospace, "SF Mono", Menlo, Consolas, "DejaVu Sans Mono", monospace;
}
@media screen and (prefers-color-scheme: dark) { :root { ${DARK} } }
* { box-sizing: border-box; }
html { -webkit-text-size-adjust: 100%; text-size-adjust: 100%; scroll-behavior: smooth; }
@media (prefers-reduced-motion: reduce) { html { scroll-behavior: auto; } }
body { margin: 0; background: var(--paper); color: var(--ink); font: 1.0625rem/1.6 var(--text); overflow-wrap: break-word; }
main, .masthead, .contents, .colophon { max-width: 68rem; margin-inline: auto; padding-inline: 1.25rem; }
p { margin: 0 0 0.9em; max-width: 40em; }
a { color: var(--accent); text-underline-offset: 0.15em; text-decoration-thickness: 1px; }
:focus-visible { outline: 2px solid var(--accent); outline-offset: 2px; }

.masthead { padding-top: 3.5rem; }
.masthead h1 { margin: 0.1em 0 0.3em; font-size: clamp(1.9rem, 5vw, 2.9rem); font-weight: 400; line-height: 1.15; }
.kicker { margin: 0; font: 500 0.8125rem/1.4 var(--label); letter-spacing: 0.02em; color: var(--accent); }
.facts { display: grid; grid-template-columns: repeat(auto-fit, minmax(13rem, 1fr)); gap: 0.9rem 2rem; margin: 1.6rem 0 0; padding: 1.1rem 0; border-block: 1px solid var(--line); }
.facts dt { font: 500 0.8125rem/1.4 var(--label); color: var(--muted); }
.facts dd { margin: 0.1rem 0 0; line-height: 1.4; }

.contents { margin-block: 1.6rem 0; }
.contents ol { margin: 0; padding: 0; list-style: none; columns: 18rem; column-gap: 2rem; counter-reset: step; }
.contents li { counter-increment: step; break-inside: avoid; padding: 0.15rem 0 0.15rem 1.8em; text-indent: -1.8em; }
.contents li::before { content: counter(step); display: inline-block; width: 1.8em; color: var(--muted); text-indent: 0; }
.contents a { text-decoration: none; }
.contents a:hover { text-decoration: underline; }

.step { display: grid; grid-template-columns: minmax(0, 1fr) 17rem; column-gap: 3rem; margin-top: 3.2rem; padding-top: 1.2rem; border-top: 1px solid var(--line); content-visibility: auto; contain-intrinsic-size: auto 60rem; }
.step > h2 { grid-column: 1 / -1; margin: 0 0 0.8rem; font-size: 1.5rem; font-weight: 400; line-height: 1.3; }
.step > h2 .number { display: inline-block; min-width: 1.6em; color: var(--accent); }
.work { grid-column: 1; grid-row: 2; min-width: 0; }
.reasons { grid-column: 2; grid-row: 2; font-size: 0.9375rem; line-height: 1.5; color: var(--muted); }
.reasons h3 { margin: 0 0 0.15rem; font: 600 0.8125rem/1.5 var(--label); color: var(--accent); }
.reasons p { margin-bottom: 1.1em; }
.work > h3 { margin: 2rem 0 0.5rem; font-size: 1.2rem; font-weight: 400; font-style: italic; line-height: 1.35; }
.work > h3:first-child { margin-top: 0; }

.display { margin: 0 0 1.2rem; border-left: 2px solid var(--line); background: var(--panel); }
.display:target { border-left-color: var(--accent); }
.sheet { overflow-x: auto; padding: 0.9rem 1rem 0.5rem; scrollbar-width: thin; }
.display figcaption { display: flex; flex-wrap: wrap; align-items: baseline; gap: 0.2rem 1rem; padding: 0.25rem 1rem 0.5rem; font: 0.8125rem/1.5 var(--label); color: var(--muted); }
.display figcaption > code { flex: 1 1 8rem; min-width: 0; overflow: hidden; text-overflow: ellipsis; white-space: nowrap; }
code, pre { font-family: var(--fixed); font-size: 0.8125rem; overflow-wrap: anywhere; }
button { display: none; }
.scripted button { display: inline-block; }
button, summary { padding: 0.2rem 0.5rem; border: 1px solid var(--line); border-radius: 3px; background: var(--paper); color: var(--accent); font: 500 0.8125rem/1.5 var(--label); cursor: pointer; }
button:hover, summary:hover { border-color: var(--accent); }
details { min-width: 0; max-width: 100%; }
details[open] { flex-basis: 100%; }
summary { display: inline-block; list-style: none; }
summary::-webkit-details-marker { display: none; }
.display pre { margin: 0.5rem 0 0.3rem; padding: 0.7rem; max-height: 22rem; overflow: auto; border: 1px solid var(--line); background: var(--paper); color: var(--ink); white-space: pre; }

.table { overflow-x: auto; margin: 0 0 1.2rem; }
table { border-collapse: collapse; font-size: 1rem; line-height: 1.45; }
th, td { padding: 0.4rem 1.4rem 0.4rem 0; border-bottom: 1px solid var(--line); text-align: left; vertical-align: baseline; }
th { font: 500 0.8125rem/1.5 var(--label); color: var(--muted); }
.outcome { white-space: nowrap; font: 600 0.875rem/1.5 var(--label); }
.holds { color: var(--good); }
.fails { color: var(--bad); }
.caution { margin: 0 0 1.2rem; padding: 0.7rem 1rem; border-left: 3px solid var(--warn); background: var(--panel); }
.caution p:last-child, .caution ul { margin-bottom: 0; }
.caution ul { padding-left: 1.1rem; }
.visually-hidden { position: absolute; width: 1px; height: 1px; overflow: hidden; clip-path: inset(50%); white-space: nowrap; }
.left-out { margin: 0; font-size: 0.9375rem; color: var(--muted); }
.source-only { white-space: pre-wrap; }

.work .katex, .reasons .katex, .facts .katex { font-size: 1.08em; }
.sheet .katex-display { margin: 0; }
.sheet .katex-display > .katex { text-align: left; }
.katex > math { font-family: KaTeX_Main, "Latin Modern Math", "STIX Two Math", math; }
.sheet math[display="block"] { margin: 0; text-align: left; width: max-content; }
math mi { font-family: KaTeX_Math, KaTeX_Main; font-style: italic; text-transform: none; }
math mi[mathvariant="normal"] { font-family: KaTeX_Main; font-style: normal; }
mover[accent="true"] > :last-child { padding-bottom: 0.12em; }
mtd:nth-child(odd) { text-align: right; }
mtd:nth-child(even) { text-align: left; }
.colophon { margin-top: 4rem; padding-block: 1.2rem 3rem; border-top: 1px solid var(--line); font-size: 0.9375rem; color: var(--muted); }

@media (max-width: 60rem) {
  .step { grid-template-columns: minmax(0, 1fr); }
  .reasons { grid-column: 1; margin-bottom: 1rem; }
  .work { grid-row: 3; }
}
@media (max-width: 30rem) {
  body { font-size: 1rem; }
  .masthead { padding-top: 2rem; }
  main, .masthead, .contents, .colophon { padding-inline: 1rem; }
  .sheet, .display figcaption { padding-inline: 0.7rem; }
  .sheet { font-size: 0.95em; }
  .display figcaption > code { flex-basis: 100%; }
  .step { margin-top: 2.4rem; }
  .work .katex, .reasons .katex { font-size: 1em; }
}
@media print {
  @page { margin: 18mm 16mm; }
  body { font-size: 10.5pt; background: none; }
  .contents, button, .display details { display: none !important; }
  main, .masthead, .colophon { max-width: none; padding-inline: 0; }
  .masthead { padding-top: 0; }
  .step { grid-template-columns: minmax(0, 1fr); margin-top: 1.4rem; }
  .reasons { grid-column: 1; }
  .work { grid-row: 3; }
  .step { content-visibility: visible; }
  .display { background: none; break-inside: avoid; }
  .sheet, .table { overflow: visible; }
  h2, h3 { break-after: avoid; }
  a { color: inherit; text-decoration: none; }
}
`;
