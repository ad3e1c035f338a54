/** What a background can see of the couplings, and the conditions under which the spatial curvature drops out. */
import { collect, involves } from '../algebra/collect.js';
import { compareSimplicity, independent, primitive } from '../algebra/linear.js';
import { monomial, multiply, type Poly } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { exponentAt } from '../algebra/ring.js';

/** Coefficients of the monomials in fields and geometric parameters, each once, simplest first, linearly independent. */
export function couplingCombinations(
  reduced: Poly,
  parameters: readonly string[],
  scales: readonly string[],
  keep: (monomialHas: (name: string) => boolean) => boolean = () => true,
): Poly[] {
  const { ring } = reduced;
  const groups = collect(reduced, (g) => {
    const generator = ring.generators[g]!;
    return generator.kind === 'jet' || generator.kind === 'source' || parameters.includes(generator.name);
  });
  const chosen = groups
    .filter(({ monomial: powers }) => keep((name) => powers.some(([g]) => ring.generators[g]!.name === name)))
    .map(({ coefficient }) => primitive(withoutScales(coefficient, scales)))
    .sort(compareSimplicity);
  return independent(chosen);
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
): Poly[] => couplingCombinations(reduced, parameters, scales, (has) => has(parameter));
