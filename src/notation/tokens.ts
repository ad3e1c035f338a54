/**
 * Text → tokens with positions, for the Lagrangian and for scalar expressions. Spacing and sizing macros vanish here,
 * Greek letters and typographic signs become what their TeX spelling is. Faults of single characters are collected, so
 * that several can be shown; the parser runs only when there is none.
 */
import { type Diagnostic, errorAt } from './diagnostics.js';
import { MAX_DIAGNOSTICS } from './limits.js';
import type { Passage } from './passage.js';

/**
 * `word`: letters and digits, beginning with a letter; `macro`: text without the backslash; `mark`: one of
 * + - * / ^ _ ( ) [ ] { } , = or an escaped brace `\{` `\}`; `end` closes every list.
 */
export interface Token {
  readonly kind: 'integer' | 'word' | 'macro' | 'mark' | 'end';
  readonly text: string;
  readonly start: number;
  readonly end: number;
}

export const GREEK: readonly string[] = (
  'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi omicron pi rho sigma tau upsilon phi chi psi ' +
  'omega varepsilon vartheta varpi varrho varsigma varphi Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'
).split(' ');
const GREEK_NAMES: ReadonlySet<string> = new Set(GREEK);
/** Whether a macro is a Greek letter. */
export const isGreek = (macro: string): boolean => GREEK_NAMES.has(macro);

const SPACING = new Set(
  (
    'quad qquad enspace thinspace medspace thickspace negthinspace displaystyle textstyle left right big Big bigg Bigg ' +
    'bigl Bigl biggl Biggl bigr Bigr biggr Biggr bigm Bigm biggm Biggm'
  ).split(' '),
);
const MARKS = '+-*/^_()[]{},=';
const GREEK_LETTERS = 'αβγδεζηθικλμνξοπρστυφχψω';
const GREEK_CAPITALS: Readonly<Record<string, string>> = {
  Γ: 'Gamma',
  Δ: 'Delta',
  Θ: 'Theta',
  Λ: 'Lambda',
  Ξ: 'Xi',
  Π: 'Pi',
  Σ: 'Sigma',
  Υ: 'Upsilon',
  Φ: 'Phi',
  Ψ: 'Psi',
  Ω: 'Omega',
  ϵ: 'epsilon',
  ϕ: 'phi',
  ς: 'varsigma',
  ϑ: 'vartheta',
};
const SIGNS: Readonly<Record<string, string>> = { '−': '-', '–': '-', '·': '*', '×': '*', '⋅': '*' };
const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹⁻';

const isLetter = (c: number): boolean => (c >= 65 && c <= 90) || (c >= 97 && c <= 122);
const isDigit = (c: number): boolean => c >= 48 && c <= 57;

/** The macro name of a single Greek character, if it is one. */
function greekCharacter(c: string): string | undefined {
  const lower = GREEK_LETTERS.indexOf(c);
  if (lower !== -1) return GREEK[lower];
  return Object.hasOwn(GREEK_CAPITALS, c) ? GREEK_CAPITALS[c] : undefined;
}

/**
 * The tokens of a passage, the last one of kind `end`; faults are added to `problems`.
 * @param patterns whether `?` is a mark: the sigil of a pattern variable.
 */
export function tokenize(passage: Passage, problems: Diagnostic[], patterns = false): readonly Token[] {
  const { text } = passage;
  const tokens: Token[] = [];
  const length = text.length;
  const push = (kind: Token['kind'], value: string, start: number, end: number): void => {
    tokens.push({ kind, text: value, start, end });
  };
  const fault = (code: string, start: number, end: number, message: string, hint: string): void => {
    problems.push(errorAt(passage.locate(start, end), code, message, hint));
  };
  let i = 0;
  while (i < length && problems.length <= MAX_DIAGNOSTICS) {
    const code = text.charCodeAt(i);
    const start = i;
    if (code <= 32 || code === 0xa0 || code === 126) {
      i++;
    } else if (isLetter(code)) {
      while (i < length && (isLetter(text.charCodeAt(i)) || isDigit(text.charCodeAt(i)))) i++;
      push('word', text.slice(start, i), start, i);
    } else if (isDigit(code) || (code === 46 && isDigit(text.charCodeAt(i + 1)))) {
      while (i < length && isDigit(text.charCodeAt(i))) i++;
      if (text[i] === '.') {
        i++;
        while (i < length && isDigit(text.charCodeAt(i))) i++;
        const typed = text.slice(start, i);
        push('integer', '1', start, i);
        fault(
          'decimal-point',
          start,
          i,
          `${clip(typed)} has a decimal point`,
          `write a fraction: ${asFraction(typed)}`,
        );
      } else push('integer', text.slice(start, i), start, i);
    } else if (code === 92) {
      i = macro(text, i, push, fault);
    } else {
      const character = String.fromCodePoint(text.codePointAt(i)!);
      i += character.length;
      const greek = greekCharacter(character);
      if (SUPERSCRIPTS.includes(character)) i = superscript(text, start, push);
      else if (greek !== undefined) push('macro', greek, start, i);
      else if (MARKS.includes(character) || (patterns && character === '?')) push('mark', character, start, i);
      else if (Object.hasOwn(SIGNS, character)) push('mark', SIGNS[character]!, start, i);
      else fault('unexpected-character', start, i, `unexpected character ${show(character)}`, characterHint(character));
    }
  }
  push('end', '', length, length);
  return tokens;
}

type Push = (kind: Token['kind'], value: string, start: number, end: number) => void;
type Report = (code: string, start: number, end: number, message: string, hint: string) => void;

/** Reads what begins with a backslash at `start`; the offset behind it. */
function macro(text: string, start: number, push: Push, fault: Report): number {
  let i = start + 1;
  while (i < text.length && isLetter(text.charCodeAt(i))) i++;
  if (i === start + 1) {
    const character = text[i] ?? '';
    if (character === '{' || character === '}') push('mark', `\\${character}`, start, i + 1);
    else if (character === '\\')
      fault('unexpected-character', start, i + 1, 'unexpected line break \\\\', 'just begin a new line');
    else if (!',;:!>/ \n\t\r'.includes(character) || character === '') {
      fault(
        'unexpected-character',
        start,
        i + 1,
        `unexpected \\${show(character)}`,
        'see docs/notation.md for the macros',
      );
    }
    return i + (character === '' ? 0 : 1);
  }
  const name = text.slice(start + 1, i);
  if (SPACING.has(name)) return i;
  if (name === 'cdot' || name === 'times') push('mark', '*', start, i);
  else if (name === 'lbrace' || name === 'rbrace') push('mark', name === 'lbrace' ? '\\{' : '\\}', start, i);
  else if (name === 'phantom') return skipGroup(text, i);
  else push('macro', name, start, i);
  return i;
}

/** M⁻² as M^-2; the offset behind it. */
function superscript(text: string, start: number, push: Push): number {
  let i = start;
  let digits = '';
  push('mark', '^', start, start + 1);
  if (text[i] === '⁻') push('mark', '-', i, ++i);
  const from = i;
  for (; i < text.length && text[i] !== '⁻' && SUPERSCRIPTS.includes(text[i]!); i++)
    digits += SUPERSCRIPTS.indexOf(text[i]!);
  if (digits !== '') push('integer', digits, from, i);
  return i;
}

/** \phantom{…} only makes space. */
function skipGroup(text: string, from: number): number {
  const open = text.indexOf('{', from);
  const close = text.indexOf('}', from);
  return open === -1 || close < open || text.slice(from, open).trim() !== '' ? from : close + 1;
}

const show = (character: string): string => (character.trim() === '' ? `U+${hex(character)}` : character);
const hex = (character: string): string => (character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0');
/** A long word shortened for a message. */
export const clip = (text: string): string => (text.length > 40 ? `${text.slice(0, 37)}…` : text);

/** `0.5` as `1/2`. */
function asFraction(decimal: string): string {
  const [whole = '', part = ''] = decimal.split('.');
  if (part.length > 15) return 'p/q';
  let num = BigInt(`${whole}${part}`);
  let den = 10n ** BigInt(part.length);
  for (const prime of [2n, 5n]) {
    while (num % prime === 0n && den % prime === 0n && den > 1n) [num, den] = [num / prime, den / prime];
  }
  return den === 1n ? `${num}` : `${num}/${den}`;
}

function characterHint(character: string): string {
  if (character === '#' || character === '%')
    return 'there are no comments inside an expression; put a # line above the key';
  if (character === '&') return 'alignment marks have no meaning here; remove it';
  if ('½¼¾⅓⅔'.includes(character)) return 'write \\frac{p}{q} or p/q';
  if (character === '.') return 'a sum of terms needs no full stop';
  if (character === '|') return 'there is no absolute value in a Lagrangian';
  return 'an expression has names, integers, + - * / ^ _ and brackets';
}
