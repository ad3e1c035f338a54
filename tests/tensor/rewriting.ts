// Helpers of the tests of rewriting: sums and rules from short texts.
import { infix } from '../../src/algebra/infix.js';
import type { Ring } from '../../src/algebra/ring.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseTensorExpression } from '../../src/notation/tensor-expression.js';
import { factorsKey, type TensorSum } from '../../src/tensor/expression.js';
import { type KindTable, kindTable } from '../../src/tensor/kinds.js';
import { ringOfNames, sumOf } from '../../src/tensor/lagrangian-sum.js';
import type { Rule } from '../../src/tensor/rule.js';
import { readRuleFile } from '../../src/tensor/rule-file.js';

export const NAMES = ['c1', 'c2', 'x'];
export const RING: Ring = ringOfNames(NAMES);

export const sum = (text: string, kinds: KindTable = kindTable()): TensorSum =>
  sumOf(
    RING,
    parseTensorExpression(plainPassage(text, 'sum'), { symbols: NAMES.map((name) => ({ name })), allowFree: true }),
    kinds,
  );

export const shown = (terms: TensorSum): string =>
  terms.map((t) => `${infix(t.coefficient)}·${factorsKey(t.factors)}`).join(' + ') || '0';

/** Rules `left -> right` with conditions; ids are r1, r2, …. */
export const rules = (
  ...list: readonly (readonly [left: string, right: string, ...when: string[]])[]
): readonly Rule[] =>
  readRuleFile(
    [
      'untwist-rules: 1',
      'title: test',
      'rules:',
      ...list.flatMap(([left, right, ...when], i) => [
        `  - id: r${i + 1}`,
        `    lhs: '${left}'`,
        `    rhs: '${right}'`,
        `    when: [${when.join(', ')}]`,
        '    why: test',
        '    source: test',
        "    yes: [{ in: 'R', out: 'R' }]",
        "    no: [{ in: 'R' }]",
      ]),
    ].join('\n'),
    'rules.yaml',
  ).rules;
