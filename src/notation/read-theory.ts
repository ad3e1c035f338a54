/**
 * A theory file → Theory: YAML, declarations, Lagrangian, relations, matter. Independent faults are reported together;
 * what only follows from another fault (a name unknown because its declaration is broken) is not.
 */

import { INTERNAL, internalWith, translate } from './conventions.js';
import { type Diagnostic, errorAt, InputError, warningAt } from './diagnostics.js';
import { readLagrangian } from './lagrangian.js';
import { MAX_DIAGNOSTICS, MAX_TEXT } from './limits.js';
import { reservedMeaning } from './names.js';
import { type Passage, plainPassage } from './passage.js';
import { readAssumptions } from './read-assumptions.js';
import { readConstraints } from './read-constraints.js';
import { readConventions } from './read-conventions.js';
import { readMatter } from './read-matter.js';
import { couplingTerms, declareSpins, internalSpin, readSpins } from './read-spins.js';
import {
  type Declarations,
  declareUnits,
  type MatterDeclaration,
  namedSymbols,
  readConstants,
  readScales,
} from './read-symbols.js';
import { readTensors } from './read-tensors.js';
import { parseRelation, relationToMass } from './scalar.js';
import { slugOf } from './slug.js';
import type { DeclaredTensor, LagrangianTerm, MatterComponent, Relation, Theory, TheorySymbol } from './theory.js';
import { PLANCK_MASS, UNIT_SYMBOLS, type Units } from './units.js';
import { asRecord, asText } from './yaml-shape.js';
import { readYaml, type YamlNode } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

const KEYS = {
  required: ['untwist', 'name', 'lagrangian'],
  optional: [
    'conventions',
    'constants',
    'scales',
    'impose',
    'assume',
    'constrain',
    'matter',
    'geometry',
    'symbols',
    'tensors',
  ],
};
const DEFAULT_GEOMETRY = 'flrw';
const MAX_TITLE = 200;

export interface TheoryOptions {
  /** Relations of the command line (`--set`), applied after those of the file. */
  readonly set?: readonly string[];
  /** Assumptions of the command line (`--assume`), beside those of the file. */
  readonly assume?: readonly string[];
}

/**
 * The theory that a file describes.
 * @param file its name, for messages.
 * @throws InputError with every error found, at most MAX_DIAGNOSTICS; codes in docs/errors.md.
 */
export function readTheory(text: string, file: string, options: TheoryOptions = {}): Theory {
  const problems: Diagnostic[] = [];
  const warnings: Diagnostic[] = [];
  const values = asRecord(readYaml(text, file), 'a theory file', KEYS, problems);
  const read = <T>(key: string, reader: (node: YamlNode) => T, otherwise: T): T => {
    const node = values.get(key);
    return node === undefined ? otherwise : reader(node);
  };
  read('untwist', (node) => checkVersion(node, problems), undefined);
  const name = read('name', (node) => readName(node, problems), 'theory');
  const conventions = read('conventions', (node) => readConventions(node, problems), INTERNAL);
  const declarations: Declarations = new Map();
  read('constants', (node) => readConstants(node, declarations, problems), undefined);
  read('scales', (node) => readScales(node, declarations, problems), undefined);
  const { units } = conventions;
  read('conventions', (node) => declareUnits(units, node.origin, declarations, problems), undefined);
  const components = read('matter', (node) => readMatter(node, declarations, problems), []);
  const spinItems = declareSpins(values.get('matter'), declarations, problems);
  const tensors = read('tensors', (node) => readTensors(node, declarations, problems), []);
  refuseUnitDensities(values.get('matter'), components, units, problems);
  const geometryNode = values.get('geometry');
  const geometry = read('geometry', (node) => readGeometryName(node, problems), DEFAULT_GEOMETRY);

  // An unknown name may only follow from a fault among the declarations, or from a misspelt key.
  const declarationsStand = !problems.some((p) => CAN_HIDE_NAMES.has(p.code));
  const keep = (more: readonly Diagnostic[]): void => {
    problems.push(...more.filter((p) => declarationsStand || !NAME_FAULTS.has(p.code)));
  };
  const { symbols: named, matter } = namedSymbols(values.get('symbols'), declarations, components, problems, warnings);
  const typed = read('lagrangian', (node) => readTerms(node, named, tensors, keep, warnings), []);
  const typedRelations = readRelations(values.get('impose'), options.set ?? [], named, matter, keep);
  const assumptions = readAssumptions(values.get('assume'), options.assume ?? [], named, matter, units, keep);
  const typedConstraints = readConstraints(values.get('constrain'), named, tensors, keep);
  const typedSpins = readSpins(spinItems, named, tensors, keep);
  if (problems.length > 0) throw new InputError(limited(inOrder(problems)));
  const everywhere = [...typed, ...typedConstraints.flatMap((c) => c.terms), ...typedSpins.flatMap(couplingTerms)];
  warnings.push(...unusedWarnings(declarations, units, tensors, everywhere, typedRelations));
  const { signature } = conventions;
  const constraints = typedConstraints.map((c) => ({
    ...c,
    terms: translate(c.terms, conventions, internalWith(signature)),
  }));
  const spins = typedSpins.map((s) => internalSpin(s, conventions));
  const lagrangian = translate(typed, conventions, internalWith(signature));
  if (lagrangian.length === 0) {
    const place = values.get('lagrangian')!.origin;
    throw new InputError([
      errorAt(place, 'empty-lagrangian', 'the Lagrangian is zero', `its terms cancel in the units ${units}`),
    ]);
  }
  const relations = typedRelations.map((relation) => relationToMass(relation, units));
  const used = usedNames(
    [...lagrangian, ...constraints.flatMap((c) => c.terms), ...spins.flatMap(couplingTerms)],
    [...relations, ...assumptions],
  );
  const isUnit = ({ name: n }: TheorySymbol): boolean => unitNames(units).includes(n) && !used.has(n);
  return {
    name,
    slug: slugOf(name),
    conventions,
    signature,
    symbols: named.filter((s) => !isUnit(s)),
    unitSymbols: named.filter(isUnit),
    tensors,
    lagrangian,
    relations,
    ...(assumptions.length > 0 ? { assumptions } : {}),
    matter,
    ...(constraints.length > 0 ? { constraints } : {}),
    ...(spins.length > 0 ? { spins } : {}),
    geometry,
    ...(geometryNode ? { geometryOrigin: geometryNode.origin } : {}),
    warnings: inOrder(warnings),
  };
}

const unitNames = (units: Units): readonly string[] => UNIT_SYMBOLS[units].map((symbol) => symbol.name);

function refuseUnitDensities(
  node: YamlNode | undefined,
  matter: readonly MatterDeclaration[],
  units: Units,
  problems: Diagnostic[],
): void {
  const density = matter.find((m) => unitNames(units).includes(m.density))?.density;
  if (node === undefined || density === undefined) return;
  const message = `${density} is a unit and no energy density`;
  problems.push(errorAt(node.origin, 'unit-symbol', message, 'give the vacuum density another name'));
}

function usedNames(
  lagrangian: readonly LagrangianTerm[],
  relations: readonly Pick<Relation, 'left' | 'right'>[],
): ReadonlySet<string> {
  const scalars = [...lagrangian.map((t) => t.scalar), ...relations.flatMap((r) => [...r.left, ...r.right])];
  return new Set(scalars.flatMap(({ powers }) => powers.map(([name]) => name)));
}

const CAN_HIDE_NAMES = new Set(['unknown-key', 'wrong-kind', 'bad-name', 'unknown-matter', 'missing-key', 'bad-slots']);
const NAME_FAULTS = new Set(['unknown-symbol', 'unknown-tensor']);

function checkVersion(node: YamlNode, problems: Diagnostic[]): void {
  const version = asText(node, 'untwist', problems)?.text.trim();
  if (version === undefined || version === '1') return;
  const message = `untwist: ${version.slice(0, 40)} is not a version of the file format`;
  problems.push(errorAt(node.origin, 'bad-version', message, 'write untwist: 1'));
}

function readName(node: YamlNode, problems: Diagnostic[]): string {
  const name = asText(node, 'name', problems)?.text.trim().replace(/\s+/g, ' ') ?? 'theory';
  const fault = (message: string, hint: string): void => {
    problems.push(errorAt(node.origin, 'bad-title', message, hint));
  };
  if (name.length > MAX_TITLE) fault(`the name has more than ${MAX_TITLE} characters`, 'choose a shorter one');
  if (/\p{Cc}/u.test(name)) fault('the name contains a control character', 'remove it');
  return name;
}

function readGeometryName(node: YamlNode, problems: Diagnostic[]): string {
  const name = asText(node, 'geometry', problems)?.text.trim() ?? DEFAULT_GEOMETRY;
  if (!/^[a-z0-9-]{1,64}$/.test(name)) {
    const message = `${JSON.stringify(name.slice(0, 40))} is not the name of a geometry`;
    problems.push(
      errorAt(node.origin, 'bad-geometry', message, 'a name in small letters, digits and hyphens, such as flrw'),
    );
  }
  return name;
}

function readTerms(
  node: YamlNode,
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[],
  keep: (found: readonly Diagnostic[]) => void,
  warnings: Diagnostic[],
): readonly LagrangianTerm[] {
  const problems: Diagnostic[] = [];
  const empty = node.kind === 'text' && node.text.trim() === '';
  const text = empty ? node : asText(node, 'lagrangian', problems);
  keep(problems);
  if (text === undefined) return [];
  try {
    const reading = readLagrangian(passageOf(text), symbols, tensors);
    warnings.push(...reading.warnings);
    return reading.terms;
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    keep(error.diagnostics);
    return [];
  }
}

function readRelations(
  impose: YamlNode | undefined,
  set: readonly string[],
  symbols: readonly TheorySymbol[],
  matter: readonly MatterComponent[],
  keep: (found: readonly Diagnostic[]) => void,
): readonly Relation[] {
  const problems: Diagnostic[] = [];
  const passages: Passage[] = [];
  for (const node of impose?.kind === 'list' ? impose.items : impose === undefined ? [] : [impose]) {
    const text = asText(node, 'a relation', problems);
    if (text !== undefined) passages.push(passageOf(text));
  }
  for (const text of set) {
    if (text.length <= MAX_TEXT) passages.push(plainPassage(text, '--set'));
    else
      problems.push({
        code: 'size-limit',
        severity: 'error',
        message: `a relation has more than ${MAX_TEXT} characters`,
        file: '--set',
      });
  }
  const names = [...symbols.map((s) => s.name), ...matter.map((m) => m.density), 'k'];
  const known = new Set(names);
  const options = {
    isSymbol: (name: string) => known.has(name),
    names,
    explain: (name: string) => {
      const meaning = reservedMeaning(name);
      if (meaning === undefined) return undefined;
      if (name.startsWith('rho_')) return `${name} is not the density of a matter component of this theory`;
      return `${name} stands for ${meaning}; a relation is between constants`;
    },
  };
  const relations: Relation[] = [];
  for (const passage of passages) {
    try {
      relations.push(parseRelation(passage, options));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
    }
  }
  keep(problems);
  return relations;
}

/** Constants, scales and tensors that occur neither in the Lagrangian nor in a relation. */
function unusedWarnings(
  declarations: Declarations,
  units: Units,
  tensors: readonly DeclaredTensor[],
  lagrangian: readonly LagrangianTerm[],
  relations: readonly Relation[],
): readonly Diagnostic[] {
  const used = usedNames(lagrangian, relations);
  // M defines the Friedmann form whether the Lagrangian contains it or not.
  const needless = new Set([PLANCK_MASS, ...unitNames(units)]);
  const unused = [...declarations.values()].filter(
    ({ name, role }) => !used.has(name) && role !== 'vacuum' && role !== 'spin' && !needless.has(name),
  );
  const heads = new Set(lagrangian.flatMap((t) => t.factors.map((f) => f.head)));
  const idle = tensors.flatMap(({ name, origin }) =>
    origin === undefined || heads.has(name) ? [] : [{ name, origin, role: 'tensor' }],
  );
  return [...unused, ...idle].map(({ name, role, origin }) =>
    warningAt(origin, 'unused-symbol', `the ${role} ${name} is declared but not used`, 'remove it, or use it'),
  );
}

/** Those of the file by place, then those of --set. */
function inOrder(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const late = (d: Diagnostic): number => (d.file?.startsWith('--') ? 1 : 0);
  return [...diagnostics].sort((a, b) => late(a) - late(b) || (late(a) === 0 ? (a.start ?? 0) - (b.start ?? 0) : 0));
}

function limited(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const rest = diagnostics.length - MAX_DIAGNOSTICS;
  if (rest <= 0) return diagnostics;
  const { file } = diagnostics[0]!;
  const message = `${rest} more errors are not shown`;
  const more: Diagnostic = { code: 'more-errors', severity: 'error', message, ...(file === undefined ? {} : { file }) };
  return [...diagnostics.slice(0, MAX_DIAGNOSTICS), more];
}
