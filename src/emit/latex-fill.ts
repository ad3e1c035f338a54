/**
 * Fills lines of given widths with the terms of a sum: breaks before + and −, inside a bracket only when the whole term is
 * too long for a line, between factors only when nothing else helps. Imports no layout.
 */
import { remember } from '../algebra/memo.js';
import { bracketsFor, inlineTex, type TexTerm, unsignedTex } from './latex-math.js';
import { type Extent, extentOf } from './latex-width.js';

/** Points of \quad. */
export const INDENT = 10;

/** One line and its extent. */
export interface Line {
  /** 0 for the first line of an equation, 1 for its continuation, 2 inside a bracket. */
  readonly indent: 0 | 1 | 2;
  readonly tex: string;
  readonly height: number;
  readonly depth: number;
}

const extents = new Map<string, Extent>();

/** Extent of a text, remembered: the same terms are measured in several trial layouts. */
export function measured(tex: string): Extent {
  if (extents.size > 20_000) extents.clear();
  return remember(extents, tex, () => extentOf(tex));
}

export const widthOf = (tex: string): number => measured(tex).width;
export const joined = (...pieces: readonly string[]): string => pieces.filter((p) => p !== '').join(' ');

const flatTexts = new WeakMap<TexTerm, string>();
/** A term without its sign on one line, remembered. */
export function flatTerm(term: TexTerm): string {
  let text = flatTexts.get(term);
  if (text === undefined) {
    text = unsignedTex(term);
    flatTexts.set(term, text);
  }
  return text;
}

/** Fills lines of different widths, starting new ones on demand. */
class Filler {
  readonly lines: Line[] = [];
  /** While a long bracket is set in lines of even length: points by which lines are shorter. */
  shortening = 0;
  private current: string[] = [];
  private used = 0;
  private height = 0;
  private depth = 0;
  private indent: Line['indent'] = 0;

  constructor(
    private readonly first: number,
    private readonly rest: number,
  ) {}

  private available(indent: Line['indent']): number {
    return (indent === 0 ? this.first : this.rest - (indent - 1) * INDENT) - this.shortening;
  }

  get room(): number {
    return this.available(this.indent) - this.used;
  }

  get isEmpty(): boolean {
    return this.current.length === 0;
  }

  get isAtStart(): boolean {
    return this.isEmpty && this.indent === 0;
  }

  put(tex: string): void {
    const { width, height, depth } = measured(tex);
    this.current.push(tex);
    this.used += width;
    this.height = Math.max(this.height, height);
    this.depth = Math.max(this.depth, depth);
  }

  newLine(indent: Line['indent']): void {
    const { indent: own, height, depth } = this;
    if (!this.isEmpty || own === 0) this.lines.push({ indent: own, tex: this.current.join(' '), height, depth });
    this.current = [];
    this.used = this.height = this.depth = 0;
    this.indent = indent;
  }

  finish(): Line[] {
    if (!this.isEmpty) this.newLine(1);
    return this.lines;
  }

  /** One product; where it must be broken, the next line begins with a multiplication sign. */
  putProduct({ whole, factors }: Product, reserve: number, indent: Line['indent']): void {
    const width = widthOf(whole) + reserve;
    if (width > this.room && (!this.isEmpty || width <= this.available(indent))) this.newLine(indent);
    if (width <= this.room || factors.length < 2) {
      this.put(whole);
      return;
    }
    this.putFactors(factors, reserve);
  }

  /** The product behind an opening bracket, on the same line if its first factor fits there. */
  putFirst({ whole, factors }: Product, reserve: number): void {
    if (widthOf(factors[0]!) > this.room) this.newLine(2);
    if (widthOf(whole) + reserve <= this.room || factors.length < 2) this.put(whole);
    else this.putFactors(factors, reserve);
  }

  private putFactors(factors: readonly string[], reserve: number): void {
    factors.forEach((factor, i) => {
      if (!this.isEmpty && widthOf(factor) + (i === factors.length - 1 ? reserve : 0) > this.room) {
        this.newLine(2);
        this.put(`\\times ${factor}`);
      } else this.put(factor);
    });
  }
}

/** A product on one line and its factors, the first of them with the sign. */
interface Product {
  readonly whole: string;
  readonly factors: readonly string[];
}

const productOf = (sign: string, factors: readonly string[]): Product => ({
  whole: joined(sign, ...factors),
  factors: factors.map((factor, i) => (i === 0 ? joined(sign, factor) : factor)),
});

/** Points to be filled: on the first line, on the others, and what the last one must leave free. */
export interface Room {
  readonly first: number;
  readonly rest: number;
  readonly reserve: number;
}

/** Lines of a sum and of what follows it. */
export function fillLines(terms: readonly TexTerm[], right: string, { first, rest, reserve: own }: Room): Line[] {
  const filler = new Filler(first, rest);
  const after = own + (right === '' ? 0 : widthOf(right));
  let fresh = false;
  terms.forEach((term, i) => {
    const sign = i === 0 ? (term.negative ? '-' : '') : term.negative ? '-' : '+';
    const reserve = i === terms.length - 1 ? after : 0;
    const whole = joined(sign, flatTerm(term));
    const width = widthOf(whole) + reserve;
    if (fresh) filler.newLine(1);
    fresh = false;
    if (width <= filler.room) filler.put(whole);
    else if (width <= rest) {
      filler.newLine(1);
      filler.put(whole);
    } else {
      if (!filler.isEmpty) filler.newLine(1);
      fillLongTerm(filler, sign, term, reserve, filler.isAtStart ? { first, rest } : { first: rest, rest });
      fresh = true;
    }
  });
  if (right !== '') {
    if (after > filler.room && !filler.isEmpty) filler.newLine(1);
    filler.put(right);
  }
  return filler.finish();
}

/** A term that does not fit on a line of its own: broken inside its bracket, in lines of even length, or between factors. */
function fillLongTerm(filler: Filler, sign: string, term: TexTerm, reserve: number, room: Omit<Room, 'reserve'>): void {
  if (term.inner.length === 0) {
    filler.putProduct(productOf(sign, [...term.head, ...term.tail]), reserve, 1);
    return;
  }
  const bracket = bracketOf(sign, term);
  const linesNeeded = (shortening: number): number => {
    const trial = new Filler(room.first, room.rest);
    trial.shortening = shortening;
    fillBracket(trial, bracket, reserve);
    return trial.finish().length;
  };
  const least = linesNeeded(0);
  while (filler.shortening < room.rest / 2 && linesNeeded(filler.shortening + INDENT) === least)
    filler.shortening += INDENT;
  fillBracket(filler, bracket, reserve);
  filler.shortening = 0;
}

interface Bracket {
  /** Sign, factors in front and the opening bracket. */
  readonly opening: Product;
  readonly products: readonly Product[];
  /** The closing bracket and the factors behind it. */
  readonly closing: string;
}

const brackets = new WeakMap<TexTerm, Map<string, Bracket>>();

/** The pieces of a bracket, remembered for each sign of its term. */
function bracketOf(sign: string, term: TexTerm): Bracket {
  const known = brackets.get(term) ?? new Map<string, Bracket>();
  brackets.set(term, known);
  return remember(known, sign, () => {
    const [open, close] = bracketsFor(inlineTex(term.inner), true);
    const products = term.inner.map((inner, i) =>
      productOf(inner.negative ? '-' : i === 0 ? '' : '+', inner.inner.length > 0 ? [flatTerm(inner)] : inner.head),
    );
    const last = term.head.at(-1);
    const opening = productOf(sign, last === undefined ? [open] : [...term.head.slice(0, -1), `${last} ${open}`]);
    return { opening, products, closing: joined(close, ...term.tail) };
  });
}

function fillBracket(filler: Filler, { opening, products, closing }: Bracket, reserve: number): void {
  const end = widthOf(closing) + reserve;
  const isLast = (i: number): boolean => i === products.length - 1;
  filler.putProduct(opening, products.length > 0 ? widthOf(products[0]!.factors[0]!) : 0, 1);
  products.forEach((product, i) => {
    if (i === 0) filler.putFirst(product, isLast(i) ? end : 0);
    else filler.putProduct(product, isLast(i) ? end : 0, 2);
  });
  if (end > filler.room && !filler.isEmpty) filler.newLine(2);
  filler.put(closing);
}
