import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  coefficientOf,
  collect,
  evaluate,
  involves,
  monomialOf,
  moveTo,
  partition,
  select,
  substitute,
  symbolsOf,
} from '../../src/algebra/collect.js';
import {
  add,
  constant,
  equals,
  generator,
  isZero,
  multiply,
  type Poly,
  scale,
  sum,
  zero,
} from '../../src/algebra/poly.js';
import { isCanonicalRational, rational } from '../../src/algebra/rational.js';
import { constantsOf, ExponentLimitError, makeRing } from '../../src/algebra/ring.js';
import * as E from '../oracle/exact.js';
import { inRing, namesOf, nonZeroQuotients, RINGS, sums, tries } from './arbitrary.js';
import {
  expectSame,
  fromKernel,
  number,
  plus,
  reduced,
  replace,
  type Slow,
  slow,
  symbol,
  termsOfSlow,
  times,
  toKernel,
  toRational,
  valueAt,
} from './textbook.js';

const subsets = (names: readonly string[]) => fc.subarray([...names]);
const RADICAL = makeRing([...constantsOf(['x', 'k', 'y']), { kind: 'radical', name: 's', square: 'k' }]);

describe('parts of a polynomial', () => {
  it('are the terms that a test selects', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.tuple(sums(names), fc.constantFrom(...names))),
        ({ ring, x: [p, name] }) => {
          const at = ring.position.get(name)!;
          const [yes, no] = partition(toKernel(ring, p), (exponent) => exponent(at) > 0);
          const positive = termsOfSlow(p).filter(([powers]) => (powers[name] ?? 0) > 0);
          const others = termsOfSlow(p).filter(([powers]) => (powers[name] ?? 0) <= 0);
          expectSame(yes, slow(positive));
          expectSame(no, slow(others));
          const whole = toKernel(ring, p);
          expect(isZero(select(whole, []))).toBe(true);
          expect(
            equals(
              select(
                whole,
                Array.from({ length: whole.size }, (_, i) => i),
              ),
              whole,
            ),
          ).toBe(true);
        },
      ),
      tries(200),
    );
  });

  it('come with what multiplies a monomial', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.tuple(sums(names), subsets(names))),
        ({ ring, x: [p, chosen] }) => {
          const groups = collect(toKernel(ring, p), (g) => chosen.includes(ring.generators[g]!.name));
          for (const { monomial, coefficient } of groups) {
            expectSame(coefficient, fromKernel(coefficient));
            expect(chosen.some((name) => involves(coefficient, name))).toBe(false);
            expect(monomial.every(([g, e]) => e !== 0 && chosen.includes(ring.generators[g]!.name))).toBe(true);
          }
          const texts = groups.map(({ monomial }) => monomial.join(';'));
          expect(new Set(texts).size).toBe(groups.length);
          const back = sum(
            ring,
            groups.map(({ monomial, coefficient }) => multiply(monomialOf(ring, monomial), coefficient)),
          );
          expectSame(back, p);
        },
      ),
      tries(200),
    );
  });

  it('come with the coefficient of one power', () => {
    fc.assert(
      fc.property(
        inRing((names) => fc.tuple(sums(names), fc.constantFrom(...names), fc.integer({ min: -3, max: 3 }))),
        ({ ring, x: [p, name, e] }) => {
          const found = termsOfSlow(p).filter(([powers]) => (powers[name] ?? 0) === e);
          expectSame(
            coefficientOf(toKernel(ring, p), name, e),
            slow(found.map(([powers, c]) => [{ ...powers, [name]: 0 }, c])),
          );
          expect(isZero(coefficientOf(toKernel(ring, p), 'absent', 1))).toBe(true);
          expectSame(coefficientOf(toKernel(ring, p), 'absent', 0), p);
        },
      ),
      tries(200),
    );
    const s = generator(RADICAL, 's');
    const p = add(multiply(s, generator(RADICAL, 'x')), generator(RADICAL, 'k'));
    expectSame(coefficientOf(p, 's', 1), symbol('x'));
    expectSame(coefficientOf(p, 's', 0), symbol('k'));
  });

  it('name their symbols in the order of the ring', () => {
    fc.assert(
      fc.property(
        inRing((names) => sums(names)),
        ({ ring, x: p }) => {
          const used = new Set(termsOfSlow(p).flatMap(([powers]) => Object.keys(powers)));
          expect(symbolsOf(toKernel(ring, p))).toEqual(namesOf(ring).filter((name) => used.has(name)));
          expect(involves(toKernel(ring, p), 'absent')).toBe(false);
        },
      ),
      tries(),
    );
  });
});

describe('substitution', () => {
  const ring = RINGS[2]!;

  it('does what replacing every factor does', () => {
    const positive = sums(['x', 'y', 'z', 'p'], { terms: 4, low: 0, high: 2 });
    const image = sums(['x', 'y', 'q', 'r'], { terms: 3, low: -2, high: 2 });
    fc.assert(
      fc.property(positive, image, image, (p, f, g) => {
        const images = new Map([
          ['x', toKernel(ring, f)],
          ['z', toKernel(ring, g)],
        ]);
        expectSame(substitute(toKernel(ring, p), images), replace(p, { x: f, z: g }));
      }),
      tries(150),
    );
  });

  it('takes negative powers of single terms', () => {
    fc.assert(
      fc.property(sums(['x', 'y']), nonZeroQuotients, fc.integer({ min: -3, max: 3 }), (p, c, e) => {
        const image = slow([[{ y: e, r: 1 }, c]]);
        expectSame(substitute(toKernel(ring, p), new Map([['x', toKernel(ring, image)]])), replace(p, { x: image }));
      }),
      tries(150),
    );
    const inverse = generator(ring, 'x', -1);
    expect(() => substitute(inverse, new Map([['x', zero(ring)]]))).toThrow('division by zero');
    expect(() => substitute(inverse, new Map([['x', add(generator(ring, 'y'), constant(ring, 1))]]))).toThrow(
      'a sum has no inverse',
    );
  });

  it('goes to another ring, where the other names must be known', () => {
    const target = makeRing(constantsOf(['w', 'y', 'x']));
    const p = add(multiply(generator(ring, 'x'), generator(ring, 'y')), generator(ring, 'z', 2));
    expectSame(
      substitute(p, new Map([['z', generator(target, 'w')]]), target),
      plus(times(symbol('x'), symbol('y')), symbol('w', 2)),
    );
    expect(() => substitute(p, new Map([['y', generator(target, 'w')]]), target)).toThrow('no generator z');
  });

  it('is done for all names at once', () => {
    const swap = new Map([
      ['x', generator(ring, 'y')],
      ['y', generator(ring, 'x')],
    ]);
    expectSame(
      substitute(multiply(generator(ring, 'x', 2), generator(ring, 'y')), swap),
      times(symbol('x'), symbol('y', 2)),
    );
  });

  it('keeps a radical the root of its square', () => {
    const s = generator(RADICAL, 's');
    const p = add(multiply(s, generator(RADICAL, 'x')), generator(RADICAL, 'k'));
    const four = constant(RADICAL, 4);
    expect(() => substitute(p, new Map([['k', four]]))).toThrow('no root');
    expect(() => substitute(p, new Map([['s', constant(RADICAL, 2)]]))).toThrow('no root');
    expectSame(
      substitute(
        p,
        new Map([
          ['k', four],
          ['s', constant(RADICAL, -2)],
        ]),
      ),
      plus(times(number(E.q(-2)), symbol('x')), number(E.q(4))),
    );
    expectSame(substitute(generator(RADICAL, 'k', 2), new Map([['k', four]])), number(E.q(16)));
    expectSame(substitute(p, new Map([['x', s]])), times(number(E.q(2)), symbol('k')));
  });

  it('throws at the limit of exponents', () => {
    expect(() => substitute(generator(ring, 'x', 300), new Map([['x', generator(ring, 'y', 2)]]))).toThrow(
      ExponentLimitError,
    );
  });
});

describe('moving to another ring', () => {
  it('keeps the value and needs the names', () => {
    const wide = makeRing(constantsOf(['m', 'l', 'k', 'z', 'y', 'x', 'r', 'q', 'p', 'a']));
    fc.assert(
      fc.property(sums(namesOf(RINGS[2]!)), (p) => {
        const there = moveTo(toKernel(RINGS[2]!, p), wide);
        expectSame(there, p);
        expect(there.ring).toBe(wide);
        expect(equals(moveTo(there, RINGS[2]!), toKernel(RINGS[2]!, p))).toBe(true);
      }),
      tries(200),
    );
    expect(() => moveTo(generator(RINGS[2]!, 'x'), makeRing(constantsOf(['y'])))).toThrow('no generator x');
    expect(moveTo(generator(wide, 'x'), wide).ring).toBe(wide);
  });

  it('takes up the relation of a radical there', () => {
    const free = makeRing(constantsOf(['s', 'k', 'x']));
    fc.assert(
      fc.property(sums(['s', 'k', 'x']), (p) => {
        expectSame(moveTo(toKernel(free, p), RADICAL), reduced(p, 's', 'k'));
      }),
      tries(100),
    );
  });
});

describe('values', () => {
  it('are those of the schoolbook', () => {
    fc.assert(
      fc.property(
        inRing((names) =>
          fc.tuple(sums(names), fc.array(nonZeroQuotients, { minLength: names.length, maxLength: names.length })),
        ),
        ({ ring, x: [p, values] }) => {
          const point = Object.fromEntries(namesOf(ring).map((name, i) => [name, values[i]!]));
          const found = evaluate(
            toKernel(ring, p),
            new Map(Object.entries(point).map(([name, x]) => [name, toRational(x)])),
          );
          expect(isCanonicalRational(found)).toBe(true);
          expect(E.show(E.q(found.num, found.den))).toBe(E.show(valueAt(p, point)));
        },
      ),
      tries(150),
    );
  });

  it('need every symbol, no division by zero, and a true root', () => {
    const ring = RINGS[2]!;
    const p: Poly = add(generator(ring, 'x', -1), generator(ring, 'y'));
    expect(() => evaluate(p, new Map([['x', rational(1)]]))).toThrow('no value for y');
    expect(() =>
      evaluate(
        p,
        new Map([
          ['x', rational(0)],
          ['y', rational(1)],
        ]),
      ),
    ).toThrow(RangeError);
    const q = add(generator(RADICAL, 's'), scale(generator(RADICAL, 'k'), 2));
    expect(
      evaluate(
        q,
        new Map([
          ['s', rational(-3)],
          ['k', rational(9)],
        ]),
      ),
    ).toEqual(rational(15));
    expect(() =>
      evaluate(
        q,
        new Map([
          ['s', rational(3)],
          ['k', rational(8)],
        ]),
      ),
    ).toThrow('no root');
    expect(
      evaluate(
        generator(RADICAL, 'k'),
        new Map([
          ['s', rational(3)],
          ['k', rational(8)],
        ]),
      ),
    ).toEqual(rational(8));
    const empty: Slow = number(E.ZERO);
    expect(evaluate(toKernel(ring, empty), new Map())).toEqual(rational(0));
  });
});
