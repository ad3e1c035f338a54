/**
 * Running text with mathematics in it, and plain text made safe for LaTeX. Invariant: what `escapeText` returns is ASCII,
 * contains no command but accents and signs, and reads like the text it was given.
 */

/** Plain text, or a formula to be set in the line. */
export type Inline = string | { readonly math: string };
/** One paragraph. */
export type Prose = readonly Inline[];

export const math = (tex: string): Inline => ({ math: tex });

/** A paragraph written as a template: strings in it are plain text, formulas are `math(…)`, lists are spliced in. */
export function prose(texts: TemplateStringsArray, ...values: readonly (Inline | Prose)[]): Prose {
  const out: Inline[] = [];
  texts.forEach((text, i) => {
    if (text !== '') out.push(text.replace(/\s+/g, ' '));
    const value = values[i];
    if (value === undefined) return;
    if (typeof value === 'string' || 'math' in value) out.push(value);
    else out.push(...value);
  });
  return out;
}

/** `x, y and z`. */
export function enumerated(items: readonly (Inline | Prose)[]): Prose {
  return items.flatMap((item, i): Prose => {
    const own = typeof item === 'string' || 'math' in item ? [item] : item;
    return i === 0 ? own : [i === items.length - 1 ? ' and ' : ', ', ...own];
  });
}

const SPECIAL: ReadonlyMap<string, string> = new Map([
  ['\\', '\\textbackslash{}'],
  ['{', '\\{'],
  ['}', '\\}'],
  ['%', '\\%'],
  ['#', '\\#'],
  ['&', '\\&'],
  ['$', '\\$'],
  ['_', '\\_'],
  ['^', '\\textasciicircum{}'],
  ['~', '\\textasciitilde{}'],
  ['<', '$<$'],
  ['>', '$>$'],
  ['|', '$|$'],
  ['"', "''"],
  ['`', '\\textasciigrave{}'],
]);

/** Signs beyond ASCII that LaTeX writes with a command or a ligature. */
const SIGNS: ReadonlyMap<string, string> = new Map(
  Object.entries({
    '\u00a0': '~',
    '\u00ad': '\\-',
    '–': '--',
    '—': '---',
    '‘': '`',
    '’': "'",
    '“': '``',
    '”': "''",
    '„': ',,',
    '…': '\\dots{}',
    '§': '\\S{}',
    '©': '\\copyright{}',
    '£': '\\pounds{}',
    '†': '\\dag{}',
    ß: '\\ss{}',
    æ: '\\ae{}',
    Æ: '\\AE{}',
    œ: '\\oe{}',
    Œ: '\\OE{}',
    ø: '\\o{}',
    Ø: '\\O{}',
    ł: '\\l{}',
    Ł: '\\L{}',
    ı: '\\i{}',
    '−': '$-$',
    '·': '$\\cdot$',
    '×': '$\\times$',
    '±': '$\\pm$',
    '≠': '$\\neq$',
    '≤': '$\\leq$',
    '≥': '$\\geq$',
    '≈': '$\\approx$',
    '∝': '$\\propto$',
    '→': '$\\to$',
    '∞': '$\\infty$',
    '∂': '$\\partial$',
    '∇': '$\\nabla$',
    '√': '$\\surd$',
    '½': '$\\tfrac{1}{2}$',
    '°': '$^{\\circ}$',
  }),
);
const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
/** In the order of the code points from alpha. */
const GREEK =
  'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi o pi rho varsigma sigma tau upsilon phi chi psi omega'.split(
    ' ',
  );
const GREEK_CAPITALS = new Set('Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'.split(' '));
/** Combining marks. */
const ACCENTS: ReadonlyMap<string, string> = new Map([
  ['\u0300', '`'],
  ['\u0301', "'"],
  ['\u0302', '^'],
  ['\u0303', '~'],
  ['\u0304', '='],
  ['\u0306', 'u'],
  ['\u0307', '.'],
  ['\u0308', '"'],
  ['\u030a', 'r'],
  ['\u030b', 'H'],
  ['\u030c', 'v'],
  ['\u0323', 'd'],
  ['\u0327', 'c'],
]);

function greekTex(c: string): string | undefined {
  const code = c.codePointAt(0)!;
  if (code >= 0x3b1 && code <= 0x3c9) return GREEK[code - 0x3b1];
  if (code < 0x391 || code > 0x3a9) return undefined;
  const small = GREEK[code - 0x391]!;
  const capital = small[0]!.toUpperCase() + small.slice(1);
  return GREEK_CAPITALS.has(capital) ? capital : undefined;
}

/** Words longer than this get places where they may be broken. */
const LONG_WORD = 24;
const BREAK_EVERY = 12;

/**
 * Plain text for LaTeX. Letters with accents become accent commands; what LaTeX cannot set with its standard fonts
 * becomes its code point in square brackets.
 */
export const escapeText = (text: string): string =>
  text
    .normalize('NFC')
    .split(/[^\S\u00a0]+/)
    .map(escapeWord)
    .filter((word) => word !== '')
    .join(' ');

function escapeWord(word: string): string {
  // A negated sign is one of the table, not a letter with an accent.
  const points = [...word].flatMap((c) => (SIGNS.has(c) ? [c] : [...c.normalize('NFD')]));
  const pieces: string[] = [];
  for (let i = 0; i < points.length; i++) {
    let piece = escapeSign(points[i]!);
    while (points[i + 1] !== undefined && ACCENTS.has(points[i + 1]!)) {
      const body = piece === 'i' || piece === 'j' ? `\\${piece}` : piece;
      piece = `\\${ACCENTS.get(points[++i]!)}{${body}}`;
    }
    if (piece !== '') pieces.push(piece);
  }
  if (pieces.length <= LONG_WORD) return pieces.join('');
  return pieces.map((piece, i) => (i > 0 && i % BREAK_EVERY === 0 ? `\\allowbreak{}${piece}` : piece)).join('');
}

function escapeSign(c: string): string {
  const known = SPECIAL.get(c) ?? SIGNS.get(c);
  if (known !== undefined) return known;
  if (c >= '!' && c <= '~') return c;
  const power = SUPERSCRIPTS.indexOf(c);
  if (power >= 0) return `$^{${power}}$`;
  const greek = greekTex(c);
  if (greek !== undefined) return greek === 'o' ? 'o' : `$\\${greek}$`;
  const code = c.codePointAt(0)!;
  return code < 32 || (code >= 0x7f && code < 0xa0) || (code >= 0x200b && code <= 0x200f)
    ? ''
    : `[U+${code.toString(16).toUpperCase().padStart(4, '0')}]`;
}

/** `ρ_T`, `E_N` and the letters N, H, k on their own, in text that this program wrote, are formulas. */
const FORMULA = /([A-Za-z\u03b1-\u03c9])_([A-Za-z0-9])(?![A-Za-z0-9])|(?<![A-Za-z0-9_])[NHk](?![A-Za-z0-9_])/g;

/** Text of this program (never of a user) with its symbols as formulas. */
export function withFormulas(text: string): Prose {
  return spliced(text, FORMULA, ([whole, base, script]) => {
    if (base === undefined) return whole;
    const letter = greekTex(base);
    return `${letter === undefined ? base : `\\${letter}`}_{${script}}`;
  });
}

/** Text with the given words, such as `phi`, as the formulas that they name. */
export function withNames(text: string, names: ReadonlyMap<string, string>): Prose {
  return spliced(text, /[A-Za-z][A-Za-z0-9_]+/g, ([word]) => names.get(word));
}

function spliced(text: string, pattern: RegExp, tex: (match: RegExpMatchArray) => string | undefined): Prose {
  const out: Inline[] = [];
  let end = 0;
  for (const match of text.matchAll(pattern)) {
    const formula = tex(match);
    if (formula === undefined) continue;
    if (match.index > end) out.push(text.slice(end, match.index));
    out.push(math(formula));
    end = match.index + match[0].length;
  }
  if (end < text.length) out.push(text.slice(end));
  return out;
}

/** A paragraph in LaTeX. */
export const proseTex = (paragraph: Prose): string =>
  paragraph
    .map((piece) => {
      if (typeof piece !== 'string') return `$${piece.math}$`;
      const text = escapeText(piece);
      return `${/^\s/.test(piece) ? ' ' : ''}${text}${/\s$/.test(piece) && text !== '' ? ' ' : ''}`;
    })
    .join('');

/** The text as ASCII on one line, for a comment of a TeX file. */
export const commentText = (text: string): string =>
  [...text.normalize('NFKD').replace(/\s+/g, ' ')]
    .filter((c) => c >= ' ' && c <= '~')
    .join('')
    .trim();
