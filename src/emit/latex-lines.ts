/**
 * Breaks equations into lines and displays that fit the narrow column of a two-column journal, as a person would: before
 * + and −, inside a bracket only when the whole term is too long for a line, and into several displays when one would be
 * taller than about half a page. Invariant: no line is wider than LINE_WIDTH unless a single symbol is.
 */
import { bracketsFor, inlineTex, type TexTerm, unsignedTex } from './latex-math.js';
import { extentOf, widthOf } from './latex-width.js';

/** Points: the column of 246 less an equation number of three digits and the space before it. */
export const LINE_WIDTH = 212;
/** Points: a page of two columns has about 690, one of an article 550. */
export const DISPLAY_HEIGHT = 245;
/** \quad and \qquad. */
const INDENT = 10;

export interface Equation {
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
}

const widths = new Map<string, number>();

/** Width of a text, remembered: the same terms are measured in several trial layouts. */
function measured(tex: string): number {
  let width = widths.get(tex);
  if (width === undefined) {
    if (widths.size > 20_000) widths.clear();
    width = widthOf(tex);
    widths.set(tex, width);
  }
  return width;
}

/** Fills lines of different widths, starting new ones on demand. */
class Filler {
  readonly lines: Line[] = [];
  private current: string[] = [];
  private used = 0;
  private indent: Line['indent'] = 0;

  constructor(
    private readonly first: number,
    private readonly rest: number,
  ) {}

  get room(): number {
    return (this.indent === 0 ? this.first : this.rest - (this.indent - 1) * INDENT) - this.used;
  }

  get isEmpty(): boolean {
    return this.current.length === 0;
  }

  put(tex: string): void {
    this.current.push(tex);
    this.used += measured(tex);
  }

  newLine(indent: Line['indent']): void {
    if (this.isEmpty && this.indent !== 0) {
      this.indent = indent;
      return;
    }
    this.lines.push({ indent: this.indent, tex: this.current.join(' ') });
    this.current = [];
    this.used = 0;
    this.indent = indent;
  }

  finish(): Line[] {
    if (!this.isEmpty) this.newLine(1);
    return this.lines;
  }

  /** Factors of one product; where it must be broken, the next line begins with a multiplication sign. */
  putProduct(sign: string, factors: readonly string[], reserve: number, indent: Line['indent']): void {
    const whole = [sign, ...factors].filter((f) => f !== '').join(' ');
    const available = this.rest - (indent - 1) * INDENT;
    if (measured(whole) + reserve > this.room && measured(whole) + reserve <= available) this.newLine(indent);
    if (measured(whole) + reserve <= this.room || factors.length === 1) {
      if (measured(whole) + reserve > this.room && !this.isEmpty) this.newLine(indent);
      this.put(whole);
      return;
    }
    if (!this.isEmpty) this.newLine(indent);
    factors.forEach((factor, i) => {
      const last = i === factors.length - 1 ? reserve : 0;
      const text = i === 0 && sign !== '' ? `${sign} ${factor}` : factor;
      if (this.isEmpty || measured(text) + last <= this.room) {
        this.put(text);
        return;
      }
      this.newLine(2);
      this.put(`\\times ${factor}`);
    });
  }
}

/** Lines of a sum whose first line has another width than the rest. */
function fillLines(terms: readonly TexTerm[], right: string, first: number, rest: number): Line[] {
  const filler = new Filler(first, rest);
  const after = right === '' ? 0 : measured(right);
  let fresh = false;
  terms.forEach((term, i) => {
    const sign = i === 0 ? (term.negative ? '-' : '') : term.negative ? '-' : '+';
    const reserve = i === terms.length - 1 ? after : 0;
    const whole = [sign, unsignedTex(term)].filter((t) => t !== '').join(' ');
    const width = measured(whole) + reserve;
    if (fresh) filler.newLine(1);
    fresh = false;
    if (width <= filler.room) filler.put(whole);
    else if (width <= rest) {
      filler.newLine(1);
      filler.put(whole);
    } else {
      fillLongTerm(filler, sign, term, reserve);
      fresh = true;
    }
  });
  if (right !== '') {
    if (after > filler.room && !filler.isEmpty) filler.newLine(1);
    filler.put(right);
  }
  return filler.finish();
}

/** A term that does not fit on a line of its own: broken inside its bracket, or between factors. */
function fillLongTerm(filler: Filler, sign: string, term: TexTerm, reserve: number): void {
  if (term.inner.length === 0) {
    filler.putProduct(sign, [...term.head, ...term.tail], reserve, 1);
    return;
  }
  const [open, close] = bracketsFor(inlineTex(term.inner), true);
  if (!filler.isEmpty) filler.newLine(1);
  const closing = [close, ...term.tail].join(' ');
  term.inner.forEach((inner, i) => {
    const isFirst = i === 0;
    const isLast = i === term.inner.length - 1;
    const body = inner.inner.length > 0 ? [unsignedTex(inner)] : inner.head;
    const mark = inner.negative ? '-' : isFirst ? '' : '+';
    const opening = isFirst ? [sign, ...term.head, open].filter((t) => t !== '').join(' ') : '';
    const before = [opening, mark].filter((t) => t !== '').join(' ');
    filler.putProduct(before, body, isLast ? measured(closing) + reserve : 0, isFirst ? 1 : 2);
  });
  if (measured(closing) + reserve > filler.room && !filler.isEmpty) filler.newLine(2);
  filler.put(closing);
}

/** Points that a line takes, the space between lines included. */
function heightOf(line: string): number {
  const { height, depth } = extentOf(line);
  return Math.max(8.4, height) + Math.max(3.6, depth) + 3.5;
}

const INDENTS = ['', '\\quad ', '\\qquad '] as const;

/** How an equation is aligned: at its relation sign, or with everything after the first line indented from the margin. */
interface Layout {
  readonly lines: Lines;
  readonly height: number;
}

function assemble(left: string, lines: readonly Line[], aligned: boolean): Layout {
  const start = aligned ? `${left} &=` : `&${left} =`;
  const texts = lines.map(({ indent, tex }, i) =>
    i === 0 ? (tex === '' ? start : `${start} ${tex}`) : `&${INDENTS[indent]}${indent === 0 ? '' : leading(tex)}`,
  );
  return { lines: texts, height: texts.reduce((h, t) => h + heightOf(t), 0) };
}

/** A line that begins with a multiplication sign or relation gets an empty operand, so that the sign keeps its spaces. */
const leading = (tex: string): string => (/^[-+=]|^\\times/.test(tex) ? `{}${tex}` : tex);

function layoutEquation({ left, terms, right = '' }: Equation): Layout {
  const flat = [left, '=', inlineTex(terms), right].filter((t) => t !== '').join(' ');
  if (measured(flat) <= LINE_WIDTH) return { lines: [flat], height: heightOf(flat) };
  const start = measured(`${left} =`);
  const hanging = fillLines(terms, right, LINE_WIDTH - start, LINE_WIDTH - INDENT);
  const leftWidth = measured(left);
  if (leftWidth < LINE_WIDTH / 3) {
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

/** Several short equations below each other, aligned at their relation signs when the left sides are short. */
export function rowDisplays(rows: readonly Equation[]): Lines[] {
  const leftWidth = Math.max(0, ...rows.map((r) => measured(r.left)));
  const aligned = leftWidth < LINE_WIDTH / 3;
  const displays: string[][] = [];
  let height = 0;
  for (const { left, terms, right = '' } of rows) {
    const relation = measured('x =') - measured('x');
    const first = LINE_WIDTH - (aligned ? leftWidth : measured(left)) - relation;
    const rest = LINE_WIDTH - (aligned ? leftWidth : 0) - INDENT;
    const filled = terms.length > 0 ? fillLines(terms, right, first, rest) : [{ indent: 0 as const, tex: '0' }];
    const row = assemble(left, filled, aligned);
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
