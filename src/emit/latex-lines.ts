/**
 * Breaks equations into lines and displays that fit the narrow column of a two-column journal, as a person would: before
 * + and −, inside a bracket only when the whole term is too long for a line, and into several displays when one would be
 * taller than about half a page. Invariant: no line is wider than LINE_WIDTH unless a single symbol is.
 */
import { remember } from '../algebra/memo.js';
import { bracketsFor, inlineTex, type TexTerm, unsignedTex } from './latex-math.js';
import { type Extent, extentOf } from './latex-width.js';

/** Points: the column of 246 less an equation number of three digits and the space before it. */
export const LINE_WIDTH = 212;
/** Points: a page of two columns has about 690, one of an article 550. */
export const DISPLAY_HEIGHT = 245;
/** \quad and \qquad. */
const INDENT = 10;

export interface Equation {
  /** Empty for a sum without a left side, `… = 0`. */
  readonly left: string;
  readonly terms: readonly TexTerm[];
  /** What follows the sum, for instance `= 0`; empty for nothing. */
  readonly right?: string;
  /** Name of the n-th part, when the equation needs several displays. */
  readonly part?: (n: number) => string;
}

/** The lines of one display; more than one line have alignment marks. */
export type Lines = readonly string[];

interface Line {
  /** 0 for the first line of an equation, 1 for its continuation, 2 inside a bracket. */
  readonly indent: 0 | 1 | 2;
  readonly tex: string;
  readonly height: number;
  readonly depth: number;
}

const extents = new Map<string, Extent>();

/** Extent of a text, remembered: the same terms are measured in several trial layouts. */
function measured(tex: string): Extent {
  if (extents.size > 20_000) extents.clear();
  return remember(extents, tex, () => extentOf(tex));
}

const widthOf = (tex: string): number => measured(tex).width;
const joined = (...pieces: readonly string[]): string => pieces.filter((p) => p !== '').join(' ');

const flatTexts = new WeakMap<TexTerm, string>();
function flatTerm(term: TexTerm): string {
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

  /** Factors of one product; where it must be broken, the next line begins with a multiplication sign. */
  putProduct(sign: string, factors: readonly string[], reserve: number, indent: Line['indent']): void {
    const whole = joined(sign, ...factors);
    const width = widthOf(whole) + reserve;
    if (width > this.room && (!this.isEmpty || width <= this.available(indent))) this.newLine(indent);
    if (width <= this.room || factors.length < 2) {
      this.put(whole);
      return;
    }
    factors.forEach((factor, i) => {
      const text = i === 0 ? joined(sign, factor) : factor;
      if (!this.isEmpty && widthOf(text) + (i === factors.length - 1 ? reserve : 0) > this.room) {
        this.newLine(2);
        this.put(`\\times ${factor}`);
      } else this.put(text);
    });
  }
}

/** Lines of a sum whose first line has another width than the rest. */
function fillLines(terms: readonly TexTerm[], right: string, first: number, rest: number): Line[] {
  const filler = new Filler(first, rest);
  const after = right === '' ? 0 : widthOf(right);
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
      fillLongTerm(filler, sign, term, reserve, rest);
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
function fillLongTerm(filler: Filler, sign: string, term: TexTerm, reserve: number, rest: number): void {
  if (term.inner.length === 0) {
    filler.putProduct(sign, [...term.head, ...term.tail], reserve, 1);
    return;
  }
  const linesNeeded = (shortening: number): number => {
    const trial = new Filler(rest, rest);
    trial.shortening = shortening;
    fillBracket(trial, sign, term, reserve);
    return trial.finish().length;
  };
  if (!filler.isAtStart) {
    const least = linesNeeded(0);
    const step = INDENT;
    while (filler.shortening < rest / 2 && linesNeeded(filler.shortening + step) === least) filler.shortening += step;
  }
  fillBracket(filler, sign, term, reserve);
  filler.shortening = 0;
}

function fillBracket(filler: Filler, sign: string, term: TexTerm, reserve: number): void {
  const [open, close] = bracketsFor(inlineTex(term.inner), true);
  const closing = joined(close, ...term.tail);
  term.inner.forEach((inner, i) => {
    const isFirst = i === 0;
    const isLast = i === term.inner.length - 1;
    const body = inner.inner.length > 0 ? [flatTerm(inner)] : inner.head;
    const mark = inner.negative ? '-' : isFirst ? '' : '+';
    const before = joined(isFirst ? joined(sign, ...term.head, open) : '', mark);
    filler.putProduct(before, body, isLast ? widthOf(closing) + reserve : 0, isFirst ? 1 : 2);
  });
  if (widthOf(closing) + reserve > filler.room && !filler.isEmpty) filler.newLine(2);
  filler.put(closing);
}

/** Points that a line takes with the space below it: strut, \jot and a little. */
const lineHeight = (height: number, depth: number): number => Math.max(8.4, height) + Math.max(3.6, depth) + 3.5;

const INDENTS = ['', '\\quad ', '\\qquad '] as const;

interface Layout {
  readonly lines: Lines;
  readonly height: number;
}

/** Lines with alignment marks: at the relation sign, or at the margin. */
function assemble(left: string, lines: readonly Line[], aligned: boolean): Layout {
  const start = left === '' ? '&' : aligned ? `${left} &=` : `&${left} =`;
  const own = measured(left);
  const texts = lines.map(({ indent, tex }, i) =>
    i === 0 ? joined(start, tex.replace(/^- /, '-')).replace(/^& /, '&') : `&${INDENTS[indent]}${leading(tex)}`,
  );
  const heights = lines.map(({ height, depth }, i) =>
    i === 0 ? lineHeight(Math.max(height, own.height), Math.max(depth, own.depth)) : lineHeight(height, depth),
  );
  return { lines: texts, height: heights.reduce((a, b) => a + b, 0) };
}

/** A line that begins with a sign gets an empty operand, so that the sign keeps its spaces. */
const leading = (tex: string): string => (/^[-+=]|^\\times/.test(tex) ? `{}${tex}` : tex);

/** Whether a sum fits in so many points on one line. */
function fits(terms: readonly TexTerm[], points: number): boolean {
  let used = 0;
  for (const term of terms) {
    used += widthOf(`+ ${flatTerm(term)}`);
    if (used > points) return false;
  }
  return true;
}

function layoutEquation({ left, terms, right = '' }: Equation): Layout {
  const start = left === '' ? 0 : widthOf(left) + widthOf('=');
  if (fits(terms, LINE_WIDTH - start - (right === '' ? 0 : widthOf(right)))) {
    const flat = joined(left, left === '' ? '' : '=', inlineTex(terms), right);
    const { height, depth } = measured(flat);
    return { lines: [flat], height: lineHeight(height, depth) };
  }
  const hanging = fillLines(terms, right, LINE_WIDTH - start, LINE_WIDTH - INDENT);
  const leftWidth = widthOf(left);
  if (left !== '' && leftWidth < LINE_WIDTH / 3) {
    const aligned = fillLines(terms, right, LINE_WIDTH - start, LINE_WIDTH - leftWidth - INDENT);
    if (aligned.length <= Math.max(hanging.length, 2)) return assemble(left, aligned, true);
  }
  return assemble(left, hanging, false);
}

/** The displays of one equation: itself, or its parts when it is too tall for one. */
export function equationDisplays(equation: Equation): Lines[] {
  const whole = layoutEquation(equation);
  if (whole.height <= DISPLAY_HEIGHT || !equation.part) return [whole.lines];
  const { part } = equation;
  const chunks = intoChunks(equation.terms, part(10));
  const names = chunks.map((_, i): TexTerm => ({ negative: false, head: [part(i + 1)], inner: [], tail: [] }));
  return [
    layoutEquation({ ...equation, terms: names }).lines,
    ...chunks.map((terms, i) => layoutEquation({ left: part(i + 1), terms }).lines),
  ];
}

/** Cuts a sum into pieces that each fit one display. */
function intoChunks(terms: readonly TexTerm[], left: string): TexTerm[][] {
  const heightOfSum = (sum: readonly TexTerm[]): number => layoutEquation({ left, terms: sum }).height;
  const queue = terms.flatMap((term) => smaller(term, (t) => heightOfSum([t]) <= DISPLAY_HEIGHT));
  const chunks: TexTerm[][] = [[]];
  for (const term of queue) {
    const last = chunks[chunks.length - 1]!;
    if (last.length > 0 && heightOfSum([...last, term]) > DISPLAY_HEIGHT) chunks.push([term]);
    else last.push(term);
  }
  return chunks;
}

/** A term whose bracket alone is taller than a display, as several terms with shorter brackets. */
function smaller(term: TexTerm, fits: (t: TexTerm) => boolean): TexTerm[] {
  if (term.inner.length < 4 || fits(term)) return [term];
  const half = term.inner.length >> 1;
  const halves = [term.inner.slice(0, half), term.inner.slice(half)];
  return halves.flatMap((inner) => smaller({ ...term, inner }, fits));
}

const ZERO_TERM: TexTerm = { negative: false, head: ['0'], inner: [], tail: [] };

/** Several short equations below each other, aligned at their relation signs when the left sides are short. */
export function rowDisplays(rows: readonly Equation[]): Lines[] {
  const leftWidth = Math.max(0, ...rows.map((r) => widthOf(r.left)));
  const aligned = leftWidth < LINE_WIDTH / 3 && rows.every((r) => r.left !== '');
  const displays: string[][] = [];
  let height = 0;
  for (const equation of rows) {
    const { left, terms, right = '' } = equation;
    const first = LINE_WIDTH - (aligned ? leftWidth : widthOf(left)) - (left === '' ? 0 : widthOf('='));
    const rest = LINE_WIDTH - (aligned ? leftWidth : 0) - INDENT;
    const row = assemble(left, fillLines(terms.length > 0 ? terms : [ZERO_TERM], right, first, rest), aligned);
    if (row.height > DISPLAY_HEIGHT && equation.part) {
      displays.push(...equationDisplays(equation).map((lines) => [...lines]));
      height = DISPLAY_HEIGHT;
      continue;
    }
    if (displays.length === 0 || height + row.height > DISPLAY_HEIGHT) {
      displays.push([]);
      height = 0;
    }
    displays[displays.length - 1]!.push(...row.lines);
    height += row.height;
  }
  return displays;
}

/** The body of a display, without an environment that numbers it: what KaTeX takes in display mode. */
export function displayBody(lines: Lines): string {
  const [only] = lines;
  if (lines.length === 1) return only!.replace(/^&| &=/, (m) => (m === '&' ? '' : ' ='));
  return `\\begin{split}\n  ${lines.join(' \\\\\n  ')}\n\\end{split}`;
}

/** The display as amsmath wants it, numbered and labelled. */
export const numberedDisplay = (lines: Lines, label: string): string =>
  `\\begin{equation}\\label{${label}}\n${displayBody(lines)}\n\\end{equation}`;
