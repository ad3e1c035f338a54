/**
 * Names of irreducible parts, and how one is written: a parenthesised word in a superscript, `T^{(axial)}_{abc}`, or in
 * front, `{}^{(\mathrm{axial})}T_{abc}`. What the parts are is data of rules/parts; here are only their words.
 */
import type { Cursor } from './cursor.js';
import { nearest } from './suggest.js';
import type { Span } from './syntax.js';

export interface PartVocabulary {
  readonly head: string;
  /** Only the tensor with this number of slots has parts. */
  readonly slots: number;
  readonly names: readonly string[];
}

/**
 * The irreducible parts under the Lorentz group. Torsion: 24 = 4 + 4 + 16; curvature: 36 = 10 + 9 + 1 + 9 + 6 + 1, in the order
 * of the names (CQG 28 (2011) 215017).
 */
export const PARTS: readonly PartVocabulary[] = [
  { head: 'T', slots: 3, names: ['vector', 'axial', 'tensor'] },
  {
    head: 'R',
    slots: 4,
    // `ricci` is the symmetric Ricci tensor without its trace, `pseudoscalar` the totally antisymmetric part.
    names: ['weyl', 'pair-antisymmetric', 'pseudoscalar', 'ricci', 'ricci-antisymmetric', 'scalar'],
  },
];

/** The parts of a tensor head; undefined when it has none in this notation. */
export const partsOf = (head: string): PartVocabulary | undefined => PARTS.find((parts) => parts.head === head);

/** A part as it stands at the cursor. */
export interface TypedPart extends Span {
  readonly name: string;
  /** Tokens that it takes. */
  readonly tokens: number;
  /** Where the word alone stands. */
  readonly word: Span;
}

const UPRIGHT: ReadonlySet<string> = new Set(['mathrm', 'mathit', 'text', 'textrm']);

/** `^{(word)}` or `^{(\mathrm{word})}` at the token `ahead` places further on; consumes nothing. */
export function partAt(cursor: Cursor, ahead: number): TypedPart | undefined {
  if (!cursor.isMark('^', ahead) || !cursor.isMark('{', ahead + 1) || !cursor.isMark('(', ahead + 2)) return undefined;
  let n = ahead + 3;
  const braced = cursor.peek(n).kind === 'macro' && UPRIGHT.has(cursor.peek(n).text) && cursor.isMark('{', n + 1);
  if (braced) n += 2;
  const { start } = cursor.peek(n);
  let name = '';
  for (;;) {
    if (cursor.peek(n).kind !== 'word') return undefined;
    name += cursor.peek(n++).text;
    if (!cursor.isMark('-', n)) break;
    name += '-';
    n++;
  }
  const word = { start, end: cursor.peek(n - 1).end };
  if (braced && !cursor.isMark('}', n++)) return undefined;
  if (!cursor.isMark(')', n) || !cursor.isMark('}', n + 1)) return undefined;
  return { name, tokens: n + 2 - ahead, word, start: cursor.peek(ahead).start, end: cursor.peek(n + 1).end };
}

const ALL_NAMES: readonly string[] = PARTS.flatMap((parts) => parts.names);

/** Whether the word is rather meant as indices in brackets, as in R^{(ab)}. */
export const looksLikeIndices = (name: string): boolean =>
  /^[A-Za-z]{1,4}$/.test(name) && !ALL_NAMES.includes(name) && nearest(name, ALL_NAMES) === undefined;

/** Stops the parsing when the tensor has no such part. Code `unknown-part`. */
export function checkPart(cursor: Cursor, head: string, shownHead: string, part: TypedPart): void {
  const names = partsOf(head)?.names;
  if (names?.includes(part.name)) return;
  if (names === undefined) {
    const having = PARTS.map((parts) => parts.head).join(' and ');
    cursor.fail('unknown-part', part.word, `${shownHead} has no irreducible parts`, `only ${having} have`);
  }
  const near = nearest(part.name, names);
  const hint = near === undefined ? `they are ${names.join(', ')}` : `did you mean ${near}?`;
  cursor.fail('unknown-part', part.word, `(${part.name}) is not an irreducible part of ${shownHead}`, hint);
}
