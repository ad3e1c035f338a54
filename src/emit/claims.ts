/** What `untwist compare --claim` prints: texts for a terminal and plain data for JSON. */
import picocolors from 'picocolors';
import { infix } from '../algebra/infix.js';
import type { Certificate } from '../compare/certificate.js';
import type { Residual, Verdict } from '../compare/consequence.js';
import type { BranchVerdict, ClaimReport, ClaimsReport } from '../compare/decide.js';
import type { Derivation } from '../derivation.js';
import { groupedText, productText, quotientText } from './grouped.js';
import { FORMAT_VERSION } from './json.js';

/** Characters of one expression on the terminal; the JSON has them all. */
const MAX_TEXT = 600;
const SHORT = 240;

const shortened = (text: string): string =>
  text.length <= MAX_TEXT ? text : `${text.slice(0, MAX_TEXT)} … (${text.length} characters; --json prints all)`;

export const residualText = ({ top, bottom }: Residual): string => quotientText(top, bottom);

/** `(1/a^3) E_N - …`, with `d/dt` for derivatives of equations. */
export function certificateText({ denominator, cofactors }: Certificate): string {
  if (cofactors.length === 0) return '0';
  const terms = cofactors.map(({ name, order, value }) => {
    const equation = /^[A-Za-z_0-9]+$/.test(name) ? `E_${name}` : `[${name}]`;
    const derivative = order === 0 ? equation : order === 1 ? `d/dt ${equation}` : `d^${order}/dt^${order} ${equation}`;
    return `(${infix(value)}) ${derivative}`;
  });
  const sum = terms.join(' + ');
  return denominator.length === 0 ? sum : `[ ${sum} ] / (${productText(denominator)})`;
}

const HEADLINE = { holds: 'holds', fails: 'does not hold', undecided: 'undecided' } as const;
const ON_BRANCH = { follows: 'holds', fails: 'does not hold', undecided: 'undecided' } as const;

export function claimsText(d: Derivation, report: ClaimsReport, color: boolean): string {
  const paint = picocolors.createColors(color);
  const lines = [`${paint.bold(d.theory.name)}  at lapse 1, on the geometry ${d.geometry.id}`];
  if (report.branch.length > 0) lines.push(`branch: ${report.branch.join(', ')}`);
  if (report.where.length > 0) lines.push(`where ${report.where.join(', ')}`);
  for (const claim of report.claims) lines.push('', ...claimLines(claim, paint));
  for (const { branch, needs } of report.impossible) {
    const where = branch.length === 0 ? 'solutions' : `solutions with ${branch.join(', ')}`;
    lines.push('', `${where} would need ${needs}`);
  }
  return `${lines.join('\n')}\n`;
}

type Paint = ReturnType<typeof picocolors.createColors>;

function claimLines(report: ClaimReport, paint: Paint): string[] {
  const { claim, verdict, branches } = report;
  const colour = { holds: paint.green, fails: paint.red, undecided: paint.yellow }[verdict];
  const matter = verdict === 'holds' && report.anyMatter ? ', for matter of any pressure' : '';
  const lines = [paint.bold(claim.text), `  ${colour(HEADLINE[verdict])}${matter}`];
  const { counterexample: found } = report;
  if (found) {
    const where = found.branch.length === 0 ? '' : `, on solutions with ${shortened(found.branch.join(', '))}`;
    lines.push(`  for instance with ${found.couplings.join(', ')}${where}`);
  }
  if (report.staticOnly) lines.push('  all solutions are static: an expansion rate vanishes');
  if (report.reason !== undefined) lines.push(`  no answer within the bound: ${report.reason}`);
  if (claim.divisors.length > 0) lines.push(`  cleared of the divisors ${claim.divisors.map(infix).join(', ')}`);
  for (const b of branches) lines.push(...branchLines(b, branches.length > 1));
  if (report.residual) lines.push(`  left − right comes to ${shortened(residualText(report.residual))}`);
  for (const { kind, term, corrected } of report.repairs)
    lines.push(
      kind === 'absent' ? `  it would hold without the term ${term}` : `  it would hold with ${corrected} for ${term}`,
    );
  return lines;
}

function branchLines({ branch, result }: BranchVerdict, several: boolean): string[] {
  const indent = several ? '    ' : '  ';
  const lines = several ? [`  ${branch.join(', ') || 'general'}: ${ON_BRANCH[result.verdict]}`] : [];
  if (result.verdict === 'follows') {
    if (result.conditions.length > 0) lines.push(`${indent}where ${result.conditions.map(shortened).join(', ')}`);
    const text = certificateText(result.certificate);
    if (text.length <= SHORT && text !== '0') lines.push(`${indent}left − right = ${text}`);
  }
  if (several && result.verdict === 'fails')
    lines.push(`${indent}left − right comes to ${shortened(residualText(result.residual))}`);
  return lines;
}

const residualObject = ({ top, bottom }: Residual): Record<string, unknown> => ({
  numerator: groupedText(top),
  denominator: bottom.map(({ base, power }) => ({ factor: infix(base), power })),
});

function resultObject(result: Verdict): Record<string, unknown> {
  if (result.verdict === 'follows')
    return {
      verdict: 'holds',
      conditions: result.conditions,
      certificate: {
        denominator: result.certificate.denominator.map(({ base, power }) => ({ factor: infix(base), power })),
        terms: result.certificate.cofactors.map(({ name, order, value }) => ({
          equation: name,
          derivative: order,
          cofactor: infix(value),
        })),
      },
    };
  if (result.verdict === 'fails') return { verdict: 'fails', residual: residualObject(result.residual) };
  return { verdict: 'undecided', reason: result.reason };
}

/** Plain data, ready for JSON.stringify; key order is fixed. */
export function claimsObject(d: Derivation, report: ClaimsReport): Record<string, unknown> {
  return {
    untwist: FORMAT_VERSION,
    theory: d.theory.name,
    geometry: d.geometry.id,
    branch: report.branch,
    where: report.where,
    claims: report.claims.map((c) => ({
      claim: c.claim.text,
      verdict: c.verdict,
      anyMatter: c.anyMatter,
      ...(c.staticOnly ? { staticOnly: true } : {}),
      ...(c.reason === undefined ? {} : { reason: c.reason }),
      expression: infix(c.claim.poly),
      divisors: c.claim.divisors.map(infix),
      ...(c.counterexample ? { counterexample: c.counterexample } : {}),
      ...(c.residual ? { residual: residualObject(c.residual) } : {}),
      repairs: c.repairs.map(({ kind, term, factor, corrected }) => ({ kind, term, factor, corrected })),
      branches: c.branches.map(({ branch, result }) => ({ branch, ...resultObject(result) })),
    })),
    impossible: report.impossible,
  };
}
