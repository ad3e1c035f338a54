/**
 * Matter with spin in the `matter` list of a theory file: { spin: sigma, axial: q }, { spin: S, coupling: "…" } with S
 * declared under tensors, { spin: s, average: weyssenhoff }. Densities of spin are declared here, with mass dimension 3.
 */
import { type Conventions, internalWith, translate } from './conventions.js';
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { reservedMeaning } from './names.js';
import { type Declarations, declare } from './read-symbols.js';
import { parseScalar } from './scalar.js';
import { collectScalars } from './scalar-term.js';
import { freeSlots, readTensorExpression } from './tensor-expression.js';
import type { DeclaredTensor, LagrangianTerm, SpinSource, TheorySymbol } from './theory.js';
import { toMass } from './units.js';
import { asRecord, asText } from './yaml-shape.js';
import type { YamlMap, YamlNode, YamlText } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

const FORMS =
  'write { spin: sigma, axial: q }, { spin: S, coupling: "S_{abc} T^{abc}" } or { spin: s, average: weyssenhoff }';

/** Whether an item of the list is matter with spin. */
export const isSpin = (node: YamlNode): node is YamlMap => node.kind === 'map' && node.entries.has('spin');

/** A source whose coupling has not been read yet. */
interface Declared {
  readonly name: YamlText;
  readonly item: YamlMap;
  readonly kind: SpinSource['kind'];
  readonly value: YamlText;
}

/**
 * First pass: the densities become symbols, so that the rest of the file may use them.
 * Reports `spin-form` and faults of the names.
 */
export function declareSpins(
  node: YamlNode | undefined,
  declarations: Declarations,
  problems: Diagnostic[],
): readonly Declared[] {
  const found: Declared[] = [];
  for (const item of node?.kind === 'list' ? node.items.filter(isSpin) : []) {
    const keys = { required: ['spin'], optional: ['axial', 'coupling', 'average'] };
    const values = asRecord(item, 'matter with spin', keys, problems);
    const name = asText(values.get('spin')!, 'the name of a spin density', problems);
    const given = (['axial', 'coupling', 'average'] as const).filter((key) => values.has(key));
    const [key] = given;
    if (name === undefined) continue;
    if (given.length !== 1 || key === undefined) {
      problems.push(errorAt(item.origin, 'spin-form', 'matter with spin couples in one way', FORMS));
      continue;
    }
    const value = asText(values.get(key)!, key, problems);
    if (value === undefined) continue;
    const kind = key === 'axial' ? 'axial' : key === 'coupling' ? 'tensor' : 'weyssenhoff';
    if (found.some((other) => other.name.text.trim() === name.text.trim())) {
      const message = `the spin density ${name.text.trim()} occurs twice`;
      problems.push(errorAt(name.origin, 'matter-twice', message, 'keep one of them, or give it another name'));
      continue;
    }
    if (kind !== 'tensor') declare(name, 'spin', 3, declarations, problems);
    found.push({ name, item, kind, value });
  }
  return found;
}

/** Second pass: the couplings, in the conventions of the file. Reports faults of the expressions and `spin-form`. */
export function readSpins(
  declared: readonly Declared[],
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[],
  keep: (found: readonly Diagnostic[]) => void,
): readonly SpinSource[] {
  const problems: Diagnostic[] = [];
  const sources = declared.flatMap((source): SpinSource[] => {
    try {
      return read(source, symbols, tensors, problems);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
      return [];
    }
  });
  keep(problems);
  return sources;
}

function read(
  { name: node, kind, value }: Declared,
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[],
  problems: Diagnostic[],
): SpinSource[] {
  const name = node.text.trim();
  const passage = passageOf(value);
  const fault = (origin: YamlText['origin'], message: string, hint: string): SpinSource[] => {
    problems.push(errorAt(origin, 'spin-form', message, hint));
    return [];
  };
  const { origin } = node;
  if (kind === 'weyssenhoff') {
    if (value.text.trim() === 'weyssenhoff') return [{ kind, name, origin }];
    return fault(
      value.origin,
      `${value.text.trim().slice(0, 40)} is no average of spins`,
      'write average: weyssenhoff',
    );
  }
  if (kind === 'axial') {
    const known = new Set(symbols.filter((s) => s.role !== 'spin').map((s) => s.name));
    const explain = (symbol: string): string | undefined => {
      const meaning = reservedMeaning(symbol);
      return meaning === undefined ? undefined : `${symbol} stands for ${meaning}; a coupling is made of constants`;
    };
    const coupling = parseScalar(passage, { isSymbol: (symbol) => known.has(symbol), names: known, explain });
    if (coupling.length === 0) return fault(value.origin, 'the coupling is zero', 'leave the source out');
    return [{ kind, name, coupling, origin }];
  }
  const tensor = tensors.find((t) => t.name === name);
  if (tensor === undefined)
    return fault(origin, `${name} is not declared under tensors`, `add tensors: { ${name}: { indices: 3 } }`);
  const { terms } = readTensorExpression(passage, { symbols, tensors });
  const isLinear = terms.every(({ factors }) => factors.filter((f) => f.head === name).length === 1);
  const others = terms.flatMap((t) => t.factors).find((f) => f.head !== name && tensors.some((t) => t.name === f.head));
  if (terms.length === 0 || !isLinear || terms.some((t) => freeSlots(t).length > 0))
    return fault(value.origin, `the coupling is not linear in ${name}`, `each term contains ${name} once`);
  if (others !== undefined)
    return fault(value.origin, `${others.head} has no components here`, `couple ${name} to torsion and curvature`);
  return [{ kind, name, tensor, coupling: terms, origin }];
}

/** The coupling as terms of a Lagrangian; an average has none of its own. */
export const couplingTerms = (source: SpinSource): readonly LagrangianTerm[] =>
  source.kind === 'tensor'
    ? source.coupling
    : source.kind === 'axial'
      ? source.coupling.map((scalar) => ({ scalar, factors: [] }))
      : [];

/** The source with its coupling in the internal conventions. The axial one is defined in them and only changes its units. */
export function internalSpin(source: SpinSource, conventions: Conventions): SpinSource {
  if (source.kind === 'axial')
    return { ...source, coupling: collectScalars(source.coupling.map((term) => toMass(term, conventions.units))) };
  if (source.kind === 'weyssenhoff') return source;
  return { ...source, coupling: translate(source.coupling, conventions, internalWith(conventions.signature)) };
}
