import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { divideExactly, splitUnit } from '../../src/algebra/division.js';
import { primitive } from '../../src/algebra/linear.js';
import {
  add,
  constant,
  equals,
  generator,
  isCanonical,
  monomial,
  multiply,
  type Poly,
  power,
  scale,
  subtract,
  sum,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, ExponentLimitError, makeRing } from '../../src/algebra/ring.js';
import * as E from '../oracle/exact.js';
import { inRing, nonZeroQuotients, RINGS, sums, tries } from './arbitrary.js';
import { expectSame, fromKernel, number, plus, symbol, termsOfSlow, times, toKernel, toRational } from './textbook.js';

const RADICAL = makeRing([...constantsOf(['x', 'k', 'y']), { kind: 'radical', name: 's', square: 'k' }]);
/** The radical before its square, and in another word. */
const EARLY = makeRing([{ kind: 'radical', name: 's', square: 'k' }, ...constantsOf(['x', 'y', 'z', 'w', 'k'])]);
const radicalNames = ['x', 'y', 'k', 's'];

/** Quotient of dense polynomials in one variable by long division, undefined when a remainder is left. */
function longDivision(p: readonly E.Q[], q: readonly E.Q[]): E.Q[] | undefined {
  const rest = [...p];
  const quotient: E.Q[] = [];
  for (let shift = p.length - q.length; shift >= 0; shift--) {
    const c = E.div(rest[shift + q.length - 1]!, q.at(-1)!);
    quotient[shift] = c;
    q.forEach((b, i) => {
      rest[shift + i] = E.sub(rest[shift + i]!, E.mul(c, b));
    });
  }
  return rest.every(E.isZero) ? quotient : undefined;
}

describe('exact division', () => {
  it('undoes multiplication', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.tuple(sums(names), sums(names, { terms: 4 }))),
        ({ ring, x: [p, q] }) => {
          fc.pre(q.size > 0);
          const quotient = divideExactly(multiply(toKernel(ring, p), toKernel(ring, q)), toKernel(ring, q));
          expectSame(quotient!, p);
        },
      ),
      tries(300),
    );
  });

  it('undoes multiplication where radicals occur', () => {
    const one = sums(radicalNames, { terms: 4, low: -2, high: 2 });
    fc.assert(
      fc.property(one, one, fc.constantFrom(RADICAL, EARLY), (p, q, ring) => {
        const [a, b] = [toKernel(ring, p), toKernel(ring, q)];
        fc.pre(b.size > 0);
        const quotient = divideExactly(multiply(a, b), b)!;
        expect(isCanonical(quotient)).toBe(true);
        expect(equals(quotient, a)).toBe(true);
      }),
      tries(200),
    );
  });

  it('says no when it does not work out, as long division does', () => {
    const dense = fc.array(fc.integer({ min: -2, max: 2 }), { minLength: 1, maxLength: 5 });
    const ring = RINGS[0]!;
    fc.assert(
      fc.property(dense, dense, dense, fc.integer({ min: -3, max: 3 }), (p, q, factor, shift) => {
        fc.pre(q.at(-1) !== 0 && q[0] !== 0);
        const build = (list: readonly number[]): Poly =>
          sum(
            ring,
            list.map((c, i) => scale(generator(ring, 'x', i), c)),
          );
        // Half of the time a multiple, half of the time most likely none.
        const top = factor.length % 2 === 0 ? build(p) : multiply(build(p), build(q));
        const coefficients = Array.from({ length: 12 }, (_, i) => {
          const found = termsOfSlow(fromKernel(top)).find(([powers]) => (powers.x ?? 0) === i);
          return found ? found[1] : E.ZERO;
        });
        const want = longDivision(
          coefficients,
          q.map((c) => E.q(c)),
        );
        const found = divideExactly(multiply(top, generator(ring, 'x', shift)), build(q));
        if (!want) expect(found).toBeUndefined();
        else expectSame(found!, plus(...want.map((c, i) => times(number(c), symbol('x', i + shift)))));
      }),
      tries(300),
    );
  });

  it('never returns a quotient that is none', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.tuple(sums(names), sums(names, { terms: 3 }))),
        ({ ring, x: [p, q] }) => {
          fc.pre(q.size > 1);
          const [a, b] = [toKernel(ring, p), toKernel(ring, q)];
          const quotient = divideExactly(a, b);
          if (quotient) expect(equals(multiply(quotient, b), a)).toBe(true);
        },
      ),
      tries(200),
    );
  });

  it('ends for Laurent polynomials, whichever words the generators are in', () => {
    const ring = makeRing(constantsOf(['a', 'b', 'c', 'd', 'e', 'f', 'g']));
    const one = constant(ring, 1);
    for (const [x, y] of [
      ['a', 'b'],
      ['a', 'g'],
      ['f', 'g'],
      ['g', 'a'],
    ] as const) {
      const [u, v] = [generator(ring, x), generator(ring, y)];
      // 1/(1 - v) has no end in u/v, u/v², …
      expect(divideExactly(add(u, one), subtract(one, v))).toBeUndefined();
      expect(divideExactly(add(u, power(v, -1)), add(v, one))).toBeUndefined();
      expect(divideExactly(add(power(u, -1), v), add(power(v, -3), u))).toBeUndefined();
      const big = add(power(u, 500), power(v, -500));
      expect(equals(divideExactly(multiply(big, add(u, v)), add(u, v))!, big)).toBe(true);
      expect(divideExactly(add(big, one), add(u, v))).toBeUndefined();
      // Leading terms alone would go on to v^900, beyond the limit.
      expect(divideExactly(add(power(u, 300), power(v, 3)), subtract(u, power(v, 3)))).toBeUndefined();
    }
  });

  it('divides many terms by a few in reasonable time', () => {
    const ring = RINGS[1]!;
    const f = power(sum(ring, ['x', 'y', 'z', 'p'].map((n) => generator(ring, n)).concat(constant(ring, 1))), 8);
    const g = add(multiply(generator(ring, 'x', -1), generator(ring, 'y')), constant(ring, 3));
    expect(equals(divideExactly(multiply(f, g), g)!, f)).toBe(true);
    expect(divideExactly(add(multiply(f, g), constant(ring, 1)), g)).toBeUndefined();
  });

  it('divides by every single term, and refuses zero', () => {
    const ring = RINGS[2]!;
    const p = add(generator(ring, 'x'), generator(ring, 'r', -1));
    const unit = monomial(ring, rational(-2, 3), [
      ['x', 2],
      ['r', -1],
    ]);
    expect(equals(divideExactly(p, unit)!, multiply(p, power(unit, -1)))).toBe(true);
    expect(equals(divideExactly(zero(ring), p)!, zero(ring))).toBe(true);
    expect(() => divideExactly(p, zero(ring))).toThrow('division by zero');
    expect(() => divideExactly(p, generator(RINGS[0]!, 'x'))).toThrow('different rings');
  });

  it('knows that k is a square', () => {
    const [x, k, s] = ['x', 'k', 's'].map((n) => generator(RADICAL, n)) as [Poly, Poly, Poly];
    const one = constant(RADICAL, 1);
    expect(equals(divideExactly(subtract(multiply(x, x), k), subtract(x, s))!, add(x, s))).toBe(true);
    expect(equals(divideExactly(subtract(one, k), add(one, s))!, subtract(one, s))).toBe(true);
    expect(divideExactly(add(one, k), add(one, s))).toBeUndefined();
    expect(equals(divideExactly(x, s)!, multiply(x, power(s, -1)))).toBe(true);
  });

  it('throws at the limit of exponents', () => {
    const ring = RINGS[0]!;
    expect(() => divideExactly(generator(ring, 'x', 511), generator(ring, 'x', -1))).toThrow(ExponentLimitError);
    const s = generator(RADICAL, 's');
    expect(() => divideExactly(multiply(generator(RADICAL, 'k', 300), s), add(s, constant(RADICAL, 1)))).toThrow(
      ExponentLimitError,
    );
    expect(
      equals(divideExactly(generator(RADICAL, 'k', 511), generator(RADICAL, 'k', 511))!, constant(RADICAL, 1)),
    ).toBe(true);
  });
});

describe('the part of a polynomial that no unit divides', () => {
  it('is primitive, has lowest exponents 0, and is what is left of p', () => {
    fc.assert(
      fc.property(
        inRing((names) => sums(names)),
        ({ ring, x: p }) => {
          const a = toKernel(ring, p);
          const { unit, reduced } = splitUnit(a);
          expect(isCanonical(unit) && isCanonical(reduced)).toBe(true);
          expect(unit.size).toBe(1);
          expect(equals(multiply(unit, reduced), a)).toBe(true);
          expect(equals(primitive(reduced), reduced)).toBe(true);
          if (p.size === 0) return;
          const terms = termsOfSlow(fromKernel(reduced));
          for (const name of ring.generators.map((g) => g.name))
            expect(Math.min(...terms.map(([powers]) => powers[name] ?? 0))).toBe(0);
        },
      ),
      tries(200),
    );
  });

  it('is the same for all multiples by units', () => {
    const units = fc.tuple(nonZeroQuotients, ...radicalNames.map(() => fc.integer({ min: -4, max: 4 })));
    fc.assert(
      fc.property(sums(radicalNames), units, fc.constantFrom(RADICAL, EARLY), (p, [c, ...exponents], ring) => {
        const a = toKernel(ring, p);
        const unit = monomial(
          ring,
          toRational(c),
          exponents.map((e, i) => [radicalNames[i]!, e]),
        );
        const { reduced } = splitUnit(multiply(a, unit));
        expect(equals(reduced, splitUnit(a).reduced)).toBe(true);
        if (a.size > 0) expect(equals(multiply(splitUnit(a).unit, reduced), a)).toBe(true);
      }),
      tries(300),
    );
  });

  it('keeps a sum of symbols as it is written', () => {
    const ring = RINGS[1]!;
    const p = add(generator(ring, 'x'), generator(ring, 'y'));
    expect(equals(splitUnit(p).reduced, p)).toBe(true);
    const { unit, reduced } = splitUnit(scale(multiply(p, generator(ring, 'x', -2)), rational(-3, 2)));
    expect(equals(reduced, p)).toBe(true);
    expectSame(unit, times(number(E.q(-3, 2)), symbol('x', -2)));
  });
});
