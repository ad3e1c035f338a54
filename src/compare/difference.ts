/** The first difference between two equations: a monomial in the fields with its two coefficients. Imports algebra. */
import { collect, monomialOf } from '../algebra/collect.js';
import { equals, isZero, multiply, type Poly, power, subtract, termsOf, zero } from '../algebra/poly.js';
import type { JetSpace } from './jet-space.js';

export interface Difference {
  /** Name of the equation: a field, or a text that says what was compared. */
  readonly equation: string;
  /** At lapse 1. */
  readonly monomial: Poly;
  readonly first: Poly;
  readonly second: Poly;
}

/**
 * The simplest monomial in which two lists of equations differ, in the first equation that differs.
 * @param volume spatial volume, divided out.
 */
export function firstDifference(
  space: JetSpace,
  first: ReadonlyMap<string, Poly>,
  second: ReadonlyMap<string, Poly>,
  volume: Poly,
): Difference | undefined {
  const { ring, places } = space;
  const isField = (g: number): boolean => places[g]!.kind !== 'coupling';
  const perVolume = power(volume, -1);
  for (const name of new Set([...first.keys(), ...second.keys()])) {
    const a = multiply(first.get(name) ?? zero(ring), perVolume);
    const b = multiply(second.get(name) ?? zero(ring), perVolume);
    const rest = subtract(a, b);
    if (isZero(rest)) continue;
    const groups = collect(rest, isField).map(({ monomial }) => monomialOf(ring, monomial));
    const monomial = groups.reduce((best, m) => (weight(m) < weight(best) ? m : best));
    const of = (p: Poly): Poly =>
      collect(p, isField).find((c) => equals(monomialOf(ring, c.monomial), monomial))?.coefficient ?? zero(ring);
    return { equation: name, monomial, first: of(a), second: of(b) };
  }
  return undefined;
}

/** Degree in fields, negative powers counted too. */
function weight(monomial: Poly): number {
  const [term] = termsOf(monomial);
  return term!.exponents.reduce((n, [, e]) => n + Math.abs(e), 0);
}
