/**
 * What holds for every spatial curvature: the constraint-vector form, how far the rules lead from it to the metric analogue and
 * where they stop, under which conditions on the couplings they do not, and the form without torsion where the fields of the
 * connection can be integrated out directly. Added to a derivation when it is asked for.
 */
import { eulerLagrange } from './algebra/calculus.js';
import { moveTo } from './algebra/collect.js';
import { addFraction, equalFraction, type Fraction, fraction } from './algebra/fraction.js';
import { isZero, type Poly, subtract } from './algebra/poly.js';
import { jetsOf, makeRing, type Ring } from './algebra/ring.js';
import type { Check, Derivation, EveryK, IntegratedForm, ScalarTensorForm } from './derivation.js';
import { comovingOf } from './geometry/comoving.js';
import type { Geometry } from './geometry/geometry.js';
import { symbolicValue } from './geometry/reduction.js';
import { couplingCombinations, screeningConditions } from './mechanics/couplings.js';
import { type SolvedConditions, solveConditions } from './mechanics/linear-conditions.js';
import { dropTotalDerivatives } from './mechanics/total-derivatives.js';
import type { Theory } from './notation/theory.js';
import { type EliminationBranch, integrateDirectly } from './scalartensor/auxiliary.js';
import { fieldRules } from './scalartensor/auxiliary-file.js';
import { backgroundOf, constraintVector, type VectorRoles } from './scalartensor/constraint-vector.js';
import { currentResult } from './scalartensor/current-zeros.js';
import { sameEquations } from './scalartensor/elimination-check.js';
import { movingNames } from './scalartensor/form-rules.js';
import { type MetricForm, metricForm } from './scalartensor/metric-form.js';
import {
  asPoly,
  type Background,
  isZeroFraction,
  onBackground,
  rateAlong,
  termsIn,
  type VectorForm,
} from './scalartensor/vector-form.js';
import { type Setting, settingOf } from './setting.js';

type Checker = (name: string, detail: string, holds: boolean) => void;

/** A first-order Lagrangian has equations of second order, and solutions that are inserted bring derivatives of their own. */
const COMPARED_JETS = 5;

/** Names and kinematics of an isotropic geometry; undefined for another. */
export function vectorRoles(geometry: Geometry): VectorRoles | undefined {
  const { isotropic, lapse, components, metricCurvature, volume } = geometry;
  if (!isotropic) return undefined;
  const { scale, curvature } = isotropic;
  return { lapse, scale, curvature, components, metricCurvature, volume, comoving: comovingOf(geometry) };
}

/** A background with enough derivatives to compare equations, for a form with the given scalars. */
export function comparedBackground(roles: VectorRoles, ring: Ring, scalars: readonly string[]): Background {
  const fields = [roles.lapse, roles.scale, ...scalars];
  const others = ring.generators.filter((g) => g.kind !== 'jet' && !scalars.includes(g.name));
  return backgroundOf(roles, makeRing([...fields.flatMap((q) => jetsOf(q, COMPARED_JETS)), ...others]));
}

/**
 * The derivation with what holds for every spatial curvature; the same one where that is there, or on a geometry that is not isotropic.
 * @throws Error when a check fails, which means that this program is wrong.
 */
export function withEveryK(d: Derivation, onStep: (what: string) => void = () => {}): Derivation {
  if (!d.geometry.isotropic || d.everyK) return d;
  const checks: Check[] = [];
  const check: Checker = (name, detail, holds) => {
    if (!holds) throw new Error(`check failed: ${name} (${detail})`);
    checks.push({ name, holds, detail });
  };
  // The setting keeps the parameters of the geometry as symbols, also when the theory imposes values on them.
  const setting = settingOf(asRead(d), onStep);
  onStep('looking for the form at every spatial curvature');
  const movable = setting.fields.map((f) => f.name).filter((q) => q !== d.geometry.lapse);
  const { reduced } = dropTotalDerivatives(setting.gravity, movable, d.geometry.lapse);
  const everyK = everyKOf(setting, d.scalarTensor, reduced, check);
  return everyK ? { ...d, everyK, checks: [...d.checks, ...checks] } : d;
}

/** The theory as it was read: a derivation counts the components of spin tensors among its symbols. */
function asRead({ theory, spin }: Derivation): Theory {
  const components = spin?.tensors.flatMap((t) => t.components) ?? [];
  return { ...theory, symbols: theory.symbols.filter((s) => !components.some((c) => c.name === s.name)) };
}

/**
 * The results of this module; undefined on a geometry that is not isotropic.
 * @param reducedGravity the gravitational Lagrangian without total derivatives.
 * @param form the metric analogue as it was found by comparing coefficients: the rules must lead to the same.
 */
function everyKOf(setting: Setting, form: ScalarTensorForm, reducedGravity: Poly, check: Checker): EveryK | undefined {
  const { geometry, ring, terms, gravity, constrained, fields } = setting;
  const roles = vectorRoles(geometry);
  if (!roles) return undefined;
  const scalars = fields.map((f) => f.name).filter((q) => q !== roles.lapse && q !== roles.scale);
  const isPlain = constrained.length === 0;
  const lagrangian = terms.map(({ coefficient, factors }) => ({
    coefficient,
    value: symbolicValue(geometry, factors),
  }));
  const outcome = constraintVector(gravity, isPlain ? lagrangian : undefined, roles, scalars);
  if (!outcome.found) return undefined;
  const { vector } = outcome;
  check(
    'constraint-vector form',
    'evaluated on the metric geometry it is the reduced Lagrangian term by term, so all equations agree for every k',
    true,
  );
  const none = {
    vector,
    metric: undefined,
    current: undefined,
    conditions: undefined,
    screening: undefined,
    integrated: undefined,
  };
  // Multipliers are no scalars of a metric analogue; with constraints it belongs to their branches.
  if (!isPlain) return none;
  const metric = metricForm(vector.form);
  compareRoutes(
    metric,
    form,
    backgroundOf(roles, ring),
    { gravity, fields: [roles.lapse, roles.scale, ...scalars] },
    check,
  );
  return {
    vector,
    metric,
    current: metric.reached && currentResult(metric.reached.functions.current),
    conditions: metric.reached && conditionsFor(metric.reached.remainder, setting, scalars),
    screening: screeningOf(setting, reducedGravity, roles.curvature),
    integrated: metric.stop === undefined ? undefined : integratedForm(vector.form, scalars, roles, ring, check),
  };
}

/** A Lagrangian and the fields that are varied in it. */
interface Compared {
  readonly gravity: Poly;
  readonly fields: readonly string[];
}

/** The functions that the rules lead to against those that comparing coefficients found. */
function compareRoutes(
  metric: MetricForm,
  form: ScalarTensorForm,
  background: Background,
  { gravity, fields }: Compared,
  check: Checker,
): void {
  const name = 'two routes to the scalar-tensor form';
  const detail = 'the rules lead from the constraint-vector form to the functions that comparing coefficients gives';
  if (form.form === 'none' || !metric.reached) {
    check(name, detail, form.form === 'none' && !metric.reached);
    return;
  }
  const { functions } = metric.reached;
  const same = (f: Fraction, p: Poly): boolean => equalFraction(f, fraction(moveTo(p, f.numerator.ring)));
  const sameMap = (a: ReadonlyMap<string, Fraction>, b: ReadonlyMap<string, Poly>): boolean =>
    [...a].every(([key, f]) => same(f, b.get(key)!));
  check(
    name,
    detail,
    same(functions.g4, form.g4) &&
      same(functions.potential, form.potential) &&
      sameMap(functions.kinetic, form.kinetic) &&
      sameMap(functions.current, form.current),
  );
  const { form: last, remainder } = metric.reached;
  const whole = asPoly(onBackground({ ...last, value: addFraction(last.value, remainder) }, background));
  check(
    'scalar-tensor form with its obstruction',
    'the metric analogue and what the rules leave of the spatial curvature have together the equations of the theory at every k',
    whole !== undefined && fields.every((q) => isZero(eulerLagrange(subtract(gravity, whole), q))),
  );
}

/** When an expression in ³R vanishes for all fields: conditions on the couplings, solved as far as they are linear. */
function conditionsFor(remainder: Fraction, setting: Setting, scalars: readonly string[]): SolvedConditions {
  const moving = [...movingNames(scalars), ...scalars];
  return solvedFor(setting, couplingCombinations(remainder.numerator, moving, scalesOf(setting)));
}

/** When the spatial curvature drops out of the equations. */
function screeningOf(setting: Setting, reducedGravity: Poly, curvature: string): SolvedConditions {
  const parameters = setting.geometry.parameters.map((p) => p.name);
  return solvedFor(setting, screeningConditions(reducedGravity, curvature, parameters, scalesOf(setting)));
}

const scalesOf = ({ theory }: Setting): string[] => theory.symbols.filter((s) => s.role === 'scale').map((s) => s.name);

/** Conditions on the couplings of a theory, solved as far as they are linear. */
export const solvedFor = ({ theory }: Pick<Setting, 'theory'>, conditions: readonly Poly[]): SolvedConditions =>
  solveConditions(
    conditions,
    theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name),
  );

/** Whether each term has at most one velocity, without which no field of the connection can be integrated out directly. */
function isLinearInRates({ value, scalars }: VectorForm): boolean {
  const rates = scalars.map(rateAlong);
  const terms = termsIn(value, rates);
  return terms?.every(({ powers }) => [...powers.values()].reduce((n, e) => n + e, 0) <= 1) ?? false;
}

/** The connection integrated out by the rules without branches, when that leaves a form which holds for every k. */
function integratedForm(
  form: VectorForm,
  scalars: readonly string[],
  roles: VectorRoles,
  ring: Ring,
  check: Checker,
): IntegratedForm | undefined {
  if (!isLinearInRates(form)) return undefined;
  const branch = integrateDirectly(form, scalars, fieldRules());
  if (!branch) return undefined;
  const metric = metricForm(branch.form);
  if (!metric.reached || !isZeroFraction(metric.reached.remainder)) return undefined;
  check(
    'connection integrated out',
    'with the solutions of the connection inserted, the equations of lapse and scale factor are those of the metric form at every k',
    agrees(form, branch, metric, roles, ring),
  );
  return { branch, metric };
}

/** The equations of a form with the solutions of a branch inserted, and those of the metric form that the branch leads to. */
export function agrees(
  form: VectorForm,
  branch: EliminationBranch,
  metric: MetricForm | undefined,
  roles: VectorRoles,
  ring: Ring,
): boolean {
  const background = comparedBackground(roles, ring, form.scalars);
  const reached = metric?.reached;
  const last: VectorForm =
    reached && isZeroFraction(reached.remainder)
      ? { ...reached.form, scalars: form.scalars }
      : { ...branch.form, scalars: form.scalars };
  return sameEquations(form, { ...branch, form: last }, [roles.lapse, roles.scale], background);
}
