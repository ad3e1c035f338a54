/**
 * The text of a Lagrangian → its terms: syntax, Einstein's rule, expansion, and a look at mass dimensions. The one
 * entry for Lagrangian texts; imports the stages of this folder.
 */
import { type Diagnostic, errorAt, InputError, warningAt } from './diagnostics.js';
import { expand } from './expand.js';
import { checkIndices } from './indices.js';
import { reservedMeaning } from './names.js';
import { parseExpression } from './parser.js';
import type { Passage } from './passage.js';
import { printLagrangian } from './print.js';
import type { Expression } from './syntax.js';
import type { LagrangianTerm, TensorHead, TheorySymbol } from './theory.js';
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
export function readLagrangian(passage: Passage, symbols: readonly TheorySymbol[]): LagrangianReading {
  const { text } = passage;
  if (text.trim() === '') {
    const place = passage.locate(0, text.length);
    throw new InputError([errorAt(place, 'empty-lagrangian', 'the Lagrangian is empty', 'for example 1/2 M^2 R')]);
  }
  const names = symbols.map((s) => s.name);
  const declared = new Set(names);
  const problems: Diagnostic[] = [];
  const vocabulary = {
    tensors: true,
    jets: false,
    isSymbol: (name: string) => declared.has(name),
    names,
    explain: (name: string) => {
      const meaning = reservedMeaning(name);
      return meaning === undefined ? undefined : `${name} stands for ${meaning} and cannot occur in a Lagrangian`;
    },
  };
  const tree = parseExpression(passage, vocabulary, problems);
  if (tree !== undefined) problems.push(...checkIndices(tree, passage));
  if (tree === undefined || problems.length > 0) throw new InputError(problems);
  const terms = expand(tree, passage);
  if (terms.length === 0) {
    const place = passage.locate(tree.start, tree.end);
    throw new InputError([errorAt(place, 'empty-lagrangian', 'the Lagrangian is zero', 'its terms cancel')]);
  }
  return { terms, warnings: dimensionWarnings(tree, terms, passage, symbols) };
}

const DIMENSIONS: Readonly<Record<TensorHead, number>> = { R: 2, T: 1, A: 1, epsilon: 0, eta: 0, delta: 0 };

/** Mass dimension of a term in units c = ħ = 1. */
export function dimensionOf(term: LagrangianTerm, symbols: ReadonlyMap<string, number>): number {
  const scalar = term.scalar.powers.reduce((sum, [name, exponent]) => sum + exponent * (symbols.get(name) ?? 0), 0);
  return term.factors.reduce((sum, { head }) => sum + DIMENSIONS[head], scalar);
}

function dimensionWarnings(
  tree: Expression,
  terms: readonly LagrangianTerm[],
  passage: Passage,
  symbols: readonly TheorySymbol[],
): readonly Diagnostic[] {
  const dimensions = new Map(symbols.map((s) => [s.name, s.dimension]));
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
