/** What a background can see of the couplings, and the conditions under which the spatial curvature drops out. */
import { collect, involves, partition } from '../algebra/collect.js';
import { compareSimplicity, independent, primitive } from '../algebra/linear.js';
import { remember } from '../algebra/memo.js';
import { equals, monomial, multiply, type Poly } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { exponentAt, positionOf } from '../algebra/ring.js';

/** Coefficients of the monomials in fields and geometric parameters, each once, simplest first, linearly independent. */
export function couplingCombinations(reduced: Poly, parameters: readonly string[], scales: readonly string[]): Poly[] {
  const { ring } = reduced;
  const groups = collect(reduced, (g) => {
    const generator = ring.generators[g]!;
    return generator.kind === 'jet' || generator.kind === 'source' || parameters.includes(generator.name);
  });
  const chosen = groups.map(({ coefficient }) => primitive(withoutScales(coefficient, scales)));
  return independent(distinct(chosen).sort(compareSimplicity));
}

/** Each polynomial once: many monomials have the same coefficient, and sorting is what costs. */
function distinct(polys: readonly Poly[]): Poly[] {
  const bySize = new Map<number, Poly[]>();
  for (const p of polys) {
    const known = remember(bySize, p.size, () => []);
    if (!known.some((q) => equals(p, q))) known.push(p);
  }
  return [...bySize.values()].flat();
}

/** Divides by the largest monomial in the scales that divides every term, since a common scale is no coupling. */
function withoutScales(p: Poly, scales: readonly string[]): Poly {
  const { ring } = p;
  const powers = scales
    .filter((s) => involves(p, s))
    .map((s) => {
      const g = ring.position.get(s)!;
      let least = Number.POSITIVE_INFINITY;
      for (let i = 0; i < p.size; i++) least = Math.min(least, exponentAt(p.keys, i * ring.words, g));
      return [s, -least] as const;
    });
  return powers.length === 0 ? p : multiplyBy(p, powers);
}

const multiplyBy = (p: Poly, powers: readonly (readonly [string, number])[]): Poly =>
  multiply(p, monomial(p.ring, rational(1), powers));

/** Conditions on the couplings for a parameter to drop out of a Lagrangian reduced modulo total derivatives. */
export const screeningConditions = (
  reduced: Poly,
  parameter: string,
  parameters: readonly string[],
  scales: readonly string[],
): Poly[] => {
  const place = positionOf(reduced.ring, parameter);
  const [dependent] = partition(reduced, (exponent) => exponent(place) !== 0);
  return couplingCombinations(dependent, parameters, scales);
};
