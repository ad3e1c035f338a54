/**
 * The constraint-vector form of a reduced Lagrangian, for every spatial curvature and of any degree: rates become derivatives
 * along a unit timelike vector n (multiplier λ(n² + 1)), the expansion rate becomes θ and the spatial curvature ³R.
 * What replaces what is computed from the kinematics of n on the geometry, never typed in, and the form is evaluated on the
 * metric geometry again: it must be the Lagrangian that it came from, term by term.
 */
import { involves, moveTo, substitute } from '../algebra/collect.js';
import {
  equals,
  generator,
  leadingCoefficient,
  multiply,
  type Poly,
  power,
  product,
  scale,
  sum,
} from '../algebra/poly.js';
import { divideRational, ONE, type Rational } from '../algebra/rational.js';
import { constantsOf, jetName, makeRing, type Ring } from '../algebra/ring.js';
import type { Comoving } from '../geometry/comoving.js';
import type { ComponentSymbol } from '../geometry/geometry.js';
import {
  asFraction,
  asPoly,
  type Background,
  EXPANSION,
  onBackground,
  rateAlong,
  SPATIAL_CURVATURE,
  type VectorForm,
  vectorRing,
} from './vector-form.js';

/** Names and kinematics that the construction needs from the geometry. */
export interface VectorRoles {
  readonly lapse: string;
  readonly scale: string;
  readonly curvature: string;
  readonly components: readonly ComponentSymbol[];
  readonly comoving: Comoving;
  /** Curvature scalar of the metric connection. */
  readonly metricCurvature: Poly;
  /** Determinant of the coframe. */
  readonly volume: Poly;
}

/** The Lagrangian as a sum of coefficients times polynomials in component symbols. */
export type ComponentLagrangian = readonly { readonly coefficient: Poly; readonly value: Poly }[];

export interface ConstraintVectorForm {
  /** What each component of torsion and curvature becomes, in the ring of `form`. */
  readonly components: ReadonlyMap<string, Poly>;
  /** The Lagrangian in component symbols, in a ring of these and the couplings; where it is known in them. */
  readonly inComponents: Poly | undefined;
  /** The same with the components written out. */
  readonly form: VectorForm;
}

export type ConstraintVectorOutcome =
  | { readonly found: true; readonly vector: ConstraintVectorForm }
  | { readonly found: false; readonly reason: string; readonly offending: Poly | undefined };

/** The ratio of two single terms that agree up to a number; undefined when they do not. */
function ratioOf(p: Poly, q: Poly): Rational | undefined {
  if (p.size !== 1 || q.size !== 1) return undefined;
  const ratio = divideRational(leadingCoefficient(p), leadingCoefficient(q));
  return equals(p, scale(q, ratio)) ? ratio : undefined;
}

/** How a reduced expression per volume is read as one of n: the inverse of evaluating it. */
interface Reading {
  /** @returns undefined when something is left that the vector form has no word for. */
  readonly read: (p: Poly) => Poly | undefined;
  readonly ring: Ring;
}

/**
 * θ = c (ȧ/aN) and ³R = d k/a² with numbers c and d are solved for ȧ and k, and D(q,1) = N n·∂q; a scalar then contains
 * neither N nor a any more.
 */
function readingOf(roles: VectorRoles, scalars: readonly string[], constants: readonly string[]): Reading | undefined {
  const { lapse, scale: a, curvature, comoving } = roles;
  const own = comoving.expansion.ring;
  const rate = product(own, [generator(own, jetName(a, 1)), generator(own, a, -1), generator(own, lapse, -1)]);
  const round = product(own, [generator(own, curvature), generator(own, a, -2)]);
  const perRate = ratioOf(comoving.expansion, rate);
  const perRound = ratioOf(comoving.spatialCurvature, round);
  if (!comoving.isShearFree || !perRate || !perRound) return undefined;
  const ring = vectorRing(scalars, constants);
  const wide = makeRing([...ring.generators, ...constantsOf([lapse, a])]);
  const g = (name: string, e = 1): Poly => generator(wide, name, e);
  const images = new Map<string, Poly>([
    [jetName(a, 1), scale(product(wide, [g(EXPANSION), g(a), g(lapse)]), divideRational(ONE, perRate))],
    [curvature, scale(product(wide, [g(SPATIAL_CURVATURE), g(a, 2)]), divideRational(ONE, perRound))],
    ...scalars.map((q): [string, Poly] => [jetName(q, 1), product(wide, [g(rateAlong(q)), g(lapse)])]),
  ]);
  const read = (p: Poly): Poly | undefined => {
    // Scalars contain no odd powers of a radical, and one that is nowhere needs no image.
    const plain = makeRing(p.ring.generators.filter((g) => g.kind !== 'radical'));
    const known = plain.generators.every(
      ({ name }) => images.has(name) || wide.position.has(name) || !involves(p, name),
    );
    const image = known ? substitute(moveTo(p, plain), images, wide) : undefined;
    return image && !involves(image, lapse) && !involves(image, a) ? moveTo(image, ring) : undefined;
  };
  return { read, ring };
}

/** Names of the constants of a ring, the spatial curvature left out. */
export const constantsIn = (ring: Ring, curvature: string): string[] =>
  ring.generators.filter((g) => g.kind === 'constant' && g.name !== curvature).map((g) => g.name);

/** The background on which vector forms with the scalars of a ring of jets are evaluated. */
export const backgroundOf = ({ lapse, comoving, volume, metricCurvature }: VectorRoles, ring: Ring): Background => ({
  ring,
  lapse,
  expansion: moveTo(comoving.expansion, ring),
  spatialCurvature: moveTo(comoving.spatialCurvature, ring),
  metricCurvature: moveTo(metricCurvature, ring),
  volume: moveTo(volume, ring),
});

/** A component may have the name of a constant of the user. */
export const componentName = (name: string): string => `component ${name}`;

/** A ring of component symbols, constants and further names. */
export const componentRing = (roles: VectorRoles, constants: readonly string[], more: readonly string[] = []): Ring =>
  makeRing(constantsOf([...roles.components.map((c) => componentName(c.name)), ...more, ...constants]));

/** A value in the ring of component symbols, in such a ring. */
export const inComponentRing = (value: Poly, into: Ring): Poly =>
  substitute(
    value,
    new Map(value.ring.generators.map(({ name }) => [name, generator(into, componentName(name))])),
    into,
  );

/** A Lagrangian in component symbols as one polynomial. */
export const joined = (lagrangian: ComponentLagrangian, into: Ring): Poly =>
  sum(
    into,
    lagrangian.map(({ coefficient, value }) => multiply(moveTo(coefficient, into), inComponentRing(value, into))),
  );

/**
 * The constraint-vector form of a gravitational Lagrangian.
 * @param gravity a³N L, matter left out, before total derivatives are dropped.
 * @param lagrangian the same in component symbols, where it is known: a second route to the form.
 * @throws Error when the two routes differ, or when the form has another value on the metric geometry than the Lagrangian:
 * the program would be wrong.
 */
export function constraintVector(
  gravity: Poly,
  lagrangian: ComponentLagrangian | undefined,
  roles: VectorRoles,
  scalars: readonly string[],
): ConstraintVectorOutcome {
  const constants = constantsIn(gravity.ring, roles.curvature);
  const reading = readingOf(roles, scalars, constants);
  if (!reading)
    return {
      found: false,
      reason: 'the normal vector has shear, or its expansion and the spatial curvature are no single terms',
      offending: undefined,
    };
  const components = new Map<string, Poly>();
  for (const { name, value } of roles.components) {
    const image = reading.read(value);
    if (!image) return { found: false, reason: `the component ${name} is no scalar of n`, offending: value };
    components.set(name, image);
  }
  const background = backgroundOf(roles, gravity.ring);
  const whole = reading.read(multiply(gravity, power(background.volume, -1)));
  if (!whole) return { found: false, reason: 'the Lagrangian contains what is no scalar of n', offending: gravity };
  const form: VectorForm = { value: asFraction(whole), scalars };
  const there = asPoly(onBackground(form, background));
  if (!there || !equals(there, gravity))
    throw new Error('the constraint-vector form has another value on the metric geometry than the Lagrangian');
  const inComponents = lagrangian && joined(lagrangian, componentRing(roles, constants));
  if (inComponents && !equals(inVector(inComponents, components, reading.ring), whole))
    throw new Error('the components give another constraint-vector form than the reduced Lagrangian');
  return { found: true, vector: { components, inComponents, form } };
}

/** A Lagrangian in component symbols with the components written out. */
export const inVector = (inComponents: Poly, components: ReadonlyMap<string, Poly>, ring: Ring): Poly =>
  substitute(inComponents, new Map([...components].map(([name, p]) => [componentName(name), moveTo(p, ring)])), ring);
