import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  antiderivative,
  eulerLagrange,
  fieldPartial,
  orderIn,
  partial,
  timeDerivative,
} from '../../src/algebra/calculus.js';
import { add, equals, generator, isZero, multiply, type Poly, scale } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, ExponentLimitError, jetName, jetsOf, makeRing } from '../../src/algebra/ring.js';
import * as E from '../oracle/exact.js';
import { MECHANICS, namesOf, RINGS, sums, tries } from './arbitrary.js';
import {
  derive,
  expectSame,
  fromKernel,
  minus,
  number,
  plus,
  reduced,
  type Slow,
  slope,
  symbol,
  termsOfSlow,
  times,
  toKernel,
} from './textbook.js';

const ring = MECHANICS;
const FIELDS = ['N', 'a', 'phi'];
/** Names whose jets go up to a given order, with sources, constants and the radical. */
const namesUpTo = (order: number): string[] => [
  ...FIELDS.flatMap((q) => Array.from({ length: order + 1 }, (_, n) => jetName(q, n))),
  'rho',
  'sigma',
  'c',
  'k',
  's',
];
const make = (p: Slow): Poly => toKernel(ring, p);
const low = (p: Slow): Slow => reduced(p, 's', 'k');

/** ρ ∝ a^(-18/5), σ ∝ a^-3 φ^(1/2). */
const SOURCES = { a: { rho: E.q(-18, 5), sigma: E.q(-3) }, phi: { sigma: E.q(1, 2) } } as const;
const sourceRules = (field: string, speed: Slow): Record<string, Slow> =>
  Object.fromEntries(
    Object.entries(SOURCES[field as 'a' | 'phi'] ?? {}).map(([name, exponent]) => [
      name,
      times(number(exponent), times(symbol(name), times(symbol(field, -1), speed))),
    ]),
  );
/** ∂/∂q with the sources as functions of q. */
const slopeAlong = (p: Slow, field: string): Slow =>
  derive(p, { [field]: number(E.ONE), ...sourceRules(field, number(E.ONE)) });
const rate = (p: Slow): Slow => {
  const rules: [string, Slow][] = [];
  for (const q of FIELDS) for (let n = 0; n < 4; n++) rules.push([jetName(q, n), symbol(jetName(q, n + 1))]);
  const along = FIELDS.map((q) => derive(p, sourceRules(q, symbol(jetName(q, 1)))));
  return plus(derive(p, Object.fromEntries(rules)), ...along);
};

describe('derivatives against the schoolbook', () => {
  it('with respect to one generator', () => {
    fc.assert(
      fc.property(
        fc
          .constantFrom(...RINGS, ring)
          .chain((r) =>
            fc.tuple(fc.constant(r), sums(namesOf(r).filter((n) => n !== 's')), fc.constantFrom(...namesOf(r))),
          ),
        ([r, p, name]) => {
          expectSame(partial(toKernel(r, p), name), slope(p, name));
          expect(isZero(partial(toKernel(r, p), 'absent'))).toBe(true);
        },
      ),
      tries(300),
    );
  });

  it('with respect to a field, sources included', () => {
    fc.assert(
      fc.property(sums(namesUpTo(2)), fc.constantFrom(...FIELDS), (p, q) => {
        expectSame(fieldPartial(make(p), q), low(slopeAlong(low(p), q)));
      }),
      tries(200),
    );
  });

  it('with respect to time', () => {
    fc.assert(
      fc.property(sums(namesUpTo(3)), (p) => {
        expectSame(timeDerivative(make(p)), low(rate(low(p))));
      }),
      tries(300),
    );
  });

  it('of products, by the rule of products', () => {
    const one = sums(namesUpTo(2), { terms: 4 }).map(make);
    fc.assert(
      fc.property(one, one, (p, q) => {
        const whole = timeDerivative(multiply(p, q));
        expect(equals(whole, add(multiply(timeDerivative(p), q), multiply(p, timeDerivative(q))))).toBe(true);
      }),
      tries(),
    );
  });

  it('of variational problems, also with second derivatives', () => {
    fc.assert(
      fc.property(sums(namesUpTo(2), { terms: 4 }), fc.constantFrom(...FIELDS), (raw, q) => {
        const p = low(raw);
        const want = plus(
          slopeAlong(p, q),
          times(number(E.q(-1)), rate(slope(p, jetName(q, 1)))),
          rate(rate(slope(p, jetName(q, 2)))),
        );
        expectSame(eulerLagrange(make(p), q), low(want));
      }),
      tries(100),
    );
  });

  it('of total derivatives vanish, variationally', () => {
    fc.assert(
      fc.property(sums(namesUpTo(1), { terms: 4 }), fc.constantFrom(...FIELDS), (p, q) => {
        expect(isZero(eulerLagrange(timeDerivative(make(p)), q))).toBe(true);
      }),
      tries(100),
    );
  });
});

describe('a fluid density', () => {
  const [speed, rho] = ['D(a,1)', 'rho'].map((name) => generator(ring, name)) as [Poly, Poly];

  it('changes by -3(1+w) ρ ȧ/a and gives the pressure', () => {
    const want = scale(multiply(rho, multiply(speed, generator(ring, 'a', -1))), rational(-18, 5));
    expect(equals(timeDerivative(rho), want)).toBe(true);
    // L = -a³Nρ with w = 1/5: ∂L/∂a = 3 a² N p, p = ρ/5.
    const volume = multiply(generator(ring, 'a', 3), generator(ring, 'N'));
    const varied = eulerLagrange(scale(multiply(volume, rho), -1), 'a');
    expect(
      equals(varied, scale(multiply(multiply(generator(ring, 'a', 2), generator(ring, 'N')), rho), rational(3, 5))),
    ).toBe(true);
  });

  it('is not asked for when it does not occur', () => {
    const short = makeRing([
      ...jetsOf('a', 0),
      ...jetsOf('phi', 1),
      { kind: 'source', name: 'rho', exponents: new Map([['a', rational(-3)]]) },
    ]);
    expectSame(timeDerivative(generator(short, 'phi')), symbol('D(phi,1)'));
    expect(() => timeDerivative(generator(short, 'rho'))).toThrow('no generator D(a,1)');
  });
});

describe('the highest order of a field', () => {
  it('is the one that occurs', () => {
    fc.assert(
      fc.property(sums(namesUpTo(4)), fc.constantFrom(...FIELDS), (p, q) => {
        const found = termsOfSlow(fromKernel(make(p))).flatMap(([powers]) =>
          [0, 1, 2, 3, 4].filter((n) => powers[jetName(q, n)]),
        );
        expect(orderIn(make(p), q)).toBe(Math.max(-1, ...found));
      }),
      tries(),
    );
    expect(orderIn(generator(ring, 'c'), 'c')).toBe(-1);
  });
});

describe('antiderivatives', () => {
  it('are differentiated back, and leave what would be a logarithm', () => {
    fc.assert(
      fc.property(sums(namesUpTo(1)), fc.constantFrom('a', 'phi', 'D(a,1)', 'c', 'k'), (p, name) => {
        const { primitive, rest } = antiderivative(make(p), name);
        const kept = low(p);
        const logarithmic = new Map([...kept].filter(([key]) => key.split(' ').includes(`${name}^-1`)));
        expectSame(rest, logarithmic);
        expectSame(partial(primitive, name), minus(kept, logarithmic));
        expectSame(primitive, fromKernel(primitive));
        // No constant of integration is invented.
        expect([...fromKernel(primitive).keys()].every((key) => key.includes(`${name}^`))).toBe(true);
      }),
      tries(200),
    );
  });

  it('refuse a radical and a name that is not there', () => {
    expect(() => antiderivative(generator(ring, 'a'), 's')).toThrow('s is a radical');
    expect(() => antiderivative(generator(ring, 'a'), 'b')).toThrow('no generator b');
  });
});

describe('the ends of a ring', () => {
  const r = makeRing([...jetsOf('a', 1), ...constantsOf(['x', 'y', 'z', 'w'])]);
  const a = (e: number) => generator(r, 'a', e);

  it('are an error where a jet has no successor', () => {
    expect(() => timeDerivative(generator(r, 'D(a,1)'))).toThrow('no time derivative of D(a,1)');
    expect(() => eulerLagrange(multiply(generator(r, 'D(a,1)'), generator(r, 'D(a,1)')), 'a')).toThrow(
      'no time derivative',
    );
  });

  it('are an error, not a wrap, at the limit of exponents', () => {
    expectSame(partial(a(511), 'a'), times(number(E.q(511)), symbol('a', 510)));
    expectSame(partial(a(-510), 'a'), times(number(E.q(-510)), symbol('a', -511)));
    expect(() => partial(a(-511), 'a')).toThrow(ExponentLimitError);
    expectSame(timeDerivative(a(511)), times(number(E.q(511)), times(symbol('a', 510), symbol('D(a,1)'))));
    expect(() => timeDerivative(a(-511))).toThrow(ExponentLimitError);
    const up = makeRing(jetsOf('a', 2));
    const mixed = multiply(generator(up, 'a'), generator(up, 'D(a,1)', 511));
    expect(() => timeDerivative(mixed)).toThrow(ExponentLimitError);
    expect(() => antiderivative(a(511), 'a')).toThrow(ExponentLimitError);
    expect(() => fieldPartial(multiply(generator(MECHANICS, 'a', -511), generator(MECHANICS, 'rho')), 'a')).toThrow(
      ExponentLimitError,
    );
    // Nothing is refused for the sake of another generator.
    expectSame(
      partial(multiply(a(3), generator(r, 'x', -511)), 'a'),
      times(number(E.q(3)), times(symbol('a', 2), symbol('x', -511))),
    );
  });

  it('are not reached by differentiating often', () => {
    let p = add(a(1), generator(r, 'x', 2));
    for (let i = 0; i < 600; i++) p = partial(multiply(p, a(1)), 'a');
    expectSame(p, plus(times(number(E.pow(E.q(2), 600)), symbol('a')), symbol('x', 2)));
  });
});
