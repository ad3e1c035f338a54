/**
 * Terms → text: the Lagrangian as it was understood, plain (which the parser reads back to the same terms), in Unicode for
 * a terminal, or in LaTeX. One style table holds everything in which the three differ.
 */
import { latexName, latexPower } from './latex-symbol.js';
import { isBuiltIn, typedHead } from './tensor-syntax.js';
import type {
  DeclaredTensor,
  IndexSlot,
  LagrangianTerm,
  ScalarSum,
  ScalarTerm,
  TensorFactor,
  TheorySymbol,
} from './theory.js';
import { GREEK } from './tokens.js';

export interface PrintOptions {
  /** Greek letters, minus sign and exponents in Unicode; the default is plain ASCII. */
  readonly unicode?: boolean;
  /** Declared symbols: factors of a term are printed in this order (constants before scales), others after them by name. */
  readonly symbols?: readonly TheorySymbol[];
}

interface Style {
  readonly minus: string;
  readonly symbol: (name: string) => string;
  readonly power: (base: string, exponent: number) => string;
  readonly fraction: (num: bigint, den: bigint) => string;
  /** A tensor without indices, and how a part of it is marked. */
  readonly head: (head: string, part: string | undefined) => string;
  readonly index: (name: string) => string;
  /** How a quotient of monomials is written; without it negative exponents stay. */
  readonly quotient?: (numerator: string, denominator: string) => string;
}

const plainPower = (base: string, n: number): string => (n === 1 ? base : n > 1 ? `${base}^${n}` : `${base}^{${n}}`);

const partMark = (part: string | undefined): string => (part === undefined ? '' : `^{(${part})}`);

const PLAIN: Style = {
  minus: '-',
  symbol: (name) => name,
  power: plainPower,
  fraction: (num, den) => (den === 1n ? `${num}` : `${num}/${den}`),
  head: (head, part) => typedHead(head) + partMark(part),
  index: (name) => name,
};

const GREEK_TEXT = 'αβγδεζηθικλμνξοπρστυφχψωεϑϖϱςφΓΔΘΛΞΠΣΥΦΨΩ';
const GREEK_LETTER: ReadonlyMap<string, string> = new Map(GREEK.map((name, i) => [name, [...GREEK_TEXT][i]!]));
/** The Greek letter of that TeX name, or the text unchanged. */
const greek = (text: string): string => GREEK_LETTER.get(text) ?? text;
/** An integer as a Unicode exponent. */
export const superscript = (n: number): string =>
  [...`${n}`].map((c) => (c === '-' ? '⁻' : '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(c)]!)).join('');

const UNICODE: Style = {
  ...PLAIN,
  minus: '−',
  symbol: (name) => name.split('_').map(greek).join('_'),
  power: (base, n) => (n === 1 ? base : base + superscript(n)),
  head: (head, part) => greek(head) + partMark(part),
  index: (name) => {
    const at = name.indexOf('\\');
    return at === -1 ? name : name.slice(0, at) + greek(name.slice(at + 1));
  },
};

/** A declared name in Unicode: `alpha_1` as α_1. */
export const unicodeName: (name: string) => string = UNICODE.symbol;

function latexStyle(symbols: readonly TheorySymbol[], tensors: readonly DeclaredTensor[]): Style {
  const latex = new Map(symbols.map((s) => [s.name, s.latex]));
  const heads = new Map(tensors.map((t) => [t.name, t.latex]));
  return {
    ...PLAIN,
    symbol: (name) => latex.get(name) ?? latexName(name),
    power: latexPower,
    head: (head, part) => {
      // In mathematics a hyphen would be set as a minus sign.
      const font = part?.includes('-') === true ? 'textrm' : 'mathrm';
      const mark = part === undefined ? '' : `{}^{(\\${font}{${part}})}`;
      const name = isBuiltIn(head) ? typedHead(head) : (heads.get(head) ?? latexName(head));
      return mark + (/[_^']/.test(name) ? `{${name}}` : name);
    },
    fraction: (num, den) => (den === 1n ? `${num}` : `\\tfrac{${num}}{${den}}`),
    quotient: (numerator, denominator) => `\\frac{${numerator}}{${denominator}}`,
  };
}

/** `T^{a}{}_{bc}`: one group of indices for each run at one height; a single letter needs no braces. */
function printTensor({ head, part, slots }: TensorFactor, style: Style): string {
  let text = style.head(head, part);
  for (let i = 0; i < slots.length; ) {
    const { up } = slots[i]!;
    const run: IndexSlot[] = [];
    while (slots[i] !== undefined && slots[i]!.up === up) run.push(slots[i++]!);
    const names = run.map((slot) => style.index(slot.name));
    // A macro must not swallow the letter behind it.
    const joined = names.map((name, n) => (name.includes('\\') && n + 1 < names.length ? `${name} ` : name)).join('');
    const bare = joined.length === 1;
    // TeX takes no second superscript, so the first indices stand apart from a part's name.
    const apart = run[0] !== slots[0] || (up && text.endsWith(')}'));
    text += (apart ? '{}' : '') + (up ? '^' : '_') + (bare ? joined : `{${joined}}`);
  }
  return text;
}

const withoutSign = (n: bigint): bigint => (n < 0n ? -n : n);

function orderedPowers(scalar: ScalarTerm, rank: ReadonlyMap<string, number>): ScalarTerm['powers'] {
  const of = (name: string): number => rank.get(name) ?? rank.size;
  return [...scalar.powers].sort(([a], [b]) => of(a) - of(b) || (a < b ? -1 : 1));
}

/** Coefficient and symbols of a term, without the sign; empty for 1. */
function printScalarPart(scalar: ScalarTerm, style: Style, rank: ReadonlyMap<string, number>): string {
  const num = withoutSign(scalar.coefficient.num);
  const { den } = scalar.coefficient;
  const powers = orderedPowers(scalar, rank);
  const write = (chosen: typeof powers, sign: 1 | -1): string[] =>
    chosen.map(([name, exponent]) => style.power(style.symbol(name), sign * exponent));
  const below = powers.filter(([, exponent]) => exponent < 0);
  if (style.quotient !== undefined && below.length > 0) {
    const above = write(
      powers.filter(([, exponent]) => exponent > 0),
      1,
    );
    if (num !== 1n || above.length === 0) above.unshift(`${num}`);
    return style.quotient(above.join(' '), [...(den === 1n ? [] : [`${den}`]), ...write(below, -1)].join(' '));
  }
  const parts = write(powers, 1);
  return [...(num === 1n && den === 1n ? [] : [style.fraction(num, den)]), ...parts].join(' ');
}

/** One term without its sign. */
function printTerm(term: LagrangianTerm, style: Style, rank: ReadonlyMap<string, number>): string {
  const scalar = printScalarPart(term.scalar, style, rank);
  const parts = scalar === '' ? [] : [scalar];
  for (let i = 0; i < term.factors.length; ) {
    const factor = term.factors[i]!;
    let count = 1;
    const bare = (at: number): boolean => {
      const other = term.factors[at];
      return other !== undefined && other.head === factor.head && other.slots.length === 0;
    };
    if (bare(i)) while (bare(i + count)) count++;
    parts.push(style.power(printTensor(factor, style), count));
    i += count;
  }
  return parts.length === 0 ? '1' : parts.join(' ');
}

/** The terms with their signs, `['1/2 M^2 R', '- b3 T_a T^a']`; the first has no plus sign. */
function printTerms(terms: readonly LagrangianTerm[], style: Style, symbols: readonly TheorySymbol[]): string[] {
  const rank = new Map(symbols.map((s, i) => [s.name, i]));
  return terms.map((term, i) => {
    const body = printTerm(term, style, rank);
    if (term.scalar.coefficient.num < 0n) return `${style.minus}${i === 0 ? '' : ' '}${body}`;
    return i === 0 ? body : `+ ${body}`;
  });
}

/**
 * The Lagrangian as it was understood, on one line. The plain form is read back by the parser to the same terms; the
 * Unicode form is for reading only. An empty sum is `0`.
 */
export function printLagrangian(terms: readonly LagrangianTerm[], options: PrintOptions = {}): string {
  return lagrangianLines(terms, options).join(' ') || '0';
}

/** As `printLagrangian`, one text for each term, so that the caller can break lines. */
export function lagrangianLines(terms: readonly LagrangianTerm[], options: PrintOptions = {}): readonly string[] {
  return printTerms(terms, options.unicode === true ? UNICODE : PLAIN, options.symbols ?? []);
}

/** The Lagrangian in LaTeX with the user's names of symbols and tensors, on one line; break it between the `latexTerms`. */
export function latexLagrangian(
  terms: readonly LagrangianTerm[],
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[] = [],
): string {
  return latexTerms(terms, symbols, tensors).join(' ') || '0';
}

/** As `latexLagrangian`, one text with its sign for each term. */
export function latexTerms(
  terms: readonly LagrangianTerm[],
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[] = [],
): readonly string[] {
  return printTerms(terms, latexStyle(symbols, tensors), symbols);
}

/** A scalar sum in the plain or Unicode form of `printLagrangian`, for instance one side of a relation. */
export function printScalar(sum: ScalarSum, options: PrintOptions = {}): string {
  return printLagrangian(
    sum.map((scalar) => ({ scalar, factors: [] })),
    options,
  );
}

/** A scalar sum in LaTeX. */
export function latexScalar(sum: ScalarSum, symbols: readonly TheorySymbol[]): string {
  return latexLagrangian(
    sum.map((scalar) => ({ scalar, factors: [] })),
    symbols,
  );
}
