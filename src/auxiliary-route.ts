/**
 * The other way to a scalar-tensor form: squares are linearised by auxiliary fields, and the fields of the connection (or those
 * that the user names) are integrated out. Every branch is kept, and its equations are compared with those of the theory.
 */
import { moveTo, substitute, symbolsOf } from './algebra/collect.js';
import type { Fraction } from './algebra/fraction.js';
import { solveLinear } from './algebra/linear-system.js';
import { generator, isZero, multiply, type Poly, power, sum, zero } from './algebra/poly.js';
import type { Ring } from './algebra/ring.js';
import { factor } from './cas/factor.js';
import type { AuxiliaryRoute, Check, Derivation, EveryK, LinearisedField, RouteBranch } from './derivation.js';
import { agrees, comparedBackground, vectorRoles, withEveryK } from './every-k.js';
import { symbolicValue } from './geometry/reduction.js';
import { internalWith, translate } from './notation/conventions.js';
import { type Diagnostic, InputError } from './notation/diagnostics.js';
import { plainPassage } from './notation/passage.js';
import { nearest } from './notation/suggest.js';
import { parseTensorExpression } from './notation/tensor-expression.js';
import type { TensorFactor } from './notation/theory.js';
import { type EliminationBranch, integrateOut } from './scalartensor/auxiliary.js';
import { fieldRules } from './scalartensor/auxiliary-file.js';
import {
  componentName,
  componentRing,
  constantsIn,
  inComponentRing,
  type VectorRoles,
} from './scalartensor/constraint-vector.js';
import { currentResult } from './scalartensor/current-zeros.js';
import { isComparable, sameOnSubstitution } from './scalartensor/elimination-check.js';
import { type Linearised, linearised } from './scalartensor/linearise.js';
import { metricForm } from './scalartensor/metric-form.js';
import { asFraction, asPoly, onBackground, type VectorForm, vectorRing } from './scalartensor/vector-form.js';
import { dummyFreeKey } from './tensor/invariants.js';
import { expandParts } from './tensor/parts.js';

export interface RouteOptions {
  /** Scalars whose powers are made linear, as typed: a product of tensors, or `curvature` for every component. */
  readonly linearise: readonly string[];
  /** Fields to integrate out, in order; those of the connection when undefined. */
  readonly integrate: readonly string[] | undefined;
}

/** Milliseconds for a package to split a cubic. */
const TIME_LIMIT_MS = 4000;
/** Powers of a scalar that are looked for in the Lagrangian. */
const MAX_POWER = 8;
/**
 * Terms of a result beyond which its equations are not written out for a comparison; that every solution was inserted exactly,
 * which implies that they agree, is not affected.
 */
const MAX_COMPARED_TERMS = 240;
const ALL = 'curvature';
const FILE = '--linearise';

const fault = (code: string, message: string, hint: string, file = FILE): InputError => {
  const diagnostic: Diagnostic = { code, severity: 'error', message, hint, file };
  return new InputError([diagnostic]);
};

/**
 * A derivation with this route added, and with what holds for every curvature, from which it starts.
 * @throws InputError when there is nothing to linearise, a field is unknown, or the geometry is not isotropic.
 */
export async function withAuxiliaryRoute(
  given: Derivation,
  options: RouteOptions,
  onStep: (what: string) => void = () => {},
): Promise<Derivation> {
  const d = withEveryK(given, onStep);
  const roles = vectorRoles(d.geometry);
  const { everyK } = d;
  if (!roles || !everyK?.vector.inComponents)
    throw fault(
      'no-auxiliary-route',
      'auxiliary fields are integrated out on an isotropic geometry and without constraints',
      'leave --linearise and --integrate out',
    );
  onStep('integrating auxiliary fields out');
  const checks: Check[] = [];
  const check = (name: string, detail: string, holds: boolean): void => {
    if (!holds) throw new Error(`check failed: ${name} (${detail})`);
    checks.push({ name, holds, detail });
  };
  const { start, fields, hessian } = linearisedForm(d, everyK, roles, options.linearise);
  const connection = d.geometry.isotropic!.scalars;
  const wanted = chosenFields(options.integrate ?? connection, start.scalars);
  if (fields.length > 0) compareLinearised(d, everyK, roles, start, fields, check);
  const split = async (p: Poly) => (await factor(p, { timeLimitMs: TIME_LIMIT_MS }))?.factors;
  const branches = await integrateOut(start, wanted, fieldRules(), split);
  const found = branches.map((branch): RouteBranch => routeBranch(branch, start, roles, d.ring, check));
  const route: AuxiliaryRoute = { fields, hessian, start, integrated: wanted, branches: found };
  return { ...d, auxiliary: route, checks: [...d.checks, ...checks] };
}

function chosenFields(names: readonly string[], scalars: readonly string[]): readonly string[] {
  for (const name of names) {
    if (scalars.includes(name)) continue;
    const near = nearest(name, scalars);
    const hint = near === undefined ? `the fields are ${scalars.join(', ')}` : `did you mean ${near}?`;
    throw fault('unknown-field', `there is no field ${name.slice(0, 40)}`, hint, '--integrate');
  }
  return [...new Set(names)];
}

function routeBranch(
  branch: EliminationBranch,
  start: VectorForm,
  roles: VectorRoles,
  ring: Ring,
  check: (name: string, detail: string, holds: boolean) => void,
): RouteBranch {
  const isClosed = (branch.form.roots?.length ?? 0) === 0 && branch.steps.every((s) => !s.constraint);
  const metric = isClosed ? metricForm(branch.form) : undefined;
  const isShort = sizeOf(branch.form.value) <= MAX_COMPARED_TERMS;
  const isCompared = isClosed && isShort && isComparable(branch) && branch.steps.length > 0;
  if (isCompared)
    check(
      'fields integrated out',
      'with their solutions inserted, the equations of lapse, scale factor and the fields that are left are those of the result at every k',
      agrees(start, branch, metric, roles, ring),
    );
  return {
    branch,
    metric,
    isCompared,
    current: metric?.reached && currentResult(metric.reached.functions.current),
  };
}

/** Terms of a fraction, above and below the line. */
const sizeOf = ({ numerator, denominator }: Fraction): number =>
  denominator.reduce((n, { base, power: e }) => n + e * base.size, numerator.size);

/** Names for fields that nobody has yet. */
function freshNames(count: number, wish: string, taken: (name: string) => boolean): string[] {
  const out: string[] = [];
  for (let n = count === 1 ? 0 : 1; out.length < count; n++) {
    const name = n === 0 ? wish : `${wish}${n}`;
    if (!taken(name)) out.push(name);
  }
  return out;
}

interface LinearisedForm {
  readonly start: VectorForm;
  readonly fields: readonly LinearisedField[];
  readonly hessian: Poly | undefined;
}

/** The vector form of the Lagrangian with the powers of some scalars made linear. */
function linearisedForm(
  d: Derivation,
  { vector }: EveryK,
  roles: VectorRoles,
  asked: readonly string[],
): LinearisedForm {
  if (asked.length === 0) return { start: vector.form, fields: [], hessian: undefined };
  const constants = constantsIn(d.ring, roles.curvature);
  const taken = (name: string): boolean => d.ring.position.has(name) || constants.includes(name);
  const wishes =
    asked.length === 1 && asked[0]!.trim() === ALL ? curvatureWishes(d) : asked.map((t) => scalarWish(d, t));
  const chis = freshNames(wishes.length, 'chi', taken);
  const marks = wishes.map((_, i) => `scalar ${i + 1}`);
  const wide = componentRing(roles, constants, [...marks, ...chis]);
  const marked = markedLagrangian(d, wishes, marks, wide);
  const pairs = wishes.map((w, i) => [w.factors ? marks[i]! : componentName(w.component!), chis[i]!] as const);
  const made = linearised(marked, pairs);
  if (!made) throw nothing(d, asked);
  const back = new Map(
    wishes.flatMap((w, i) => (w.factors ? [[marks[i]!, inComponentRing(w.value, wide)] as const] : [])),
  );
  const scalars = [...vector.form.scalars, ...chis];
  const into = vectorRing(scalars, constants);
  const written = substitute(made.value, back);
  const images = new Map(
    roles.components.map((c) => [componentName(c.name), moveTo(vector.components.get(c.name)!, into)] as const),
  );
  const used = chis.map((_, i) => !isZero(made.hessian[i]![i]!) || made.hessian[i]!.some((p) => !isZero(p)));
  const fields = wishes.flatMap((w, i): LinearisedField[] => {
    if (!used[i]) return [];
    const value = substitute(inComponentRing(w.value, wide), images, into);
    return [{ name: chis[i]!, latex: chiTex(chis[i]!), scalar: w.text, value }];
  });
  const start: VectorForm = {
    value: asFraction(substitute(written, images, into)),
    scalars: scalars.filter((q) => vector.form.scalars.includes(q) || fields.some((f) => f.name === q)),
  };
  return { start, fields, hessian: hessianDeterminant(made, used, into) };
}

const chiTex = (name: string): string => (name === 'chi' ? '\\chi' : `\\chi_{${name.slice('chi'.length)}}`);

/** det ∂²F/∂χ∂χ for the fields that occur. */
function hessianDeterminant({ hessian }: Linearised, used: readonly boolean[], into: Ring): Poly {
  const rows = hessian.filter((_, i) => used[i]).map((row) => row.filter((_, i) => used[i]));
  const none = zero(rows[0]![0]!.ring);
  const solution = solveLinear(
    rows,
    rows.map(() => none),
  );
  return moveTo(solution?.determinant ?? none, into);
}

/** A scalar that the user wants to be made linear: a product of tensors, or a component. */
interface Wish {
  readonly text: string;
  readonly factors: readonly TensorFactor[] | undefined;
  readonly component: string | undefined;
  /** In the ring of component symbols. */
  readonly value: Poly;
}

/** Every component of curvature. */
function curvatureWishes({ geometry }: Derivation): Wish[] {
  const { curvature, ring } = geometry.tensors;
  const names = new Set([...curvature.entries.values()].flatMap(symbolsOf));
  const inCurvature = geometry.components.filter(({ name }) => names.has(name));
  return inCurvature.map(({ name }) => ({
    text: name,
    factors: undefined,
    component: name,
    value: generator(ring, name),
  }));
}

/** A product of tensors as typed, in the conventions of the theory file. */
function scalarWish({ theory, geometry }: Derivation, typed: string): Wish {
  const text = typed.trim().replace(/\s+/g, ' ');
  const parsed = parseTensorExpression(plainPassage(typed, FILE), { tensors: theory.tensors });
  const parts = expandParts(translate(parsed, theory.conventions, internalWith(theory.signature))).terms;
  const [term] = parts;
  if (!term || parts.length !== 1 || term.factors.length === 0)
    throw fault(
      'bad-scalar',
      `${text.slice(0, 60)} is no single product of tensors`,
      'for example R, or curvature for all components',
    );
  return { text, factors: term.factors, component: undefined, value: symbolicValue(geometry, term.factors) };
}

/** The product of n copies of some factors, their dummies renamed. */
const copies = (factors: readonly TensorFactor[], n: number): TensorFactor[] =>
  Array.from({ length: n }, (_, i) =>
    factors.map((f) => ({ ...f, slots: f.slots.map((s) => ({ ...s, name: `${s.name} ${i}` })) })),
  ).flat();

/** The Lagrangian in component symbols, powers of the wished scalars written with a mark. */
function markedLagrangian(d: Derivation, wishes: readonly Wish[], marks: readonly string[], wide: Ring): Poly {
  const keys = new Map<string, readonly [mark: string, n: number]>();
  wishes.forEach((w, i) => {
    if (!w.factors) return;
    for (let n = 2; n <= MAX_POWER; n++) keys.set(dummyFreeKey(copies(w.factors, n)), [marks[i]!, n]);
  });
  return sum(
    wide,
    d.terms.map(({ coefficient, factors }) => {
      const found = keys.get(dummyFreeKey(factors));
      const value = found
        ? power(generator(wide, found[0]), found[1])
        : inComponentRing(symbolicValue(d.geometry, factors), wide);
      return multiply(moveTo(coefficient, wide), value);
    }),
  );
}

function nothing(d: Derivation, asked: readonly string[]): InputError {
  const scalars = d.terms.filter(({ factors }) => factors.length > 1 && factors.every((f) => f.slots.length === 0));
  const hint =
    scalars.length > 0 ? 'R occurs squared: --linearise R' : 'give curvature, which linearises in every component';
  return fault(
    'nothing-to-linearise',
    `no power of ${asked.join(', ').slice(0, 60)} stands alone in the Lagrangian`,
    hint,
  );
}

/** On χ = X the linearised Lagrangian has the equations of the theory, and those of χ hold. */
function compareLinearised(
  d: Derivation,
  { vector }: EveryK,
  roles: VectorRoles,
  start: VectorForm,
  fields: readonly LinearisedField[],
  check: (name: string, detail: string, holds: boolean) => void,
): void {
  const background = comparedBackground(roles, d.ring, start.scalars);
  const inverse = asFraction(power(background.volume, -1));
  const values = new Map(
    fields.map(({ name, value }) => {
      const density = onBackground({ value: asFraction(value), scalars: start.scalars }, background);
      const scalar = asPoly({
        numerator: multiply(density.numerator, inverse.numerator),
        denominator: density.denominator,
      });
      return [name, scalar!] as const;
    }),
  );
  check(
    'linearised Lagrangian',
    'with the auxiliary fields replaced by what they stand for, it has the equations of the theory at every k, and their own hold',
    sameOnSubstitution(
      start,
      { ...vector.form, scalars: vector.form.scalars },
      values,
      [roles.lapse, roles.scale],
      background,
    ),
  );
}
