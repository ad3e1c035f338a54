/**
 * What a derivation offers to programs, as a description of functions: Lagrangian, residuals and their Jacobian, effective
 * fluid, spin, scalar-tensor functions, expansion and densities. Adding a function here adds it to every language.
 */
import { orderIn, partial } from '../algebra/calculus.js';
import type { Fraction } from '../algebra/fraction.js';
import { monomial, type Poly } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { jetName } from '../algebra/ring.js';
import type { BiScalarForm, Derivation, FluidValue, FriedmannForm, SpinElimination } from '../derivation.js';
import { currentFunctions } from './code-current.js';
import type { CodeFunction, CodeModule, CodeOutput, CodeResult, JetsInput } from './code-description.js';
import { frameFunctions } from './code-frames.js';
import { dimensionsIn, dimensionsOf, modelParameters } from './parameters.js';

/** What a function returns and why, before it is told its input. */
type Draft = Omit<CodeFunction, 'input'>;
type DimensionText = (p: Poly) => string;

export interface ModelOptions {
  /** Whether the derivatives of the residuals are wanted; they are several times as long as the residuals. */
  readonly jacobian: boolean;
}

export function codeModel(d: Derivation, { jacobian }: ModelOptions): CodeModule {
  const dimensions = dimensionsOf(d);
  const dimension: DimensionText = (p) => dimensionText(dimensionsIn(p, dimensions));
  const base: Draft[] = [
    lagrangian(d, dimension),
    residuals(d, dimension),
    ...(d.constraints && d.constraints.size > 0 ? [constraints(d.constraints, dimension)] : []),
    ...expansion(d),
    ...densities(d, dimension),
    ...(d.friedmann ? friedmann(d.friedmann, dimension) : []),
    ...(typeof d.spin?.elimination === 'object' ? spin(d.spin.elimination) : []),
    ...(d.scalarTensor.form === 'bi-scalar' ? scalarTensor(d.scalarTensor, dimension) : []),
    ...currentFunctions(d),
    ...frameFunctions(d),
  ];
  const drafts = jacobian ? [...base.slice(0, 2), ...jacobianOf(d), ...base.slice(2)] : base;
  const input = jetsOf(d, drafts);
  return {
    slug: d.theory.slug,
    theory: d.theory.name,
    geometry: { id: d.geometry.id, title: d.geometry.title },
    conditions: d.relations.conditions.map((c) => c.text),
    variables: [...d.equations.keys()],
    parameters: modelParameters(withAllExpressions(d)),
    couplings: new Set(d.theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name)),
    functions: drafts.map((f) => ({ ...f, input })),
  };
}

/** The derivation with every expression of the module among its equations, where parameters are looked for. */
function withAllExpressions(d: Derivation): Derivation {
  const more = [...(d.constraints ?? []), ...d.fluids.map((f) => [`rho ${f.name}`, f.rho] as const)];
  return { ...d, equations: new Map([...d.equations, ...more]) };
}

/** Derivatives that the functions read; the same jets serve all of them. */
function jetsOf(d: Derivation, drafts: readonly Draft[]): JetsInput {
  const polynomials = drafts.flatMap((f) =>
    f.outputs.flatMap((o) => [o.numerator, ...(o.denominator ?? []).map((x) => x.base)]),
  );
  return {
    kind: 'jets',
    name: 'jets',
    about: 'Fields at one time: value, first derivative, second derivative, … as far as they are needed.',
    fields: d.fields.map(({ name, meaning, dimension }) => ({
      name,
      meaning,
      dimension,
      order: Math.max(0, ...polynomials.map((p) => orderIn(p, name))),
    })),
  };
}

/** Words for the dimensions of the terms of an expression. */
export function dimensionText(found: readonly number[]): string {
  if (found.length === 0) return 'identically zero';
  if (found.length === 1) return powerText(found[0]!);
  const list = `${found.slice(0, -1).join(', ')} and ${found.at(-1)}`;
  return `terms of mass dimension ${list}, constants counted as declared`;
}

/** Words for one dimension. */
export const powerText = (n: number): string => (n === 0 ? 'dimensionless' : `mass dimension ${n}`);

const NUMBER: CodeResult = { kind: 'number' };

const one = (name: string, text: string, doc: readonly string[], value: Poly | Fraction): Draft => ({
  name,
  doc: [`${text}.`, ...doc],
  result: NUMBER,
  outputs: [{ key: name, meaning: text, ...('ring' in value ? { numerator: value } : value) }],
});

/** A record of polynomials by key. */
const record = (
  name: string,
  result: Omit<Extract<CodeResult, { kind: 'record' }>, 'kind'>,
  doc: readonly string[],
  values: Iterable<readonly [string, Poly | Fraction]>,
  meaning: (key: string, value: Poly | Fraction) => string,
): Draft => ({
  name,
  doc,
  result: { kind: 'record', ...result },
  outputs: [...values].map(
    ([key, value]): CodeOutput => ({
      key,
      meaning: meaning(key, value),
      ...('ring' in value ? { numerator: value } : value),
    }),
  ),
});

const withDimension =
  (dimension: DimensionText, meaning: (key: string) => string) =>
  (key: string, value: Poly | Fraction): string =>
    `${meaning(key)}; ${dimension('ring' in value ? value : value.numerator)}`;

const lagrangian = (d: Derivation, dimension: DimensionText): Draft =>
  one(
    'lagrangian',
    `Reduced Lagrangian per unit coordinate volume; ${dimension(d.lagrangian)}`,
    ['With matter, before total derivatives are dropped.'],
    d.lagrangian,
  );

const residuals = (d: Derivation, dimension: DimensionText): Draft =>
  record(
    'equations',
    { type: 'Equations', about: 'Residuals of the field equations, by the variable whose variation gives them.' },
    ['Euler–Lagrange expressions ∂L/∂q − d/dt ∂L/∂q̇ (+ …) of the Lagrangian, not rescaled; all vanish on a solution.'],
    d.equations,
    withDimension(dimension, (key) => `∂L/∂${key} − d/dt ∂L/∂(d${key}/dt)`),
  );

const constraints = (values: ReadonlyMap<string, Poly>, dimension: DimensionText): Draft =>
  record(
    'constraints',
    { type: 'Constraints', about: 'Components of the field equations that no residual contains.' },
    ['Further components of the field equations; all vanish on a solution.'],
    values,
    withDimension(dimension, (key) => `component ${key}`),
  );

/** ∂E_q/∂D(f,n): rows in the order of the residuals, columns field by field, each from its value up; none without columns. */
function jacobianOf(d: Derivation): Draft[] {
  const equations = [...d.equations];
  const columns = d.fields.flatMap(({ name }) => {
    const order = Math.max(...equations.map(([, e]) => orderIn(e, name)));
    return Array.from({ length: order + 1 }, (_, n) => jetName(name, n));
  });
  if (columns.length === 0) return [];
  const jacobian: Draft = {
    name: 'jacobian',
    doc: [
      'Partial derivatives of the residuals with respect to the jets, one at a time; couplings and densities are held ' +
        'fixed, also a density that is a function of time.',
    ],
    result: {
      kind: 'matrix',
      about: 'Rows: residuals. Columns: jets, D(q,n) for the n-th derivative.',
      rows: equations.map(([q]) => q),
      columns,
    },
    outputs: equations.flatMap(([q, e]) =>
      columns.map((jet) => ({ key: `${q},${jet}`, meaning: `∂E_${q}/∂${jet}`, numerator: partial(e, jet) })),
    ),
  };
  return [jacobian];
}

/** H = ȧ/(aN), one for each scale factor. */
function expansion(d: Derivation): Draft[] {
  const { geometry, ring } = d;
  const rates = [...geometry.rates].map(([a, name]) => {
    const rate = monomial(ring, rational(1), [
      [jetName(a, 1), 1],
      [a, -1],
      [geometry.lapse, -1],
    ]);
    return [name, rate, a] as const;
  });
  const [first] = rates;
  if (first === undefined) return [];
  const text = (a: string): string => `(d${a}/dt)/(${a} ${geometry.lapse})`;
  if (rates.length === 1)
    return [one('expansionRate', `Expansion rate ${first[0]} = ${text(first[2])}; mass dimension 1`, [], first[1])];
  const scaleOf = new Map(rates.map(([name, , a]) => [name, a]));
  return [
    record(
      'expansionRates',
      { type: 'ExpansionRates', about: 'Expansion rates of the directions.' },
      ['Expansion rate of each direction.'],
      rates.map(([name, rate]) => [name, rate] as const),
      (name) => `${text(scaleOf.get(name)!)}; mass dimension 1`,
    ),
  ];
}

/** ρ and p of the matter components. */
function densities(d: Derivation, dimension: DimensionText): Draft[] {
  if (d.fluids.length === 0) return [];
  const by = (value: (f: FluidValue) => Poly) => d.fluids.map((f) => [f.name, value(f)] as const);
  return [
    record(
      'densities',
      { type: 'Densities', about: 'Numbers by component of matter.' },
      ['Energy density of each component of matter.'],
      by((f) => f.rho),
      withDimension(dimension, (name) => `energy density of ${name}`),
    ),
    record(
      'pressures',
      { type: 'Pressures', about: 'Numbers by component of matter.' },
      ['Pressure of each component of matter.'],
      by((f) => f.pressure),
      withDimension(dimension, (name) => `pressure of ${name}`),
    ),
  ];
}

function friedmann({ rhoT, pT, wT }: FriedmannForm, dimension: DimensionText): Draft[] {
  const define =
    'Defined by 3M²(H² + k/a²) = ρ + ρ_T and −M²(2Ḣ + 3H² + k/a²) = p + p_T, dots divided by N, H = ȧ/(aN).';
  const ratio = 'Effective equation of state p_T/ρ_T, common factors cancelled; dimensionless';
  return [
    one('rhoT', `Effective energy density ρ_T of torsion; ${dimension(rhoT)}`, [define], rhoT),
    one('pT', `Effective pressure p_T of torsion; ${dimension(pT)}`, [define], pT),
    ...(wT ? [one('wT', ratio, ['Not finite where ρ_T vanishes.'], wT)] : []),
  ];
}

/** What spin adds, and the connection that it makes. */
function spin({ solution, rho, p }: SpinElimination): Draft[] {
  const why = ['The connection is eliminated by its equations.'];
  return [
    record(
      'connection',
      { type: 'Connection', about: 'The connection that the metric and the spin make.' },
      ['The solution of the equations of the connection, which are linear in it.'],
      solution,
      (q) => `value of ${q} on the equations of the connection`,
    ),
    one('rhoSpin', 'What spin adds to the energy density; mass dimension 4', why, rho),
    ...(p ? [one('pSpin', 'What spin adds to the pressure; mass dimension 4', why, p)] : []),
  ];
}

const BACKGROUND = 'Equivalent to the torsion theory on the homogeneous, isotropic background';

function scalarTensor(s: BiScalarForm, dimension: DimensionText): Draft[] {
  const valid = s.validFor === 'every k' ? `${BACKGROUND}, for every k.` : `${BACKGROUND} with k = 0.`;
  const action = 'Part of √−g [ G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V ], X^AB = −½ ∂A·∂B once per unordered pair.';
  const about = [action, valid];
  return [
    one('g4', `Coefficient G4 of the metric curvature scalar; ${dimension(s.g4)}`, about, s.g4),
    record(
      'kinetic',
      { type: 'Kinetic', about: 'Kinetic coefficients K_AB, by unordered pair of scalars.' },
      [
        'Kinetic coefficients; +½ K_AB Ȧ Ḃ for each pair in the reduced Lagrangian.',
        ...about,
        'Their signs are no statement about the particle spectrum of the torsion theory.',
      ],
      s.kinetic,
      withDimension(dimension, (key) => `multiplies X^(${key})`),
    ),
    record(
      'current',
      { type: 'Current', about: 'Components J_A of the current J_μ = Σ J_A ∂_μ A, by scalar.' },
      ['Components of the current; +J_A Ȧ in the reduced Lagrangian.', ...about],
      s.current,
      withDimension(dimension, (key) => `multiplies ∂_μ ${key}`),
    ),
    one('potential', `Potential V; ${dimension(s.potential)}`, about, s.potential),
    one(
      'curvatureObstruction',
      `Torsion theory minus its scalar-tensor form at k ≠ 0, up to total derivatives; ${dimension(s.obstruction)}`,
      ['Per a³N; a first derivative stands for itself divided by N.'],
      s.obstruction,
    ),
  ];
}
