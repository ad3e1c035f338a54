import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import {
  constantsOf,
  ExponentLimitError,
  exponentAt,
  exponentRange,
  jetName,
  jetsOf,
  makeRing,
  packMonomial,
  positionOf,
  unpackMonomial,
  weightOf,
  wordOf,
} from '../../src/algebra/ring.js';
import { compareKeys } from '../../src/algebra/terms.js';
import { tries } from './arbitrary.js';

const ringOf = (n: number) => makeRing(constantsOf(Array.from({ length: n }, (_, i) => `v${i}`)));
const exponent = fc.oneof(fc.constantFrom(0, 1, -1, 511, -511, 510, -510), fc.integer({ min: -511, max: 511 }));
const tuples = (n: number) => fc.array(exponent, { minLength: n, maxLength: n });
const sizes = fc.constantFrom(1, 2, 4, 5, 6, 10, 11, 13);

describe('packed exponents', () => {
  it('come back as they went in, up to the limit', () => {
    fc.assert(
      fc.property(
        sizes.chain((n) => tuples(n)),
        (exponents) => {
          const ring = ringOf(exponents.length);
          const keys = packMonomial(ring, exponents);
          expect(keys.length).toBe(Math.ceil(exponents.length / 5));
          expect(Array.from(unpackMonomial(ring, keys, 0))).toEqual(exponents);
          exponents.forEach((e, g) => {
            expect(exponentAt(keys, 0, g)).toBe(e);
          });
        },
      ),
      tries(300),
    );
  });

  it('are ordered as the exponents are', () => {
    fc.assert(
      fc.property(
        sizes.chain((n) => fc.tuple(tuples(n), tuples(n), fc.nat(n))),
        ([a, tail, same]) => {
          const b = [...a.slice(0, same), ...tail.slice(same)];
          const ring = ringOf(a.length);
          const at = a.findIndex((e, i) => e !== b[i]);
          const order = at < 0 ? 0 : Math.sign(a[at]! - b[at]!);
          const packed = compareKeys(packMonomial(ring, a), 0, packMonomial(ring, b), 0, ring.words);
          expect(Math.sign(packed)).toBe(order);
        },
      ),
      tries(300),
    );
  });

  it('add by words where the sums stay within the limit', () => {
    fc.assert(
      fc.property(
        sizes.chain((n) => fc.tuple(tuples(n), tuples(n))),
        ([a, b]) => {
          const ring = ringOf(a.length);
          const sums = a.map((e, i) => e + b[i]!);
          fc.pre(sums.every((e) => Math.abs(e) <= 511));
          const [ka, kb] = [packMonomial(ring, a), packMonomial(ring, b)];
          expect(Array.from(ka, (w, i) => w + kb[i]!)).toEqual(Array.from(packMonomial(ring, sums)));
        },
      ),
      tries(300),
    );
  });

  it('refuse 512', () => {
    for (const e of [512, -512, 1024, 5000]) expect(() => packMonomial(ringOf(6), [0, e])).toThrow(ExponentLimitError);
    expect(new ExponentLimitError()).toBeInstanceOf(RangeError);
    expect(new ExponentLimitError().name).toBe('ExponentLimitError');
    expect(new ExponentLimitError().message).toBe('an exponent beyond 511 would be needed');
  });

  it('have a word and a weight each', () => {
    expect([0, 4, 5, 12].map(wordOf)).toEqual([0, 0, 1, 2]);
    expect([0, 3, 4, 5].map(weightOf)).toEqual([1024 ** 4, 1024, 1, 1024 ** 4]);
  });

  it('have a range over a list', () => {
    const ring = ringOf(6);
    const rows = [
      [1, -2, 0, 0, 0, 511],
      [3, -7, 0, 2, 0, -511],
      [2, 0, 0, -4, 0, 0],
    ];
    const keys = Float64Array.from(rows.flatMap((row) => Array.from(packMonomial(ring, row))));
    const { low, high } = exponentRange(ring, keys);
    expect(Array.from(low)).toEqual([1, -7, 0, -4, 0, -511]);
    expect(Array.from(high)).toEqual([3, 0, 0, 2, 0, 511]);
    expect(Array.from(exponentRange(ring, new Float64Array(0)).low)).toEqual([0, 0, 0, 0, 0, 0]);
  });
});

describe('a ring', () => {
  it('knows the successor of each jet', () => {
    const ring = makeRing([...jetsOf('a', 2), ...jetsOf('N', 1), ...constantsOf(['k'])]);
    expect(ring.generators.map((g) => g.name)).toEqual(['D(a,2)', 'D(a,1)', 'a', 'D(N,1)', 'N', 'k']);
    expect(ring.next).toEqual([-1, 0, 1, -1, 3, -1]);
    expect(ring.generators.map((g) => positionOf(ring, g.name))).toEqual([0, 1, 2, 3, 4, 5]);
    expect(jetName('a', 0)).toBe('a');
    expect(jetName('a', 3)).toBe('D(a,3)');
    expect(() => positionOf(ring, 'b')).toThrow('no generator b in the ring');
  });

  it('is frozen', () => {
    const ring = makeRing([...constantsOf(['k']), { kind: 'radical', name: 's', square: 'k' }]);
    expect([ring, ring.generators, ring.next, ring.radicals].every(Object.isFrozen)).toBe(true);
    expect(ring.radicals).toEqual([[1, 0]]);
  });

  it('may be empty', () => {
    expect(makeRing([]).words).toBe(1);
  });

  it('refuses generators that cannot be', () => {
    const k = constantsOf(['k']);
    expect(() => makeRing([...k, ...k])).toThrow('named twice');
    expect(() => makeRing([{ kind: 'radical', name: 's', square: 'k' }])).toThrow('no generator k');
    expect(() => makeRing([...jetsOf('a', 1), { kind: 'radical', name: 's', square: 'a' }])).toThrow(
      'a is no constant',
    );
    expect(() =>
      makeRing([...k, { kind: 'radical', name: 's', square: 'k' }, { kind: 'radical', name: 't', square: 's' }]),
    ).toThrow('s is no constant');
    expect(() =>
      makeRing([...k, { kind: 'radical', name: 's', square: 'k' }, { kind: 'radical', name: 't', square: 'k' }]),
    ).toThrow('two radicals have the same square');
    expect(() => makeRing([{ kind: 'source', name: 'rho', exponents: new Map([['a', rational(-3)]]) }])).toThrow(
      'no generator a',
    );
  });
});
