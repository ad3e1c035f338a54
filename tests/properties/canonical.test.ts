/**
 * Canonical forms against brute force on random components: equal forms have equal values in four dimensions; without ε,
 * and in as many dimensions as there are contracted pairs, different forms have different values.
 */
import { describe, expect, it } from 'vitest';
import { constant, type Poly, termsOf } from '../../src/algebra/poly.js';
import { makeRing } from '../../src/algebra/ring.js';
import { canonicalSum, factorsKey, type TensorTerm } from '../../src/tensor/expression.js';
import { kindTable, makeKind } from '../../src/tensor/kinds.js';
import { exchange } from '../../src/tensor/symmetry.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import {
  disguised,
  type OracleSymmetry,
  type OracleTensor,
  PRIME,
  RandomTensors,
  randomContraction,
} from '../oracle/tensors.js';

const ONE = constant(makeRing([]), 1);
/** Declared tensors of a few kinds: symmetric, antisymmetric, with exchange of pairs, cyclic, without symmetry. */
const DECLARED = [
  makeKind('S', 2, [exchange(2, 0, 1, 1)]),
  makeKind('F', 2, [exchange(2, 0, 1, -1)]),
  makeKind('W', 4, [exchange(4, 0, 1, -1), exchange(4, 2, 3, -1), { places: [2, 3, 0, 1], sign: 1 }]),
  makeKind('C', 3, [{ places: [1, 2, 0], sign: 1 }]),
  makeKind('H', 3),
];
const KINDS = kindTable(DECLARED);
const GROUPS: ReadonlyMap<string, readonly OracleSymmetry[]> = new Map([...KINDS].map(([name, k]) => [name, k.group]));
const GEOMETRIC = [
  ['T', 3],
  ['T', 3],
  ['R', 4],
  ['R', 2],
  ['T', 1],
  ['R', 0],
] as const;
const ALL = [...GEOMETRIC, ['S', 2], ['F', 2], ['W', 4], ['C', 3], ['H', 3]] as const;
type Tensor = readonly [head: string, slots: number];

const term = (factors: readonly OracleTensor[], coefficient: Poly = ONE): TensorTerm => ({ coefficient, factors });
const canonical = (factors: readonly OracleTensor[], by = 1) =>
  canonicalSum([term(factors, constant(ONE.ring, by))], KINDS);
const keyOf = (terms: readonly TensorTerm[]): string =>
  terms.map((t) => `${t.coefficient.numerators[0]}/${t.coefficient.denominator} ${factorsKey(t.factors)}`).join(' + ');

/** Value of a sum with rational coefficients; denominators are powers of two and three here. */
function sumValue(terms: readonly TensorTerm[], tensors: RandomTensors, free: ReadonlyMap<string, number>): number {
  let total = 0;
  for (const t of terms) {
    const [only] = termsOf(t.coefficient);
    expect(only!.coefficient.den).toBe(1n);
    const by = Number(((only!.coefficient.num % BigInt(PRIME)) + BigInt(PRIME)) % BigInt(PRIME));
    total = (total + by * tensors.value(t.factors, free)) % PRIME;
  }
  return total;
}

function drawn(random: Random, from: readonly Tensor[], most: number, slots: number): Tensor[] {
  const tensors: Tensor[] = [];
  for (let n = 1 + random.below(most); n > 0; n--) tensors.push(random.pick(from));
  const count = (): number => tensors.reduce((n, [, k]) => n + k, 0);
  while (count() > slots) tensors.pop();
  return tensors;
}

describe('equal canonical forms', () => {
  it(
    'mean equal values in four dimensions, with ε, η, δ, A, traces and free indices',
    () => {
      let compared = 0;
      for (let run = 0; run < runs(1500); run++) {
        const seed = firstSeed(50_000) + run;
        const random = new Random(seed);
        const tensors = drawn(random, [...ALL, ['A', 1]], 3, 9);
        if (random.chance(30)) tensors.push(['epsilon', 4]);
        if (random.chance(20)) tensors.push([random.pick(['eta', 'delta']), 2]);
        const slots = tensors.reduce((n, [, k]) => n + k, 0);
        const free = slots % 2 === 1 ? 1 : random.chance(20) && slots > 2 ? 2 : 0;
        const factors = randomContraction(random, tensors, free);
        const components = new RandomTensors(seed, 4, GROUPS);
        const at = new Map(Array.from({ length: free }, (_, i) => [`f${i}`, random.below(4)] as const));
        expect(sumValue(canonical(factors), components, at), `seed ${seed}`).toBe(components.value(factors, at));
        compared++;
      }
      expect(compared).toBe(runs(1500));
    },
    runs(120_000),
  );

  it(
    'do not depend on names of dummies, their heights, the order of factors or slot symmetries',
    () => {
      for (let run = 0; run < runs(3000); run++) {
        const seed = firstSeed(60_000) + run;
        const random = new Random(seed);
        const tensors = drawn(random, ALL, 5, 16);
        if (random.chance(30)) tensors.push(['epsilon', 4]);
        if (tensors.reduce((n, [, k]) => n + k, 0) % 2 === 1) tensors.push(['T', 1]);
        const factors = randomContraction(random, tensors);
        const other = disguised(random, factors, GROUPS);
        const form = canonical(factors);
        expect(keyOf(canonical(other.factors, other.sign)), `seed ${seed}`).toBe(keyOf(form));
        expect(keyOf(canonicalSum(form, KINDS)), `idempotent, seed ${seed}`).toBe(keyOf(form));
      }
    },
    runs(120_000),
  );
});

describe('different canonical forms', () => {
  it(
    'mean different values in as many dimensions as there are pairs',
    () => {
      let [equal, different, zero] = [0, 0, 0];
      for (let run = 0; run < runs(4000); run++) {
        const seed = firstSeed(70_000) + run;
        const random = new Random(seed);
        const tensors = drawn(random, ALL, 4, 10);
        if (tensors.reduce((n, [, k]) => n + k, 0) % 2 === 1) tensors.push(random.chance(50) ? ['T', 1] : ['T', 3]);
        // R_ab and T_a contain one pair themselves, R two.
        const hidden = tensors.reduce(
          (n, [head, k]) => n + (head === 'R' ? (4 - k) / 2 : head === 'T' ? (3 - k) / 2 : 0),
          0,
        );
        const pairs = tensors.reduce((n, [, k]) => n + k, 0) / 2 + hidden;
        if (pairs > 5) continue;
        const [a, b] = [randomContraction(random, tensors), randomContraction(random, tensors)];
        const components = new RandomTensors(seed, Math.max(2, pairs), GROUPS);
        const [x, y] = [components.value(a), components.value(b)];
        const [formA, formB] = [keyOf(canonical(a)), keyOf(canonical(b))];
        // A vanishing value has the empty form, and only it.
        expect(formA === '', `seed ${seed}`).toBe(x === 0);
        expect(formB === '', `seed ${seed}`).toBe(y === 0);
        const opposite = keyOf(canonical(b, -1));
        expect(formA === formB, `seed ${seed}`).toBe(x === y);
        expect(formA === opposite, `seed ${seed}`).toBe((x + y) % PRIME === 0);
        if (x === 0) zero++;
        else if (formA === formB || formA === opposite) equal++;
        else different++;
      }
      // The draw meets all three cases.
      expect(Math.min(equal, different, zero)).toBeGreaterThan(runs(50));
    },
    runs(240_000),
  );
});
