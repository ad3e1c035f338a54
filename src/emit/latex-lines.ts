/**
 * Lays equations out in displays that fit the narrow column of a two-column journal: aligned at the relation sign where
 * that costs no line, and in several displays when one would be taller than about half a page.
 * Invariant: no line is wider than the column leaves room for, unless a single symbol is.
 */
import { fillLines, flatTerm, INDENT, joined, type Line, measured, type Room, widthOf } from './latex-fill.js';
import { inlineTex, type TexTerm } from './latex-math.js';

/** What a line may take, and what its equation number takes of the last one; points. */
interface Frame {
  readonly line: number;
  readonly number: number;
}

/** Points that an equation on one line may take: the column of 246 less a number of three digits and the space before it. */
export const SINGLE_LINE = 210;
/** Lines of a short display leave room for the number, which stands beside its middle. */
const SHORT: Frame = { line: SINGLE_LINE, number: 0 };
/** In a long display only the last line does. */
const LONG: Frame = { line: 238, number: 28 };
/** Up to so many lines are kept on one page. */
const SHORT_LINES = 3;
/** Points, half a page less the space around a display: an article has 550 on a page, two columns about 690. */
const DISPLAY_HEIGHT = 255;
/** So few displays of one equation are made about equally tall, in steps of a line. */
const FEW_CHUNKS = 4;
const EVENING = 16;

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
  if (fits(terms, SINGLE_LINE - start - (right === '' ? 0 : widthOf(right)))) {
    const flat = joined(left, left === '' ? '' : '=', inlineTex(terms), right);
    const { height, depth } = measured(flat);
    return { lines: [flat], height: lineHeight(height, depth) };
  }
  return inFrames((frame) => brokenEquation({ left, terms, right }, frame));
}

/** The short form when it has few lines, else the long one, unless that would have few. */
function inFrames(layout: (frame: Frame) => Layout): Layout {
  const short = layout(SHORT);
  if (short.lines.length <= SHORT_LINES) return short;
  const long = layout(LONG);
  return long.lines.length > SHORT_LINES ? long : short;
}

function brokenEquation({ left, terms, right = '' }: Equation, { line, number }: Frame): Layout {
  const leftWidth = widthOf(left);
  const first = line - (left === '' ? 0 : leftWidth + widthOf('='));
  const hanging = fillLines(terms, right, { first, rest: line - INDENT, reserve: number });
  if (left !== '' && leftWidth < line / 3) {
    const aligned = fillLines(terms, right, { first, rest: line - leftWidth - INDENT, reserve: number });
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

/** Cuts a sum into pieces that each fit one display, about equally tall when they are few. */
function intoChunks(terms: readonly TexTerm[], left: string): TexTerm[][] {
  const heightOfSum = (sum: readonly TexTerm[]): number => layoutEquation({ left, terms: sum }).height;
  const queue = terms.flatMap((term) => smaller(term, (t) => heightOfSum([t]) <= DISPLAY_HEIGHT));
  const cut = (limit: number): TexTerm[][] => {
    const chunks: TexTerm[][] = [[]];
    for (const term of queue) {
      const last = chunks[chunks.length - 1]!;
      if (last.length > 0 && heightOfSum([...last, term]) > limit) chunks.push([term]);
      else last.push(term);
    }
    return chunks;
  };
  let chunks = cut(DISPLAY_HEIGHT);
  const { length } = chunks;
  for (let limit = DISPLAY_HEIGHT - EVENING; length <= FEW_CHUNKS && limit > DISPLAY_HEIGHT / 2; limit -= EVENING) {
    const lower = cut(limit);
    if (lower.length > length) break;
    chunks = lower;
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
  const displays: Lines[] = [];
  let open: Equation[] = [];
  const close = (): void => {
    const group = open;
    if (group.length > 0) displays.push(inFrames((frame) => rowsIn(group, frame)).lines);
    open = [];
  };
  for (const row of rows) {
    if (rowsIn([...open, row], LONG).height > DISPLAY_HEIGHT) close();
    if (open.length === 0 && row.part && rowsIn([row], LONG).height > DISPLAY_HEIGHT)
      displays.push(...equationDisplays(row));
    else open.push(row);
  }
  close();
  return displays;
}

function rowsIn(rows: readonly Equation[], { line, number }: Frame): Layout {
  const leftWidth = Math.max(0, ...rows.map((r) => widthOf(r.left)));
  const aligned = leftWidth < line / 3 && rows.every((r) => r.left !== '');
  const layouts = rows.map(({ left, terms, right = '' }) => {
    const room: Room = {
      first: line - (aligned ? leftWidth : widthOf(left)) - (left === '' ? 0 : widthOf('=')),
      rest: line - (aligned ? leftWidth : 0) - INDENT,
      reserve: number,
    };
    return assemble(left, fillLines(terms.length > 0 ? terms : [ZERO_TERM], right, room), aligned);
  });
  return { lines: layouts.flatMap((l) => l.lines), height: layouts.reduce((h, l) => h + l.height, 0) };
}

/** The body of a display, without an environment that numbers it: what KaTeX takes in display mode. */
export function displayBody(lines: Lines): string {
  const [only] = lines;
  if (lines.length === 1) return only!.replace(/^&| &=/, (m) => (m === '&' ? '' : ' ='));
  return `\\begin{split}\n  ${lines.join(' \\\\\n  ')}\n\\end{split}`;
}

/** The display as amsmath wants it, with one number and a label; a long one may be broken between pages. */
export function numberedDisplay(lines: Lines, label: string): string {
  if (lines.length <= SHORT_LINES) return `\\begin{equation} \\label{${label}}\n${displayBody(lines)}\n\\end{equation}`;
  return `\\begin{align}\n  ${lines.join(' \\notag \\\\\n  ')} \\label{${label}}\n\\end{align}`;
}
