/**
 * The bi-scalar form: √−g [G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V] with the scalars that the symmetry leaves to the
 * connection, read off the reduced Lagrangian at lapse 1 and zero spatial curvature, then reduced again from its covariant
 * form on the metric geometry and compared equation by equation.
 */
import { eulerLagrange, partial } from '../algebra/calculus.js';
import { coefficientOf, collect, monomialOf, partition, substitute } from '../algebra/collect.js';
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
  zero,
} from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { jetName, positionOf, type Ring } from '../algebra/ring.js';
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

/** A gravitational Lagrangian with lapse, matter left out, and what is already known of it. */
export interface Gravity {
  /** Its representative up to total derivatives, fields in the order scale factor, then scalars. */
  readonly reduced: Poly;
  /** Its Euler–Lagrange expressions by field. */
  readonly equations: ReadonlyMap<string, Poly>;
}

/**
 * Finds the form of a gravitational Lagrangian, or says which terms have none in this class.
 * @throws Error when the equations of the form differ from those of the theory: the program would be wrong.
 */
export function biScalarForm(gravity: Gravity, roles: BiScalarRoles): BiScalarOutcome {
  const { ring } = gravity.reduced;
  const { lapse, scale: a, scalars } = roles;
  // Dropping total derivatives goes term by term, so that it commutes with setting k = 0.
  const reduced = coefficientOf(gravity.reduced, roles.curvature, 0);
  const perVolume = multiply(atUnitLapse(reduced, lapse), generator(ring, a, -3));
  const { coefficient, rest } = quadraticForm(perVolume, a, scalars);
  if (!isZero(rest))
    return {
      found: false,
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: rest,
    };
  const inverse = coefficient(a, a);
  const wrong = scalars
    .map((q) => ({ q, excess: subtract(coefficient(a, q), partial(inverse, q)) }))
    .filter(({ excess }) => !isZero(excess));
  if (wrong.length > 0)
    return {
      found: false,
      reason: 'the coefficient of H times a velocity must be the derivative of the coefficient of H² and is not',
      offending: mismatch(coefficient, a, scalars, wrong),
    };
  const functions: BiScalarFunctions = {
    g4: scale(inverse, rational(-1, 6)),
    kinetic: new Map(pairsOf(scalars).map(([x, y]) => [`${x},${y}`, scale(coefficient(x, y), 2)])),
    current: new Map(scalars.map((q) => [q, coefficient(q)])),
    potential: negate(coefficient()),
  };
  return { found: true, functions, obstruction: verified(gravity, functions, roles) };
}

/** The terms of the Lagrangian in H² and H q̇ that do not fit each other; `excess` is what H q̇ has too much. */
function mismatch(
  coefficient: QuadraticForm['coefficient'],
  a: string,
  scalars: readonly string[],
  wrong: readonly { readonly q: string; readonly excess: Poly }[],
): Poly {
  const { ring } = coefficient();
  const places = scalars.map((q) => positionOf(ring, q));
  const rate = (q: string): Poly =>
    multiply(generator(ring, jetName(q, 1)), q === a ? generator(ring, a, -1) : constant(ring, 1));
  const powersOf = (e: (g: number) => number, lowered?: string): string =>
    places.map((g, i) => e(g) - (scalars[i] === lowered ? 1 : 0)).join();
  const unfit = wrong.map(({ q, excess }) => {
    const groups = collect(excess, (g) => places.includes(g)).map(({ monomial: powers }) => new Map(powers));
    return { q, powers: new Set(groups.map((powers) => powersOf((g) => powers.get(g) ?? 0))) };
  });
  const [squares] = partition(coefficient(a, a), (e) => unfit.some(({ q, powers }) => powers.has(powersOf(e, q))));
  const mixed = unfit.map(({ q, powers }) => {
    const [terms] = partition(coefficient(a, q), (e) => powers.has(powersOf(e)));
    return product(ring, [terms, rate(a), rate(q)]);
  });
  return sum(ring, [product(ring, [squares, rate(a), rate(a)]), ...mixed]);
}

interface QuadraticForm {
  /** What multiplies the product of the rates of the given fields: Ȧ of a scalar, H = ȧ/a of the scale factor. */
  readonly coefficient: (...fields: readonly string[]) => Poly;
  /** Terms that are no polynomial of second degree in the rates. */
  readonly rest: Poly;
}

/** A Lagrangian at lapse 1 per volume as a polynomial in the rates of the scale factor and of the scalars. */
function quadraticForm(perVolume: Poly, a: string, scalars: readonly string[]): QuadraticForm {
  const { ring } = perVolume;
  const fields = [a, ...scalars];
  const velocities = fields.map((q) => positionOf(ring, jetName(q, 1)));
  const scalePlace = positionOf(ring, a);
  const parts = new Map<string, Poly>();
  const rest: Poly[] = [];
  for (const { monomial: powers, coefficient } of collect(
    perVolume,
    (g) => g === scalePlace || velocities.includes(g),
  )) {
    const exponent = new Map(powers);
    const degrees = velocities.map((g) => exponent.get(g) ?? 0);
    // Without curvature a is only a unit of length: it must occur as ȧ/a.
    const isRate = (exponent.get(scalePlace) ?? 0) === -degrees[0]!;
    if (isRate && degrees.every((d) => d >= 0) && degrees.reduce((n, d) => n + d, 0) <= 2)
      parts.set(degrees.join(), coefficient);
    else rest.push(multiply(monomialOf(ring, powers), coefficient));
  }
  const degreesOf = (of: readonly string[]): string => fields.map((q) => of.filter((r) => r === q).length).join();
  return { coefficient: (...of) => parts.get(degreesOf(of)) ?? zero(ring), rest: sum(ring, rest) };
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
function verified({ reduced, equations }: Gravity, f: BiScalarFunctions, roles: BiScalarRoles): Poly {
  const { ring } = reduced;
  const { lapse, scale: a, scalars, curvature } = roles;
  const form = reducedForm(f, roles, ring);
  const flat = (p: Poly): Poly => coefficientOf(p, curvature, 0);
  const flatForm = flat(form);
  for (const q of [lapse, a, ...scalars])
    if (!equals(flat(equations.get(q)!), eulerLagrange(flatForm, q)))
      throw new Error(`the scalar-tensor form has another equation of ${q} than the torsion theory`);
  const obstruction = subtract(reduced, dropTotalDerivatives(form, [a, ...scalars], lapse).reduced);
  if (!isZero(flat(obstruction))) throw new Error('the scalar-tensor form differs from the torsion theory at k = 0');
  return multiply(atUnitLapse(obstruction, lapse), generator(ring, a, -3));
}
