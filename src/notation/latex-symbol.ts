/**
 * LaTeX of symbols: derived from a name, or checked when the user gives it. What passes the check is accepted by KaTeX and
 * by a plain article, cannot break out of its formula, and sets one symbol with scripts and accents.
 */
import type { Diagnostic } from './diagnostics.js';
import { errorAt } from './diagnostics.js';
import type { Passage } from './passage.js';
import { GREEK, isGreek } from './tokens.js';

/** Longest LaTeX name. */
const MAX_LATEX = 100;
const MAX_GROUPS = 8;
/** Macros with one braced argument. */
const WRAPPERS: ReadonlySet<string> = new Set([
  ...['mathrm', 'mathcal', 'mathsf', 'mathbf', 'mathit', 'mathtt'],
  ...['hat', 'tilde', 'bar', 'dot', 'ddot', 'vec', 'check', 'breve', 'acute', 'grave', 'overline', 'underline'],
  ...['widehat', 'widetilde'],
]);
const SIGNS: ReadonlySet<string> = new Set(['prime', 'ell', 'hbar', 'star', 'ast', 'dagger', 'parallel', 'perp', 'pm']);

/** The first fault of a LaTeX name; undefined when it may be used. */
export function latexFault(passage: Passage): Diagnostic | undefined {
  const { text } = passage;
  const fail = (start: number, end: number, message: string, hint: string): Diagnostic =>
    errorAt(passage.locate(start, end), 'bad-latex', message, hint);
  if (!/[A-Za-z0-9]/.test(text)) return fail(0, text.length, 'the LaTeX name has no letter', "for example '\\alpha_0'");
  if (text.length > MAX_LATEX) {
    return fail(0, text.length, `the LaTeX name has more than ${MAX_LATEX} characters`, 'choose a shorter one');
  }
  const reader = new LatexReader(text);
  const fault = reader.read();
  return fault === undefined ? undefined : fail(fault.start, fault.end, fault.message, fault.hint);
}

interface LatexFault {
  readonly start: number;
  readonly end: number;
  readonly message: string;
  readonly hint: string;
}

class LatexReader {
  private readonly text: string;
  private at = 0;
  constructor(text: string) {
    this.text = text;
  }

  read(): LatexFault | undefined {
    const fault = this.group(0);
    if (fault !== undefined || this.at >= this.text.length) return fault;
    return this.fault(this.at, this.at + 1, '} closes no brace', 'remove it');
  }

  private fault(start: number, end: number, message: string, hint: string): LatexFault {
    return { start, end, message, hint };
  }

  private skipSpaces(): void {
    while (this.text[this.at] === ' ') this.at++;
  }

  /** Atoms with their scripts, up to a closing brace or the end. */
  private group(depth: number): LatexFault | undefined {
    this.skipSpaces();
    while (this.at < this.text.length && this.text[this.at] !== '}') {
      const fault = this.atom(depth) ?? this.scripts(depth);
      if (fault !== undefined) return fault;
      this.skipSpaces();
    }
    return undefined;
  }

  private scripts(depth: number): LatexFault | undefined {
    const seen = new Set<string>();
    for (;;) {
      this.skipSpaces();
      const mark = this.text[this.at] ?? '';
      if (mark !== '_' && mark !== '^' && mark !== "'") return undefined;
      const kind = mark === '_' ? 'subscript' : 'superscript';
      const start = this.at;
      while (mark === "'" && this.text[this.at + 1] === "'") this.at++;
      this.at++;
      if (seen.has(kind))
        return this.fault(
          start,
          this.at,
          `a second ${kind}`,
          `put both into one: ${mark === '_' ? 'c_{a b}' : 'c^{a b}'}`,
        );
      seen.add(kind);
      if (mark === "'") continue;
      this.skipSpaces();
      if (this.at >= this.text.length) return this.fault(start, this.at, `${mark} lacks its argument`, 'add one');
      const fault = this.atom(depth, true);
      if (fault !== undefined) return fault;
    }
  }

  /** One letter, macro or group; as the argument of a script a macro with an argument of its own needs braces. */
  private atom(depth: number, inScript = false): LatexFault | undefined {
    const start = this.at;
    const c = this.text[this.at] ?? '';
    if (/[A-Za-z0-9,]/.test(c)) {
      this.at++;
      return undefined;
    }
    if (c === '{') return this.braced(depth);
    if (c === '\\') {
      const name = /^[A-Za-z]+/.exec(this.text.slice(this.at + 1))?.[0] ?? '';
      this.at += 1 + name.length;
      if (isLatexGreek(name) || SIGNS.has(name)) return undefined;
      const hint =
        'allowed are Greek letters and \\mathrm, \\mathcal, \\mathsf, \\mathbf, \\hat, \\tilde, \\bar and their like';
      if (!WRAPPERS.has(name))
        return this.fault(start, Math.max(this.at, start + 2), `\\${name} is not allowed in a LaTeX name`, hint);
      if (inScript) return this.fault(start, this.at, `\\${name} as a script needs braces around it`, `{\\${name}{x}}`);
      this.skipSpaces();
      if (/[A-Za-z0-9]/.test(this.text[this.at] ?? '')) {
        this.at++;
        return undefined;
      }
      if (this.text[this.at] !== '{')
        return this.fault(start, this.at, `\\${name} needs an argument in braces`, `\\${name}{x}`);
      return this.braced(depth);
    }
    return this.fault(
      start,
      start + 1,
      `${JSON.stringify(c)} is not allowed in a LaTeX name`,
      'letters, digits, _ ^ { } and a few macros are',
    );
  }

  private braced(depth: number): LatexFault | undefined {
    const start = this.at;
    if (depth >= MAX_GROUPS)
      return this.fault(start, start + 1, `braces are nested more than ${MAX_GROUPS} deep`, 'simplify the name');
    this.at++;
    const fault = this.group(depth + 1);
    if (fault !== undefined) return fault;
    if (this.text[this.at] !== '}') return this.fault(start, start + 1, '{ is never closed', 'add the closing }');
    this.at++;
    return undefined;
  }
}

/** LaTeX has no \omicron: it is a Latin o. */
const isLatexGreek = (name: string): boolean => isGreek(name) && name !== 'omicron';
const LATEX_GREEK: ReadonlySet<string> = new Set(GREEK.filter(isLatexGreek));

/** A piece of a name: a Greek letter, one letter, digits, or a word in upright type. */
function latexPiece(piece: string): string {
  if (LATEX_GREEK.has(piece)) return `\\${piece}`;
  if (/^(?:[A-Za-z]|[0-9]+)$/.test(piece)) return piece;
  return `\\mathrm{${piece}}`;
}

/**
 * LaTeX derived from a name: c0 → c_{0}, alpha_1 → \alpha_{1}, Lambda → \Lambda, rho_dust → \rho_{\mathrm{dust}},
 * mass → \mathrm{mass}.
 */
export function latexName(name: string): string {
  const [head = '', ...rest] = name.split('_').filter((piece) => piece !== '');
  const digits = /^([A-Za-z]+)([0-9]+)$/.exec(head);
  const split = digits !== null && (digits[1]!.length === 1 || LATEX_GREEK.has(digits[1]!));
  const base = latexPiece(split ? digits[1]! : head);
  const subscripts = [...(split ? [digits[2]!] : []), ...rest.map(latexPiece)];
  return subscripts.length === 0 ? base : `${base}_{${subscripts.join(',')}}`;
}

/** base^exponent; a base that has a superscript of its own gets brackets, since TeX refuses two. */
export function latexPower(base: string, exponent: number): string {
  if (exponent === 1) return base;
  return `${/[\^']/.test(base) ? `(${base})` : base}^{${exponent}}`;
}
