/**
 * The syntax tree of the notation: what was typed, with positions, before indices are checked and brackets multiplied
 * out. Plain data; start and end are UTF-16 offsets in the passage. Imports only types.
 */
import type { IndexSlot } from './theory.js';

export interface Span {
  readonly start: number;
  readonly end: number;
}

/** A slot with the place of its index. */
export interface SlotNode extends IndexSlot, Span {}

export type Expression =
  | ({ readonly kind: 'integer'; readonly value: bigint } & Span)
  /** A declared name, or a jet: its name is then `D(q,n)`. */
  | ({ readonly kind: 'symbol'; readonly name: string } & Span)
  | TensorNode
  /** Summands with their signs; a leading sign alone makes a sum of one. */
  | ({ readonly kind: 'sum'; readonly summands: readonly Summand[] } & Span)
  /** Factors from left to right; the first never divides. */
  | ({ readonly kind: 'product'; readonly factors: readonly Factor[] } & Span)
  | ({ readonly kind: 'power'; readonly base: Expression; readonly exponent: number } & Span);

export interface TensorNode extends Span {
  readonly kind: 'tensor';
  readonly head: string;
  /** An irreducible part. */
  readonly part?: string;
  readonly slots: readonly SlotNode[];
}

export interface Summand {
  readonly negative: boolean;
  readonly value: Expression;
}

export interface Factor {
  readonly divides: boolean;
  readonly negative: boolean;
  readonly value: Expression;
}
