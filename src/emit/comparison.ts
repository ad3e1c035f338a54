/** What `untwist compare` prints about two theories: texts for a terminal and plain data for JSON. */
import picocolors from 'picocolors';
import { infix } from '../algebra/infix.js';
import type { Comparison, Relation } from '../compare/theories.js';
import type { Derivation } from '../derivation.js';
import { residualText } from './claims.js';
import { groupedText, ratioText } from './grouped.js';
import { FORMAT_VERSION } from './json.js';

const HEADLINE: Readonly<Record<Relation, string>> = {
  identical: 'the same reduced Lagrangian',
  boundary: 'the same equations: the Lagrangians differ by a total derivative',
  scaled: 'the same equations up to constant factors',
  equivalent: 'the same solutions: the equations of each theory follow from those of the other',
  metric: 'the same equations of the metric and its matter, with different connections',
  different: 'different',
  undecided: 'undecided',
};

/** Whether the background equations are the same. */
export const areSame = ({ relation }: Comparison): boolean => relation !== 'different' && relation !== 'undecided';

const MAX_TEXT = 400;
const shortened = (text: string): string =>
  text.length <= MAX_TEXT ? text : `${text.slice(0, MAX_TEXT)} … (${text.length} characters; --json prints all)`;

export function comparisonText(a: Derivation, b: Derivation, c: Comparison, color: boolean): string {
  const paint = picocolors.createColors(color);
  const colour = areSame(c) ? paint.green : c.relation === 'different' ? paint.red : paint.yellow;
  const lines = [
    `${paint.bold(`1  ${a.theory.name}`)}${c.redefinition.texts.length > 0 ? `  with ${c.redefinition.texts.join(', ')}` : ''}`,
    `${paint.bold(`2  ${b.theory.name}`)}  on the geometry ${a.geometry.id}`,
    '',
    colour(HEADLINE[c.relation]),
  ];
  if (c.redefinition.conditions.length > 0)
    lines.push(`  the redefinition is invertible where ${c.redefinition.conditions.join(', ')}`);
  if (c.primitive) lines.push(`  L1 − L2 = d/dt of ${shortened(groupedText(c.primitive))}`);
  if (c.scaling) {
    const mass = ratioText(c.scaling.massSquared.top, c.scaling.massSquared.bottom);
    const overall = ratioText(c.scaling.factor.top, c.scaling.factor.bottom);
    const parts = [
      ...(mass === '1' ? [] : [`with (${mass}) M^2 for M^2`]),
      ...(overall === '1' ? [] : [`multiplied by ${overall}`]),
    ];
    lines.push(`  theory 2 is theory 1 ${parts.join(', ')}`);
  }
  if (c.reason !== undefined) lines.push(`  ${c.reason}`);
  if (c.difference) {
    const { equation, monomial, first, second } = c.difference;
    lines.push(
      `  first difference, in the relation for ${equation}: the coefficient of ${infix(monomial)}`,
      `    1: ${shortened(infix(first))}`,
      `    2: ${shortened(infix(second))}`,
    );
  }
  lines.push(...solutionLines(c));
  if (c.relation === 'different' && !c.metricDiffers)
    lines.push('  whether the metric and its matter alone obey the same equations was not decided');
  return `${lines.join('\n')}\n`;
}

function solutionLines({ solutions, relation }: Comparison): string[] {
  if (!solutions) return [];
  if (solutions.result === 'undecided') return [`  no answer within the bound: ${solutions.reason}`];
  if (solutions.result === 'different') {
    const { of, equation, poly, branch, residual, counterpart } = solutions.missing;
    const where = branch.length === 0 ? '' : `, on its solutions with ${branch.join(', ')}`;
    const other = of === 1 ? 2 : 1;
    return [
      `  an equation of theory ${of} (for ${equation}) does not follow from theory ${other}${where}:`,
      `    ${of}: ${shortened(groupedText(poly))} = 0`,
      ...(counterpart ? [`    ${other}: ${shortened(groupedText(counterpart))} = 0`] : []),
      `    it comes to ${shortened(residualText(residual))} there`,
    ];
  }
  const [first, second] = solutions.eliminated.map((names) => names.join(', '));
  const lines: string[] = [];
  if (solutions.anyMatter) lines.push('  for matter of any pressure');
  if (first !== '') lines.push(`  eliminated from theory 1: ${first}`);
  if (second !== '') lines.push(`  eliminated from theory 2: ${second}`);
  if (solutions.conditions.length > 0) lines.push(`  where ${shortened(solutions.conditions.join(', '))}`);
  if (relation === 'metric') lines.push('  the functions of the connection differ');
  return lines;
}

/** Plain data, ready for JSON.stringify; key order is fixed. */
export function comparisonObject(a: Derivation, b: Derivation, c: Comparison): Record<string, unknown> {
  const { solutions } = c;
  return {
    untwist: FORMAT_VERSION,
    first: a.theory.name,
    second: b.theory.name,
    geometry: a.geometry.id,
    redefine: c.redefinition.texts,
    relation: c.relation,
    same: areSame(c),
    ...(c.reason === undefined ? {} : { reason: c.reason }),
    ...(c.primitive ? { primitive: infix(c.primitive) } : {}),
    ...(c.scaling
      ? {
          scaling: {
            factor: ratioText(c.scaling.factor.top, c.scaling.factor.bottom),
            massSquared: ratioText(c.scaling.massSquared.top, c.scaling.massSquared.bottom),
          },
        }
      : {}),
    unshared: c.unshared,
    conditions: [...c.redefinition.conditions, ...(solutions?.result === 'same' ? solutions.conditions : [])],
    ...(solutions?.result === 'same' ? { anyMatter: solutions.anyMatter, eliminated: solutions.eliminated } : {}),
    ...(c.relation === 'different' ? { metricDiffers: c.metricDiffers ?? 'undecided' } : {}),
    ...(solutions?.result === 'undecided' ? { reason: solutions.reason } : {}),
    ...(solutions?.result === 'different'
      ? {
          missing: {
            theory: solutions.missing.of,
            equation: solutions.missing.equation,
            expression: infix(solutions.missing.poly),
            ...(solutions.missing.counterpart ? { counterpart: infix(solutions.missing.counterpart) } : {}),
            branch: solutions.missing.branch,
            residual: residualText(solutions.missing.residual),
          },
        }
      : {}),
    ...(c.difference
      ? {
          difference: {
            equation: c.difference.equation,
            monomial: infix(c.difference.monomial),
            first: infix(c.difference.first),
            second: infix(c.difference.second),
          },
        }
      : {}),
  };
}
