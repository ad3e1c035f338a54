/**
 * The bi-scalar form: √−g [G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V] with the scalars that the symmetry leaves to the
 * connection, read off the reduced Lagrangian at lapse 1 and zero spatial curvature, then reduced again from its covariant
 * form on the metric geometry and compared equation by equation.
 */
import { eulerLagrange, partial } from '../algebra/calculus.js';
import { coefficientOf, partition, substitute } from '../algebra/collect.js';
import {
  constant,
  equals,
  generator,
  isZero,
  monomial,
  multiply,
  negate,
  type Poly,
  product,
  scale,
  subtract,
  sum,
} from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { jetName, type Ring } from '../algebra/ring.js';
import { dropTotalDerivatives } from '../mechanics/total-derivatives.js';

/** Names and values that the construction needs from the geometry, in the ring of the Lagrangian. */
export interface BiScalarRoles {
  readonly lapse: string;
  readonly scale: string;
  readonly curvature: string;
  readonly scalars: readonly string[];
  /** Curvature scalar of the metric connection. */
  readonly metricCurvature: Poly;
  /** Determinant of the coframe. */
  readonly volume: Poly;
}

/** The functions of the scalars that make up the form. */
export interface BiScalarFunctions {
  readonly g4: Poly;
  /** Keyed `A,B`, one entry for each unordered pair in the order of the scalars. */
  readonly kinetic: ReadonlyMap<string, Poly>;
  readonly current: ReadonlyMap<string, Poly>;
  readonly potential: Poly;
}

export type BiScalarOutcome =
  | { readonly found: true; readonly functions: BiScalarFunctions; readonly obstruction: Poly }
  | { readonly found: false; readonly reason: string; readonly offending: Poly };

/** Unordered pairs of scalars as [A, B], in order. */
export const pairsOf = (scalars: readonly string[]): [string, string][] =>
  scalars.flatMap((a, i) => scalars.slice(i).map((b): [string, string] => [a, b]));

/**
 * Finds the form of a gravitational Lagrangian (with lapse, matter left out), or says which terms have none in this class.
 * @throws Error when the equations of the form differ from those of the theory: the program would be wrong.
 */
export function biScalarForm(gravity: Poly, roles: BiScalarRoles): BiScalarOutcome {
  const { ring } = gravity;
  const flat = coefficientOf(gravity, roles.curvature, 0);
  const { lapse, scale: a, scalars } = roles;
  const { reduced } = dropTotalDerivatives(flat, [a, ...scalars], lapse);
  const perVolume = multiply(atUnitLapse(reduced, lapse), generator(ring, a, -3));
  const velocities = [a, ...scalars].map((q) => ring.position.get(jetName(q, 1))!);
  const scalePlace = ring.position.get(a)!;
  const degree = (e: (g: number) => number): number => velocities.reduce((n, g) => n + e(g), 0);
  // Without curvature a is only a unit of length: it must occur as ȧ/a.
  const [fits, tooMuch] = partition(perVolume, (e) => {
    const d = degree(e);
    return d >= 0 && d <= 2 && velocities.every((g) => e(g) >= 0) && e(scalePlace) === -e(velocities[0]!);
  });
  if (!isZero(tooMuch))
    return {
      found: false,
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: tooMuch,
    };
  const rate = (p: Poly, n: number): Poly => multiply(coefficientOf(p, jetName(a, 1), n), generator(ring, a, n));
  const quadratic = (p: Poly, q: string, n: number): Poly => coefficientOf(p, jetName(q, 1), n);
  const still = (p: Poly): Poly => scalars.reduce((s, q) => quadratic(s, q, 0), p);

  const inverse = still(rate(fits, 2));
  const mixed = new Map(
    scalars.map((q) => [q, still(scalars.reduce((s, r) => (r === q ? quadratic(s, r, 1) : s), rate(fits, 1)))]),
  );
  const wrong = scalars
    .map((q) => ({ q, rest: subtract(mixed.get(q)!, partial(inverse, q)) }))
    .filter(({ rest }) => !isZero(rest));
  if (wrong.length > 0)
    return {
      found: false,
      reason: 'the coefficient of H times a velocity must be the derivative of the coefficient of H² and is not',
      offending: sum(
        ring,
        wrong.map(({ q, rest }) =>
          product(ring, [rest, generator(ring, jetName(q, 1)), generator(ring, jetName(a, 1)), generator(ring, a, -1)]),
        ),
      ),
    };
  const slow = rate(fits, 0);
  const others = (pair: readonly string[]): readonly string[] => scalars.filter((q) => !pair.includes(q));
  const without = (p: Poly, pair: readonly string[]): Poly => others(pair).reduce((s, q) => quadratic(s, q, 0), p);
  const kinetic = new Map(
    pairsOf(scalars).map(([x, y]) => {
      const part = x === y ? quadratic(slow, x, 2) : quadratic(quadratic(slow, x, 1), y, 1);
      return [`${x},${y}`, scale(without(part, [x, y]), 2)];
    }),
  );
  const current = new Map(scalars.map((q) => [q, without(quadratic(slow, q, 1), [q])]));
  const functions: BiScalarFunctions = {
    g4: scale(inverse, rational(-1, 6)),
    kinetic,
    current,
    potential: negate(still(slow)),
  };
  return { found: true, functions, obstruction: verified(gravity, functions, roles) };
}

/** N = 1 and its derivatives 0. Sound after variation, and for reading off functions of a reparametrisation-invariant L. */
export function atUnitLapse(p: Poly, lapse: string): Poly {
  const { ring } = p;
  const images = new Map<string, Poly>();
  for (const g of ring.generators)
    if (g.kind === 'jet' && g.field === lapse) images.set(g.name, constant(ring, g.order === 0 ? 1 : 0));
  return substitute(p, images);
}

/** The covariant form on the metric geometry, with lapse: X^AB = ½ȦḂ/N², the positive branch of √|J²| = J_A Ȧ/N. */
export function reducedForm(f: BiScalarFunctions, roles: BiScalarRoles, ring: Ring): Poly {
  const velocity = (q: string): Poly =>
    monomial(ring, rational(1), [
      [jetName(q, 1), 1],
      [roles.lapse, -1],
    ]);
  const kinetic = [...f.kinetic].map(([key, k]) => {
    const [x, y] = key.split(',') as [string, string];
    return scale(product(ring, [k, velocity(x), velocity(y)]), rational(1, 2));
  });
  const current = [...f.current].map(([q, j]) => multiply(j, velocity(q)));
  const bracket = sum(ring, [multiply(f.g4, roles.metricCurvature), ...kinetic, ...current, negate(f.potential)]);
  return multiply(roles.volume, bracket);
}

/** Compares the equations at k = 0 and returns the obstruction at k ≠ 0. */
function verified(gravity: Poly, f: BiScalarFunctions, roles: BiScalarRoles): Poly {
  const { ring } = gravity;
  const { lapse, scale: a, scalars, curvature } = roles;
  const form = reducedForm(f, roles, ring);
  const flat = (p: Poly): Poly => coefficientOf(p, curvature, 0);
  for (const q of [lapse, a, ...scalars])
    if (!equals(eulerLagrange(flat(gravity), q), eulerLagrange(flat(form), q)))
      throw new Error(`the scalar-tensor form has another equation of ${q} than the torsion theory`);
  const { reduced } = dropTotalDerivatives(subtract(gravity, form), [a, ...scalars], lapse);
  if (!isZero(flat(reduced))) throw new Error('the scalar-tensor form differs from the torsion theory at k = 0');
  return multiply(atUnitLapse(reduced, lapse), generator(ring, a, -3));
}
