/**
 * Errors as data: a code, a place, what was expected and a hint. `renderDiagnostic` turns one into text for a terminal;
 * nothing in this folder prints. Imports no other file of the project.
 */
import picocolors from 'picocolors';

export interface Diagnostic {
  /** Stable kebab-case code, documented in docs/errors.md. */
  readonly code: string;
  readonly severity: 'error' | 'warning';
  /** One sentence without a full stop. */
  readonly message: string;
  /** What to do about it. */
  readonly hint?: string;
  readonly file?: string;
  /** The text in which start and end (UTF-16 offsets) lie; with it the rendering shows line, column and a caret. */
  readonly source?: string;
  readonly start?: number;
  readonly end?: number;
}

/** Where a diagnostic points: the fields of `Diagnostic` that say so, all present. */
export interface Place {
  readonly file: string;
  readonly source: string;
  readonly start: number;
  readonly end: number;
}

/** Thrown for input at fault; carries every diagnostic that was found. The command line turns it into exit code 1. */
export class InputError extends Error {
  readonly diagnostics: readonly Diagnostic[];
  constructor(diagnostics: readonly Diagnostic[]) {
    super(diagnostics.map((d) => d.message).join('; '));
    this.name = 'InputError';
    this.diagnostics = diagnostics;
  }
}

/** An error at a place. */
export function errorAt(place: Place, code: string, message: string, hint?: string): Diagnostic {
  const { file, source, start, end } = place;
  return { code, severity: 'error', message, ...(hint === undefined ? {} : { hint }), file, source, start, end };
}

/** A warning at a place. */
export function warningAt(place: Place, code: string, message: string, hint?: string): Diagnostic {
  return { ...errorAt(place, code, message, hint), severity: 'warning' };
}

/** Line and column, both from 1; columns count characters (code points), a tab being one. */
export function lineAndColumn(source: string, offset: number): { line: number; column: number } {
  const at = Math.min(Math.max(offset, 0), source.length);
  let line = 1;
  let begin = 0;
  for (let i = source.indexOf('\n'); i !== -1 && i < at; i = source.indexOf('\n', i + 1)) {
    line++;
    begin = i + 1;
  }
  return { line, column: [...source.slice(begin, at)].length + 1 };
}

/** Characters kept of a long source line on each side of the caret. */
const WINDOW = 90;
const WIDE =
  /[\u1100-\u115f\u2e80-\u303e\u3041-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\uffe0-\uffe6\u{1f300}-\u{1faff}\u{20000}-\u{3fffd}]/u;
const NO_WIDTH = /[\p{Mn}\p{Me}\u200b-\u200f\u2060\ufeff]/u;

/** Columns that a terminal uses for the text, tabs kept as tabs so that the caret line stays aligned. */
const padding = (text: string): string =>
  [...text].map((c) => (c === '\t' ? '\t' : NO_WIDTH.test(c) ? '' : WIDE.test(c) ? '  ' : ' ')).join('');

/** Control and direction-changing characters could rewrite the terminal; they are shown as a replacement mark. */
const harmless = (text: string): string =>
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
  text.replace(/[\u0000-\u0008\u000a-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/g, '\ufffd');

function excerpt(source: string, start: number, end: number): { line: string; caret: string } {
  const from = source.lastIndexOf('\n', start - 1) + 1;
  const newline = source.indexOf('\n', start);
  let to = newline === -1 ? source.length : newline;
  if (source[to - 1] === '\r' && to > start) to--;
  const left = Math.max(from, start - WINDOW);
  const right = Math.min(to, Math.max(start + WINDOW, Math.min(end, start + WINDOW)));
  const before = (left > from ? '…' : '') + source.slice(left, start);
  const marked = source.slice(start, Math.min(Math.max(end, start + 1), right));
  const after = source.slice(start + marked.length, right) + (right < to ? '…' : '');
  const width = Math.max(1, padding(harmless(marked.trimEnd())).length);
  return {
    line: harmless(before + marked + after).trimEnd(),
    caret: padding(harmless(before)) + '^'.repeat(width),
  };
}

/**
 * The diagnostic as text without a final newline:
 *
 *     theory.yaml:7:12: error: unknown symbol b4
 *         + b4 T_a T^a
 *           ^^
 *     hint: did you mean b1?
 *
 * Line and column count from 1. Without a source only the file is named; `color` asks for terminal colours.
 */
export function renderDiagnostic(d: Diagnostic, options: { readonly color?: boolean } = {}): string {
  const paint = picocolors.createColors(options.color ?? false);
  const lines: string[] = [];
  const label = d.severity === 'error' ? paint.red(paint.bold('error:')) : paint.yellow(paint.bold('warning:'));
  const file = d.file === undefined ? '' : harmless(d.file);
  if (d.source === undefined || d.start === undefined) {
    lines.push(`${file === '' ? '' : `${paint.bold(`${file}:`)} `}${label} ${harmless(d.message)}`);
  } else {
    const { line, column } = lineAndColumn(d.source, d.start);
    lines.push(`${paint.bold(`${file}:${line}:${column}:`)} ${label} ${harmless(d.message)}`);
    const shown = excerpt(d.source, Math.min(d.start, d.source.length), d.end ?? d.start + 1);
    if (shown.line.trim() !== '') lines.push(`    ${shown.line}`, `    ${paint.red(shown.caret)}`);
  }
  if (d.hint !== undefined) lines.push(`${paint.cyan('hint:')} ${harmless(d.hint)}`);
  return lines.join('\n');
}
