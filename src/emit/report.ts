/**
 * The derivation as one HTML file that needs nothing else: step by step, each step with its reason and rule. Formulas are
 * typeset here, not in the browser; the one script only copies. A content security policy forbids everything but that
 * script, the styles and the embedded fonts, so that no text of a user can run or load anything.
 */
import type { Derivation } from '../derivation.js';
import { rewritingText } from './explanation.js';
import { latexSections } from './latex.js';
import { type LatexDisplay, type LatexOptions, type Passage, type Section, writerOf } from './latex-display.js';
import { math, type Prose, prose } from './latex-text.js';
import { BlockWriter, facts, warnings } from './report-blocks.js';
import { katexStyle, makeTypesetter } from './report-math.js';
import { reasonsOf } from './report-reasons.js';
import { REPORT_SCRIPT, scriptHash } from './report-script.js';
import { REPORT_STYLE } from './report-style.js';
import { escapeHtml, proseHtml } from './report-text.js';

export interface ReportOptions {
  /** Variables such as `u,v` as the geometry offers them; its own when left out or empty. */
  readonly variables?: string;
}

/**
 * The page. The same derivation gives the same text.
 * @throws RangeError for variables that the geometry does not offer.
 */
export function reportHtml(derivation: Derivation, options: ReportOptions = {}): string {
  const latexOptions: LatexOptions = options.variables ? { variables: options.variables } : {};
  const { theory } = derivation;
  const sections = latexSections(derivation, latexOptions);
  const writer = writerOf(derivation, latexOptions);
  const blocks = new BlockWriter(makeTypesetter());
  const steps = sections.map((section, i) => step(section, i + 1, derivation, blocks, writer.latex));
  const variables = writer.viewer.fields.filter((f) => f.name !== derivation.geometry.lapse).map((f) => f.latex);
  const list = facts(derivation, variables, blocks.typesetter)
    .map(([term, text]) => `<div><dt>${term}</dt><dd>${text}</dd></div>`)
    .join('\n');
  const contents = sections.map(
    ({ id, title }) => `<li><a href="#step-${escapeHtml(id)}">${escapeHtml(title)}</a></li>`,
  );
  const body = `<header class="masthead">
<p class="kicker">From a Lagrangian with torsion to its cosmology</p>
<h1>${escapeHtml(theory.name)}</h1>
<dl class="facts">
${list}
</dl>
</header>
<nav class="contents" aria-label="Steps"><ol>
${contents.join('\n')}
</ol></nav>
<main>
${warnings(derivation)}
${steps.join('\n')}
</main>
<footer class="colophon"><p>Derived by untwist with exact algebra; every number on this page is exact. Units c = ħ = 1.</p></footer>
<p id="said" role="status" class="visually-hidden"></p>
<script>${REPORT_SCRIPT}</script>`;
  const policy = [
    "default-src 'none'",
    "style-src 'unsafe-inline'",
    'font-src data:',
    'img-src data:',
    `script-src ${scriptHash(REPORT_SCRIPT)}`,
    "base-uri 'none'",
    "form-action 'none'",
  ];
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy.join('; ')}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<title>${escapeHtml(theory.name)} – derivation</title>
<style>${REPORT_STYLE}${katexStyle(body)}</style>
</head>
<body>
${body}
</body>
</html>
`;
}

function step(
  section: Section,
  number: number,
  derivation: Derivation,
  blocks: BlockWriter,
  latex: (name: string) => string,
): string {
  const paragraphs = (list: readonly Prose[]) =>
    list.map((p) => `<p>${proseHtml(p, blocks.typesetter)}</p>`).join('\n');
  const passage = ({ id, title, text, displays, remarks }: Passage): string => {
    const heading = title === section.title ? '' : `<h3>${escapeHtml(title)}</h3>`;
    if (id === 'checks') return `${heading}${paragraphs(text.slice(0, 1))}${blocks.checks(derivation)}`;
    const shown =
      id === 'invariants'
        ? `${blocks.invariants(derivation)}${blocks.sourceOf(displays)}`
        : displays.map((d) => blocks.display(d)).join('\n');
    const symbols = id === 'lagrangian' ? `${blocks.symbols(derivation, latex)}${rewritingHtml(derivation)}` : '';
    return [heading, paragraphs(text), shown, paragraphs(remarks), symbols].filter((s) => s !== '').join('\n');
  };
  const { allowed, rule } = reasonsOf(section.id, derivation);
  const reasons = [
    ...(allowed.length > 0 ? [`<h3>Why this is allowed</h3>\n${paragraphs(allowed)}`] : []),
    ...(rule.length > 0 ? [`<h3>Rule and source</h3>\n${paragraphs(rule)}`] : []),
  ];
  const passages = section.id === 'equations' ? [...section.passages, noether(derivation, latex)] : section.passages;
  return `<section class="step" id="step-${escapeHtml(section.id)}">
<h2><span class="number">${number}</span>${escapeHtml(section.title)}</h2>
<aside class="reasons">
${reasons.join('\n')}
</aside>
<div class="work">
${passages.map(passage).join('\n')}
</div>
</section>`;
}

/** The rules that rewrote the Lagrangian, folded. */
function rewritingHtml(derivation: Derivation): string {
  const steps = rewritingText(derivation).map((text) => `<pre>${escapeHtml(text)}</pre>`);
  if (steps.length === 0) return '';
  return `<details class="rewriting"><summary>Rewriting in ${steps.length} steps</summary>${steps.join('\n')}</details>`;
}

/** The identity of time reparametrisation, which was checked for these very equations. */
function noether({ geometry, equations, theory, checks }: Derivation, latex: (name: string) => string): Passage {
  const fields = [...equations.keys()].filter((q) => q !== geometry.lapse).map(latex);
  const lapse = latex(geometry.lapse);
  const left = fields.map((q) => `\\dot{${q}} E_{${q}}`);
  const body = `${left.join(' + ')} = ${lapse} \\dot{E}_{${lapse}}`;
  const label = `eq:${theory.slug}:noether`;
  const display: LatexDisplay = {
    label,
    tex: body,
    copyTex: `\\begin{equation}\n  ${body}\n  \\label{${label}}\n\\end{equation}`,
  };
  const holds = checks.some((c) => c.name.startsWith('Noether') && c.holds);
  const text = holds
    ? prose`With the lapse ${math(lapse)} kept, the expressions obey identically, for all functions of time,`
    : prose`The identity that ties the expressions together was not checked:`;
  return { id: 'noether', title: 'Noether identity', text: [text], displays: [display], remarks: [] };
}
