/**
 * What the words of an expression may mean: declared symbols, tensor heads, names with subscripts. Shared by the parsers
 * of Lagrangians and of scalar expressions; the caller says which symbols exist.
 */
import type { Cursor } from './cursor.js';
import { MAX_NAME } from './limits.js';
import { nearest, splitWord } from './suggest.js';
import type { Span } from './syntax.js';
import type { DeclaredTensor, TensorHead } from './theory.js';
import { clip } from './tokens.js';

export interface Vocabulary {
  /** Whether R, T, A, \epsilon, \eta, \delta are tensors (else they are names like others). */
  readonly tensors: boolean;
  /** Tensors of the user, by name. */
  readonly declared?: ReadonlyMap<string, DeclaredTensor> | undefined;
  /** Whether `?a` is an index, standing for any index of a pattern. */
  readonly patterns?: boolean;
  /** Whether D(q,n) is the n-th time derivative of q. */
  readonly jets: boolean;
  readonly isSymbol: (name: string) => boolean;
  /** Symbols to suggest for an unknown one. */
  readonly names: Iterable<string>;
  /** Why a name that is no symbol here cannot be used, when there is more to say than "unknown". */
  readonly explain?: ((name: string) => string | undefined) | undefined;
}

/** A name with its subscript: `c_1`, `c_{1}` and `\alpha_1` are single names. */
export interface JoinedName {
  readonly text: string;
  /** Tokens that it takes, the first word included. */
  readonly tokens: number;
}

/** The longest name at the cursor, whose first word reads `base`. Consumes nothing. */
export function joinName(cursor: Cursor, base: string): JoinedName {
  let text = base;
  let ahead = 1;
  let end = cursor.token.end;
  for (;;) {
    const token = cursor.peek(ahead);
    const underscore = token.kind === 'mark' && token.text === '_';
    const joins = underscore || token.kind === 'word' || token.kind === 'integer';
    // TeX allows spaces around the first underscore, and a name cannot begin its subscript without one.
    const near = token.start === end || ahead <= 2;
    if (!joins || !near || (ahead === 1 && !underscore)) break;
    text += underscore ? '_' : token.text;
    end = token.end;
    ahead++;
  }
  if (ahead > 1 && text.endsWith('_') && cursor.isMark('{', ahead)) {
    let inner = '';
    for (let n = ahead + 1; ; n++) {
      const token = cursor.peek(n);
      if (token.kind === 'mark' && token.text === '}' && inner !== '') return { text: text + inner, tokens: n + 1 };
      if (token.kind !== 'word' && token.kind !== 'integer' && token.text !== '_') return { text: base, tokens: 1 };
      inner += token.text;
    }
  }
  return { text, tokens: ahead };
}

const WORD_HEADS: ReadonlyMap<string, TensorHead> = new Map([
  ['R', 'R'],
  ['T', 'T'],
  ['A', 'A'],
]);
/** Macros that are tensors of their own, whose names a declared tensor cannot have. */
export const MACRO_HEADS: ReadonlyMap<string, TensorHead> = new Map([
  ['epsilon', 'epsilon'],
  ['varepsilon', 'epsilon'],
  ['eta', 'eta'],
  ['delta', 'delta'],
]);

/** Whether the `^` that is `ahead` tokens further on begins a power, not indices. */
export function isPowerAt(cursor: Cursor, ahead: number): boolean {
  let n = ahead + 1;
  if (cursor.isMark('{', n) || cursor.isMark('(', n)) n++;
  while (cursor.isMark('-', n) || cursor.isMark('+', n)) n++;
  return cursor.peek(n).kind === 'integer';
}

/** Whether the token `ahead` places further on is the name of a tensor, whatever follows it. */
export function isHeadAt(cursor: Cursor, ahead: number, vocabulary: Vocabulary): boolean {
  const { kind, text } = cursor.peek(ahead);
  if (kind !== 'word' && kind !== 'macro') return false;
  return (kind === 'macro' ? MACRO_HEADS : WORD_HEADS).has(text) || vocabulary.declared?.has(text) === true;
}

/** The tensor head at the cursor, if the word there is one and no declared name is meant. */
export function headAt(cursor: Cursor, name: JoinedName, vocabulary: Vocabulary): string | undefined {
  const { kind, text } = cursor.token;
  if (!vocabulary.tensors) return undefined;
  const head = (kind === 'macro' ? MACRO_HEADS : WORD_HEADS).get(text) ?? vocabulary.declared?.get(text)?.name;
  if (head === undefined) return undefined;
  const subscripted = name.tokens > 1;
  if (subscripted) return /[0-9]/.test(name.text) && vocabulary.isSymbol(name.text) ? undefined : head;
  if (kind === 'word') return head;
  // \delta alone, or with a power, is the constant delta if there is one.
  const indexed = cursor.isMark('_', 1) || (cursor.isMark('^', 1) && !isPowerAt(cursor, 1)) || cursor.isMark('{', 1);
  return indexed || !vocabulary.isSymbol(name.text) ? head : undefined;
}

/** The name that a Greek macro stands for; \varepsilon is epsilon unless `varepsilon` is a symbol. */
export function macroName(macro: string, vocabulary: Vocabulary): string {
  return macro === 'varepsilon' && !vocabulary.isSymbol(macro) ? 'epsilon' : macro;
}

/**
 * Reports a name that is no symbol here, once in a passage; stops the parsing when indices follow, which nothing could
 * read. Codes `unknown-symbol`, `unknown-tensor`, `reserved-name`.
 */
export function reportUnknown(cursor: Cursor, vocabulary: Vocabulary, name: JoinedName, span: Span): void {
  const typed = cursor.typed(span);
  const indexed = vocabulary.tensors && (cursor.isMark('_') || (cursor.isMark('^') && !isPowerAt(cursor, 0)));
  if (!indexed && !cursor.isNews(name.text)) return;
  const report = (code: string, message: string, hint: string): void => {
    if (indexed) cursor.fail(code, span, message, hint);
    cursor.report(code, span, message, hint);
  };
  const apart = runTogether(typed, vocabulary);
  const subscript = vocabulary.tensors ? /^([A-Za-z]+)\s*_\s*\{[A-Za-z\s]+\}$/.exec(typed) : null;
  const reason = vocabulary.explain?.(name.text);
  if (apart !== undefined) {
    report('unknown-symbol', `unknown symbol ${clip(name.text)}`, `did you mean ${apart}?`);
  } else if (indexed || subscript !== null) {
    const hint = tensorHint(subscript?.[1] ?? typed, vocabulary);
    report('unknown-tensor', `${typed} is not a tensor of this notation`, hint);
  } else if (reason !== undefined) {
    report('reserved-name', reason, 'choose another name');
  } else {
    const near = nearest(name.text, vocabulary.names);
    const hint =
      near === undefined ? 'declare it under constants or scales, or mend the name' : `did you mean ${near}?`;
    report('unknown-symbol', `unknown symbol ${clip(name.text)}`, hint);
  }
}

function tensorHint(base: string, vocabulary: Vocabulary): string {
  if (base === 'g') return 'indices are frame indices: write \\eta_{ab}';
  if (base === 'epsilon' || base === 'eta' || base === 'delta') return `write \\${base}`;
  const declared = [...(vocabulary.declared?.keys() ?? [])];
  const more = declared.length === 0 ? '' : `; declared are ${clip(declared.join(', '))}`;
  return `the tensors are R, T, A, \\epsilon, \\eta and \\delta${more}; others are declared under tensors`;
}

/** `c0M` as `c0 M`, `b1T_{abc}` as `b1 T_{abc}`: known words that lack a space. */
function runTogether(typed: string, vocabulary: Vocabulary): string | undefined {
  const isHead = (piece: string): boolean => WORD_HEADS.has(piece) || vocabulary.declared?.has(piece) === true;
  const known = (piece: string): boolean => vocabulary.isSymbol(piece) || (vocabulary.tensors && isHead(piece));
  const words = splitWord(typed, known);
  if (words !== undefined || !vocabulary.tensors) return words;
  for (let i = Math.min(typed.length, MAX_NAME) - 1; i > 0; i--) {
    if (!isHead(typed[i]!) || typed[i + 1] !== '_') continue;
    const before = typed.slice(0, i);
    const apart = vocabulary.isSymbol(before) ? before : splitWord(before, known);
    if (apart !== undefined) return `${apart} ${typed.slice(i)}`;
  }
  return undefined;
}
