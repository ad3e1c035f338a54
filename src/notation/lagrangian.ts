/**
 * The text of a Lagrangian → its terms, none of them with free indices, and a look at mass dimensions. The one entry for
 * Lagrangian texts.
 */
import { type Diagnostic, errorAt, InputError, warningAt } from './diagnostics.js';
import { expand } from './expand.js';
import type { Passage } from './passage.js';
import { printLagrangian } from './print.js';
import type { Expression } from './syntax.js';
import { readTensorExpression } from './tensor-expression.js';
import { isBuiltIn } from './tensor-syntax.js';
import type { DeclaredTensor, LagrangianTerm, TensorHead, TheorySymbol } from './theory.js';
import { clip } from './tokens.js';

export interface LagrangianReading {
  /** Like terms collected, in the order of the text; never empty. */
  readonly terms: readonly LagrangianTerm[];
  /** At most one: the first term whose mass dimension is not 4. */
  readonly warnings: readonly Diagnostic[];
}

/**
 * @throws InputError with every fault found: one syntax error at most, every unknown symbol and wrong number of indices;
 * when there is none, every offence against Einstein's rule; when there is none of these, the first limit exceeded.
 */
export function readLagrangian(
  passage: Passage,
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[] = [],
): LagrangianReading {
  const { text } = passage;
  if (text.trim() === '') {
    const place = passage.locate(0, text.length);
    throw new InputError([errorAt(place, 'empty-lagrangian', 'the Lagrangian is empty', 'for example 1/2 M^2 R')]);
  }
  const { tree, terms } = readTensorExpression(passage, { symbols, tensors });
  if (terms.length === 0) {
    const place = passage.locate(tree.start, tree.end);
    throw new InputError([errorAt(place, 'empty-lagrangian', 'the Lagrangian is zero', 'its terms cancel')]);
  }
  return { terms, warnings: dimensionWarnings(tree, terms, passage, symbols, tensors) };
}

const DIMENSIONS: Readonly<Record<TensorHead, number>> = { R: 2, T: 1, A: 1, epsilon: 0, eta: 0, delta: 0 };

/** Mass dimension of a term in units c = ħ = 1; `dimensions` holds those of symbols and declared tensors by name. */
export function dimensionOf(term: LagrangianTerm, dimensions: ReadonlyMap<string, number>): number {
  const scalar = term.scalar.powers.reduce((sum, [name, n]) => sum + n * (dimensions.get(name) ?? 0), 0);
  const ofHead = (head: string): number => (isBuiltIn(head) ? DIMENSIONS[head] : (dimensions.get(head) ?? 0));
  return term.factors.reduce((sum, { head }) => sum + ofHead(head), scalar);
}

function dimensionWarnings(
  tree: Expression,
  terms: readonly LagrangianTerm[],
  passage: Passage,
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[],
): readonly Diagnostic[] {
  const dimensions = new Map([...symbols, ...tensors].map((s) => [s.name, s.dimension]));
  const isOff = (term: LagrangianTerm): boolean => dimensionOf(term, dimensions) !== 4;
  if (!terms.some(isOff)) return [];
  const summands = tree.kind === 'sum' ? tree.summands.map((s) => s.value) : [tree];
  for (const summand of summands) {
    const off = expand(summand, passage).find(isOff);
    if (off === undefined) continue;
    const typed = clip(printLagrangian([off], { symbols }));
    const message = `the term ${typed} has mass dimension ${dimensionOf(off, dimensions)}, a Lagrangian has 4`;
    const hint = 'multiply by a scale such as M^2, or declare the dimension of its constant: { b1: mass^2 }';
    return [warningAt(passage.locate(summand.start, summand.end), 'mass-dimension', message, hint)];
  }
  return [];
}
