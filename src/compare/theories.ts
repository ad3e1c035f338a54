/**
 * Compares two theories on one geometry: their reduced Lagrangians exactly, up to a total derivative, up to a constant factor
 * and a rescaling of M², after a redefinition that the user gives; then the solutions of their equations.
 */
import { eulerLagrange } from '../algebra/calculus.js';
import { coefficientOf, moveTo } from '../algebra/collect.js';
import { constant, equals, isZero, multiply, type Poly, power, subtract } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { dropTotalDerivatives } from '../mechanics/total-derivatives.js';
import { PLANCK_MASS } from '../setting.js';
import { commonRing } from './common-ring.js';
import { type Difference, firstDifference } from './difference.js';
import { type Equivalence, equivalence } from './equivalence.js';
import { degreeIn, isUnit } from './factors.js';
import { type JetSpace, jetSpace } from './jet-space.js';
import { type Redefinition, readRedefinition } from './redefinition.js';
import { type Scaling, scalingBetween } from './scaling.js';
import { BOUNDS, type Bound } from './system.js';

/**
 * How two theories are related, the closest relation first: equal Lagrangians; equal up to a total derivative; equations equal
 * up to a constant factor and M²; the same solutions for all shared fields; the same metric and matter with different
 * connections; none of these.
 */
export type Relation = 'identical' | 'boundary' | 'scaled' | 'equivalent' | 'metric' | 'different' | 'undecided';

export interface Comparison {
  readonly relation: Relation;
  readonly redefinition: Redefinition;
  /** First Lagrangian minus second = d/dt of this; for `boundary`, when it is no logarithm. */
  readonly primitive: Poly | undefined;
  readonly scaling: Scaling | undefined;
  /** For `equivalent` and `metric`, and what was found for all fields otherwise. */
  readonly solutions: Equivalence | undefined;
  /** First difference: of what is left after elimination, else of the equations as they stand. */
  readonly difference: Difference | undefined;
  /** Fields that only one theory has. */
  readonly unshared: readonly [readonly string[], readonly string[]];
  /** For `different`: whether the equations of the metric and its matter are known to differ too. */
  readonly metricDiffers?: boolean;
  /** Why nothing was decided, when no elimination was tried. */
  readonly reason?: string;
}

export interface ComparisonOptions {
  /** Replacements of fields and couplings in the first theory. */
  readonly redefine?: readonly string[];
}

/** @throws InputError when the theories cannot be compared or a redefinition is at fault. */
export function compareTheories(a: Derivation, b: Derivation, options: ComparisonOptions = {}): Comparison {
  const ring = commonRing(a, b);
  const redefinition = readRedefinition(ring, a.geometry, options.redefine ?? []);
  const first = redefinition.apply(moveTo(a.lagrangian, ring));
  const second = moveTo(b.lagrangian, ring);
  const fields = [...new Set([...a.equations.keys(), ...b.equations.keys()])];
  const only = (d: Derivation, other: Derivation): string[] =>
    [...d.equations.keys()].filter((q) => !other.equations.has(q));
  const base = {
    redefinition,
    primitive: undefined,
    scaling: undefined,
    solutions: undefined,
    difference: undefined,
    unshared: [only(a, b), only(b, a)] as const,
  };
  // Without an action principle the Lagrangians say nothing; only the equations are compared then.
  const varied = a.geometry.traceless && b.geometry.traceless;
  if (varied && equals(first, second)) return { ...base, relation: 'identical' };
  const redefined = redefinition.texts.length === 0 ? a : withLagrangian(a, ring, first, redefinition);
  if (varied) {
    const rest = subtract(first, second);
    if (fields.every((q) => isZero(eulerLagrange(rest, q))))
      return { ...base, relation: 'boundary', primitive: primitiveOf(rest, fields, a.geometry.lapse) };
    const of = (l: Poly): Poly[] => fields.map((q) => eulerLagrange(l, q));
    const scaling = scalingBetween(of(first), of(second), PLANCK_MASS);
    if (scaling) return { ...base, relation: 'scaled', scaling };
  }
  if ([...a.geometry.rates.keys()].some((q) => redefinition.names.includes(q)))
    return { ...base, relation: 'undecided', reason: 'solutions are compared for the scale factor as it is' };
  const space = jetSpace([redefined, b]);
  const solved = bySolutions(space, redefined, b);
  if (solved.relation !== 'different') return { ...base, ...solved };
  return { ...base, ...solved, difference: differenceOf(space, redefined, b, solved.solutions) };
}

function primitiveOf(rest: Poly, fields: readonly string[], lapse: string): Poly | undefined {
  const movable = fields.filter((q) => q !== lapse);
  const { reduced, primitive } = dropTotalDerivatives(rest, movable, lapse);
  return isZero(reduced) ? primitive : undefined;
}

/** The derivation with another Lagrangian, as far as comparing needs it. */
function withLagrangian(d: Derivation, ring: Ring, lagrangian: Poly, { apply }: Redefinition): Derivation {
  const moved = (p: Poly): Poly => apply(moveTo(p, ring));
  return {
    ...d,
    ring,
    lagrangian,
    gravity: moved(d.gravity),
    fluids: d.fluids.map((f) => ({ ...f, rho: moved(f.rho), pressure: moved(f.pressure) })),
    equations: new Map([...d.equations.keys()].map((q) => [q, eulerLagrange(lagrangian, q)])),
  };
}

function bySolutions(
  space: JetSpace,
  a: Derivation,
  b: Derivation,
): Pick<Comparison, 'relation' | 'solutions' | 'metricDiffers'> {
  const common = new Set([...a.equations.keys()].filter((q) => b.equations.has(q)));
  const all = withMatter(space, a, b, common, BOUNDS);
  if (all.result === 'same') return { relation: 'equivalent', solutions: all };
  // Once the theories are known to differ, a short try tells whether their metrics do.
  const bounds = all.result === 'different' ? BOUNDS.slice(0, 1) : BOUNDS;
  const metric = withMatter(space, a, b, new Set(), bounds);
  if (metric.result === 'same') return { relation: 'metric', solutions: metric };
  if (metric.result === 'different') return { relation: 'different', solutions: metric, metricDiffers: true };
  return { relation: all.result, solutions: all };
}

/**
 * For matter of any pressure where both have the same fluids; for the fluids themselves where that fails or they differ. All
 * of it is tried within a short bound before anything is tried within a long one.
 */
function withMatter(
  space: JetSpace,
  a: Derivation,
  b: Derivation,
  shared: ReadonlySet<string>,
  bounds: readonly Bound[],
): Equivalence {
  const names = (d: Derivation): string =>
    d.fluids
      .map((f) => `${f.name} ${f.density}`)
      .sort()
      .join();
  const sameFluids = names(a) === names(b) && a.fluids.length > 0;
  let own: Equivalence | undefined;
  for (const bound of bounds) {
    const general = sameFluids ? equivalence(space, [a, b], shared, true, bound) : undefined;
    if (general?.result === 'same') return general;
    own = equivalence(space, [a, b], shared, false, bound);
    // Where both differ, the equations for any matter are the simpler ones to read.
    if (own.result === 'different') return general?.result === 'different' ? general : own;
    if (own.result === 'same') return own;
  }
  return own!;
}

/** From what is left after elimination where both theories have it, else from the equations as they stand. */
function differenceOf(
  space: JetSpace,
  a: Derivation,
  b: Derivation,
  solutions: Equivalence | undefined,
): Difference | undefined {
  const one = constant(space.ring, 1);
  if (solutions?.result === 'different' && solutions.missing.counterpart) {
    const { equation, poly, counterpart, of } = solutions.missing;
    const [mine, other] = [solvedFor(space, poly, equation), solvedFor(space, counterpart, equation)];
    if (mine && other) {
      const [first, second] = of === 1 ? [mine, other] : [other, mine];
      return firstDifference(space, new Map([[equation, first]]), new Map([[equation, second]]), one);
    }
  }
  if ([...a.equations.keys()].some((q) => !b.equations.has(q)) || a.equations.size !== b.equations.size)
    return undefined;
  const translated = (d: Derivation): ReadonlyMap<string, Poly> =>
    new Map([...d.equations].map(([q, e]) => [q, space.translate(e)]));
  return firstDifference(space, translated(a), translated(b), space.translate(a.geometry.spatialVolume));
}

/** The relation divided by the coefficient of what it is solved for, when that never vanishes. */
function solvedFor(space: JetSpace, p: Poly, name: string): Poly | undefined {
  const g = space.ring.position.get(name);
  if (g === undefined) return undefined;
  const coefficient = coefficientOf(p, name, degreeIn(p, g));
  return isUnit(space, coefficient) ? multiply(p, power(coefficient, -1)) : undefined;
}
