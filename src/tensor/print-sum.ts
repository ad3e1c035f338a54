/**
 * Sums of products of tensors as text of the notation: one line for each product, its coefficient in brackets when it is a
 * sum. The plain form is read back to the same sum.
 */

import { latexLagrangian, latexScalar, printLagrangian, printScalar } from '../notation/print.js';
import { collectScalars, UNIT } from '../notation/scalar-term.js';
import type { DeclaredTensor, LagrangianTerm, ScalarTerm, TensorFactor, TheorySymbol } from '../notation/theory.js';
import { factorsKey, type TensorSum } from './expression.js';
import { lagrangianOf } from './lagrangian-sum.js';

export interface SumStyle {
  readonly form: 'plain' | 'unicode' | 'latex';
  readonly symbols?: readonly TheorySymbol[];
  readonly tensors?: readonly DeclaredTensor[];
  /** From the internal conventions to those of the text. */
  readonly written?: (terms: readonly LagrangianTerm[]) => readonly LagrangianTerm[];
}

interface Product {
  readonly factors: readonly TensorFactor[];
  readonly scalars: ScalarTerm[];
}

/** The terms with equal products put together. */
function productsOf(terms: readonly LagrangianTerm[]): Product[] {
  const found = new Map<string, Product>();
  for (const { scalar, factors } of terms) {
    const key = factorsKey(factors);
    const known = found.get(key);
    if (known) known.scalars.push(scalar);
    else found.set(key, { factors, scalars: [scalar] });
  }
  return [...found.values()];
}

const minus = (scalars: readonly ScalarTerm[]): ScalarTerm[] =>
  scalars.map((s) => ({ ...s, coefficient: { num: -s.coefficient.num, den: s.coefficient.den } }));

/** One text with its sign for each product; the first has no plus sign. `['0']` for zero. */
export const sumLines = (sum: TensorSum, style: SumStyle): string[] => termLines(lagrangianOf(sum), style);

/** As `sumLines`, for terms whose products keep the form that they have. */
export function termLines(terms: readonly LagrangianTerm[], style: SumStyle): string[] {
  const { form, symbols = [], tensors = [], written = (t) => t } = style;
  const options = { unicode: form === 'unicode', symbols };
  const product = (terms: readonly LagrangianTerm[]): string =>
    form === 'latex' ? latexLagrangian(terms, symbols, tensors) : printLagrangian(terms, options);
  const scalar = (terms: readonly ScalarTerm[]): string =>
    form === 'latex' ? latexScalar(terms, symbols) : printScalar(terms, options);
  const [left, right] = form === 'latex' ? ['\\left( ', ' \\right)'] : ['(', ')'];
  const lines = productsOf(written(terms)).map(({ factors, scalars }, i) => {
    const ordered = collectScalars(scalars);
    const negative = ordered.length > 0 && ordered.every((s) => s.coefficient.num < 0n);
    const positive = negative ? minus(ordered) : ordered;
    const text =
      positive.length === 1
        ? product([{ scalar: positive[0]!, factors }])
        : factors.length === 0
          ? scalar(positive)
          : `${left}${scalar(positive)}${right} ${product([{ scalar: UNIT, factors }])}`;
    const sign = form === 'unicode' ? '−' : '-';
    // A sum without tensors has its own signs inside.
    if (factors.length === 0 && positive.length > 1) return `${i === 0 ? '' : '+ '}${scalar(ordered)}`;
    return negative ? `${sign}${i === 0 ? '' : ' '}${text}` : i === 0 ? text : `+ ${text}`;
  });
  return lines.length === 0 ? ['0'] : lines;
}

/** The sum on one line. */
export const printSum = (sum: TensorSum, style: SumStyle): string => sumLines(sum, style).join(' ');
