import { describe, expect, it } from 'vitest';
import { scale } from '../../src/algebra/poly.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseTensorExpression } from '../../src/notation/tensor-expression.js';
import { canonicalSum, type TensorTerm } from '../../src/tensor/expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { tensorTerms } from '../../src/tensor/lagrangian-sum.js';
import { equalSums } from '../../src/tensor/rewrite.js';
import type { Rule } from '../../src/tensor/rule.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { densityOf, simplify, simplifyWarnings } from '../../src/tensor/simplify.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { PRIME, RandomTensors, randomContraction } from '../oracle/tensors.js';
import { NAMES, RING, rules, shown, sum } from './rewriting.js';

const KINDS = kindTable();
const CONSTANTS = NAMES.map((name) => `constant ${name}`);
const typed = (text: string): TensorTerm[] =>
  tensorTerms(RING, parseTensorExpression(plainPassage(text, 't'), { symbols: NAMES.map((name) => ({ name })) }));
const run = (text: string, given: readonly string[] = CONSTANTS, own: readonly Rule[] = []) =>
  simplify(typed(text), { kinds: KINDS, given: new Set(given), rules: own });

/** The steps lead from what was typed to the value. */
function addsUp(text: string, result: ReturnType<typeof simplify>): void {
  const all = [
    ...typed(text),
    ...result.steps.flatMap((s) => [
      ...s.before.map((t) => ({ ...t, coefficient: scale(t.coefficient, -1) })),
      ...s.after,
    ]),
  ];
  expect(equalSums(canonicalSum(all, KINDS), result.value, KINDS)).toBe(true);
}

describe('simplify', () => {
  it.each([
    ['R_{abcd} R^{badc} - R_{abcd} R^{abcd}', '0'],
    ['c1 R^{(scalar)}_{abcd} R^{abcd} + R', '1·R() + c1/6·R()R()'],
    ['\\epsilon^{abcd} T_{abe} T_{cd}{}^e + \\epsilon^{abcd} T_a T_{bcd}', '1/4·epsilon(_a_b_c_d)T(_e^a^b)T(^e^c^d)'],
    ['A_a A^a', '-2·T(_a_b_c)T(^a^b^c) + 4·T(_a_b_c)T(^b^a^c)'],
    ['c1', 'c1·'],
  ])('%s', (text, value) => {
    const result = run(text);
    expect(result.stop).toBe('fixpoint');
    expect(shown(result.value)).toBe(value);
    addsUp(text, result);
  });

  it('drops total derivatives only when told to', () => {
    const text = 'c1 R^2 - 4 c1 R_{ab} R^{ba} + c1 R_{abcd} R^{cdab} + x R';
    expect(shown(run(text).value)).not.toBe('x·R()');
    const result = run(text, [...CONSTANTS, 'modulo-boundary']);
    expect(shown(result.value)).toBe('x·R()');
    addsUp(text, result);
    // c1 may vary: nothing is known about it.
    expect(run(text, ['modulo-boundary', 'constant x']).value).toHaveLength(4);
  });

  it('uses what holds without torsion', () => {
    const result = run('R_{abcd} R^{acbd} + c1 T_a T^a + R_{ab} R^{ba}', [...CONSTANTS, 'torsion-free']);
    expect(shown(result.value)).toBe('1·R(_a_b)R(^a^b) + 1/2·R(_a_b_c_d)R(^a^b^c^d)');
  });

  it('applies the rules of the user first', () => {
    const own = rules(['R_{ab} R^{ab}', 'T_a T^a']);
    const result = run('c1 R_{ab} R^{ab}', CONSTANTS, own);
    expect(shown(result.value)).toBe('c1·T(_a)T(^a)');
    expect(result.steps.map((s) => s.ruleId)).toEqual(['r1']);
  });

  it('says when rules of the user do not end', () => {
    const result = run('R', CONSTANTS, rules(['R', 'T_a T^a'], ['T_a T^a', 'R']));
    expect(result.stop).toBe('cycle');
    expect(simplifyWarnings(result).map((w) => w.message)).toEqual(['the rules undo each other']);
    expect(simplifyWarnings(run('R'))).toEqual([]);
  });

  it('keeps the value on random components', () => {
    for (let i = 0; i < runs(25); i++) {
      const seed = firstSeed(83_000) + i;
      const random = new Random(seed);
      const draw = [
        ['R', 4],
        ['T', 3],
        ['R', 2],
        ['T', 1],
        ['epsilon', 4],
      ] as const;
      const heads = Array.from({ length: 1 + random.below(3) }, () => random.pick(draw));
      if (heads.reduce((n, [, k]) => n + k, 0) % 2 === 1) heads.push(['T', 1]);
      const factors = randomContraction(random, heads);
      const before = sum('R').map((t) => ({ ...t, factors }));
      const { value } = simplify(before, { kinds: KINDS, given: new Set() });
      const tensors = new RandomTensors(seed, 4);
      let total = 0n;
      for (const t of value) {
        // Denominators are moved to the other side one by one.
        const p = BigInt(PRIME);
        let inverse = 1n;
        for (let base = t.coefficient.denominator % p, e = p - 2n; e > 0n; e >>= 1n, base = (base * base) % p)
          if (e & 1n) inverse = (inverse * base) % p;
        total += BigInt(t.coefficient.numerators[0]!) * inverse * BigInt(tensors.value(t.factors));
      }
      const p = BigInt(PRIME);
      expect(Number(((total % p) + p) % p), `seed ${seed}`).toBe(tensors.value(factors));
    }
  });

  it('is idempotent', () => {
    for (const text of [
      '\\epsilon^{abcd} R_{ab}{}^{ef} R_{efcd}',
      'c1 R^{(weyl)}_{abcd} R^{acbd} + x T_{abc} T^{cab}',
    ]) {
      const once = run(text).value;
      expect(shown(simplify(once, { kinds: KINDS, given: new Set() }).value)).toBe(shown(once));
    }
  });
});

describe('densities', () => {
  it('are left side minus right side', () => {
    const rule = bundledRules('identities').find((r) => r.id === 'gauss-bonnet')!;
    const { sum: density, ruleId } = densityOf(rule);
    expect(ruleId).toBe('gauss-bonnet');
    expect(density.map((t) => Number(t.coefficient.num))).toEqual([1, -4, 1]);
  });
});
