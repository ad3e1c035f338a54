import { describe, expect, it } from 'vitest';
import { echelonMod } from '../../src/algebra/modular.js';
import { termsOf } from '../../src/algebra/poly.js';
import { PARTS } from '../../src/notation/parts.js';
import type { TensorSum } from '../../src/tensor/expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { expandParts, hasParts, writeOutParts } from '../../src/tensor/parts.js';
import { equalSums, rewrite } from '../../src/tensor/rewrite.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { terms } from '../notation/rendered.js';
import { PRIME, RandomTensors } from '../oracle/tensors.js';
import { sum } from './rewriting.js';

const KINDS = kindTable();
const RANKS: Readonly<Record<string, number>> = {
  vector: 4,
  axial: 4,
  tensor: 16,
  scalar: 1,
  ricci: 9,
  'ricci-antisymmetric': 6,
  pseudoscalar: 1,
  'pair-antisymmetric': 9,
  weyl: 10,
};
const NAMES = ['a', 'b', 'c', 'd'];
type Matrix = readonly (readonly number[])[];

/** Independent components: the indices of each, and the components that are ± it. */
function basisOf(
  head: string,
): { readonly at: readonly number[]; readonly tensor: (indices: readonly number[]) => number }[] {
  const pairs = [0, 1, 2, 3].flatMap((i) => [0, 1, 2, 3].filter((j) => j > i).map((j) => [i, j] as const));
  const sign = ([i, j]: readonly [number, number], x: number, y: number): number =>
    x === i && y === j ? 1 : x === j && y === i ? -1 : 0;
  if (head === 'T')
    return [0, 1, 2, 3].flatMap((a) =>
      pairs.map((p) => ({ at: [a, ...p], tensor: ([x, y, z]: readonly number[]) => (x === a ? sign(p, y!, z!) : 0) })),
    );
  return pairs.flatMap((p) =>
    pairs.map((q) => ({
      at: [...p, ...q],
      tensor: ([w, x, y, z]: readonly number[]) => sign(p, w!, x!) * sign(q, y!, z!),
    })),
  );
}

/** A tensor with given components in place of random ones. */
class Given extends RandomTensors {
  constructor(
    private readonly head: string,
    private readonly tensor: (indices: readonly number[]) => number,
  ) {
    super(1, 4);
  }

  override component(head: string, at: readonly number[]): number {
    if (head === this.head && at.length === (head === 'T' ? 3 : 4)) return (this.tensor(at) + PRIME) % PRIME;
    return super.component(head, at);
  }
}

const inverse = (n: bigint): bigint => {
  let out = 1n;
  for (let base = n % BigInt(PRIME), e = BigInt(PRIME) - 2n; e > 0n; e >>= 1n, base = (base * base) % BigInt(PRIME))
    if (e & 1n) out = (out * base) % BigInt(PRIME);
  return out;
};

/** The linear map that a sum with free indices a, b, c(, d) describes, on independent components. */
function matrixOf(written: TensorSum, head: string): Matrix {
  const basis = basisOf(head);
  const coefficients = written.map((t) => {
    const [{ coefficient }] = termsOf(t.coefficient) as [ReturnType<typeof termsOf>[0]];
    const p = BigInt(PRIME);
    return Number((((coefficient.num % p) + p) * inverse(coefficient.den)) % p);
  });
  const columns = basis.map(({ tensor }) => {
    const components = new Given(head, tensor);
    return basis.map(({ at }) => {
      const free = new Map(at.map((i, n) => [NAMES[n]!, i]));
      return written.reduce((total, t, n) => (total + coefficients[n]! * components.value(t.factors, free)) % PRIME, 0);
    });
  });
  return basis.map((_, row) => columns.map((column) => column[row]!));
}

const multiplied = (a: Matrix, b: Matrix): Matrix =>
  a.map((row) => b[0]!.map((_, j) => row.reduce((s, x, k) => (s + x * b[k]![j]!) % PRIME, 0)));
const added = (a: Matrix, b: Matrix): Matrix => a.map((row, i) => row.map((x, j) => (x + b[i]![j]!) % PRIME));
const identity = (n: number): Matrix =>
  Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_x, j) => Number(i === j)));
const zero = (n: number): Matrix => Array.from({ length: n }, () => Array<number>(n).fill(0));

for (const { head, slots, names } of PARTS)
  describe(`irreducible parts of ${head}`, () => {
    const indices = NAMES.slice(0, slots).join('');
    const matrices = names.map((part) =>
      matrixOf(writeOutParts(sum(`${head}^{(${part})}_{${indices}}`), KINDS).value, head),
    );
    const size = basisOf(head).length;

    it('projectors are idempotent and orthogonal', () => {
      for (const [i, a] of matrices.entries())
        for (const [j, b] of matrices.entries())
          expect(multiplied(a, b), `${names[i]} ${names[j]}`).toEqual(i === j ? a : zero(size));
    });

    it('are complete', () => {
      expect(matrices.reduce(added)).toEqual(identity(size));
    });

    it.each(names.map((part, i) => [part, i] as const))('%s has the right rank', (part, i) => {
      expect(matrices[i]!.reduce((s, row, n) => (s + row[n]!) % PRIME, 0)).toBe(RANKS[part]);
      const rows = matrices[i]!.map((row) => Float64Array.from(row));
      expect(echelonMod(rows, PRIME)).toHaveLength(RANKS[part]!);
    });

    it('are self-adjoint for the contraction of all indices', () => {
      const eta = [-1, 1, 1, 1];
      const weights = basisOf(head).map(({ at }) => at.reduce((s, x) => s * eta[x]!, 1));
      for (const m of matrices)
        m.forEach((row, i) => {
          row.forEach((x, j) => {
            expect((weights[i]! * x - weights[j]! * m[j]![i]!) % PRIME === 0).toBe(true);
          });
        });
    });

    it('every part has its rule, and every rule fires', () => {
      const all = names.map((part) => `${head}^{(${part})}_{${indices}}`).join(' + ');
      const rules = bundledRules('parts');
      const { steps, value, stop } = rewrite(sum(all), rules, { kinds: KINDS });
      expect(stop).toBe('fixpoint');
      const ofHead = rules.filter((r) => r.left[0]!.head === head).map((r) => r.id);
      expect(new Set(steps.map((s) => s.ruleId))).toEqual(new Set(ofHead));
      expect(equalSums(value, sum(`${head}_{${indices}}`), KINDS)).toBe(true);
    });
  });

describe('traces and cyclic sums of the irreducible ones', () => {
  it.each([
    'T^{(tensor)}{}^b{}_{ab}',
    'T^{(axial)}{}^b{}_{ab}',
    'T^{(tensor)}_{abc} + T^{(tensor)}_{bca} + T^{(tensor)}_{cab}',
    'T^{(vector)}_{abc} + T^{(vector)}_{bca} + T^{(vector)}_{cab}',
    'R^{(weyl)}{}^c{}_{acb}',
    'R^{(pair-antisymmetric)}{}^c{}_{acb}',
    'R^{(pseudoscalar)}{}^c{}_{acb}',
    'R^{(weyl)}_{abcd} + R^{(weyl)}_{acdb} + R^{(weyl)}_{adbc}',
    'R^{(ricci)}{}^{ab}{}_{ab}',
    '\\epsilon^{abcd} R^{(scalar)}_{abcd}',
    '\\epsilon^{abcd} R^{(weyl)}_{abcd}',
  ])('%s vanishes', (text) => {
    expect(writeOutParts(sum(text), KINDS).value).toEqual([]);
  });
});

describe('expandParts', () => {
  it('leaves Lagrangians without parts untouched', () => {
    const plain = terms('c0 R + b1 T_a T^a');
    expect(expandParts(plain)).toEqual({ terms: plain, steps: [] });
    expect(expandParts(plain).terms).toBe(plain);
  });

  it('writes parts out and keeps coefficients and the other terms', () => {
    const { terms: written, steps } = expandParts(
      terms('c0 R + b1 c0 T^{(vector)}_{abc} T^{(vector)}{}^{abc} - b1 R^2'),
    );
    expect(written.some(hasParts)).toBe(false);
    expect(written).toEqual(terms('c0 R - b1 R^2 + 2/3 b1 c0 T_a T^a'));
    expect(steps.map((s) => s.ruleId)).toEqual(['torsion-vector', 'torsion-vector']);
  });

  it('collects as it goes, so that high powers stay small', () => {
    const square = 'R^{(weyl)}_{abcd} R^{(weyl)}{}^{abcd}';
    // A product of three sums of six scalars.
    expect(expandParts(terms(`(${square})(${square})(${square})`)).terms).toHaveLength(56);
  });
});
