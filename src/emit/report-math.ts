/**
 * Formulas of the report: TeX to markup by KaTeX, and the style sheet with the faces that this markup uses, embedded.
 * Short displays become KaTeX's own layout; long ones MathML, which is a fifteenth of the size and is laid out by the
 * browser, in the same faces.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import katex from 'katex';
import { escapeHtml } from './report-text.js';

/** Expansions of macros that KaTeX allows; its default stops inside long equations. */
const MAX_EXPAND = 1e6;
/** Characters of the TeX of a formula that is still laid out by KaTeX, which makes about seventy times as many of it. */
const LONGEST_TEX = 2000;
/** Characters of all markup in KaTeX's own layout, and of all of it: what keeps the page quick to open. */
const LARGEST_LAYOUT = 1_500_000;
const LARGEST_TOTAL = 4_000_000;
const LEFT_OUT = '<p class="left-out">Not shown, to keep this page quick to open; the source is complete.</p>';

export interface Typesetter {
  /** A formula within a line. */
  inline(tex: string): string;
  /** A formula on lines of its own. */
  display(tex: string): string;
}

/**
 * Markup of TeX; a formula that KaTeX does not know is shown as its source. Very many displays are more than a browser
 * should be given: beyond a limit they are left out with a note.
 */
export function makeTypesetter(): Typesetter {
  const known = new Map<string, string>();
  let total = 0;
  const set = (tex: string, displayMode: boolean): string => {
    if (displayMode && total > LARGEST_TOTAL) return LEFT_OUT;
    const output = tex.length > LONGEST_TEX || total > LARGEST_LAYOUT ? 'mathml' : 'htmlAndMathml';
    try {
      const markup = withoutSource(
        katex.renderToString(tex, { displayMode, output, maxExpand: MAX_EXPAND, throwOnError: true, strict: false }),
      );
      total += markup.length;
      return markup;
    } catch {
      return `<code class="source-only">${escapeHtml(tex)}</code>`;
    }
  };
  const cached = (tex: string, displayMode: boolean): string => {
    const key = `${displayMode} ${tex}`;
    const markup = known.get(key) ?? set(tex, displayMode);
    known.set(key, markup);
    return markup;
  };
  return { inline: (tex) => cached(tex, false), display: (tex) => cached(tex, true) };
}

/** The annotation repeats the TeX, which the page holds anyway. */
const withoutSource = (markup: string): string =>
  markup.replace(/<annotation encoding="[^"]*">[^<]*<\/annotation>/g, '');

const FACE = /@font-face\{([^}]*)\}/g;

interface Face {
  readonly family: string;
  readonly style: string;
  readonly weight: string;
  readonly file: string;
}

function readFace(body: string): Face {
  const property = (name: string) => new RegExp(`${name}:([^;]*)`).exec(body)?.[1]?.replaceAll('"', '').trim() ?? '';
  const file = /url\(([^)]*\.woff2)\)/.exec(body)?.[1] ?? '';
  return { family: property('font-family'), style: property('font-style'), weight: property('font-weight'), file };
}

/** Faces that MathML and the page itself are set in, besides those that classes ask for. */
const ALWAYS = ['KaTeX_Main italic 400', 'KaTeX_Main normal 400', 'KaTeX_Math italic 400', 'KaTeX_Size1 normal 400'];

/** Faces of MathML's variants of letters, which browsers leave to style sheets. */
const VARIANTS: ReadonlyMap<string, string> = new Map([
  ['bold', 'KaTeX_Main normal 700'],
  ['bold-italic', 'KaTeX_Math italic 700'],
  ['double-struck', 'KaTeX_AMS normal 400'],
  ['fraktur', 'KaTeX_Fraktur normal 400'],
  ['italic', 'KaTeX_Main italic 400'],
  ['monospace', 'KaTeX_Typewriter normal 400'],
  ['sans-serif', 'KaTeX_SansSerif normal 400'],
  ['script', 'KaTeX_Caligraphic normal 400'],
]);

/** Classes in the markup. */
const classesOf = (markup: string): Set<string> =>
  new Set([...markup.matchAll(/class="([^"]*)"/g)].flatMap(([, list]) => list!.split(' ')));

/**
 * KaTeX's style sheet for some markup, faces as data URIs: those of rules whose classes all occur.
 * @throws Error when the installed KaTeX lacks a file that it names.
 */
export function katexStyle(markup: string): string {
  const require = createRequire(import.meta.url);
  const path = require.resolve('katex/dist/katex.min.css');
  const sheet = readFileSync(path, 'utf8');
  const rules = sheet.replace(FACE, '');
  const present = classesOf(markup);
  const wanted = new Set(ALWAYS);
  for (const [, selectors, body] of rules.matchAll(/([^{}]+)\{([^{}]*)\}/g)) {
    const family = /font-family:(KaTeX_\w+)/.exec(body!)?.[1];
    const style = /font-style:(\w+)/.exec(body!)?.[1];
    const weight = /font-weight:(\w+)/.exec(body!)?.[1];
    if (family === undefined && style === undefined && weight === undefined) continue;
    const used = selectors!
      .split(',')
      .some((s) => [...s.matchAll(/\.([\w-]+)/g)].every(([, name]) => present.has(name!)));
    // A rule that changes only the slant or the weight changes it in whatever family is around it.
    const families = family === undefined ? ['KaTeX_Main', 'KaTeX_SansSerif'] : [family];
    if (used) for (const f of families) wanted.add(`${f} ${style ?? 'normal'} ${weight ?? '400'}`);
  }
  const variants = new Set([...markup.matchAll(/ mathvariant="([^"]*)"/g)].map(([, name]) => name!));
  let variantRules = '';
  for (const [name, face] of VARIANTS) {
    if (!variants.has(name)) continue;
    wanted.add(face);
    const [family, style, weight] = face.split(' ');
    variantRules += `math [mathvariant="${name}"]{font:${style} ${weight} 1em ${family}}`;
  }
  const faces = [...sheet.matchAll(FACE)].map(([, body]) => readFace(body!));
  const embedded = faces
    .filter(({ family, style, weight }) => wanted.has(`${family} ${style} ${weight}`))
    .map(({ family, style, weight, file }) => {
      const data = readFileSync(join(dirname(path), file)).toString('base64');
      const source = `url(data:font/woff2;base64,${data}) format("woff2")`;
      return `@font-face{font-display:block;font-family:${family};font-style:${style};font-weight:${weight};src:${source}}`;
    });
  return embedded.join('') + rules + variantRules;
}
