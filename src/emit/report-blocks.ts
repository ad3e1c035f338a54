/** Blocks of the report: displays with their sources, tables, the lists at its head. Every text is escaped here. */
import { symbolsOf } from '../algebra/collect.js';
import type { Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import { sumOf } from './display.js';
import { componentTable } from './display-symbols.js';
import { type LatexDisplay, tensorsTex } from './latex-display.js';
import { inlineTex, pulledOutTex } from './latex-math.js';
import { withFormulas } from './latex-text.js';
import type { Typesetter } from './report-math.js';
import { escapeHtml, proseHtml } from './report-text.js';

/** Writes the displays of one page; sources are numbered so that buttons find them. */
export class BlockWriter {
  private sources = 0;

  constructor(readonly typesetter: Typesetter) {}

  /** A display in a box of its own that scrolls when it is wider than the page, with its TeX to copy. */
  display({ label, tex, copyTex }: LatexDisplay): string {
    const sheet = `<div class="sheet" tabindex="0" role="group" aria-label="Equation ${escapeHtml(label)}">${this.typesetter.display(tex)}</div>`;
    return `<figure class="display" id="${escapeHtml(label)}">${sheet}${this.caption(label, copyTex)}</figure>`;
  }

  /** The caption alone, for displays that the page shows as a table. */
  sourceOf(displays: readonly LatexDisplay[]): string {
    const [first] = displays;
    if (!first) return '';
    const tex = displays.map((d) => d.copyTex).join('\n\n');
    return `<figure class="display" id="${escapeHtml(first.label)}">${this.caption(first.label, tex)}</figure>`;
  }

  private caption(label: string, copyTex: string): string {
    const id = `tex-${++this.sources}`;
    const button = `<button type="button" data-copies="${id}" data-label="Copy LaTeX" aria-label="Copy LaTeX of ${escapeHtml(label)}">Copy LaTeX</button>`;
    // A line feed directly after <pre> would be dropped.
    const source = `<details><summary>Source</summary><pre id="${id}">\n${escapeHtml(copyTex)}</pre></details>`;
    return `<figcaption><code>${escapeHtml(label)}</code>${button}${source}</figcaption>`;
  }

  /** Products of tensors with their values in component symbols. */
  invariants(d: Derivation): string {
    const components = componentTable(d);
    const rows = d.invariants.map(({ factors, value }) => {
      const sum = inlineTex(pulledOutTex(sumOf(value, components, false)));
      return [this.typesetter.inline(tensorsTex(factors)), this.typesetter.inline(sum === '' ? '0' : sum)];
    });
    return table(['Product of tensors', 'Value'], rows);
  }

  /** Declared symbols with what they stand for. */
  symbols(d: Derivation, latex: (name: string) => string): string {
    const roles = {
      constant: 'constant',
      scale: 'scale',
      vacuum: 'vacuum energy density',
      spin: 'spin density',
    } as const;
    const rows = d.theory.symbols.map(({ name, role, dimension }) => [
      this.typesetter.inline(latex(name)),
      `<code>${escapeHtml(name)}</code>`,
      d.relations.eliminated.has(name) ? `${roles[role]}, eliminated` : roles[role],
      dimension === 0 ? '1' : this.typesetter.inline(dimension === 1 ? '\\text{mass}' : `\\text{mass}^{${dimension}}`),
    ]);
    return rows.length === 0 ? '' : table(['Symbol', 'In the file', 'Role', 'Dimension'], rows);
  }

  /** Every statement that was tested, with its outcome. */
  checks(d: Derivation): string {
    const rows = d.checks.map(({ name, holds, detail }) => [
      holds ? '<span class="outcome holds">✓ holds</span>' : '<span class="outcome fails">✗ fails</span>',
      proseHtml(withFormulas(name), this.typesetter),
      proseHtml(withFormulas(detail), this.typesetter),
    ]);
    return table(['Outcome', 'Statement', 'What was compared'], rows);
  }
}

/** A table of finished cells. */
function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const cells = (tag: string, row: readonly string[]) => row.map((c) => `<${tag}>${c}</${tag}>`).join('');
  const body = rows.map((row) => `<tr>${cells('td', row)}</tr>`).join('\n');
  return `<div class="table" tabindex="0" role="group" aria-label="${head[0]}"><table><thead><tr>${cells('th', head)}</tr></thead><tbody>\n${body}</tbody></table></div>`;
}

/** What is known of the derivation at a glance: term and finished text. */
export function facts(
  d: Derivation,
  variables: readonly string[],
  typesetter: Typesetter,
): (readonly [string, string])[] {
  const { theory, geometry, scalarTensor, checks, fluids } = d;
  const failed = checks.filter((c) => !c.holds).length;
  const analogue = scalarTensor.form === 'none' ? 'none in this class' : `two scalars, for ${scalarTensor.validFor}`;
  const curvature = geometry.parameters.find((p) => p.name === geometry.isotropic?.curvature);
  return [
    ['Geometry', escapeHtml(geometry.title)],
    ['Signature', theory.signature.replaceAll('-', '−')],
    ['Variables', variables.map((v) => typesetter.inline(v)).join(', ')],
    ['Matter', fluids.length === 0 ? 'none' : escapeHtml(fluids.map((f) => f.name).join(', '))],
    ['Metric analogue', analogue],
    ...(d.screening && curvature
      ? [['Spatial curvature', `${typesetter.inline(curvature.latex)} ${screeningText(d.screening)}`] as const]
      : []),
    ['Checks', failed === 0 ? `all ${checks.length} hold` : `${failed} of ${checks.length} fail`],
  ];
}

function screeningText(conditions: readonly Poly[]): string {
  if (conditions.length === 0) return 'drops out of the equations';
  if (conditions.some((p) => symbolsOf(p).length === 0)) return 'cannot drop out';
  return conditions.length === 1 ? 'drops out on one condition' : `drops out on ${conditions.length} conditions`;
}

/** Warnings of the reader, when there are any. */
export function warnings({ theory }: Derivation): string {
  if (theory.warnings.length === 0) return '';
  const items = theory.warnings.map(({ message, hint }) => {
    const advice = hint === undefined ? '' : ` (${hint})`;
    return `<li>${escapeHtml(message + advice)}</li>`;
  });
  return `<div class="caution"><p>Warnings about the theory file:</p><ul>${items.join('')}</ul></div>`;
}
