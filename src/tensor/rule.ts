/**
 * Rewriting rules as plain data, freed of their notation. Index variables are names that begin with `?`, which no user can
 * give to an index; what is contracted inside one side has letters and gets fresh names at every application.
 * Invariant: the left side is one canonical product with coefficient 1; each `?x` occurs in it once, and once in every
 * term of the right side.
 */
import type { Rational } from '../algebra/rational.js';
import type { DeclaredTensor, LagrangianTerm, Origin } from '../notation/theory.js';
import type { TensorSymbol } from './expression.js';

/** What begins the name of an index variable. */
export const SIGIL = '?';
export const isVariable = (name: string): boolean => name.startsWith(SIGIL);

/** A predicate of conditions.ts with its index variables. */
export interface Condition {
  readonly predicate: string;
  readonly variables: readonly string[];
}

/** What is known: `modulo-boundary`, `constant c1`, `not torsion-free`. */
export type Fact = string;

export interface Example {
  readonly given: readonly Fact[];
  readonly input: readonly LagrangianTerm[];
  /** What the rule makes of it; undefined in an example where it must not apply. */
  readonly output: readonly LagrangianTerm[] | undefined;
}

export interface RuleTerm {
  readonly coefficient: Rational;
  readonly factors: readonly TensorSymbol[];
}

export interface Rule {
  readonly id: string;
  readonly left: readonly TensorSymbol[];
  /** Empty for zero. */
  readonly right: readonly RuleTerm[];
  readonly when: readonly Condition[];
  /** Why it holds, one sentence. */
  readonly why: string;
  /** Where it is from. */
  readonly source: string;
  readonly yes: readonly Example[];
  readonly no: readonly Example[];
  readonly origin: Origin;
}

export interface RuleFile {
  readonly title: string;
  /** Symbols of the examples. */
  readonly constants: readonly string[];
  /** Tensors that the rules are about, beyond the built-in ones. */
  readonly tensors: readonly DeclaredTensor[];
  /** In order of priority. */
  readonly rules: readonly Rule[];
}
