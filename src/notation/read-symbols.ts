/**
 * The declarations of a theory file: constants, scales, and the LaTeX of their names. Faulty declarations are reported and
 * still entered, so that their use in the Lagrangian is not reported a second time.
 */
import { type Diagnostic, errorAt, warningAt } from './diagnostics.js';
import { DIMENSION_HINT, parseDimension } from './dimension.js';
import { latexFault, latexName } from './latex-symbol.js';
import { MAX_SYMBOLS } from './limits.js';
import { nameFault } from './names.js';
import { nearest } from './suggest.js';
import type { MatterComponent, Origin, SymbolRole, TheorySymbol } from './theory.js';
import { PLANCK_MASS, UNIT_SYMBOLS, type UnitSymbol, type Units } from './units.js';
import { asList, asMap, asText } from './yaml-shape.js';
import type { YamlMap, YamlNode, YamlText } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

/** A symbol with the place of its declaration. */
export interface Declaration {
  readonly name: string;
  readonly role: SymbolRole;
  readonly dimension: number;
  readonly origin: Origin;
}

/** A matter component before its density has a LaTeX name. */
export type MatterDeclaration = Omit<MatterComponent, 'latex'>;

/** Declarations in the order of the file, by name. */
export type Declarations = Map<string, Declaration>;

/** Adds one declaration; reports `bad-name`, `reserved-name`, `declared-twice`. */
export function declare(
  key: YamlText,
  role: SymbolRole,
  dimension: number,
  declarations: Declarations,
  problems: Diagnostic[],
): void {
  const name = key.text.trim();
  const fault = nameFault(name);
  if (fault !== undefined) problems.push(errorAt(key.origin, fault.code, fault.message, fault.hint));
  const before = declarations.get(name);
  if (before !== undefined) {
    const message = `${name} is declared twice`;
    problems.push(errorAt(key.origin, 'declared-twice', message, `it is a ${before.role} already; keep one of them`));
    return;
  }
  if (declarations.size === MAX_SYMBOLS) {
    const message = `more than ${MAX_SYMBOLS} constants, scales and tensors`;
    problems.push(errorAt(key.origin, 'symbols-limit', message, 'declare only what the Lagrangian uses'));
  }
  declarations.set(name, { name, role, dimension, origin: key.origin });
}

/** The power of mass; reports `bad-dimension`. */
export function readDimension(node: YamlNode, name: string, problems: Diagnostic[]): number {
  const text = asText(node, `the dimension of ${name}`, problems);
  const dimension = text === undefined ? 0 : parseDimension(text.text);
  if (dimension === undefined) {
    const message = `${JSON.stringify(text?.text.trim())} is not a dimension`;
    problems.push(errorAt(node.origin, 'bad-dimension', message, DIMENSION_HINT));
  }
  return dimension ?? 0;
}

/** `constants: [c0, { g: mass^2 }]`. */
export function readConstants(node: YamlNode, declarations: Declarations, problems: Diagnostic[]): void {
  for (const item of asList(node, 'constants', problems)?.items ?? []) {
    if (item.kind === 'map') {
      for (const { key, value } of item.entries.values()) {
        declare(key, 'constant', readDimension(value, key.text, problems), declarations, problems);
      }
    } else {
      const text = asText(item, 'a constant', problems);
      if (text !== undefined) declare(text, 'constant', 0, declarations, problems);
    }
  }
}

/** `scales: { M: mass }`. */
export function readScales(node: YamlNode, declarations: Declarations, problems: Diagnostic[]): void {
  for (const { key, value } of asMap(node, 'scales', problems)?.entries.values() ?? []) {
    declare(key, 'scale', readDimension(value, key.text, problems), declarations, problems);
  }
}

/**
 * Declares the symbols that the units bring with them, and M into which they are translated, unless they are declared
 * already. Reports `unit-symbol` for a declaration that means something else.
 */
export function declareUnits(units: Units, origin: Origin, declarations: Declarations, problems: Diagnostic[]): void {
  const symbols: readonly UnitSymbol[] = UNIT_SYMBOLS[units];
  if (symbols.length === 0) return;
  const mass = { name: PLANCK_MASS, role: 'scale', dimension: 1 } as const;
  for (const { name, role, dimension } of [mass, ...symbols]) {
    const before = declarations.get(name);
    if (before === undefined) declarations.set(name, { name, role, dimension, origin });
    else if (before.dimension !== dimension) {
      const message = `${name} has another meaning in the units ${units}, with the dimension mass^${dimension}`;
      problems.push(errorAt(before.origin, 'unit-symbol', message, 'leave the declaration out, or rename the symbol'));
    }
  }
}

/** What a theory prints by a name of its own. */
export interface NamedSymbols {
  readonly symbols: readonly TheorySymbol[];
  readonly matter: readonly MatterComponent[];
}

/**
 * Symbols and densities with their LaTeX, derived from the name unless `symbols` (may be undefined) gives it. Reports
 * `bad-latex` and `unknown-symbol`; warns with `same-latex` when two would look alike.
 */
export function namedSymbols(
  node: YamlNode | undefined,
  declarations: Declarations,
  matter: readonly MatterDeclaration[],
  problems: Diagnostic[],
  warnings: Diagnostic[],
): NamedSymbols {
  const names = new Set([...declarations.keys(), ...matter.map((m) => m.density)]);
  const map = node === undefined ? undefined : asMap(node, 'symbols', problems);
  const given = givenNames(map, names, problems);
  const latexOf = (name: string): string => given.get(name) ?? latexName(name);
  const seen = new Map<string, string>();
  for (const name of names) {
    const latex = latexOf(name);
    const twin = seen.get(latex);
    seen.set(latex, name);
    const place = map?.entries.get(name)?.value.origin ?? declarations.get(name)?.origin ?? map?.origin;
    if (twin === undefined || place === undefined) continue;
    const message = `${twin} and ${name} are both printed as ${latex}`;
    warnings.push(warningAt(place, 'same-latex', message, 'give one of them another name under symbols'));
  }
  return {
    symbols: [...declarations.values()].map(({ name, role, dimension }) => ({
      name,
      role,
      dimension,
      latex: latexOf(name),
    })),
    matter: matter.map((component) => ({ ...component, latex: latexOf(component.density) })),
  };
}

/** The LaTeX that the user gives, by name. */
function givenNames(
  map: YamlMap | undefined,
  names: ReadonlySet<string>,
  problems: Diagnostic[],
): ReadonlyMap<string, string> {
  const given = new Map<string, string>();
  for (const [name, { key, value }] of map?.entries ?? []) {
    if (!names.has(name)) {
      const near = nearest(name, names);
      const hint =
        near === undefined ? 'only declared constants, scales and densities can be renamed' : `did you mean ${near}?`;
      problems.push(errorAt(key.origin, 'unknown-symbol', `symbols renames ${name}, which is not declared`, hint));
      continue;
    }
    const text = asText(value, `the LaTeX of ${name}`, problems);
    if (text === undefined) continue;
    const fault = latexFault(passageOf(text));
    if (fault !== undefined) problems.push(fault);
    else given.set(name, text.text.trim());
  }
  return given;
}
