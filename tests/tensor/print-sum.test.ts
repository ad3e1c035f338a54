import { describe, expect, it } from 'vitest';
import { plainPassage } from '../../src/notation/passage.js';
import { parseTensorExpression } from '../../src/notation/tensor-expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { lagrangianOf, sumOf } from '../../src/tensor/lagrangian-sum.js';
import { printSum, sumLines, termLines } from '../../src/tensor/print-sum.js';
import { equalSums } from '../../src/tensor/rewrite.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomContraction } from '../oracle/tensors.js';
import { NAMES, RING, sum } from './rewriting.js';

const KINDS = kindTable();

describe('sums as text', () => {
  it.each([
    ['R', 'R'],
    ['-c1 R', '-c1 R'],
    ['c1 R_{ab} R^{ba} + c2 R_{xy} R^{yx}', '(c1 + c2) R_{ab} R^{ba}'],
    ['-c1 R - 2 c2 R + T_a T^a', '-(c1 + 2 c2) R + T_a T^a'],
    ['R^2 - c1 T_a T^a - x T_b T^b', 'R^2 - (c1 + x) T_a T^a'],
    ['c1 R - x R', '(c1 - x) R'],
    ['c1 + x', 'c1 + x'],
    ['R + c1 - x', 'c1 - x + R'],
    ['R - R', '0'],
    ['1/2', '1/2'],
  ])('%s prints as %s', (text, printed) => {
    expect(printSum(sum(text), { form: 'plain' })).toBe(printed);
  });

  it('in Unicode and LaTeX', () => {
    const typed = sum('c1 \\epsilon^{abcd} R_{abcd} + x \\epsilon^{abcd} R_{abcd} - 1/2 x^2 R^2');
    expect(sumLines(typed, { form: 'unicode' })).toEqual(['−1/2 x² R²', '+ (c1 + x) ε_{abcd} R^{abcd}']);
    expect(sumLines(typed, { form: 'latex' })).toEqual([
      '-\\tfrac{1}{2} x^{2} R^{2}',
      '+ \\left( c_{1} + x \\right) \\epsilon_{abcd} R^{abcd}',
    ]);
  });

  it('may be written in other conventions', () => {
    const doubled = printSum(sum('c1 R + x R'), {
      form: 'plain',
      written: (terms) => terms.map((t) => ({ ...t, scalar: { ...t.scalar, coefficient: { num: 2n, den: 1n } } })),
    });
    expect(doubled).toBe('(2 c1 + 2 x) R');
  });

  it('keeps the form of given terms', () => {
    const terms = parseTensorExpression(plainPassage('T_{xyz} T^{xyz}', 't'));
    expect(termLines(terms, { form: 'plain' })).toEqual(['T_{xyz} T^{xyz}']);
    expect(lagrangianOf(sum('T_{xyz} T^{xyz}'))[0]!.factors[0]!.slots[0]!.name).toBe('a');
  });

  it('is read back to the same sum', () => {
    for (let run = 0; run < runs(150); run++) {
      const seed = firstSeed(81_000) + run;
      const random = new Random(seed);
      const terms = Array.from({ length: 1 + random.below(4) }, () => {
        const tensors = Array.from({ length: 1 + random.below(3) }, () =>
          random.pick([
            ['T', 3],
            ['R', 4],
            ['R', 2],
            ['R', 0],
            ['T', 1],
          ] as const),
        );
        const slots = tensors.reduce((n, [, k]) => n + k, 0);
        const factors = randomContraction(random, slots % 2 === 0 ? tensors : [...tensors, ['T', 1]]);
        const powers = [[random.pick(NAMES), 1 + random.below(3)]] as const;
        const coefficient = { num: BigInt(random.pick([1, -1, 3, -2])), den: BigInt(random.pick([1, 5, 7])) };
        return { scalar: { coefficient, powers }, factors };
      });
      const typed = sumOf(RING, terms, KINDS);
      for (const form of ['plain', 'unicode'] as const)
        expect(equalSums(sum(printSum(typed, { form })), typed, KINDS), `seed ${seed}`).toBe(true);
    }
  });
});
