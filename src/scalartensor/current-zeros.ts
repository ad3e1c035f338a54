/**
 * Where the root √|J_μ J^μ| of a current J_μ = Σ J_A ∂_μ A is singular: common zeros of its components in field space. And
 * whether the current is a gradient. What depends on velocities, J_A Ȧ = 0, is for the solution to say.
 */
import { coefficientOf, involves, symbolsOf } from '../algebra/collect.js';
import { splitUnit } from '../algebra/division.js';
import { type Fraction, partialOfFraction } from '../algebra/fraction.js';
import { primitive } from '../algebra/linear.js';
import { equals, isZero, type Poly } from '../algebra/poly.js';
import { exponentRange } from '../algebra/ring.js';
import { integralOver, isZeroFraction, ringOf, subtractFraction, sumFractions, zeroFraction } from './vector-form.js';

/** All of these vanish together: scalars that are zero, and expressions that are. */
export interface SingularSurface {
  readonly vanishing: readonly string[];
  readonly conditions: readonly Poly[];
}

export interface CurrentResult {
  /** J_A by scalar. */
  readonly components: ReadonlyMap<string, Fraction>;
  /** The branch of the root that reproduces the theory: + stands for √|J²| = J_A n·∂A, with n towards the future. */
  readonly branch: '+J_A n·∂A';
  /** Common zeros of the components; empty when they have none for couplings in general. */
  readonly zeros: readonly SingularSurface[];
  /** F with J_μ = ∂_μ F, when there is one: then the root is that of one scalar, a cuscuton. */
  readonly potential: Fraction | undefined;
}

/** A surface, with the scalars that must not vanish on it because something is divided by them. */
interface Way extends SingularSurface {
  readonly divisors: readonly string[];
}

/** The ways in which a product of powers of scalars and one sum can vanish. */
function waysToVanish(p: Poly, scalars: readonly string[]): Way[] {
  const { reduced, unit } = splitUnit(p);
  const powerOf = (q: string): number => exponentRange(p.ring, unit.keys).low[p.ring.position.get(q)!]!;
  const divisors = scalars.filter((q) => powerOf(q) < 0);
  const alone = scalars.filter((q) => powerOf(q) > 0).map((q): Way => ({ vanishing: [q], conditions: [], divisors }));
  return reduced.size > 1 ? [...alone, { vanishing: [], conditions: [reduced], divisors }] : alone;
}

/** Two surfaces at once, conditions simplified by the scalars that vanish; undefined when that is never. */
function together(a: Way, b: Way): Way | undefined {
  const vanishing = [...new Set([...a.vanishing, ...b.vanishing])];
  const divisors = [...new Set([...a.divisors, ...b.divisors])];
  if (vanishing.some((q) => divisors.includes(q))) return undefined;
  const conditions: Poly[] = [];
  for (const condition of [...a.conditions, ...b.conditions]) {
    const rest = primitive(vanishing.reduce((p, q) => coefficientOf(p, q, 0), condition));
    if (isZero(rest) || conditions.some((c) => equals(c, rest))) continue;
    conditions.push(splitUnit(rest).reduced);
  }
  return { vanishing, conditions, divisors };
}

/** Whether a surface exists for couplings in general: each condition has a scalar in it. */
const isGeneral = ({ conditions }: SingularSurface, scalars: readonly string[]): boolean =>
  conditions.every((c) => scalars.some((q) => involves(c, q)));

/** Whether the first contains the second. */
const contains = (a: SingularSurface, b: SingularSurface): boolean =>
  a.vanishing.every((q) => b.vanishing.includes(q)) &&
  a.conditions.every((c) => b.conditions.some((d) => equals(c, d)));

function commonZeros(components: readonly Poly[], scalars: readonly string[]): SingularSurface[] {
  let surfaces: Way[] = [{ vanishing: [], conditions: [], divisors: [] }];
  for (const p of components)
    surfaces = surfaces.flatMap((s) => waysToVanish(p, scalars).flatMap((way) => together(s, way) ?? []));
  const general = surfaces.filter((s) => isGeneral(s, scalars));
  return general
    .filter((s, i) => !general.some((other, j) => j !== i && contains(other, s) && !(contains(s, other) && j > i)))
    .map(({ vanishing, conditions }) => ({ vanishing, conditions }));
}

/** F with F_A = J_A for every scalar, made by integrating one scalar after the other. */
function potentialOf(components: ReadonlyMap<string, Fraction>): Fraction | undefined {
  const [first] = components.values();
  if (!first) return undefined;
  const ring = ringOf(first);
  let potential = zeroFraction(ring);
  for (const [q, j] of components) {
    const part = integralOver(subtractFraction(j, partialOfFraction(potential, q)), q);
    if (!part) return undefined;
    potential = sumFractions(ring, [potential, part]);
  }
  const isGradient = [...components].every(([q, j]) =>
    isZeroFraction(subtractFraction(partialOfFraction(potential, q), j)),
  );
  return isGradient ? potential : undefined;
}

/** What is to be said about a current; undefined when it vanishes. */
export function currentResult(components: ReadonlyMap<string, Fraction>): CurrentResult | undefined {
  const present = [...components.values()].filter((j) => !isZeroFraction(j));
  if (present.length === 0) return undefined;
  const scalars = [...components.keys()];
  return {
    components,
    branch: '+J_A n·∂A',
    zeros: commonZeros(
      present.map((j) => j.numerator),
      scalars,
    ).filter((s) => s.vanishing.length + s.conditions.length > 0),
    potential: potentialOf(components),
  };
}

/** Names of the scalars that a surface involves. */
export const scalarsOf = (s: SingularSurface, scalars: readonly string[]): string[] =>
  scalars.filter((q) => s.vanishing.includes(q) || s.conditions.some((c) => symbolsOf(c).includes(q)));
