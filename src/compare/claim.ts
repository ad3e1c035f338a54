/**
 * A printed equation as a polynomial that ought to vanish, with the terms in which it was typed, so that a misprint can be
 * named. Imports the vocabulary of claims, factors.
 */
import { add, constant, generator, multiply, type Poly, power, zero } from '../algebra/poly.js';
import { exponentRange } from '../algebra/ring.js';
import { errorAt, InputError } from '../notation/diagnostics.js';
import { plainPassage } from '../notation/passage.js';
import type { Expression } from '../notation/syntax.js';
import { withoutDots } from './dots.js';
import { basesOf, divideIn, isVariable } from './factors.js';
import type { JetSpace } from './jet-space.js';
import { negateQuotient, type Quotient } from './quotient.js';
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
  const whole = passage.locate(0, passage.text.length);
  const pieces = [...summands(left, false, typed), ...summands(right, true, typed)];
  const values = pieces.map(({ node, negative }) => {
    const value = node(vocabulary, passage);
    return negative ? negateQuotient(value) : value;
  });
  const { polys, divisors } = cleared(vocabulary.space, values);
  const { ring } = vocabulary.space;
  const poly = polys.reduce(add, zero(ring));
  if (poly.size === 0 && pieces.length === 0)
    throw new InputError([errorAt(whole, 'empty-claim', 'the claim says nothing', 'write an equation')]);
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
      const text = others.map((f) => `${f.divides ? '/' : ''}${typed(f.value)}`).join(' ');
      return summands(chosen.value, negative, typed).map((piece) => ({
        text: `${text.startsWith('/') ? '' : `${text} `}${piece.text}${text.startsWith('/') ? ` ${text}` : ''}`.trim(),
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

/** All quotients over one denominator, which is dropped; variables are cleared from denominators too. */
function cleared(
  space: JetSpace,
  values: readonly Quotient[],
): { readonly polys: readonly Poly[]; readonly divisors: readonly Poly[] } {
  const { ring } = space;
  let common: Poly = constant(ring, 1);
  for (const { bottom } of values)
    if (!divideIn(space, common, bottom)) common = multiply(common, lacking(space, common, bottom));
  const polys = values.map(({ top, bottom }) => multiply(top, divideIn(space, common, bottom)!));
  const lowest = new Map<number, number>();
  for (const p of polys)
    exponentRange(ring, p.keys).low.forEach((n, g) => {
      if (p.size > 0 && n < 0 && isVariable(space, g)) lowest.set(g, Math.min(lowest.get(g) ?? 0, n));
    });
  let shift: Poly = constant(ring, 1);
  for (const [g, n] of lowest) shift = multiply(shift, power(generator(ring, ring.generators[g]!.name), -n));
  return { polys: polys.map((p) => multiply(p, shift)), divisors: basesOf(space, multiply(common, shift)) };
}

/** A factor that makes `have` a multiple of `want`: want itself, less what they obviously share. */
function lacking(space: JetSpace, have: Poly, want: Poly): Poly {
  const quotient = divideIn(space, want, have);
  return quotient ?? want;
}
