/** Why each stage of a derivation is allowed, and which rewriting rules fired, as plain text. */
import picocolors from 'picocolors';
import type { Derivation } from '../derivation.js';
import { printSum } from '../tensor/print-sum.js';
import { type LatexOptions, latexSections } from './latex.js';
import type { Prose } from './latex-text.js';
import { reasonsOf } from './report-reasons.js';

const plain = (paragraph: Prose): string =>
  paragraph.map((piece) => (typeof piece === 'string' ? piece : piece.math)).join('');

const WIDTH = 96;

/** A paragraph in lines of at most WIDTH characters, formulas in TeX. */
function filled(text: string, indent: string): string {
  const lines: string[] = [];
  let line = indent;
  for (const word of text.split(/\s+/)) {
    if (line.length + word.length > WIDTH && line.trim() !== '') {
      lines.push(line.trimEnd());
      line = indent;
    }
    line += `${word} `;
  }
  return [...lines, line.trimEnd()].join('\n');
}

/** Steps of the rewriting of the Lagrangian: rule, before, after, why. */
export function rewritingText(d: Derivation): string[] {
  const style = { form: 'unicode', symbols: d.theory.symbols } as const;
  return (d.rewriting ?? []).map(
    ({ ruleId, before, after, why }, i) =>
      `  ${i + 1}. ${ruleId}: ${why}\n       ${printSum(before, style)}\n     = ${printSum(after, style)}`,
  );
}

/** The whole explanation, with a final newline. */
export function explanation(d: Derivation, options: LatexOptions & { readonly color: boolean }): string {
  const paint = picocolors.createColors(options.color);
  const rewriting = rewritingText(d);
  const stages = latexSections(d, options).flatMap(({ id, title }, i) => {
    const { allowed, rule } = reasonsOf(id, d);
    const steps = id === 'theory' && rewriting.length > 0 ? ['  Rewriting:', ...rewriting] : [];
    const reasons = [
      ...allowed.map((p) => filled(plain(p), '  ')),
      ...rule.map((p) => filled(`Rule or source: ${plain(p)}`, '  ')),
    ];
    return [`${paint.bold(`${i + 1}. ${title}`)}`, ...reasons, ...steps];
  });
  const checks = d.checks.map((c) => filled(`${c.holds ? 'holds' : 'FAILS'}: ${c.name}: ${c.detail}`, '  '));
  return `\n${[paint.bold('Explanation'), ...stages, paint.bold('Checks made'), ...checks].join('\n')}\n`;
}
