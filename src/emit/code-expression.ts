/**
 * Expressions of emitted code as trees, printed by the one precedence table, and their layout on lines. What differs
 * between languages is a `Notation`; a broken line always ends in an operator, which every language continues after.
 */
import { bracketed, type Level, PRECEDENCE } from '../algebra/precedence.js';
import type { Rational } from '../algebra/rational.js';
import { doubleParts } from './double-literal.js';

export interface SignedTerm {
  readonly negative: boolean;
  readonly value: Expression;
}

export type Expression =
  | { readonly kind: 'name'; readonly text: string }
  /** An entry of a list, counted from 0. */
  | { readonly kind: 'element'; readonly of: string; readonly index: number }
  /** Not negative. */
  | { readonly kind: 'number'; readonly value: Rational }
  | { readonly kind: 'product'; readonly factors: readonly Expression[] }
  | { readonly kind: 'quotient'; readonly top: Expression; readonly bottom: Expression }
  | { readonly kind: 'root'; readonly of: Expression }
  /** Empty for zero. */
  | { readonly kind: 'sum'; readonly terms: readonly SignedTerm[] };

/** What a language writes in its own way. */
export interface Notation {
  /** A literal from its decimal text, an integer or one with a point or an exponent. */
  readonly literal: (digits: string) => string;
  readonly element: (list: string, index: number) => string;
  readonly root: (argument: string) => string;
}

interface Printed {
  readonly text: string;
  readonly level: Level;
}

/** A positive rational, which a division of two exact doubles rounds once where it is no double itself. */
function number(value: Rational, n: Notation): Printed {
  const [top, bottom] = doubleParts(value);
  if (bottom === undefined) return { text: n.literal(top), level: PRECEDENCE.atom };
  return { text: `${n.literal(top)} / ${n.literal(bottom)}`, level: PRECEDENCE.product };
}

function printed(e: Expression, n: Notation): Printed {
  switch (e.kind) {
    case 'name':
      return { text: e.text, level: PRECEDENCE.atom };
    case 'element':
      return { text: n.element(e.of, e.index), level: PRECEDENCE.atom };
    case 'number':
      return number(e.value, n);
    case 'root':
      return { text: n.root(print(e.of, n)), level: PRECEDENCE.atom };
    case 'quotient':
      return {
        text: `${print(e.top, n, PRECEDENCE.product)} / ${print(e.bottom, n, PRECEDENCE.sign)}`,
        level: PRECEDENCE.product,
      };
    case 'product':
      return { text: factorTexts(e, n).join(' * '), level: PRECEDENCE.product };
    case 'sum': {
      const [first] = e.terms;
      const lone = e.terms.length === 1 && !first!.negative;
      if (lone) return printed(first!.value, n);
      return { text: e.terms.length === 0 ? n.literal('0') : termTexts(e.terms, n).join(' '), level: PRECEDENCE.sum };
    }
  }
}

/** Text of an expression for a place that needs a level, in brackets when it binds less tightly. */
export function print(e: Expression, n: Notation, needed: Level = PRECEDENCE.sum): string {
  const { text, level } = printed(e, n);
  return bracketed(text, level, needed);
}

/** The factors of a term. A sign in front applies to the first one, so each binds as tightly as a sign does. */
const factorTexts = (e: Expression, n: Notation): string[] =>
  (e.kind === 'product' ? e.factors : [e]).map((f) => print(f, n, PRECEDENCE.sign));

function signedFactors({ negative, value }: SignedTerm, n: Notation, first: boolean): string[] {
  const signed = negative && first;
  if (!signed && value.kind !== 'product') return [print(value, n, PRECEDENCE.product)];
  const [head, ...rest] = factorTexts(value, n);
  return [signed ? `-${head}` : head!, ...rest];
}

/** One text for each term, ending in the operator that leads to the next. */
const termTexts = (terms: readonly SignedTerm[], n: Notation): string[] =>
  termFactors(terms, n).map((factors) => factors.join(' '));

/** For each term its factors, each ending in the operator behind it. */
function termFactors(terms: readonly SignedTerm[], n: Notation): string[][] {
  return terms.map((term, i) => {
    const factors = signedFactors(term, n, i === 0);
    const next = terms[i + 1];
    return factors.map((f, j) => {
      if (j < factors.length - 1) return `${f} *`;
      return next === undefined ? f : `${f} ${next.negative ? '-' : '+'}`;
    });
  });
}

/**
 * The lines of an expression: one when it is at most `wanted` columns wide, else one for each term; a term wider than
 * `limit` is broken at its products. Single names are never broken.
 */
export function layout(e: Expression, n: Notation, wanted: number, limit = Number.POSITIVE_INFINITY): string[] {
  const flat = print(e, n);
  if (flat.length <= wanted) return [flat];
  const terms = e.kind === 'sum' ? e.terms : e.kind === 'product' ? [{ negative: false, value: e }] : undefined;
  if (!terms) return [flat];
  return termFactors(terms, n).flatMap((factors) => filled(factors, limit));
}

/** Words on as few lines as fit. */
export function filled(words: readonly string[], limit: number): string[] {
  const lines: string[] = [];
  for (const word of words) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= limit) lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines;
}
