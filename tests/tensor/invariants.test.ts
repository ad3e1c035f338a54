import { describe, expect, it } from 'vitest';
import { constant, equals, negate, type Poly } from '../../src/algebra/poly.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import type { TensorFactor } from '../../src/notation/theory.js';
import { packIndices, type SparseTensor, TensorBuilder } from '../../src/tensor/components.js';
import type { FrameMetric } from '../../src/tensor/contraction.js';
import { dummyFreeKey, type GeometricTensors, makeEvaluator, NoComponentsError } from '../../src/tensor/invariants.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { factorsOf } from '../oracle/reading.js';
import { toRational } from '../random-poly.js';

const ring = makeRing(constantsOf(['x']));
const RANGE = [0, 1, 2, 3] as const;
const METRICS: readonly FrameMetric[] = [
  [-1, 1, 1, 1],
  [1, -1, -1, -1],
];

/** T^a_bc and R^a_bcd as numbers, antisymmetric as torsion and curvature are, with the frame metric. */
interface Numbers {
  readonly eta: FrameMetric;
  readonly torsion: Q[][][];
  readonly curvature: Q[][][][];
}

function randomNumbers(random: Random, eta: FrameMetric): Numbers {
  const torsion = RANGE.map(() => RANGE.map(() => RANGE.map(() => E.ZERO)));
  const curvature = RANGE.map(() => RANGE.map(() => RANGE.map(() => RANGE.map(() => E.ZERO))));
  for (const c of RANGE)
    for (const d of RANGE) {
      if (c >= d) continue;
      for (const a of RANGE) {
        torsion[a]![c]![d] = random.rational();
        torsion[a]![d]![c] = E.neg(torsion[a]![c]![d]!);
        for (const b of RANGE) {
          if (a >= b) continue;
          const x = random.rational();
          // R_ab = −R_ba is R^b_a = −η_aa η_bb R^a_b.
          const s = E.q(-eta[a] * eta[b]);
          curvature[a]![b]![c]![d] = x;
          curvature[a]![b]![d]![c] = E.neg(x);
          curvature[b]![a]![c]![d] = E.mul(s, x);
          curvature[b]![a]![d]![c] = E.neg(E.mul(s, x));
        }
      }
    }
  return { eta, torsion, curvature };
}

/** The kernel's tensors with all indices lowered. */
function lowered({ eta, torsion, curvature }: Numbers): GeometricTensors {
  const put = (builder: TensorBuilder, indices: readonly number[], x: Q): void => {
    const p = constant(ring, toRational(x));
    if (p.size > 0) builder.put(packIndices(indices), eta[indices[0]!]! < 0 ? negate(p) : p);
  };
  const t = new TensorBuilder(3);
  const r = new TensorBuilder(4);
  for (const a of RANGE)
    for (const b of RANGE)
      for (const c of RANGE) {
        put(t, [a, b, c], torsion[a]![b]![c]!);
        for (const d of RANGE) put(r, [a, b, c, d], curvature[a]![b]![c]![d]!);
      }
  return { ring, metric: eta, torsion: t.build(), curvature: r.build() };
}

const levi = (...i: readonly number[]): number => {
  let sign = 1;
  for (let p = 0; p < i.length; p++) for (let q = p + 1; q < i.length; q++) sign *= Math.sign(i[q]! - i[p]!);
  return sign;
};

/** A component at the typed heights, straight from the definitions. */
function component({ eta, torsion, curvature }: Numbers, { head, slots }: TensorFactor, at: readonly number[]): Q {
  // Each definition gives a tensor at its own heights; other slots are moved there.
  const natural: boolean[] =
    head === 'R' && slots.length === 4
      ? [true, false, false, false]
      : head === 'T' && slots.length === 3
        ? [true, false, false]
        : head === 'A'
          ? [true]
          : head === 'delta'
            ? [true, false]
            : slots.map(() => false);
  let sign = 1;
  slots.forEach(({ up }, s) => {
    if (up !== natural[s]) sign *= eta[at[s]!]!;
  });
  const [a, b, c, d] = at as [number, number, number, number];
  const ricci = (m: number, n: number): Q => E.sum(...RANGE.map((x) => curvature[x]![m]![x]![n]!));
  const value = (): Q => {
    if (head === 'R' && slots.length === 4) return curvature[a]![b]![c]![d]!;
    if (head === 'R' && slots.length === 2) return ricci(a, b);
    if (head === 'R') return E.sum(...RANGE.map((x) => E.mul(E.q(eta[x]), ricci(x, x))));
    if (head === 'T' && slots.length === 3) return torsion[a]![b]![c]!;
    if (head === 'T') return E.sum(...RANGE.map((x) => torsion[x]![a]![x]!));
    if (head === 'eta') return a === b ? E.q(eta[a]!) : E.ZERO;
    if (head === 'delta') return a === b ? E.ONE : E.ZERO;
    if (head === 'epsilon') return E.q(levi(a, b, c, d));
    // A^a = ε^abcd T_bcd, every index of ε raised.
    let total = E.ZERO;
    for (const x of RANGE)
      for (const y of RANGE)
        for (const z of RANGE) {
          const s = levi(a, x, y, z) * eta[a]! * eta[x] * eta[y] * eta[z] * eta[x];
          if (s !== 0) total = E.add(total, E.mul(E.q(s), torsion[x]![y]![z]!));
        }
    return total;
  };
  return E.mul(E.q(sign), value());
}

function denseValue(numbers: Numbers, factors: readonly TensorFactor[]): Q {
  const names = [...new Set(factors.flatMap((f) => f.slots.map((s) => s.name)))];
  let out = E.ZERO;
  for (let code = 0; code < 4 ** names.length; code++) {
    const at = new Map(names.map((n, i) => [n, Math.floor(code / 4 ** i) % 4]));
    let value = E.ONE;
    for (const f of factors) {
      const x = component(
        numbers,
        f,
        f.slots.map((s) => at.get(s.name)!),
      );
      if (E.isZero(x)) {
        value = E.ZERO;
        break;
      }
      value = E.mul(value, x);
    }
    out = E.add(out, value);
  }
  return out;
}

const numberOf = (p: Poly): string => (p.size === 0 ? '0' : E.show(E.q(BigInt(p.numerators[0]!), p.denominator)));

const PRODUCTS = [
  'R',
  'R_{ab} R^{ab}',
  'R_{ab} R^{ba}',
  'R_{abcd} R^{abcd}',
  'R_{abcd} R^{cdab}',
  'R_{abcd} R^{acbd}',
  'R^{a}{}_{bac} \\eta^{bc}',
  'T_{abc} T^{abc}',
  'T_{abc} T^{bac}',
  'T_a T^a',
  'A_a A^a',
  'T_a A^a',
  'A^a T_a',
  'T^{b}{}_{ab} A^a',
  '\\epsilon^{abcd} R_{abcd}',
  '\\epsilon_{abcd} R^{abcd}',
  '\\epsilon^{abcd} R_{ab}{}^{e}{}_{c} T_{e} T_{d}',
  '\\epsilon^{abcd} T_{eab} T^e{}_{cd}',
  '\\epsilon_{abcd} \\epsilon^{abce} T^d T_e',
  'R_{abcd} T^{abe} T^{cd}{}_e',
  'R_{ab} T^a T^b',
  'R_{abcd} A^a T^b A^c T^d',
  '\\delta^a_b R_a{}^b',
  '\\eta_{ab} \\eta^{ab}',
  '\\delta^a{}_a R',
];

describe('makeEvaluator', () => {
  for (const text of PRODUCTS)
    it(`gives ${text} its value from the definitions`, () => {
      const factors = factorsOf(text);
      for (let i = 0; i < runs(2); i++) {
        const seed = firstSeed(31 * i);
        const random = new Random(seed);
        for (const eta of METRICS) {
          const numbers = randomNumbers(random, eta);
          const value = makeEvaluator(lowered(numbers)).value(factors);
          expect(numberOf(value), `seed ${seed}, metric ${eta}`).toBe(E.show(denseValue(numbers, factors)));
        }
      }
    });

  it('computes products that differ only in dummies once', () => {
    const evaluator = makeEvaluator(lowered(randomNumbers(new Random(1), METRICS[0]!)));
    const first = evaluator.value(factorsOf('R_{ab} R^{ab}'));
    expect(evaluator.value(factorsOf('R_{xy} R^{xy}'))).toBe(first);
    expect(equals(evaluator.value(factorsOf('R_{xy} R^{yx}')), first)).toBe(false);
  });

  it('is one for no factors', () => {
    const empty: SparseTensor = { rank: 3, entries: new Map() };
    const evaluator = makeEvaluator({ ring, metric: METRICS[0]!, torsion: empty, curvature: { ...empty, rank: 4 } });
    expect(evaluator.value([])).toEqual(constant(ring, 1));
  });

  it('refuses what has no components instead of taking it for the metric or the whole tensor', () => {
    const evaluator = makeEvaluator(lowered(randomNumbers(new Random(1), METRICS[0]!)));
    const [a, b] = factorsOf('\\eta_{ab} \\eta^{ab}') as [TensorFactor, TensorFactor];
    expect(() => evaluator.value([{ ...a, head: 'S' }, b])).toThrow(NoComponentsError);
    expect(() => evaluator.value([{ ...a, head: 'constructor' }, b])).toThrow(
      'the tensor constructor has no components',
    );
    const torsion = factorsOf('T_{abc} T^{abc}') as TensorFactor[];
    expect(() => evaluator.value([{ ...torsion[0]!, part: 'axial' }, torsion[1]!])).toThrow(
      'the part axial of T is not written out',
    );
  });
});

describe('dummyFreeKey', () => {
  const key = (text: string): string => dummyFreeKey(factorsOf(text));

  it('does not depend on the names of dummies', () => {
    expect(key('R_{abcd} T^{abe} T^{cd}{}_e')).toBe(key('R_{pqrs} T^{pqa} T^{rs}{}_a'));
  });

  it('tells different contractions apart', () => {
    const texts = ['R_{ab} R^{ab}', 'R_{ab} R^{ba}', 'R', 'R R', 'T_a T^a', 'A_a A^a', 'T_a A^a', 'R_{abcd} R^{abcd}'];
    expect(new Set(texts.map(key)).size).toBe(texts.length);
  });

  it('tells an irreducible part from its tensor', () => {
    const [first, second] = factorsOf('T_{abc} T^{abc}') as [TensorFactor, TensorFactor];
    expect(dummyFreeKey([{ ...first, part: 'axial' }, second])).not.toBe(dummyFreeKey([first, second]));
  });
});
