/**
 * Sums for display → TeX: factors, fractions, powers and brackets, all brackets by the one precedence table.
 * Invariant: pieces are joined by spaces, so that a command never runs into the letter behind it, and a base that has a
 * superscript of its own gets brackets, since TeX refuses two. Lines are broken elsewhere.
 */
import { bracketed, type Level, PRECEDENCE } from '../algebra/precedence.js';
import { ONE, type Rational, rational } from '../algebra/rational.js';
import { type DisplaySum, type DisplayTerm, type Factor, pulledOut } from './display.js';
import type { DisplaySymbol } from './display-symbols.js';
import { widthOf } from './latex-width.js';

/** A signed term, kept in pieces between which a line may be broken: head · (Σ inner) · tail. */
export interface TexTerm {
  readonly negative: boolean;
  readonly head: readonly string[];
  /** Empty when the term has no bracket. */
  readonly inner: readonly TexTerm[];
  readonly tail: readonly string[];
}

interface Piece {
  readonly tex: string;
  readonly level: Level;
}

/** Fractions wider than this are written with negative exponents, between which a line can be broken. */
const WIDE_FRACTION = 110;

/** One letter, command (with its argument) or group. */
const NUCLEUS = /^(?:\\[A-Za-z]+ *(?:\{(?:[^{}]|\{(?:[^{}]|\{[^{}]*\})*\})*\})?|[A-Za-z0-9]|\{(?:[^{}]|\{[^{}]*\})*\})/;
const SUBSCRIPT =
  /^_ *(?:\\[A-Za-z]+ *(?:\{(?:[^{}]|\{[^{}]*\})*\})?|[A-Za-z0-9]|\{(?:[^{}]|\{(?:[^{}]|\{[^{}]*\})*\})*\})/;

/** How tightly the LaTeX of a symbol binds: `c_{0}` is an atom, `c'` has a superscript already, `ab` is a product. */
function levelOf(latex: string): Level {
  const nucleus = NUCLEUS.exec(latex)?.[0] ?? '';
  const rest = latex.slice(nucleus.length).trim();
  const scripts = rest.slice(SUBSCRIPT.exec(rest)?.[0].length ?? 0).trim();
  if (nucleus !== '' && scripts === '') return PRECEDENCE.atom;
  return /^[\^']/.test(scripts) ? PRECEDENCE.power : PRECEDENCE.product;
}

const DOTS = ['', '\\dot', '\\ddot', '\\dddot'];

/** The n-th time derivative: the dots sit on the letter, not on letter and subscript together. */
function dotted(latex: string, order: number): Piece {
  if (order === 0) return { tex: latex, level: levelOf(latex) };
  const [, letter, scripts = ''] = /^(\\[A-Za-z]+|[A-Za-z])( *_.*)?$/.exec(latex) ?? [undefined, latex];
  if (order < DOTS.length) return { tex: `${DOTS[order]}{${letter}}${scripts}`, level: PRECEDENCE.atom };
  return { tex: `${letter}${scripts}^{(${order})}`, level: PRECEDENCE.power };
}

/** LaTeX of the time derivative of a quantity. */
export const rateTex = (latex: string): string => dotted(latex, 1).tex;

const symbolPiece = ({ latex, order }: DisplaySymbol): Piece => dotted(latex, order);
export const symbolTex = (symbol: DisplaySymbol): string => symbolPiece(symbol).tex;

/** base^exponent. */
export function powerTex(symbol: DisplaySymbol, exponent: number): string {
  const { tex, level } = symbolPiece(symbol);
  return exponent === 1 ? tex : `${bracketed(tex, level, PRECEDENCE.atom)}^{${exponent}}`;
}

const powers = (factors: readonly Factor[], sign: 1 | -1 = 1): string[] =>
  factors.map(({ symbol, exponent }) => powerTex(symbol, sign * exponent));
const join = (pieces: readonly string[]): string => (pieces.length === 0 ? '1' : pieces.join(' '));
const above = (factors: readonly Factor[]): Factor[] => factors.filter((f) => f.exponent > 0);
const below = (factors: readonly Factor[]): Factor[] => factors.filter((f) => f.exponent < 0);

/** Numerator over denominator as one piece, or, when that is very wide, as factors with negative exponents. */
function quotient(top: readonly string[], bottom: readonly Factor[], number: bigint): string[] {
  const divisor = [...(number === 1n ? [] : [`${number}`]), ...powers(bottom, -1)];
  const whole = `\\frac{${join(top)}}{${join(divisor)}}`;
  if (widthOf(whole) <= WIDE_FRACTION) return [whole];
  return [...(number === 1n ? [] : [`\\tfrac{1}{${number}}`]), ...top, ...powers(bottom)];
}

/** A positive rational and couplings; empty for 1. */
function coefficientPieces(content: Rational, common: readonly Factor[]): string[] {
  const top = powers(above(common));
  const bottom = below(common);
  if (bottom.length > 0) {
    const whole = content.num === 1n && top.length > 0 ? top : [`${content.num}`, ...top];
    return quotient(whole, bottom, content.den);
  }
  if (content.den !== 1n) return [`\\tfrac{${content.num}}{${content.den}}`, ...top];
  return content.num === 1n ? top : [`${content.num}`, ...top];
}

/** Fields, rates and matter; k/a² and ρ/a³ stay together as the fractions they are known as. */
function monomialPieces(monomial: readonly Factor[]): string[] {
  const top = above(monomial);
  const bottom = below(monomial);
  if (bottom.length === 0) return powers(top);
  const still = top.filter(({ symbol }) => symbol.role === 'parameter' || symbol.role === 'density');
  const moving = top.filter((f) => !still.includes(f));
  const lengths = bottom.reduce((n, { symbol, exponent }) => n - (symbol.role === 'length' ? exponent : 0), 0);
  const natural = still.reduce((n, { symbol, exponent }) => n + symbol.dimension * exponent, 0);
  const known = still.some((f) => f.symbol.role === 'density') || (still.length > 0 && lengths === natural);
  return known ? [...quotient(powers(still), bottom, 1n), ...powers(moving)] : quotient(powers(top), bottom, 1n);
}

const magnitude = ({ num, den }: Rational): Rational => rational(num < 0n ? -num : num, den);

/** A term without a bracket. */
function simpleTerm(content: Rational, common: readonly Factor[], monomial: readonly Factor[]): TexTerm {
  const head = [...coefficientPieces(magnitude(content), common), ...monomialPieces(monomial)];
  return { negative: content.num < 0n, head: head.length > 0 ? head : ['1'], inner: [], tail: [] };
}

/** content · common · (bracket) · monomial. */
export function termTex({ content, common, bracket, monomial }: DisplayTerm): TexTerm {
  if (bracket.length === 0) return simpleTerm(content, common, monomial);
  return {
    negative: content.num < 0n,
    head: coefficientPieces(magnitude(content), common),
    inner: bracket.map((t) => simpleTerm(t.coefficient, t.factors, [])),
    tail: monomialPieces(monomial),
  };
}

/** The terms of a sum; one bracket that is the whole sum is opened. Zero has no terms. */
export function sumTex(sum: DisplaySum): readonly TexTerm[] {
  const terms = sum.terms.map(termTex);
  const [only] = terms;
  return terms.length === 1 && only!.inner.length > 0 && only!.head.length + only!.tail.length === 0
    ? opened(only!)
    : terms;
}

const opened = ({ negative, inner }: TexTerm): readonly TexTerm[] =>
  negative ? inner.map((t) => ({ ...t, negative: !t.negative })) : inner;

/** As `sumTex`, with the number that all terms share in front of one bracket: 12 (A_1² − A_2²). */
export function pulledOutTex(sum: DisplaySum): readonly TexTerm[] {
  const { content, terms } = pulledOut(sum);
  if (terms.length < 2) return sumTex(sum);
  const inner = terms.map(termTex);
  const term = {
    negative: content.num < 0n,
    head: coefficientPieces(magnitude(content), []),
    inner,
    tail: [],
  };
  return term.head.length > 0 && inner.every((t) => t.inner.length === 0) ? [term] : sumTex(sum);
}

/** The product of powers, negative ones below a fraction line; `1` for none. */
export const productTex = (factors: readonly Factor[]): string => join(simpleTerm(ONE, [], factors).head);

/** A left side such as E/a³: `name` over the factors. */
export function overTex(name: string, factors: readonly Factor[], extra: readonly string[] = []): string {
  const bottom = [...extra, ...powers(above(factors))];
  const top = [name, ...powers(below(factors), -1)];
  return bottom.length === 0 ? top.join(' ') : `\\frac{${top.join(' ')}}{${bottom.join(' ')}}`;
}

/** Brackets that are as high as what they hold. */
export function bracketsFor(inner: string, acrossLines: boolean): readonly [open: string, close: string] {
  if (inner.includes('\\frac')) return ['\\Bigl(', '\\Bigr)'];
  return acrossLines || inner.includes('\\tfrac') ? ['\\bigl(', '\\bigr)'] : ['(', ')'];
}

/** A term without its sign, on one line. */
export function unsignedTex({ head, inner, tail }: TexTerm): string {
  if (inner.length === 0) return [...head, ...tail].join(' ');
  const sum = inlineTex(inner);
  const [open, close] = bracketsFor(sum, false);
  const gap = open.length > 1 ? ' ' : '';
  return [...head, `${open}${gap}${sum}${gap}${close}`, ...tail].join(' ');
}

/** A sum on one line; `0` when it has no terms. */
export function inlineTex(terms: readonly TexTerm[]): string {
  if (terms.length === 0) return '0';
  return terms.map((t, i) => `${t.negative ? (i === 0 ? '-' : '- ') : i === 0 ? '' : '+ '}${unsignedTex(t)}`).join(' ');
}
