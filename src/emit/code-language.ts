/**
 * What every target language provides, and the texts and numbers that all of them share: header, documentation of
 * functions, the sample point of the example programs.
 */
import type { CodeFunction, CodeModule } from './code-description.js';
import { filled } from './code-expression.js';
import { commentText } from './identifiers.js';

export interface Language {
  /** As the command line names it. */
  readonly id: string;
  readonly title: string;
  /** Of its files, with the dot. */
  readonly extension: string;
  /** The module's text, ending in a newline. The same description gives the same text. */
  readonly write: (m: CodeModule) => string;
  /** A program that calls every function at a sample point and prints the values, for a module in the given file. */
  readonly example: (m: CodeModule, file: string) => string;
  /** Why a module in a file of that name could not be used; undefined when it can. */
  readonly fileFault?: (file: string) => string | undefined;
}

/** Columns of a comment. */
const COMMENT_WIDTH = 110;

/** What the module is, for its first comment. Not yet cleaned for any language. */
export const headerLines = (m: CodeModule): string[] => [
  `${m.theory}: reduced equations of a gravity theory with torsion; geometry: ${m.geometry.title}.`,
  '',
  'Written by untwist from the Lagrangian; do not edit. Units c = ħ = 1, so every dimension is a power of mass and a',
  'time derivative adds one. Times are cosmic time t with lapse N: ds² = −N² dt² + … . Numbers are doubles.',
  ...(m.conditions.length > 0
    ? ['', 'Conditions that the couplings must meet and that were not used for rewriting:']
    : []),
  ...m.conditions.map((c) => `    ${c}`),
];

/** Documentation of a function with that of its outputs, for languages in which these have no place of their own. */
export const functionLines = (f: CodeFunction): string[] => [
  ...f.doc,
  ...(f.result.kind === 'number' ? [] : [f.result.about]),
  ...(f.result.kind === 'record' || f.result.kind === 'vector'
    ? f.outputs.map((o) => `    ${o.key}: ${o.meaning}`)
    : []),
  ...(f.result.kind === 'matrix'
    ? [`    rows: ${f.result.rows.join(', ')}`, `    columns: ${f.result.columns.join(', ')}`]
    : []),
];

/** Lines of a comment, cleaned and broken at spaces; a broken line goes on with its own indentation. */
export function commentLines(lines: readonly string[], width = COMMENT_WIDTH): string[] {
  return lines.flatMap((line) => {
    const indent = /^ */.exec(line)![0];
    const clean = commentText(line);
    if (clean === '') return [''];
    return filled(clean.split(' '), width - indent.length).map((l) => `${indent}${l}`);
  });
}

/** A comma list on as many lines as it needs. */
export const commaLines = (items: readonly string[], width = COMMENT_WIDTH): string[] =>
  filled(
    items.map((item, i) => (i < items.length - 1 ? `${item},` : item)),
    width,
  );

/** Values of the sample point: small quarters, exact in any notation and never zero. */
export const sampleCoupling = (index: number): string => (((index % 7) + 2) / 4).toFixed(2);
export const sampleJet = (field: number, order: number): string => (((field + 2 * order) % 5) / 4 + 0.25).toFixed(2);
