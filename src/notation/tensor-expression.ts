/**
 * The text of an expression in tensors → its terms: syntax, Einstein's rule, expansion. Lagrangians, sides of rules and
 * symmetries are read here; free indices and index variables `?a` only where the caller allows them.
 */
import { type Diagnostic, InputError } from './diagnostics.js';
import { expand } from './expand.js';
import { checkIndices } from './indices.js';
import { reservedMeaning } from './names.js';
import { parseEquation, parseExpression } from './parser.js';
import type { Passage } from './passage.js';
import type { Expression } from './syntax.js';
import type { DeclaredTensor, IndexSlot, LagrangianTerm, TheorySymbol } from './theory.js';
import type { Vocabulary } from './vocabulary.js';

export interface TensorExpressionOptions {
  readonly symbols?: readonly Pick<TheorySymbol, 'name'>[];
  readonly tensors?: readonly DeclaredTensor[];
  /** Whether an index may be a variable, `R_{?a?b}`; its slot is then named `?a`. */
  readonly patterns?: boolean;
  /** Whether indices may be free; they must be the same, at the same heights, in every summand. */
  readonly allowFree?: boolean;
}

export interface TensorReading {
  readonly tree: Expression;
  /** Like terms collected, in the order of the text; empty for zero. */
  readonly terms: readonly LagrangianTerm[];
}

function vocabularyOf({ symbols = [], tensors = [], patterns = false }: TensorExpressionOptions): Vocabulary {
  const names = symbols.map((s) => s.name);
  const declared = new Set(names);
  return {
    tensors: true,
    jets: false,
    patterns,
    declared: new Map(tensors.map((t) => [t.name, t])),
    isSymbol: (name) => declared.has(name),
    names,
    explain: (name) => {
      const meaning = reservedMeaning(name);
      return meaning === undefined ? undefined : `${name} stands for ${meaning} and cannot occur in a Lagrangian`;
    },
  };
}

/** As `parseTensorExpression`, with the tree, whose positions later errors can point at. */
export function readTensorExpression(passage: Passage, options: TensorExpressionOptions): TensorReading {
  const problems: Diagnostic[] = [];
  const tree = parseExpression(passage, vocabularyOf(options), problems);
  if (tree !== undefined) problems.push(...checkIndices(tree, passage, options.allowFree));
  if (tree === undefined || problems.length > 0) throw new InputError(problems);
  return { tree, terms: expand(tree, passage) };
}

/**
 * The terms of an expression, in the order of the text; zero is the empty list.
 * @throws InputError with every fault found: one syntax error at most, every unknown symbol and wrong number of indices;
 * when there is none, every offence against Einstein's rule; when there is none of these, the first limit exceeded.
 */
export const parseTensorExpression = (
  passage: Passage,
  options: TensorExpressionOptions = {},
): readonly LagrangianTerm[] => readTensorExpression(passage, options).terms;

/**
 * Both sides of `left = right`. That their free indices agree is left to the caller (`freeSlots`).
 * @throws InputError as `parseTensorExpression`, and `missing-equals`, `double-equals`.
 */
export function readTensorEquation(
  passage: Passage,
  options: TensorExpressionOptions,
): { readonly left: TensorReading; readonly right: TensorReading } {
  const problems: Diagnostic[] = [];
  const sides = parseEquation(passage, vocabularyOf(options), problems);
  for (const side of sides === undefined ? [] : [sides.left, sides.right]) {
    problems.push(...checkIndices(side, passage, options.allowFree));
  }
  if (sides === undefined || problems.length > 0) throw new InputError(problems);
  const { left, right } = sides;
  return { left: { tree: left, terms: expand(left, passage) }, right: { tree: right, terms: expand(right, passage) } };
}

/** The free indices of a term, in the order of their slots. */
export function freeSlots({ factors }: Pick<LagrangianTerm, 'factors'>): readonly IndexSlot[] {
  const slots = factors.flatMap((f) => f.slots);
  return slots.filter(({ name }) => slots.filter((other) => other.name === name).length === 1);
}
