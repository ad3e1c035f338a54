/**
 * Coupling bases as data: a list of invariants, each with the name of its coupling, and where the literature uses it.
 * Invariant: every entry is a scalar without symbols, coupling names differ, entries are linearly independent.
 */
import { remember } from '../algebra/memo.js';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { latexFault, latexName } from '../notation/latex-symbol.js';
import { nameFault } from '../notation/names.js';
import { nearest } from '../notation/suggest.js';
import { parseTensorExpression } from '../notation/tensor-expression.js';
import type { LagrangianTerm, Origin } from '../notation/theory.js';
import { asMap, asRecord, asText } from '../notation/yaml-shape.js';
import { readYaml, type YamlNode } from '../notation/yaml-source.js';
import { passageOf } from '../notation/yaml-text.js';
import { type KindTable, kindTable } from './kinds.js';
import { combinationOf, ringOfNames, sumOf } from './lagrangian-sum.js';
import { writeOutParts } from './parts.js';
import { relationsOfSums, type ScalarCombination } from './relations.js';
import { bundledTexts } from './rule-library.js';

export interface BasisEntry {
  readonly coupling: string;
  readonly latex: string;
  /** As written in the file. */
  readonly terms: readonly LagrangianTerm[];
  /** Parts written out, in canonical form. */
  readonly sum: ScalarCombination;
  readonly origin: Origin;
}

export interface CouplingBasis {
  /** Name of its file without the ending. */
  readonly name: string;
  readonly title: string;
  readonly why: string;
  readonly source: string;
  readonly entries: readonly BasisEntry[];
}

const KEYS = { required: ['untwist-basis', 'title', 'why', 'source', 'couplings'], optional: ['symbols'] };

/** @throws InputError with every fault found; `basis-dependent` when an entry is a combination of earlier ones. */
export function readBasis(text: string, file: string): CouplingBasis {
  const basis = parseBasis(text, file);
  refuseDependent(basis.entries, kindTable());
  return basis;
}

/** As `readBasis`, without the search for linear relations. */
function parseBasis(text: string, file: string): CouplingBasis {
  const problems: Diagnostic[] = [];
  const values = asRecord(readYaml(text, file), 'a coupling basis', KEYS, problems);
  const textOf = (key: string): string => {
    const node = values.get(key);
    return (node && asText(node, key, problems)?.text.trim()) ?? '';
  };
  const version = values.get('untwist-basis');
  if (version && textOf('untwist-basis') !== '1')
    problems.push(errorAt(version.origin, 'bad-version', 'this is not a version of bases', 'write untwist-basis: 1'));
  const [title, why, source] = ['title', 'why', 'source'].map(textOf) as [string, string, string];
  const latex = readLatex(values.get('symbols'), problems);
  const kinds = kindTable();
  const entries: BasisEntry[] = [];
  const couplings = values.get('couplings');
  for (const { key, value } of (couplings && asMap(couplings, 'couplings', problems)?.entries.values()) ?? []) {
    const coupling = key.text.trim();
    const fault = nameFault(coupling);
    if (fault) problems.push(errorAt(key.origin, fault.code, fault.message, fault.hint));
    const typed = asText(value, coupling, problems);
    if (!typed) continue;
    try {
      const terms = parseTensorExpression(passageOf(typed));
      const sum = combinationOf(writeOutParts(sumOf(ringOfNames([]), terms, kinds), kinds).value);
      if (sum.length === 0) {
        const message = `the invariant of ${coupling} vanishes`;
        problems.push(errorAt(value.origin, 'basis-dependent', message, 'remove it'));
      }
      entries.push({ coupling, latex: latex.get(coupling) ?? latexName(coupling), terms, sum, origin: value.origin });
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
    }
  }
  if (problems.length > 0) throw new InputError(problems);
  const name = file.replace(/^.*[\\/]/, '').replace(/\.ya?ml$/, '');
  return { name, title, why, source, entries };
}

function readLatex(node: YamlNode | undefined, problems: Diagnostic[]): ReadonlyMap<string, string> {
  const found = new Map<string, string>();
  for (const { key, value } of (node && asMap(node, 'symbols', problems)?.entries.values()) ?? []) {
    const text = asText(value, `the LaTeX of ${key.text}`, problems);
    const fault = text && latexFault(passageOf(text));
    if (fault) problems.push(fault);
    else if (text) found.set(key.text.trim(), text.text.trim());
  }
  return found;
}

function refuseDependent(entries: readonly BasisEntry[], kinds: KindTable): void {
  const problems: Diagnostic[] = [];
  const { dependent } = relationsOfSums(
    entries.map((e) => e.sum),
    kinds,
  );
  for (const [i, along] of dependent) {
    const names = entries.filter((_, n) => along[n] !== undefined && along[n]!.num !== 0n).map((e) => e.coupling);
    const message = `the invariant of ${entries[i]!.coupling} is a combination of earlier ones`;
    problems.push(errorAt(entries[i]!.origin, 'basis-dependent', message, `remove it, or one of ${names.join(', ')}`));
  }
  if (problems.length > 0) throw new InputError(problems);
}

const bundled = new Map<string, CouplingBasis>();
const basisName = (file: string): string => file.replace(/^.*\//, '').replace(/\.yaml$/, '');

/** Names of the bundled bases, in the order of the manifest. */
export const basisNames = (): string[] => bundledTexts('bases').map(({ file }) => basisName(file));

/** A bundled basis; that its entries are independent is a matter of the tests. @throws InputError `unknown-basis`. */
export function bundledBasis(name: string): CouplingBasis {
  const found = bundledTexts('bases').find(({ file }) => basisName(file) === name);
  if (found) return remember(bundled, name, () => parseBasis(found.text, found.file));
  const names = basisNames();
  const near = nearest(name, names);
  const hint = near === undefined ? `there are ${names.join(', ')}; or give a file` : `did you mean ${near}?`;
  const message = `there is no coupling basis ${name.slice(0, 40)}`;
  throw new InputError([{ code: 'unknown-basis', severity: 'error', message, hint }]);
}
