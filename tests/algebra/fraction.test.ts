import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { timeDerivative } from '../../src/algebra/calculus.js';
import { evaluate } from '../../src/algebra/collect.js';
import {
  addFraction,
  divideFraction,
  equalFraction,
  type Factor,
  type Fraction,
  fraction,
  isCanonicalFraction,
  multiplyFraction,
  negateFraction,
  timeDerivativeOfFraction,
} from '../../src/algebra/fraction.js';
import {
  add,
  constant,
  equals,
  generator,
  isZero,
  multiply,
  type Poly,
  power,
  scale,
  subtract,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import * as E from '../oracle/exact.js';
import { sums, tries } from './arbitrary.js';
import { type Slow, times, toKernel, toRational, valueAt } from './textbook.js';

const ring = makeRing([...jetsOf('a', 2), ...jetsOf('phi', 2), ...constantsOf(['c', 'k'])]);
const NAMES = ['D(a,1)', 'a', 'D(phi,1)', 'phi', 'c', 'k'];
const build = (p: Slow): Poly => toKernel(ring, p);

interface Raw {
  readonly top: Slow;
  readonly bottom: readonly { base: Slow; power: number }[];
}
const small = fc.constantFrom(E.q(1), E.q(-1), E.q(2), E.q(-3), E.q(1, 2), E.q(2n ** 53n + 1n));
const bases = fc.oneof(
  sums(['a', 'phi', 'c'], { terms: 3, low: -1, high: 1, factors: 2, coefficients: small }),
  // Few enough to meet again, and to divide numerators.
  fc.constantFrom('a', 'phi').chain((x) =>
    fc.constantFrom(1, -1).map(
      (c): Slow =>
        new Map([
          [`${x}^1`, E.ONE],
          ['', E.q(c)],
        ]),
    ),
  ),
);
const raws: fc.Arbitrary<Raw> = fc
  .tuple(
    sums(NAMES, { terms: 3, low: -1, high: 2, factors: 3, coefficients: small }),
    fc.array(fc.tuple(bases, fc.integer({ min: 0, max: 2 })), { maxLength: 3 }),
    fc.option(bases, { nil: undefined }),
  )
  .map(([top, bottom, common]) => ({
    top: common ? times(top, common) : top,
    bottom: bottom.filter(([base]) => base.size > 0).map(([base, n]) => ({ base, power: n })),
  }));

const make = (raw: Raw): Fraction =>
  fraction(
    build(raw.top),
    raw.bottom.map(({ base, power: n }) => ({ base: build(base), power: n })),
  );

/** A point where no denominator that is likely to occur vanishes. */
const POINT: Readonly<Record<string, E.Q>> = {
  'D(a,2)': E.q(5, 7),
  'D(a,1)': E.q(-3, 11),
  a: E.q(13, 10),
  'D(phi,2)': E.q(1, 9),
  'D(phi,1)': E.q(17, 6),
  phi: E.q(-19, 8),
  c: E.q(23, 3),
  k: E.q(-29, 4),
};
const point = new Map(Object.entries(POINT).map(([name, x]) => [name, toRational(x)]));
const at = (p: Poly): E.Q => {
  const x = evaluate(p, point);
  return E.q(x.num, x.den);
};
const valueOfRaw = ({ top, bottom }: Raw): E.Q =>
  E.div(valueAt(top, POINT), E.product(...bottom.map(({ base, power: n }) => E.pow(valueAt(base, POINT), n))));
const valueOfFraction = (f: Fraction): E.Q =>
  E.div(at(f.numerator), E.product(...f.denominator.map(({ base, power: n }) => E.pow(at(base), n))));
const expectValue = (f: Fraction, x: E.Q): void => {
  expect(isCanonicalFraction(f)).toBe(true);
  expect(E.show(valueOfFraction(f))).toBe(E.show(x));
};

describe('fractions', () => {
  it('have the value of numerator over denominator, in canonical form', () => {
    fc.assert(
      fc.property(raws, (raw) => {
        expectValue(make(raw), valueOfRaw(raw));
      }),
      tries(200),
    );
  });

  it('add, multiply and divide', () => {
    fc.assert(
      fc.property(raws, raws, (p, q) => {
        const [x, y] = [make(p), make(q)];
        const [v, w] = [valueOfRaw(p), valueOfRaw(q)];
        expectValue(addFraction(x, y), E.add(v, w));
        expectValue(multiplyFraction(x, y), E.mul(v, w));
        expectValue(negateFraction(x), E.neg(v));
        expect(isZero(addFraction(x, negateFraction(x)).numerator)).toBe(true);
        if (isZero(y.numerator)) expect(() => divideFraction(x, y)).toThrow('division by zero');
        else expectValue(divideFraction(x, y), E.div(v, w));
      }),
      tries(120),
    );
  });

  it('are equal when their values are', () => {
    fc.assert(
      fc.property(raws, raws, bases, (p, q, b) => {
        const [x, y] = [make(p), make(q)];
        expect(equalFraction(x, y)).toBe(E.same(valueOfRaw(p), valueOfRaw(q)));
        fc.pre(b.size > 0);
        const expanded = { top: times(p.top, b), bottom: [...p.bottom, { base: b, power: 1 }] };
        expect(equalFraction(x, make(expanded))).toBe(true);
        expect(equalFraction(addFraction(x, y), addFraction(y, x))).toBe(true);
      }),
      tries(120),
    );
  });

  it('are differentiated by the quotient rule', () => {
    fc.assert(
      fc.property(raws, (raw) => {
        const slope = timeDerivativeOfFraction(make(raw));
        // The textbook form, (n' d − n d')/d², at the point.
        const top = build(raw.top);
        const bottom = raw.bottom.reduce(
          (p, { base, power: n }) => multiply(p, power(build(base), n)),
          constant(ring, 1),
        );
        const [n, d, dn, dd] = [top, bottom, timeDerivative(top), timeDerivative(bottom)].map(at) as [
          E.Q,
          E.Q,
          E.Q,
          E.Q,
        ];
        expectValue(slope, E.div(E.sub(E.mul(dn, d), E.mul(n, dd)), E.mul(d, d)));
      }),
      tries(120),
    );
  });

  const [a, phi, one] = [generator(ring, 'a'), generator(ring, 'phi'), constant(ring, 1)];

  it('cancel what divides, whatever the units', () => {
    const p = add(a, phi);
    const f = fraction(multiply(p, p), [{ base: scale(multiply(p, power(a, -3)), rational(-2, 3)), power: 3 }]);
    expect(f.denominator.map((x) => x.power)).toEqual([1]);
    expect(equals(f.denominator[0]!.base, p)).toBe(true);
    expect(equals(f.numerator, scale(power(a, 9), rational(-27, 8)))).toBe(true);
    expect(
      fraction(multiply(p, p), [
        { base: p, power: 1 },
        { base: negatedMultiple(p), power: 1 },
      ]).denominator,
    ).toEqual([]);
  });
  const negatedMultiple = (p: Poly): Poly => scale(multiply(p, phi), -5);

  it('join equal factors and keep different ones apart, in one order', () => {
    const [p, q] = [add(a, phi), subtract(a, phi)];
    const list: Factor[] = [
      { base: p, power: 1 },
      { base: q, power: 2 },
      { base: negatedMultiple(p), power: 1 },
    ];
    const f = fraction(one, list);
    expect(isCanonicalFraction(f)).toBe(true);
    const g = fraction(one, [...list].reverse());
    expect(f.denominator.map((x) => x.power)).toEqual(g.denominator.map((x) => x.power));
    f.denominator.forEach((x, i) => {
      expect(equals(x.base, g.denominator[i]!.base)).toBe(true);
    });
    expect(f.denominator.map((x) => x.power).sort()).toEqual([2, 2]);
  });

  it('of zero have no denominator', () => {
    const f = fraction(zero(ring), [{ base: add(a, one), power: 7 }]);
    expect(isZero(f.numerator) && f.denominator.length === 0 && isCanonicalFraction(f)).toBe(true);
  });

  it('add over the common denominator', () => {
    const x = fraction(a, [{ base: add(a, one), power: 2 }]);
    const y = fraction(one, [{ base: add(a, one), power: 1 }]);
    expect(addFraction(x, y).denominator.map((f) => f.power)).toEqual([2]);
    expect(equals(addFraction(x, y).numerator, add(scale(a, 2), one))).toBe(true);
    // a/(a+1) + 1/(a+1) = 1.
    const z = addFraction(fraction(a, [{ base: add(a, one), power: 1 }]), y);
    expect(equals(z.numerator, one) && z.denominator.length === 0).toBe(true);
  });

  it('refuse a zero denominator and powers that are none', () => {
    expect(() => fraction(a, [{ base: zero(ring), power: 1 }])).toThrow('division by zero');
    expect(() => fraction(a, [{ base: add(a, one), power: -1 }])).toThrow(RangeError);
    expect(() => fraction(a, [{ base: add(a, one), power: 0.5 }])).toThrow(RangeError);
  });

  it('tell a spoiled value', () => {
    const base = add(a, one);
    const f = fraction(phi, [{ base, power: 1 }]);
    expect(isCanonicalFraction(f) && Object.isFrozen(f) && Object.isFrozen(f.denominator)).toBe(true);
    const other = add(phi, one);
    const bad: Fraction[] = [
      { numerator: multiply(base, phi), denominator: f.denominator },
      { numerator: zero(ring), denominator: f.denominator },
      { numerator: phi, denominator: [{ base, power: 0 }] },
      { numerator: phi, denominator: [{ base: scale(base, 2), power: 1 }] },
      { numerator: phi, denominator: [{ base: multiply(base, a), power: 1 }] },
      { numerator: phi, denominator: [{ base: a, power: 1 }] },
      { numerator: phi, denominator: [...f.denominator, ...f.denominator] },
      { numerator: { ...phi, denominator: 3n, numerators: Float64Array.from([3]) }, denominator: f.denominator },
    ];
    for (const value of bad) expect(isCanonicalFraction(value)).toBe(false);
    const pair = fraction(one, [
      { base, power: 1 },
      { base: other, power: 1 },
    ]);
    expect(isCanonicalFraction(pair)).toBe(true);
    expect(isCanonicalFraction({ ...pair, denominator: [...pair.denominator].reverse() })).toBe(false);
  });
});
