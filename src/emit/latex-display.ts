/**
 * Numbered displays with labels, grouped into passages with the text that explains them: what equations.tex,
 * derivation.tex and the report are printed from.
 */
import type { Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import { latexTerms } from '../notation/print.js';
import type { LagrangianTerm, TheorySymbol } from '../notation/theory.js';
import { type DisplaySum, rateField, type Viewer, type ViewOptions, viewerOf } from './display.js';
import { displayBody, type Equation, equationDisplays, type Lines, numberedDisplay } from './latex-lines.js';
import { overTex, sumTex, type TexTerm } from './latex-math.js';
import type { Prose } from './latex-text.js';

export interface LatexOptions {
  /** Variables such as `u,v` as the geometry offers them; its own when left out. */
  readonly variables?: string;
}

/** One display. */
export interface LatexDisplay {
  /** `eq:harbour-light:friedmann`. */
  readonly label: string;
  /** Body for KaTeX in display mode: no number, no label. */
  readonly tex: string;
  /** The numbered and labelled environment for a manuscript; needs amsmath only. */
  readonly copyTex: string;
}

/** One step: a heading, what it says, and its displays. */
export interface Passage {
  /** Last part of the labels: `friedmann`. */
  readonly id: string;
  readonly title: string;
  /** Before the displays. */
  readonly text: readonly Prose[];
  readonly displays: readonly LatexDisplay[];
  /** After the displays. */
  readonly remarks: readonly Prose[];
}

export interface Section {
  readonly id: string;
  readonly title: string;
  readonly passages: readonly Passage[];
}

/** What the sections are written with: the viewer, symbols as typeset, labels of one theory. */
export interface Writer {
  readonly derivation: Derivation;
  readonly viewer: Viewer;
  /** The viewer in the geometry's own variables. */
  readonly plain: Viewer;
  /** Declared symbols with the LaTeX that fits into formulas. */
  readonly symbols: readonly TheorySymbol[];
  /** LaTeX of a coupling, a parameter or a field of the geometry. */
  latex(name: string): string;
  /** LaTeX of the logarithmic rate of a scale factor. */
  rate(scale: string): string;
  passage(
    id: string,
    title: string,
    parts: Partial<Omit<Passage, 'id' | 'title' | 'displays'>>,
    lines?: readonly Lines[],
  ): Passage;
}

export function writerOf(derivation: Derivation, options: LatexOptions = {}): Writer {
  const plain = viewerOf(derivation);
  const viewer = options.variables === undefined ? plain : viewerOf(derivation, options.variables);
  const { slug } = derivation.theory;
  const latex = (name: string): string =>
    viewer.symbols.get(name)?.latex ?? derivation.fields.find((f) => f.name === name)?.latex ?? name;
  return {
    derivation,
    viewer,
    plain,
    latex,
    rate: (scale) => viewer.symbols.get(rateField(scale))!.latex,
    symbols: derivation.theory.symbols.map((s) => ({ ...s, latex: latex(s.name) })),
    passage: (id, title, { text = [], remarks = [] }, lines = []) => ({
      id,
      title,
      text,
      remarks,
      displays: lines.map((display, i) => {
        const label = `eq:${slug}:${id.replace(/[^A-Za-z0-9-]/g, '-')}${i === 0 ? '' : `:${i + 1}`}`;
        return { label, tex: displayBody(display), copyTex: numberedDisplay(display, label) };
      }),
    }),
  };
}

/** `name`/a^n = Σ terms, in as many displays as needed. */
export function equationOf(
  viewer: Viewer,
  name: string,
  value: Poly,
  options: ViewOptions & { readonly right?: string; readonly over?: readonly string[] } = {},
): Lines[] {
  return sumDisplays(name, viewer.sum(value, options), options.right, options.over);
}

/** As `equationOf` for a sum that has been grouped already. */
export function sumDisplays(name: string, sum: DisplaySum, right = '', over: readonly string[] = []): Lines[] {
  return equationDisplays({
    left: overTex(name, sum.divided, over),
    terms: sumTex(sum),
    right,
    part: (n) => `${withoutScripts(name)}^{[${n}]}`,
  });
}

/** A name that may take a superscript. */
const withoutScripts = (name: string): string => (name.includes('^') ? `\\bigl(${name}\\bigr)` : name);

/** Rows `left = polynomial`, one for each entry. */
export const polyRows = (viewer: Viewer, rows: Iterable<readonly [left: string, value: Poly]>): Equation[] =>
  [...rows].map(([left, value]) => ({
    left,
    terms: sumTex(viewer.sum(value, { divide: false })),
    part: (n) => `${withoutScripts(left)}^{[${n}]}`,
  }));

/** Rows `polynomial = 0`. */
export const conditionRows = (viewer: Viewer, values: readonly Poly[]): Equation[] =>
  values.map((value) => ({ left: '', terms: sumTex(viewer.sum(value, { divide: false })), right: '= 0' }));

/** A row whose right side is TeX already; its pieces are factors between which it may be broken. */
export const fixedRow = (left: string, ...right: readonly string[]): Equation => ({
  left,
  terms: [{ negative: false, head: right, inner: [], tail: [] }],
});

/** Terms that are TeX already, with their signs. */
export const typedTerms = (texts: readonly string[]): TexTerm[] =>
  texts.map((text) => {
    const body = text.replace(/^[-+] ?/, '');
    return { negative: text.startsWith('-'), head: factorsOf(body), inner: [], tail: [] };
  });

/** Splits a product at the spaces between its factors, outside braces and not in front of an argument or script. */
function factorsOf(tex: string): string[] {
  const factors: string[] = [];
  let depth = 0;
  let start = 0;
  for (let i = 0; i < tex.length; i++) {
    const c = tex[i]!;
    if (c === '{') depth++;
    else if (c === '}') depth--;
    else if (c === ' ' && depth === 0 && !/[{_^'\s]/.test(tex[i + 1] ?? ' ')) {
      factors.push(tex.slice(start, i));
      start = i + 1;
    }
  }
  factors.push(tex.slice(start));
  return factors;
}

/** A product of tensors as the user wrote it. */
export function tensorsTex(factors: LagrangianTerm['factors']): string {
  const scalar = { coefficient: { num: 1n, den: 1n }, powers: [] };
  return latexTerms([{ scalar, factors }], []).join('');
}
