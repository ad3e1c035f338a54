/**
 * A printed equation as a polynomial that ought to vanish, with the terms in which it was typed, so that a misprint can be
 * named. Imports the vocabulary of claims, quotients.
 */
import { add, multiply, type Poly, zero } from '../algebra/poly.js';
import { plainPassage } from '../notation/passage.js';
import type { Expression } from '../notation/syntax.js';
import { withoutDots } from './dots.js';
import { cleared, negateQuotient, type Quotient } from './quotient.js';
import { evaluate, parseSides, type Vocabulary } from './vocabulary.js';

/** One typed term: the claim is the sum of their values. */
export interface ClaimTerm {
  /** As it was typed. */
  readonly text: string;
  readonly value: Poly;
}

export interface Claim {
  readonly text: string;
  /** Left side minus right side, cleared of denominators. */
  readonly poly: Poly;
  /** What was cleared, besides couplings and scale factors. */
  readonly divisors: readonly Poly[];
  readonly terms: readonly ClaimTerm[];
  /** Summands that were multiplied out, whole: each is the sum of some of the terms. */
  readonly groups: readonly ClaimTerm[];
}

/** Reads `left = right`. @throws InputError with every fault found. */
export function readClaim(vocabulary: Vocabulary, text: string, option = '--claim'): Claim {
  const passage = withoutDots(plainPassage(text, option));
  const known = (name: string): boolean => vocabulary.meanings.has(name);
  const { left, right } = parseSides(passage, known, vocabulary.meanings.keys());
  const typed = (node: { readonly start: number; readonly end: number }): string => {
    const { start, end } = passage.locate(node.start, node.end);
    return text.slice(start, end).trim().replace(/\s+/g, ' ');
  };
  const pieces = [...summands(left, false, typed), ...summands(right, true, typed)];
  const values = pieces.map(({ node, negative }) => {
    const value = node(vocabulary, passage);
    return negative ? negateQuotient(value) : value;
  });
  const { polys, divisors } = cleared(vocabulary.space, values);
  const { ring } = vocabulary.space;
  const poly = polys.reduce(add, zero(ring));
  return {
    text: text.trim().replace(/\s+/g, ' '),
    poly,
    divisors,
    terms: pieces.map((piece, i) => ({ text: piece.text, value: polys[i]! })),
    groups: groupsOf(pieces, polys),
  };
}

interface Piece {
  readonly text: string;
  readonly negative: boolean;
  /** The summand that it is a part of, when that was multiplied out. */
  readonly group?: string;
  readonly node: (vocabulary: Vocabulary, passage: ReturnType<typeof withoutDots>) => Quotient;
}

/** Runs of terms that come from one typed summand. */
function groupsOf(pieces: readonly Piece[], polys: readonly Poly[]): ClaimTerm[] {
  const groups = new Map<string, Poly>();
  for (const [i, { group }] of pieces.entries())
    if (group !== undefined) groups.set(group, add(groups.get(group) ?? zero(polys[i]!.ring), polys[i]!));
  return [...groups].map(([text, value]) => ({ text, value }));
}

type Typed = (node: { readonly start: number; readonly end: number }) => string;

/** Summands of an expression; a product with one sum among its factors is multiplied out, so that each term has a name. */
function summands(node: Expression, negative: boolean, typed: Typed): Piece[] {
  if (node.kind === 'sum') return node.summands.flatMap((s) => summands(s.value, s.negative !== negative, typed));
  if (node.kind === 'product') {
    const at = node.factors.findIndex((f) => !f.divides && f.value.kind === 'sum');
    if (at >= 0) {
      const chosen = node.factors[at]!;
      const others = node.factors.filter((_, i) => i !== at);
      const written = (inner: string): string =>
        node.factors.reduce((all, f, i) => {
          const text = i === at ? inner : typed(f.value);
          return i === 0 ? text : `${all}${f.divides ? '/' : ' '}${text}`;
        }, '');
      return summands(chosen.value, negative, typed).map((piece) => ({
        text: written(piece.text),
        negative: piece.negative,
        group: typed(node),
        node: (vocabulary, passage) => {
          const one = { kind: 'integer', value: 1n, start: node.start, end: node.start } as const;
          const signs = node.factors.some((f) => f.negative);
          const rest = evaluate(
            vocabulary,
            {
              ...node,
              factors: [
                { divides: false, negative: false, value: one },
                ...others,
                ...(signs && chosen.negative ? [{ divides: false, negative: true, value: one }] : []),
              ],
            },
            passage,
          );
          const inner = piece.node(vocabulary, passage);
          return { top: multiply(rest.top, inner.top), bottom: multiply(rest.bottom, inner.bottom) };
        },
      }));
    }
  }
  return [{ text: typed(node), negative, node: (vocabulary, passage) => evaluate(vocabulary, node, passage) }];
}
