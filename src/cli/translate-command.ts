/** `untwist translate`: the couplings of a theory in a basis of invariants, and the theory rewritten in it. */
import { existsSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import Table from 'cli-table3';
import { infix } from '../algebra/infix.js';
import { equals, isZero } from '../algebra/poly.js';
import { type Diagnostic, InputError } from '../notation/diagnostics.js';
import { latexLagrangian, latexScalar, printLagrangian, printScalar } from '../notation/print.js';
import { readTheory } from '../notation/read-theory.js';
import { collectScalars, multiplyScalarTerms } from '../notation/scalar-term.js';
import type { LagrangianTerm } from '../notation/theory.js';
import { asMap } from '../notation/yaml-shape.js';
import { readYaml } from '../notation/yaml-source.js';
import { bundledBasis, type CouplingBasis, readBasis } from '../tensor/basis-file.js';
import { lagrangianOf, scalarsOf, tensorTerms } from '../tensor/lagrangian-sum.js';
import { printSum, termLines } from '../tensor/print-sum.js';
import { equalSums } from '../tensor/rewrite.js';
import { densitiesFor } from '../tensor/simplify.js';
import { type Translation, translate } from '../tensor/translate.js';
import { EXIT, type Io } from './io.js';
import { type LagrangianInput, lagrangianInput, userFault } from './lagrangian-input.js';
import { refuseExisting, writeFolder } from './output-folder.js';
import { readInput } from './read-input.js';

export interface TranslateOptions {
  readonly to: string;
  readonly moduloBoundary?: boolean;
  readonly write?: string;
  readonly latex?: boolean;
  readonly json?: boolean;
  readonly force?: boolean;
}

/** @returns the exit code. @throws InputError. */
export async function translateCommand(path: string, options: TranslateOptions, io: Io): Promise<number> {
  const { write } = options;
  if (write !== undefined && write !== '-') refuseExisting(dirname(write), [basename(write)], options.force ?? false);
  const input = await lagrangianInput(path, [], io);
  const basis = await basisOf(options.to, io);
  const given = new Set([...input.facts, ...(options.moduloBoundary ? ['modulo-boundary'] : [])]);
  const inBasis = (terms: LagrangianInput['terms']): Translation =>
    userFault(input.file, () => translate(input.ring, terms, basis, input.kinds, densitiesFor(terms, given)));
  const translation = inBasis(input.terms);
  // The relations of the file stay in it, so the text is rewritten without them.
  const typed = inBasis(input.typed);
  const text = termsIn(typed).length === 0 ? undefined : rewritten(input, typed);
  if (text !== undefined) {
    const again = inBasis(tensorTerms(input.ring, readTheory(text, input.file).lagrangian));
    const sameCouplings = typed.couplings.every(({ value }, i) => equals(value, again.couplings[i]!.value));
    if (!sameCouplings || !equalSums(typed.outside, again.outside, input.kinds))
      throw new Error('check failed: the theory rewritten is another theory');
  } else if (write !== undefined) throw new InputError([vanishing(input.file)]);
  if (options.json) io.stdout(`${JSON.stringify({ ...json(input, translation), theory: text ?? null }, null, 2)}\n`);
  else if (options.latex) io.stdout(latexArray(input, translation));
  else if (write !== '-') io.stdout(table(input, translation, io.color));
  if (text === undefined || write === undefined) return EXIT.done;
  if (write !== '-') {
    writeFolder(dirname(write), new Map([[basename(write), text]]));
    io.stderr(`Written: ${write}\n`);
  } else if (!options.json) io.stdout(text);
  return EXIT.done;
}

const vanishing = (file: string): Diagnostic => ({
  code: 'empty-lagrangian',
  severity: 'error',
  message: 'the Lagrangian vanishes in this basis',
  hint: 'its terms cancel, or are total derivatives',
  file,
});

/** A bundled basis by its name, or a file of the user. */
async function basisOf(name: string, io: Io): Promise<CouplingBasis> {
  if (!/[./\\]/.test(name) && !existsSync(name)) return bundledBasis(name);
  const { file, text } = await readInput(name, io);
  return userFault(file, () => readBasis(text, file));
}

/** Σ value · invariant and what is outside, as terms. */
const termsIn = ({ couplings, outside }: Translation): LagrangianTerm[] => [
  ...couplings.flatMap(({ entry, value }) =>
    scalarsOf(value).flatMap((scalar) =>
      entry.terms.map((t) => ({ ...t, scalar: multiplyScalarTerms(scalar, t.scalar) })),
    ),
  ),
  ...lagrangianOf(outside),
];

/** The theory file with its Lagrangian replaced; everything else stays as typed. */
function rewritten({ text, file, style }: LagrangianInput, translation: Translation): string {
  const lines = termLines(termsIn(translation), style('plain'));
  const root = asMap(readYaml(text, file), 'a theory file', [])!;
  const { key, value: old } = root.entries.get('lagrangian')!;
  const { start, end } = old.origin;
  const indent = ' '.repeat(key.origin.start - text.lastIndexOf('\n', key.origin.start - 1) + 1);
  // Inside { } a text cannot be a block.
  const inFlow = text[root.origin.start] === '{';
  const value = inFlow ? `'${lines.join(' ')}'` : `|\n${lines.map((line) => `${indent}${line}\n`).join('')}`;
  const rest = text.slice(end);
  return `${text.slice(0, start)}${value}${inFlow ? rest : rest.replace(/^[^\S\n]*\n/, '')}`;
}

interface Row {
  readonly coupling: string;
  readonly value: string;
  readonly invariant: string;
}

const rowsOf = ({ couplings }: Translation, row: (c: Translation['couplings'][number]) => Row): Row[] =>
  couplings.filter(({ value }) => !isZero(value)).map(row);

function table(input: LagrangianInput, translation: Translation, color: boolean): string {
  const style = input.style('unicode');
  const grid = new Table({
    head: ['coupling', 'value', 'of the invariant'],
    style: color ? {} : { head: [], border: [] },
  });
  for (const { coupling, value, invariant } of rowsOf(translation, ({ entry, value }) => ({
    coupling: entry.coupling,
    value: printScalar(collectScalars(scalarsOf(value)), { unicode: true, symbols: input.theory.symbols }),
    invariant: printLagrangian(entry.terms, { unicode: true }),
  })))
    grid.push([coupling, value, invariant]);
  const { basis, couplings, outside } = translation;
  const zero = couplings.filter(({ value }) => isZero(value)).map(({ entry }) => entry.coupling);
  return [
    `${input.theory.name} in the basis ${basis.name}: ${basis.title}`,
    `${basis.why} (${basis.source})`,
    grid.toString(),
    ...(zero.length > 0 ? [`zero: ${zero.join(', ')}`] : []),
    ...(outside.length > 0 ? [`not in the basis: ${printSum(outside, style)}`] : []),
    '',
  ].join('\n');
}

function latexArray(input: LagrangianInput, translation: Translation): string {
  const rows = rowsOf(translation, ({ entry, value }) => ({
    coupling: entry.latex,
    value: latexScalar(collectScalars(scalarsOf(value)), input.theory.symbols),
    invariant: latexLagrangian(entry.terms, []),
  }));
  const lines = rows.map((r) => `  ${r.coupling} &= ${r.value} & ${r.invariant} \\\\`);
  const { outside } = translation;
  const rest = outside.length > 0 ? [`% not in the basis: ${printSum(outside, input.style('latex'))}`] : [];
  return ['\\begin{array}{rll}', ...lines, '\\end{array}', ...rest, ''].join('\n');
}

const json = (input: LagrangianInput, { basis, couplings, outside }: Translation) => ({
  basis: basis.name,
  title: basis.title,
  source: basis.source,
  couplings: couplings.map(({ entry, value }) => ({
    coupling: entry.coupling,
    value: infix(value),
    invariant: printLagrangian(entry.terms),
  })),
  outside: printSum(outside, input.style('plain')),
});
