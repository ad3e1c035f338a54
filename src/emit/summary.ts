/** What `untwist derive` prints: the theory as understood and its main results, in Unicode mathematics. */
import Table from 'cli-table3';
import picocolors from 'picocolors';
import { symbolsOf } from '../algebra/collect.js';
import { isZero, type Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import type { FactoredFunction } from '../factored.js';
import { lagrangianLines, unicodeName } from '../notation/print.js';
import type { TensorSum } from '../tensor/expression.js';
import { sumOf, type Viewer, viewerOf } from './display.js';
import { componentTable } from './display-symbols.js';
import { scalarFieldSections } from './scalar-fields-summary.js';
import { branchLines, constraintTensorLines, spinLines } from './summary-constrained.js';
import { auxiliaryLines, everyKLines } from './summary-every-k.js';
import { dividedText, unicodeTensorTerms, unicodeTerms } from './unicode.js';

export interface SummaryOptions {
  /** Key of the variables, such as `u,v`. */
  readonly variables: string;
  readonly color: boolean;
  readonly factored?: readonly FactoredFunction[] | undefined;
}

const WIDTH = 100;
/** Lines of one equation that the terminal shows; the files hold the rest. */
const MAX_LINES = 8;

/** Breaks a list of terms into lines; continuation lines are indented under the first term. */
function wrapped(left: string, terms: readonly string[]): string[] {
  const lines: string[] = [];
  const indent = ' '.repeat(Math.min([...left].length, 16));
  let line = left;
  let empty = true;
  let shown = 0;
  for (const term of terms) {
    if (!empty && [...line].length + 1 + [...term].length > WIDTH) {
      if (lines.length + 1 === MAX_LINES) break;
      lines.push(line);
      line = indent;
      empty = true;
    }
    line += (empty ? '' : ' ') + term;
    empty = false;
    shown++;
  }
  const rest = terms.length - shown;
  return [...lines, rest > 0 ? `${line} … and ${rest} more terms` : line];
}

/** The text, with a final newline. */
export function summary(d: Derivation, options: SummaryOptions): string {
  const paint = picocolors.createColors(options.color);
  const viewer = viewerOf(d, options.variables === '' ? undefined : options.variables);
  const out: string[] = [];
  const section = (title: string, lines: readonly string[]): void => {
    if (lines.length > 0) out.push('', paint.bold(title), ...lines.map((l) => `  ${l}`));
  };
  const scalar = (p: Poly): string => unicodeTerms(viewer.sum(p, { divide: false })).join(' ');
  const signature = d.theory.signature.replaceAll('-', '−');
  out.push(`${paint.bold(d.theory.name)}  on the ${d.geometry.title} geometry, signature ${signature}`);
  section(
    'Lagrangian as understood',
    wrapped('', lagrangianLines(d.theory.lagrangian, { unicode: true, symbols: d.theory.symbols })),
  );
  for (const { name, terms, symbols } of d.elsewhere ?? [])
    section(
      `Lagrangian in the conventions of ${name}`,
      wrapped('', lagrangianLines(terms, { unicode: true, symbols })),
    );
  section(
    'Imposed',
    [...d.relations.eliminated].flatMap(([name, value]) => wrapped(`${unicodeName(name)} = `, [scalar(value)])),
  );
  section(
    'Conditions, not used for rewriting',
    d.relations.conditions.map((c) => `${scalar(c.value)} = 0`),
  );
  section('Products of tensors on this geometry', invariantTable(d));
  section('Equations of motion, cosmic time', equationLines(d, viewer));
  if (viewer.variables)
    section(
      'Variables',
      [...viewer.replaced].map(([name, sum]) => `${unicodeName(name)} = ${unicodeTerms(sum).join(' ')}`),
    );
  section('Friedmann form', friedmannLines(d, viewer));
  section('Constraints by multipliers', constraintTensorLines(d, viewer, wrapped));
  section('Branches of the constraints', branchLines(d, wrapped));
  section('Matter with spin', spinLines(d, viewer, wrapped));
  section('Metric analogue', analogueLines(d, viewer));
  section('Every spatial curvature', everyKLines(d, wrapped));
  section('Auxiliary fields', auxiliaryLines(d, wrapped));
  for (const { title, lines } of scalarFieldSections(d))
    section(
      title,
      lines.flatMap(([left, terms]) => wrapped(left, terms)),
    );
  section('Further components of the field equations', constraintLines(d, viewer));
  section('Covariant field equations of gravity', covariantLines(d, viewer));
  section('In factors', factoredLines(options.factored));
  section('Combinations of couplings that the background sees', d.combinations.map(scalar));
  if (d.screening)
    section('Spatial curvature', [screeningText(d.screening, d.geometry.isotropic?.curvature ?? 'k', scalar)]);
  const failed = d.checks.filter((c) => !c.holds).length;
  section('Checks', [failed === 0 ? `all ${d.checks.length} hold` : `${failed} of ${d.checks.length} fail`]);
  return `${out.join('\n')}\n`;
}

function screeningText(conditions: readonly Poly[], k: string, scalar: (p: Poly) => string): string {
  if (conditions.length === 0) return `${k} drops out of the equations`;
  if (conditions.some((p) => symbolsOf(p).length === 0)) return `${k} cannot drop out, whatever the couplings`;
  return `${k} drops out exactly when ${conditions.map((p) => `${scalar(p)} = 0`).join(' and ')}`;
}

const constraintLines = ({ constraints }: Derivation, viewer: Viewer): string[] =>
  [...(constraints ?? [])].flatMap(([name, p]) =>
    wrapped(`${name} = `, unicodeTerms(viewer.sum(p, { divide: false }))),
  );

function covariantLines({ covariant }: Derivation, viewer: Viewer): string[] {
  if (!covariant) return [];
  const { coframe, connection } = covariant.keepMomenta ? covariant.withMomenta : covariant.equations;
  const row = (name: string, sum: TensorSum): string[] =>
    sum.length === 0
      ? []
      : wrapped(
          `${name} = `,
          unicodeTensorTerms(sum, (p) => viewer.sum(p, { divide: false })),
        );
  const momenta = covariant.keepMomenta
    ? [...row('P_{abc}', covariant.momenta.torsion), ...row('Q_{abcd}', covariant.momenta.curvature)]
    : [];
  return [...momenta, ...row('E_{ab}', coframe), ...row('E_{abc}', connection)];
}

function factoredLines(factored: SummaryOptions['factored']): string[] {
  if (!factored) return [];
  return factored.length === 0
    ? ['no function of the metric analogue splits into factors']
    : factored.map(({ name, text }) => `${name} = ${text}`);
}

function invariantTable(d: Derivation): string[] {
  if (d.invariants.length === 0) return [];
  const symbols = componentTable(d);
  const bare = {
    top: '',
    'top-mid': '',
    'top-left': '',
    'top-right': '',
    bottom: '',
    'bottom-mid': '',
    'bottom-left': '',
  };
  const rows = {
    'bottom-right': '',
    left: '',
    'left-mid': '',
    mid: '',
    'mid-mid': '',
    right: '',
    'right-mid': '',
    middle: '  ',
  };
  const table = new Table({
    chars: { ...bare, ...rows },
    style: { 'padding-left': 0, 'padding-right': 0, border: [], head: [] },
  });
  const one = { coefficient: { num: 1n, den: 1n }, powers: [] };
  const shown = d.invariants.slice(0, 24);
  for (const { factors, value } of shown) {
    const name = lagrangianLines([{ scalar: one, factors }], { unicode: true }).join(' ');
    table.push([name, unicodeTerms(sumOf(value, symbols, false)).join(' ')]);
  }
  const rest = d.invariants.length - shown.length;
  const lines = table
    .toString()
    .split('\n')
    .map((l) => l.trimEnd());
  return rest > 0 ? [...lines, `… and ${rest} more`] : lines;
}

function equationLines(d: Derivation, viewer: Viewer): string[] {
  return [...d.equations].flatMap(([q, e]) => {
    const sum = viewer.sum(e);
    return wrapped(`E_${unicodeName(q)}${dividedText(sum)} = `, unicodeTerms(sum));
  });
}

function friedmannLines(d: Derivation, viewer: Viewer): string[] {
  if (!d.friedmann) return [];
  const { rhoT, pT } = d.friedmann;
  return [
    '3 M² (H² + k/a²) = ρ + ρ_T,   −M² (2 Ḣ + 3 H² + k/a²) = p + p_T',
    ...wrapped('ρ_T = ', unicodeTerms(viewer.sum(rhoT, { divide: false }))),
    ...wrapped('p_T = ', unicodeTerms(viewer.sum(pT, { divide: false }))),
  ];
}

function analogueLines(d: Derivation, viewer: Viewer): string[] {
  const form = d.scalarTensor;
  const lines = (name: string, p: Poly): string[] =>
    wrapped(`${name} = `, unicodeTerms(viewer.sum(p, { divide: false })));
  if (form.form === 'none')
    return [`none: ${form.reason}`, ...(form.offending ? lines('the terms per a³', form.offending) : [])];
  const own = viewerOf(d);
  const kinetic = [...form.kinetic].filter(([, p]) => !isZero(p));
  const current = [...form.current].filter(([, p]) => !isZero(p));
  const inOwn = (name: string, p: Poly): string[] => wrapped(`${name} = `, unicodeTerms(own.sum(p, { divide: false })));
  const names = (key: string): string => key.split(',').map(unicodeName).join('');
  const where = 'on the homogeneous, isotropic background';
  return [
    `√−g [ G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V ], equivalent ${where} for ${form.validFor}`,
    ...inOwn('G4', form.g4),
    ...kinetic.flatMap(([key, p]) => inOwn(`K_${names(key)}`, p)),
    ...current.flatMap(([key, p]) => inOwn(`J_${names(key)}`, p)),
    ...inOwn('V', form.potential),
    ...(isZero(form.obstruction) ? [] : inOwn('curvature obstruction per a³N', form.obstruction)),
    'signs in the kinetic matrix are no statement about the particle spectrum of the torsion theory',
  ];
}
