import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  add,
  constant,
  equals,
  generator,
  height,
  isCanonical,
  isZero,
  leadingCoefficient,
  monomial,
  multiply,
  negate,
  type Poly,
  power,
  product,
  scale,
  subtract,
  sum,
  termsOf,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, ExponentLimitError, makeRing } from '../../src/algebra/ring.js';
import * as E from '../oracle/exact.js';
import { inRing, pairs, quotients, RINGS, sums, tries } from './arbitrary.js';
import {
  expectSame,
  minus,
  number,
  plus,
  reduced,
  type Slow,
  symbol,
  termsOfSlow,
  times,
  toKernel,
  toRational,
  toThe,
} from './textbook.js';

const two = inRing((names) => pairs(sums(names)));

describe('polynomials against the schoolbook', () => {
  it('add and subtract', () => {
    fc.assert(
      fc.property(two, ({ ring, x: [p, q] }) => {
        const [a, b] = [toKernel(ring, p), toKernel(ring, q)];
        expectSame(a, p);
        expectSame(add(a, b), plus(p, q));
        expectSame(subtract(a, b), minus(p, q));
        expectSame(negate(a), minus(number(E.ZERO), p));
        expect(equals(add(subtract(a, b), b), a)).toBe(true);
        expect(isZero(subtract(a, a))).toBe(true);
      }),
      tries(400),
    );
  });

  it('multiply', () => {
    fc.assert(
      fc.property(two, ({ ring, x: [p, q] }) => {
        const [a, b] = [toKernel(ring, p), toKernel(ring, q)];
        expectSame(multiply(a, b), times(p, q));
        expect(equals(multiply(a, b), multiply(b, a))).toBe(true);
      }),
      tries(300),
    );
  });

  it('multiply many terms, where like monomials meet often', () => {
    const dense = sums(['x', 'y'], { terms: 40, low: -3, high: 3 });
    fc.assert(
      fc.property(fc.tuple(dense, dense), ([p, q]) => {
        expectSame(multiply(toKernel(RINGS[1]!, p), toKernel(RINGS[1]!, q)), times(p, q));
      }),
      tries(30),
    );
  });

  it('scale, and take powers', () => {
    fc.assert(
      fc.property(
        inRing((names) => sums(names, { terms: 3 })),
        quotients,
        fc.integer({ min: 0, max: 4 }),
        ({ ring, x: p }, c, n) => {
          const a = toKernel(ring, p);
          expectSame(scale(a, toRational(c)), times(number(c), p));
          expectSame(power(a, n), toThe(p, n));
          if (p.size === 1) expectSame(power(a, -n), toThe(p, -n));
          else if (n > 0) expect(() => power(a, -n)).toThrow(RangeError);
        },
      ),
      tries(200),
    );
  });

  it('sum and multiply lists', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.array(sums(names, { terms: 3, low: -2, high: 2 }), { maxLength: 5 })),
        ({ ring, x: list }) => {
          const polys = list.map((p) => toKernel(ring, p));
          expectSame(sum(ring, polys), plus(...list));
          expectSame(product(ring, polys), list.reduce<Slow>(times, number(E.ONE)));
        },
      ),
      tries(100),
    );
  });

  it('do not depend on the order in which terms arrive', () => {
    fc.assert(
      fc.property(
        inRing((names) =>
          sums(names).chain((p) =>
            fc.shuffledSubarray(termsOfSlow(p), { minLength: p.size }).map((list) => ({ p, list })),
          ),
        ),
        ({ ring, x: { p, list } }) => {
          const one = list.reduce(
            (acc, [powers, c]) => add(acc, monomial(ring, toRational(c), Object.entries(powers))),
            zero(ring),
          );
          expect(equals(one, toKernel(ring, p))).toBe(true);
        },
      ),
      tries(200),
    );
  });

  it('reduce the squares of a radical', () => {
    const ring = makeRing([...constantsOf(['x', 'k']), { kind: 'radical', name: 's', square: 'k' }]);
    const early = makeRing([{ kind: 'radical', name: 's', square: 'k' }, ...constantsOf(['x', 'y', 'z', 'p', 'k'])]);
    const raw = sums(['x', 'k', 's'], { terms: 4 });
    fc.assert(
      fc.property(raw, raw, fc.constantFrom(ring, early), fc.integer({ min: 0, max: 3 }), (p, q, r, n) => {
        const [a, b] = [toKernel(r, p), toKernel(r, q)];
        const low = reduced(p, 's', 'k');
        expectSame(a, low);
        expectSame(multiply(a, b), reduced(times(p, q), 's', 'k'));
        expectSame(add(a, b), reduced(plus(p, q), 's', 'k'));
        expectSame(power(a, n), reduced(toThe(low, n), 's', 'k'));
        if (low.size === 1) expectSame(power(a, -n), reduced(toThe(low, -n), 's', 'k'));
      }),
      tries(200),
    );
  });
});

describe('coefficients beyond 2^53', () => {
  const ring = RINGS[0]!;
  const edge = Number.MAX_SAFE_INTEGER;
  const x = generator(ring, 'x');

  it('change representation both ways', () => {
    const large = scale(x, edge);
    expect(large.numerators).toBeInstanceOf(Float64Array);
    const larger = add(large, x);
    expect(Array.isArray(larger.numerators)).toBe(true);
    expectSame(larger, times(number(E.q(2n ** 53n)), symbol('x')));
    expectSame(subtract(larger, x), times(number(E.q(edge)), symbol('x')));
    expect(subtract(larger, x).numerators).toBeInstanceOf(Float64Array);
    expectSame(scale(larger, rational(1, 2)), times(number(E.q(2n ** 52n)), symbol('x')));
    expect(height(large)).toBe(edge);
    expect(height(larger)).toBe(Number.POSITIVE_INFINITY);
    expect(height(zero(ring))).toBe(0);
  });

  it('stay exact when doubles would round', () => {
    // (2^27 x + 1)(2^27 x - 1) with a middle term that doubles could not hold beside the first.
    const a = add(scale(x, 2 ** 27 + 1), constant(ring, 1));
    const b = add(scale(x, 2 ** 27 - 1), constant(ring, -1));
    const [p, q] = [
      plus(times(number(E.q(2 ** 27 + 1)), symbol('x')), number(E.ONE)),
      plus(times(number(E.q(2 ** 27 - 1)), symbol('x')), number(E.q(-1))),
    ];
    expectSame(multiply(a, b), times(p, q));
    expectSame(power(a, 9), toThe(p, 9));
  });
});

describe('single terms', () => {
  const ring = RINGS[2]!;

  it('are built from names, which may repeat', () => {
    expectSame(
      monomial(ring, rational(3, 4), [
        ['x', 2],
        ['y', -1],
        ['x', 1],
      ]),
      times(number(E.q(3, 4)), times(symbol('x', 3), symbol('y', -1))),
    );
    expectSame(monomial(ring, rational(0), [['x', 2]]), number(E.ZERO));
    expectSame(generator(ring, 'r', -2), symbol('r', -2));
    expectSame(generator(ring, 'r', 0), number(E.ONE));
    expectSame(constant(ring, rational(-3, 7)), number(E.q(-3, 7)));
    expectSame(constant(ring, 0), number(E.ZERO));
  });

  it('give their leading coefficient and come apart again', () => {
    const p = add(
      monomial(ring, rational(-2, 3), [['x', 2]]),
      monomial(ring, rational(1, 2), [
        ['x', -1],
        ['r', 3],
      ]),
    );
    expect(leadingCoefficient(p)).toEqual(rational(-2, 3));
    expect(termsOf(p)).toEqual([
      { coefficient: rational(-2, 3), exponents: [[0, 2]] },
      {
        coefficient: rational(1, 2),
        exponents: [
          [0, -1],
          [5, 3],
        ],
      },
    ]);
    expect(p.denominator).toBe(6n);
  });

  it('refuse unknown names, broken exponents and foreign rings', () => {
    expect(() => generator(ring, 'w')).toThrow('no generator w');
    expect(() => generator(ring, 'x', 0.5)).toThrow(RangeError);
    expect(() => generator(ring, 'x', Number.NaN)).toThrow(RangeError);
    expect(() => power(generator(ring, 'x'), 1.5)).toThrow(RangeError);
    expect(() => constant(ring, 0.1)).toThrow(RangeError);
    const foreign = generator(RINGS[1]!, 'x');
    for (const f of [add, subtract, multiply, equals])
      expect(() => f(generator(ring, 'x'), foreign)).toThrow('different rings');
  });

  it('refuse to invert zero or a sum', () => {
    expect(() => power(zero(ring), -1)).toThrow('division by zero');
    expect(() => power(add(generator(ring, 'x'), constant(ring, 1)), -1)).toThrow('a sum has no inverse');
    expectSame(power(zero(ring), 0), number(E.ONE));
    expectSame(power(zero(ring), 5), number(E.ZERO));
  });
});

describe('the limit of exponents', () => {
  const ring = RINGS[2]!;
  const x = (e: number) => generator(ring, 'x', e);
  const one = constant(ring, 1);

  it('is reached exactly', () => {
    expectSame(multiply(x(256), x(255)), symbol('x', 511));
    expectSame(multiply(x(-256), x(-255)), symbol('x', -511));
    expectSame(
      multiply(add(x(500), one), add(x(11), one)),
      times(plus(symbol('x', 500), number(E.ONE)), plus(symbol('x', 11), number(E.ONE))),
    );
    expectSame(power(x(1), 511), symbol('x', 511));
    expectSame(power(x(-7), -73), symbol('x', 511));
  });

  it('refuses one more instead of running into the next exponent', () => {
    expect(() => multiply(x(256), x(256))).toThrow(ExponentLimitError);
    expect(() => multiply(add(x(511), one), add(x(1), one))).toThrow(ExponentLimitError);
    expect(() => multiply(add(x(-511), one), add(x(-1), one))).toThrow(ExponentLimitError);
    expect(() => power(x(2), 256)).toThrow(ExponentLimitError);
    expect(() => power(add(x(1), one), 512)).toThrow(ExponentLimitError);
    expect(() => power(add(x(1), one), 10 ** 9)).toThrow(ExponentLimitError);
    expect(() => generator(ring, 'x', 512)).toThrow(ExponentLimitError);
    expect(() =>
      monomial(ring, rational(1), [
        ['x', 300],
        ['x', 300],
      ]),
    ).toThrow(ExponentLimitError);
  });

  it('does not refuse what fits', () => {
    expectSame(multiply(x(511), x(-511)), number(E.ONE));
    expectSame(
      multiply(multiply(x(511), generator(ring, 'y', 511)), multiply(x(-1), generator(ring, 'z', 511))),
      times(symbol('x', 510), times(symbol('y', 511), symbol('z', 511))),
    );
    let p = add(x(1), one);
    for (let i = 0; i < 300; i++) p = multiply(multiply(p, x(2)), x(-2));
    expectSame(p, plus(symbol('x'), number(E.ONE)));
    expectSame(
      monomial(ring, rational(1), [
        ['x', 600],
        ['x', -600],
      ]),
      number(E.ONE),
    );
  });

  it('holds for the square of a radical', () => {
    const r = makeRing([...constantsOf(['k']), { kind: 'radical', name: 's', square: 'k' }]);
    const s = generator(r, 's');
    expectSame(power(s, 1000), symbol('k', 500));
    expectSame(generator(r, 's', 1023), times(symbol('k', 511), symbol('s')));
    expectSame(generator(r, 's', -1022), symbol('k', -511));
    expect(() => power(s, 1024)).toThrow(ExponentLimitError);
    expect(() => multiply(generator(r, 's', 1023), s)).toThrow(ExponentLimitError);
  });
});

describe('isCanonical', () => {
  it('tells a spoiled value', () => {
    const ring = makeRing([...constantsOf(['x', 'k']), { kind: 'radical', name: 's', square: 'k' }]);
    const p = add(generator(ring, 'x', 2), scale(generator(ring, 'k', -1), rational(1, 2)));
    expect(isCanonical(p)).toBe(true);
    expect(Object.isFrozen(p)).toBe(true);
    const spoiled = (change: Partial<Poly>): boolean => isCanonical({ ...p, ...change });
    expect(spoiled({})).toBe(true);
    expect(spoiled({ denominator: 4n, numerators: Float64Array.from([4, 2]) })).toBe(false);
    expect(spoiled({ denominator: -2n })).toBe(false);
    expect(spoiled({ denominator: 0n })).toBe(false);
    expect(spoiled({ numerators: Float64Array.from([2, 0]) })).toBe(false);
    expect(spoiled({ numerators: Float64Array.from([2, 0.5]) })).toBe(false);
    expect(spoiled({ numerators: Float64Array.from([2 ** 53, 1]) })).toBe(false);
    expect(spoiled({ numerators: [2n, 1n] })).toBe(false);
    expect(spoiled({ numerators: [2n ** 53n, 1n] })).toBe(true);
    expect(spoiled({ size: 1 })).toBe(false);
    expect(spoiled({ keys: p.keys.slice().reverse() })).toBe(false);
    expect(spoiled({ keys: Float64Array.from([p.keys[0]!, p.keys[0]!]) })).toBe(false);
    expect(spoiled({ keys: generator(ring, 'x').keys })).toBe(false);
    expect(spoiled({ reach: 1 })).toBe(false);
    expect(spoiled({ reach: 512 })).toBe(false);
    const squares = Float64Array.from([p.keys[0]!, 2 * generator(ring, 's').keys[0]!]);
    expect(spoiled({ keys: squares })).toBe(false);
    expect(spoiled({ keys: Float64Array.from([p.keys[0]!, -0]) })).toBe(false);
    expect(spoiled({ keys: Float64Array.from([p.keys[0]!, 1]) })).toBe(false);
    expect(isCanonical({ ...zero(ring), denominator: 2n })).toBe(false);
  });
});
