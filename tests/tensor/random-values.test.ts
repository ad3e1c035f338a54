import { describe, expect, it } from 'vitest';
import { PRIMES } from '../../src/algebra/modular.js';
import { kindTable, makeKind } from '../../src/tensor/kinds.js';
import { randomPoint } from '../../src/tensor/random-values.js';
import { exchange } from '../../src/tensor/symmetry.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { disguised, randomContraction } from '../oracle/tensors.js';

const P = PRIMES[0];
const S = makeKind('S', 3, [exchange(3, 0, 1, 1)]);
const KINDS = kindTable([S]);
const GROUPS = new Map([...KINDS].map(([name, kind]) => [name, kind.group]));
const symbol = (head: string, names: string, up = '') => ({
  head,
  slots: [...names].map((name) => ({ name, up: up.includes(name) })),
});

describe('values on random components', () => {
  it('depend on the seed and on nothing else', () => {
    const factors = [symbol('R', 'abcd'), symbol('R', 'cdab')];
    const value = (seed: number) => randomPoint(seed, P, KINDS).value(factors);
    expect(value(1)).toBe(value(1));
    expect(value(1)).not.toBe(value(2));
    const late = randomPoint(1, P, KINDS);
    late.value([symbol('T', 'abc'), symbol('T', 'abc')]);
    expect(late.value(factors)).toBe(value(1));
  });

  it('respect slot symmetries, names of dummies and the order of factors, in several dimensions', () => {
    const HEADS = [
      ['T', 3],
      ['R', 4],
      ['S', 3],
      ['T', 1],
      ['R', 2],
    ] as const;
    for (let run = 0; run < runs(200); run++) {
      const seed = firstSeed(40_000) + run;
      const random = new Random(seed);
      const tensors = Array.from({ length: 1 + random.below(3) }, () => random.pick(HEADS));
      if (tensors.reduce((n, [, k]) => n + k, 0) % 2 === 1) tensors.push(['T', 1]);
      const factors = randomContraction(random, tensors);
      const other = disguised(random, factors, GROUPS);
      const point = randomPoint(seed, P, KINDS, 2 + random.below(4));
      const value = point.value(factors);
      const expected = other.sign > 0 ? value : (P - value) % P;
      expect(point.value(other.factors), `seed ${seed}`).toBe(expected);
    }
  });

  it('know the definitions of the traces and of the axial vector', () => {
    const point = randomPoint(3, P, KINDS);
    const pairs = [
      [
        [symbol('R', 'ab'), symbol('R', 'ab')],
        [symbol('R', 'cadb'), symbol('R', 'ab'), symbol('eta', 'cd')],
      ],
      [[symbol('R', '')], [symbol('R', 'abab')]],
      [
        [symbol('T', 'a'), symbol('T', 'a')],
        [symbol('T', 'bab'), symbol('T', 'cac')],
      ],
      [
        [symbol('A', 'a'), symbol('T', 'a')],
        [symbol('epsilon', 'abcd'), symbol('T', 'bcd'), symbol('T', 'a')],
      ],
      [[symbol('delta', 'aa')], [symbol('eta', 'ab'), symbol('eta', 'ab')]],
    ] as const;
    for (const [a, b] of pairs) expect(point.value(a)).toBe(point.value(b));
    expect(point.value([symbol('delta', 'aa')])).toBe(4);
    // ε_abcd ε^abcd = −24.
    expect(point.value([symbol('epsilon', 'abcd'), symbol('epsilon', 'abcd')])).toBe(P - 24);
    expect(point.value([])).toBe(1);
    expect(randomPoint(1, P, KINDS, 7).value([symbol('eta', 'aa')])).toBe(7);
  });

  it('components carry the free indices in the order asked for', () => {
    const point = randomPoint(8, P, KINDS, 3);
    const straight = point.components([symbol('S', 'abc')], ['a', 'b', 'c']);
    const turned = point.components([symbol('S', 'abc')], ['c', 'a', 'b']);
    for (let a = 0; a < 3; a++)
      for (let b = 0; b < 3; b++)
        for (let c = 0; c < 3; c++) expect(turned[9 * c + 3 * a + b]).toBe(straight[9 * a + 3 * b + c]);
    const trace = point.components([symbol('R', 'ab'), symbol('T', 'b')], ['a']);
    expect(trace).toHaveLength(3);
  });

  it('refuse what has no meaning', () => {
    const point = randomPoint(1, P, KINDS, 5);
    expect(() => point.value([symbol('epsilon', 'abab')])).toThrow(/four dimensions/);
    expect(() => point.value([symbol('T', 'a')])).toThrow(/free/);
    expect(() => point.components([symbol('T', 'a')], ['b'])).toThrow(/free/);
    expect(() => point.value([{ ...symbol('R', 'abab'), part: 'weyl' }])).toThrow(/weyl/);
  });
});
