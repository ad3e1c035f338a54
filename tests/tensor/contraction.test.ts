import { describe, expect, it } from 'vitest';
import { constant, generator, isCanonical, negate, type Poly, product, sum } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { packIndices, type SparseTensor, unpackIndices } from '../../src/tensor/components.js';
import {
  ContractionLimitError,
  contract,
  contractOpen,
  type FrameMetric,
  MAX_COMPONENTS,
  MAX_WORK,
  namesOf,
  type Placed,
  trace,
} from '../../src/tensor/contraction.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoint, randomPoly, valueAt } from '../random-poly.js';

const ring = makeRing(constantsOf(['x', 'y', 'z']));
const METRICS: readonly FrameMetric[] = [
  [-1, 1, 1, 1],
  [1, -1, -1, -1],
];

/** A tensor with a share of its components filled; values repeat, also with the other sign, as those of geometries do. */
function randomTensor(random: Random, rank: number, percent: number): SparseTensor {
  const pool = Array.from({ length: 3 }, () => randomPoly(random, ring, ['x', 'y', 'z'], { terms: 2 })).filter(
    (p) => p.size > 0,
  );
  const entries = new Map<number, Poly>();
  for (let n = 0; n < 4 ** rank; n++) {
    if (pool.length === 0 || !random.chance(percent)) continue;
    const p = random.pick(pool);
    entries.set(n, random.chance(30) ? negate(p) : p);
  }
  return { rank, entries };
}

/** Slots of random tensors with every index name twice, or once for the free ones. */
function randomProduct(random: Random, ranks: readonly number[], percent: number, free = 0): Placed[] {
  const total = ranks.reduce((n, r) => n + r, 0);
  const names = random.shuffled(
    Array.from({ length: total }, (_, s) => (s < free ? `f${s}` : `d${Math.floor((s - free) / 2)}`)),
  );
  let at = 0;
  return ranks.map((rank) => {
    const mine = names.slice(at, at + rank);
    at += rank;
    return { tensor: randomTensor(random, rank, percent), names: mine };
  });
}

/** Every assignment of 0..3 to every name, numbers instead of polynomials. */
function denseSum(
  factors: readonly Placed[],
  metric: FrameMetric,
  point: ReturnType<typeof randomPoint>,
  fixed: ReadonlyMap<string, number> = new Map(),
): Q {
  const tables = factors.map(
    ({ tensor }) => new Map([...tensor.entries].map(([packed, p]) => [packed, valueAt(p, point)])),
  );
  const names = [...new Set(factors.flatMap((f) => f.names))].filter((n) => !fixed.has(n));
  let out = E.ZERO;
  for (let code = 0; code < 4 ** names.length; code++) {
    const at = new Map([...fixed, ...names.map((n, i) => [n, Math.floor(code / 4 ** i) % 4] as const)]);
    let value = E.ONE;
    for (const n of names) value = E.mul(value, E.q(metric[at.get(n)!]!));
    factors.forEach(({ names: own }, i) => {
      value = E.mul(value, tables[i]!.get(packIndices(own.map((n) => at.get(n)!))) ?? E.ZERO);
    });
    out = E.add(out, value);
  }
  return out;
}

const SHAPES: readonly (readonly number[])[] = [
  [2],
  [4],
  [1, 1],
  [2, 2],
  [3, 3],
  [4, 2],
  [1, 2, 1],
  [2, 3, 1],
  [4, 4],
  [3, 3, 2],
  [2, 2, 2, 2],
  [0, 2],
  [1, 1, 1, 1],
];

describe('contract', () => {
  for (const ranks of SHAPES)
    it(`equals the sum over all assignments for ranks ${ranks.join(', ')}`, () => {
      for (let i = 0; i < runs(12); i++) {
        const seed = firstSeed(100 * i + ranks.length);
        const random = new Random(seed);
        const metric = random.pick(METRICS);
        const factors = randomProduct(random, ranks, random.pick([10, 40, 100]));
        const point = randomPoint(random, ring);
        const value = contract(ring, factors, metric);
        expect(isCanonical(value)).toBe(true);
        expect(E.show(valueAt(value, point)), `seed ${seed}`).toBe(E.show(denseSum(factors, metric, point)));
      }
    });

  it('is one for an empty product and zero when a factor is', () => {
    expect(contract(ring, [], METRICS[0]!)).toEqual(constant(ring, 1));
    const nothing: SparseTensor = { rank: 1, entries: new Map() };
    const some: SparseTensor = { rank: 1, entries: new Map([[2, generator(ring, 'x')]]) };
    const factors = [
      { tensor: some, names: ['a'] },
      { tensor: nothing, names: ['a'] },
    ];
    expect(contract(ring, factors, METRICS[0]!).size).toBe(0);
  });

  it('multiplies scalars and disconnected pieces', () => {
    const scalar = (name: string): Placed => ({
      tensor: { rank: 0, entries: new Map([[0, generator(ring, name)]]) },
      names: [],
    });
    const random = new Random(firstSeed(5));
    const left = randomProduct(random, [2, 2], 60);
    const right = randomProduct(random, [3, 3], 60).map(({ tensor, names }) => ({
      tensor,
      names: names.map((n) => `other ${n}`),
    }));
    const [metric] = METRICS as [FrameMetric];
    const expected = product(ring, [
      generator(ring, 'x'),
      generator(ring, 'y'),
      contract(ring, left, metric),
      contract(ring, right, metric),
    ]);
    const mixed = [left[0]!, scalar('x'), right[0]!, right[1]!, scalar('y'), left[1]!];
    expect(contract(ring, mixed, metric)).toEqual(expected);
  });
});

describe('contractOpen', () => {
  it('keeps the names that occur once as slots', () => {
    for (let i = 0; i < runs(20); i++) {
      const seed = firstSeed(900 + i);
      const random = new Random(seed);
      const metric = random.pick(METRICS);
      const factors = randomProduct(
        random,
        random.pick([
          [3, 3],
          [2, 2, 2],
          [4, 2],
        ] as const),
        70,
        2,
      );
      const point = randomPoint(random, ring);
      const { tensor, names } = contractOpen(ring, factors, metric);
      if (tensor.entries.size === 0) continue;
      expect([...names].sort()).toEqual(['f0', 'f1']);
      for (let n = 0; n < 16; n++) {
        const at = unpackIndices(n, 2);
        const fixed = new Map(names.map((name, s) => [name, at[s]!]));
        const value = tensor.entries.get(n);
        const expected = denseSum(factors, metric, point, fixed);
        expect(E.show(value ? valueAt(value, point) : E.ZERO), `seed ${seed}`).toBe(E.show(expected));
      }
    }
  });
});

describe('trace', () => {
  it('leaves a tensor without pairs alone', () => {
    const placed: Placed = { tensor: randomTensor(new Random(3), 2, 50), names: ['a', 'b'] };
    expect(trace(placed, METRICS[0]!)).toBe(placed);
  });

  it('sums a pair with the signs of the metric and keeps the order of the other slots', () => {
    const one = constant(ring, 1);
    const x = generator(ring, 'x');
    const entries = new Map([
      [packIndices([0, 2, 0, 1]), one],
      [packIndices([1, 2, 1, 1]), x],
      [packIndices([1, 2, 3, 1]), x],
    ]);
    const { tensor, names } = trace({ tensor: { rank: 4, entries }, names: ['p', 'b', 'p', 'a'] }, METRICS[0]!);
    expect(names).toEqual(['b', 'a']);
    expect([...tensor.entries]).toEqual([[packIndices([2, 1]), sum(ring, [x, negate(one)])]]);
  });
});

describe('limits', () => {
  it('refuses a product with too many intermediate components', () => {
    const one = constant(ring, 1);
    // Five slots run over everything and five are zero; a join over the zeros multiplies the others.
    const open = (first: boolean): SparseTensor => ({
      rank: 10,
      entries: new Map(Array.from({ length: 4 ** 5 }, (_, n) => [first ? n * 4 ** 5 : n, one])),
    });
    const names = (from: string, to: string): string[] => [from, to].flatMap((x) => [1, 2, 3, 4, 5].map((n) => x + n));
    const factors = [
      { tensor: open(true), names: names('a', 'b') },
      { tensor: open(false), names: names('b', 'c') },
      { tensor: open(true), names: names('c', 'a') },
    ];
    expect(() => contract(ring, factors, METRICS[0]!)).toThrow(ContractionLimitError);
    expect(() => contract(ring, factors, METRICS[0]!)).toThrow(`${MAX_COMPONENTS} intermediate components`);
  });

  it('refuses a product whose components grow too long', () => {
    const wide = makeRing(constantsOf(Array.from({ length: 40 }, (_, n) => `x${n}`)));
    const long = sum(
      wide,
      wide.generators.map((g) => generator(wide, g.name)),
    );
    const scalar: Placed = { tensor: { rank: 0, entries: new Map([[0, long]]) }, names: [] };
    const start = performance.now();
    expect(() => contract(wide, Array(12).fill(scalar), METRICS[0]!)).toThrow(`${MAX_WORK} terms`);
    expect(performance.now() - start).toBeLessThan(20_000);
  });
});

it('reads index names off typed slots', () => {
  expect(
    namesOf([
      { name: 'a', up: true },
      { name: '\\mu', up: false },
    ]),
  ).toEqual(['a', '\\mu']);
});
