/**
 * What every target language provides, and the texts and numbers that all of them share: header, documentation of
 * functions, the sample point of the example programs.
 */
import type { CodeFunction, CodeInput, CodeModule } from './code-description.js';
import { filled } from './code-expression.js';
import { commentText, identifierText, makeNameTable, type Naming } from './identifiers.js';

export interface Language {
  /** As the command line names it. */
  readonly id: string;
  readonly title: string;
  /** Of its files, with the dot. */
  readonly extension: string;
  /** The module's text, ending in a newline. The same description gives the same text. */
  readonly write: (m: CodeModule) => string;
  /** A program that calls every function at a point and prints the values, for a module in the given file beside it. */
  readonly example: (m: CodeModule, file: string, sample?: Sample) => string;
  /** Why a module in a file of that name could not be used; undefined when it can. */
  readonly fileFault?: (file: string) => string | undefined;
}

/** Columns of a comment. */
const COMMENT_WIDTH = 110;

const ABOUT =
  'Written by untwist from the Lagrangian; do not edit. Units c = ħ = 1, so every dimension is a power of mass and a time ' +
  'derivative adds one. Times are cosmic time t with lapse N: ds² = −N² dt² + … . Numbers are doubles.';

/** What the module is, for its first comment; one line for each paragraph, not yet cleaned for any language. */
export const headerLines = (m: CodeModule): string[] => [
  `${m.theory}: reduced equations of a gravity theory with torsion; geometry: ${m.geometry.title}.`,
  '',
  ABOUT,
  ...(m.conditions.length > 0
    ? ['', 'Conditions that the couplings must meet and that were not used for rewriting:']
    : []),
  ...m.conditions.map((c) => `    ${c}`),
];

export const COUPLINGS = 'Everything that is constant in time, and densities: what the theory leaves to be chosen.';

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

/**
 * A point at which functions are called, as decimal numbers with a point or an exponent: by place among the parameters, and
 * by place among the fields (or the entries of a list) and order of the derivative.
 */
export interface Sample {
  readonly coupling: (index: number) => string;
  readonly jet: (field: number, order: number) => string;
}

/** Small quarters, exact in any notation and never zero. */
export const QUARTERS: Sample = {
  coupling: (index) => (((index % 7) + 2) / 4).toFixed(2),
  jet: (field, order) => (((field + 2 * order) % 5) / 4 + 0.25).toFixed(2),
};

export const EXAMPLE_TEXT =
  'Calls every function of the module at a sample point. The numbers have no meaning: put in your own.';

/** An identifier for each name, in order; the same names give the same identifiers. */
export function identifiersFor(
  names: readonly string[],
  naming: Naming,
  taken: Iterable<string> = [],
): Map<string, string> {
  const table = makeNameTable(taken, naming);
  return new Map(names.map((name) => [name, table.claim(identifierText(name))]));
}

/** Members of the record of couplings, by parameter. */
export const couplingMembers = (m: CodeModule, naming: Naming): Map<string, string> =>
  identifiersFor(
    m.parameters.map((p) => p.name),
    naming,
  );

/** Members of a record of jets, by field; places of a list, by symbol. */
export const inputMembers = (input: CodeInput, naming: Naming): Map<string, string> =>
  identifiersFor(input.kind === 'jets' ? input.fields.map((f) => f.name) : input.entries.map((e) => e.symbol), naming);

/** The module's name as an identifier in small letters, short enough to be put in front of others. */
export const moduleName = (m: CodeModule): string => identifierText(m.slug).slice(0, 30).replace(/_$/, '');

/** `stands for B1` where an identifier is not the name itself. */
export const standsFor = (identifier: string, name: string): string =>
  identifier === name ? '' : `; stands for ${name}`;
