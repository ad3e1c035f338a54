/**
 * Random values for the tests of the algebra: rings of several widths and schoolbook polynomials in them, biased to
 * 0, ±1, coefficients about 2^53 and far beyond, unequal denominators, negative exponents, equal and opposite operands.
 */
import fc from 'fast-check';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing, type Ring } from '../../src/algebra/ring.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { runs } from '../oracle/random.js';
import { minus, number, type Powers, type Slow, slow } from './textbook.js';

const EDGE = 2n ** 53n;

export const integers: fc.Arbitrary<bigint> = fc.oneof(
  { weight: 4, arbitrary: fc.bigInt({ min: -9n, max: 9n }) },
  { weight: 2, arbitrary: fc.constantFrom(0n, 1n, -1n) },
  {
    weight: 2,
    arbitrary: fc.bigInt({ min: -3n, max: 3n }).chain((d) => fc.constantFrom(EDGE + d, -EDGE + d, EDGE / 2n + d)),
  },
  { weight: 1, arbitrary: fc.bigInt({ min: -(10n ** 40n), max: 10n ** 40n }) },
);
const divisors: fc.Arbitrary<bigint> = fc.oneof(
  { weight: 4, arbitrary: fc.constant(1n) },
  { weight: 3, arbitrary: fc.constantFrom(2n, 3n, 4n, 5n, 6n, 7n) },
  { weight: 1, arbitrary: fc.constantFrom(EDGE - 1n, EDGE + 1n, 3n ** 60n) },
);
export const quotients: fc.Arbitrary<Q> = fc.tuple(integers, divisors).map(([p, q]) => E.q(p, q));
export const nonZeroQuotients: fc.Arbitrary<Q> = quotients.filter((x) => !E.isZero(x));

/** One word, exactly one word, two words, and a ring like those of the program: jets, sources, constants. */
export const RINGS: readonly Ring[] = [
  makeRing(constantsOf(['x'])),
  makeRing(constantsOf(['x', 'y', 'z', 'p', 'q'])),
  makeRing(constantsOf(['x', 'y', 'z', 'p', 'q', 'r'])),
  makeRing([...jetsOf('N', 1), ...jetsOf('a', 2), ...jetsOf('phi', 2), ...constantsOf(['c', 'M', 'k', 'l', 'm'])]),
];

export const namesOf = (ring: Ring): string[] => ring.generators.map((g) => g.name);

/** Jets of three fields up to order 4, a fluid, a vacuum energy, constants and a radical s² = k. */
export const MECHANICS: Ring = makeRing([
  ...jetsOf('N', 4),
  ...jetsOf('a', 4),
  ...jetsOf('phi', 4),
  { kind: 'source', name: 'rho', exponents: new Map([['a', rational(-18, 5)]]) },
  {
    kind: 'source',
    name: 'sigma',
    exponents: new Map([
      ['a', rational(-3)],
      ['phi', rational(1, 2)],
    ]),
  },
  ...constantsOf(['c', 'k']),
  { kind: 'radical', name: 's', square: 'k' },
]);

export interface Shape {
  readonly terms?: number;
  readonly low?: number;
  readonly high?: number;
  readonly factors?: number;
  readonly coefficients?: fc.Arbitrary<Q>;
}

/** A sum of up to `terms` monomials, each with up to `factors` of the names to powers between low and high. */
export function sums(names: readonly string[], shape: Shape = {}): fc.Arbitrary<Slow> {
  const { terms = 6, low = -3, high = 3, factors = 4, coefficients = quotients } = shape;
  const powers: fc.Arbitrary<Powers> = fc
    .uniqueArray(fc.tuple(fc.constantFrom(...names), fc.integer({ min: low, max: high })), {
      maxLength: factors,
      selector: ([name]) => name,
    })
    .map((list) => Object.fromEntries(list));
  return fc.array(fc.tuple(powers, coefficients), { maxLength: terms }).map(slow);
}

/** Two values of one kind, often equal or opposite. */
export const pairs = (one: fc.Arbitrary<Slow>): fc.Arbitrary<[Slow, Slow]> =>
  fc.oneof(
    { weight: 6, arbitrary: fc.tuple(one, one) },
    { weight: 1, arbitrary: one.map((p): [Slow, Slow] => [p, p]) },
    { weight: 1, arbitrary: one.map((p): [Slow, Slow] => [p, minus(number(E.ZERO), p)]) },
  );

/** A ring with something made for its names. */
export const inRing = <X>(make: (names: string[], ring: Ring) => fc.Arbitrary<X>): fc.Arbitrary<{ ring: Ring; x: X }> =>
  fc.constantFrom(...RINGS).chain((ring) => make(namesOf(ring), ring).map((x) => ({ ring, x })));

/** How often a property is tried. */
export const tries = (count = 100): { numRuns: number } => ({ numRuns: runs(count) });
