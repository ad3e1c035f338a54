/**
 * How vector forms are displayed: symbols for n·∂A, the expansion of n, the curvature of its surfaces, and fields that were
 * added. Everything else is displayed as in the derivation itself.
 */
import type { Fraction } from '../algebra/fraction.js';
import { isZero, power, product } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import { unicodeName } from '../notation/print.js';
import { componentName } from '../scalartensor/constraint-vector.js';
import type { MetricFunctions } from '../scalartensor/metric-form.js';
import {
  CURRENT_ROOT,
  EXPANSION,
  kineticName,
  METRIC_CURVATURE,
  pairsOf,
  rateAlong,
  SPATIAL_CURVATURE,
  type VectorForm,
} from '../scalartensor/vector-form.js';
import { sumOf, type Viewer, viewerOf } from './display.js';
import { componentTable, type DisplaySymbol } from './display-symbols.js';
import { equationOf } from './latex-display.js';
import type { Lines } from './latex-lines.js';
import { inlineTex, sumTex } from './latex-math.js';

export const EXPANSION_TEX = '\\theta_{n}';
export const SPATIAL_CURVATURE_TEX = '{{}^{3}\\!R}';
export const alongTex = (latex: string): string => `{(\\partial_{n} ${latex})}`;

/** Name and LaTeX of a scalar of a vector form: of the connection, or one that was added. */
export function scalarTex(d: Derivation, q: string): string {
  const added = d.auxiliary?.fields.find((f) => f.name === q);
  return added?.latex ?? d.fields.find((f) => f.name === q)?.latex ?? q;
}

/** A viewer for expressions in the ring of a vector form, and for those in component symbols. */
export function vectorViewer(d: Derivation, { scalars, roots }: Pick<VectorForm, 'scalars' | 'roots'>): Viewer {
  const plain = viewerOf(d);
  const symbols = new Map(plain.symbols);
  const put = (generator: string, name: string, latex: string, role: DisplaySymbol['role'], rank: number): void => {
    symbols.set(generator, { generator, name, latex, role, order: 0, rank, dimension: 0, isAbbreviated: false });
  };
  put(EXPANSION, 'θ', EXPANSION_TEX, 'field', 0);
  put(SPATIAL_CURVATURE, '³R', SPATIAL_CURVATURE_TEX, 'field', 1);
  put(METRIC_CURVATURE, 'R', '\\mathring{R}', 'field', 2);
  put(CURRENT_ROOT, '√|J²|', '{\\sqrt{| J_{\\mu} J^{\\mu} |}}', 'field', 3);
  scalars.forEach((q, i) => {
    const latex = scalarTex(d, q);
    put(rateAlong(q), `∂ₙ${unicodeName(q)}`, alongTex(latex), 'field', 4 + i);
    if (!plain.symbols.has(q)) put(q, q, latex, 'field', 40 + i);
  });
  for (const [a, b] of pairsOf(scalars))
    put(kineticName(a, b), `X(${a},${b})`, `X^{${scalarTex(d, a)} ${scalarTex(d, b)}}`, 'field', 20);
  for (const { name } of roots ?? []) put(name, 'r', 'r', 'field', 60);
  for (const [name, symbol] of componentTable(d))
    symbols.set(componentName(name), { ...symbol, generator: componentName(name) });
  return { ...plain, symbols, sum: (p, options = {}) => sumOf(p, symbols, options.divide ?? false) };
}

/** A fraction with its denominator on the left when it is no single term. */
export function fractionLines(viewer: Viewer, name: string, { numerator, denominator }: Fraction): Lines[] {
  if (denominator.length === 0) return equationOf(viewer, name, numerator, { divide: false });
  const below = product(
    numerator.ring,
    denominator.map((f) => power(f.base, f.power)),
  );
  const factor = inlineTex(sumTex(viewer.sum(below, { divide: false })));
  const [open, close] = factor.includes('\\frac') ? ['\\Bigl(', '\\Bigr)'] : ['\\bigl(', '\\bigr)'];
  return equationOf(viewer, `${open} ${factor} ${close} ${name}`, numerator, { divide: false });
}

/** The functions of a metric form that do not vanish, each under its name; the potential when all vanish. */
export function functionRows(
  { g4, kinetic, current, potential }: MetricFunctions,
  name: (kind: 'G4' | 'K' | 'J' | 'V', scalars: readonly string[]) => string,
): (readonly [string, Fraction])[] {
  const rows: (readonly [string, Fraction])[] = [
    [name('G4', []), g4],
    ...[...kinetic].map(([key, f]) => [name('K', key.split(',')), f] as const),
    ...[...current].map(([q, f]) => [name('J', [q]), f] as const),
    [name('V', []), potential],
  ];
  const present = rows.filter(([, f]) => !isZero(f.numerator));
  return present.length > 0 ? present : rows.slice(-1);
}

/** √−g [ … ] of which the functions are given. */
export const METRIC_ACTION_TEX =
  'G_{4} \\mathring{R} + \\textstyle\\sum K_{AB} X^{AB} + \\sqrt{| J_{\\mu} J^{\\mu} |} - V';

const SYMBOLS = { G4: 'G_{4}', K: 'K', J: 'J', V: 'V' } as const;

/** The functions of a metric form in displays. */
export const functionLines = (d: Derivation, viewer: Viewer, functions: MetricFunctions): Lines[] =>
  functionRows(functions, (kind, scalars) =>
    scalars.length === 0 ? SYMBOLS[kind] : `${SYMBOLS[kind]}_{${scalars.map((q) => scalarTex(d, q)).join(' ')}}`,
  ).flatMap(([name, f]) => fractionLines(viewer, name, f));
