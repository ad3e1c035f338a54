/**
 * The way back from a character of a YAML scalar to its place in the file, for every scalar style. Invariant: folding and
 * chomping only touch white space, so the visible characters of the text and of the file correspond in order.
 */
import type { Passage } from './passage.js';
import type { Origin } from './theory.js';
import type { YamlText } from './yaml-source.js';

/** The scalar as a passage to parse; places are worked out only when asked for. */
export function passageOf(node: YamlText): Passage {
  let offsets: Int32Array | undefined;
  return {
    text: node.text,
    locate: (start, end) => {
      offsets ??= offsetsOf(node);
      return placeOf(node, offsets, start, end);
    },
  };
}

function placeOf(node: YamlText, offsets: Int32Array, start: number, end: number): Origin {
  const { file, source } = node.origin;
  if (node.text === '') return node.origin;
  const from = Math.min(Math.max(start, 0), node.text.length);
  const to = Math.min(Math.max(end, from), node.text.length);
  const first = from < node.text.length ? offsets[from]! : offsets[from - 1]! + 1;
  const last = to > from ? offsets[to - 1]! + 1 : first;
  return { file, source, start: first, end: Math.max(first, last) };
}

/** For every UTF-16 unit of the text, its offset in the file. */
function offsetsOf(node: YamlText): Int32Array {
  const { text, style, origin } = node;
  return style === 'literal'
    ? literalOffsets(text, origin)
    : alignVisible(text, visibleUnits(origin, style), origin.start);
}

/** Lines correspond one to one; only the indentation at their left and a carriage return at their right are gone. */
function literalOffsets(text: string, { source, start }: Origin): Int32Array {
  const offsets = new Int32Array(text.length);
  let sourceLine = source.indexOf('\n', start) + 1;
  let textLine = 0;
  while (textLine < text.length) {
    const newline = text.indexOf('\n', textLine);
    const textEnd = newline === -1 ? text.length : newline;
    let sourceEnd = source.indexOf('\n', sourceLine);
    if (sourceEnd === -1) sourceEnd = source.length;
    const next = sourceEnd + 1;
    if (source[sourceEnd - 1] === '\r') sourceEnd--;
    const shift = sourceEnd - textEnd;
    for (let i = textLine; i <= Math.min(textEnd, text.length - 1); i++) offsets[i] = i + shift;
    sourceLine = next;
    textLine = textEnd + 1;
  }
  return offsets;
}

const isBlank = (c: string): boolean => c === ' ' || c === '\t' || c === '\n' || c === '\r';

/** Offsets of the visible units of the scalar, in order, as they stand in the file. */
function visibleUnits(origin: Origin, style: YamlText['style']): number[] {
  const { source, start, end } = origin;
  const units: number[] = [];
  if (style === 'double') return doubleQuotedUnits(source, start + 1, end - 1);
  let from = start;
  let to = end;
  if (style === 'folded') from = source.indexOf('\n', start) + 1;
  if (style === 'single') [from, to] = [start + 1, end - 1];
  for (let i = from; i < to; i++) {
    if (style === 'single' && source[i] === "'") i++;
    if (!isBlank(source[i]!)) units.push(i);
  }
  return units;
}

const HEX_DIGITS: Readonly<Record<string, number>> = { x: 2, u: 4, U: 8 };
/** Escapes that stand for white space, or for nothing (an escaped line end). */
const BLANK_ESCAPES = 'nrt \t\n\r';

function doubleQuotedUnits(source: string, from: number, to: number): number[] {
  const units: number[] = [];
  let i = from;
  while (i < to) {
    const c = source[i]!;
    if (c !== '\\') {
      if (!isBlank(c)) units.push(i);
      i++;
      continue;
    }
    const kind = source[i + 1]!;
    const digits = HEX_DIGITS[kind] ?? 0;
    const decoded = digits === 0 ? '' : String.fromCodePoint(Number.parseInt(source.slice(i + 2, i + 2 + digits), 16));
    const blank = digits === 0 ? BLANK_ESCAPES.includes(kind) : isBlank(decoded);
    if (!blank) for (let n = 0; n < Math.max(1, decoded.length); n++) units.push(i);
    i += 2 + digits;
  }
  return units;
}

/** White space of the text is placed right after the visible unit before it. */
function alignVisible(text: string, visible: readonly number[], start: number): Int32Array {
  const offsets = new Int32Array(text.length);
  let next = 0;
  let last = start - 1;
  for (let i = 0; i < text.length; i++) {
    if (isBlank(text[i]!)) last++;
    else last = visible[next++] ?? last;
    offsets[i] = last;
  }
  return offsets;
}
