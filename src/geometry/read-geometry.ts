/**
 * Strict loader of a geometry file: every key is known, every symbol declared, every expression parsed into a ring.
 * What the data mean is left to build.ts.
 */
import { readFileSync } from 'node:fs';
import type { Poly } from '../algebra/poly.js';
import { constantsOf, jetsOf, makeRing, type Ring } from '../algebra/ring.js';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { parseDimension } from '../notation/dimension.js';
import { parseScalar } from '../notation/scalar.js';
import { polyOfScalar } from '../notation/scalar-poly.js';
import type { ScalarSum } from '../notation/theory.js';
import { asList, asMap, asRecord, asText } from '../notation/yaml-shape.js';
import { readYaml, type YamlNode } from '../notation/yaml-source.js';
import { passageOf } from '../notation/yaml-text.js';
import type { GeometrySymbol, IsotropicRoles } from './geometry.js';
import type { Isotropy } from './invariant-components.js';
import { readIsotropy } from './read-isotropy.js';

/** Highest order of a field's time derivatives that any expression of a derivation needs. */
export const MAX_JET_ORDER = 3;

/** A one-form or a two-form of the file: basis positions and coefficient. */
export interface FormTerm {
  readonly basis: readonly number[];
  readonly value: Poly;
}

export interface GeometryFile {
  readonly title: string;
  readonly source: string;
  readonly why: string;
  readonly parameters: readonly GeometrySymbol[];
  readonly fields: readonly GeometrySymbol[];
  readonly ring: Ring;
  /** d of the basis forms that are not closed, by position. */
  readonly structure: ReadonlyMap<number, readonly FormTerm[]>;
  /** Coefficient of each basis form in the coframe. */
  readonly coframe: readonly Poly[];
  /** Row, column and one-form. */
  readonly connection: readonly {
    readonly row: number;
    readonly column: number;
    readonly terms: readonly FormTerm[];
  }[];
  readonly components: readonly { readonly name: string; readonly latex: string; readonly value: Poly }[];
  readonly lapse: string;
  readonly rates: ReadonlyMap<string, string>;
  readonly isotropic: IsotropicRoles | undefined;
  readonly isotropy: Isotropy;
  readonly variables: readonly {
    readonly key: string;
    readonly fields: readonly GeometrySymbol[];
    readonly images: ReadonlyMap<string, Poly>;
    readonly ring: Ring;
  }[];
}

const KEYS = {
  required: [
    'untwist-geometry',
    'title',
    'source',
    'why',
    'parameters',
    'radicals',
    'fields',
    'cobasis',
    'structure',
    'coframe',
    'connection',
    'components',
    'lapse',
    'rates',
    'variables',
    'variable-fields',
  ],
  optional: ['isotropic', 'isotropy'],
};

/** Name of a radical in the ring; no user symbol can be spelled so. */
const radicalName = (square: string): string => `sqrt(${square})`;

/**
 * Reads a geometry file's text.
 * @throws InputError with the place of every fault found.
 */
export function readGeometryText(text: string, file: string): GeometryFile {
  const problems: Diagnostic[] = [];
  const root = readYaml(text, file);
  const values = asRecord(root, 'a geometry file', KEYS, problems);
  const stop = (): never => {
    throw new InputError(problems);
  };
  if (problems.length > 0) stop();
  const at = (key: string): YamlNode => values.get(key)!;
  const textOf = (node: YamlNode, what: string): string => asText(node, what, problems)?.text.trim() ?? '';
  const entriesOf = (node: YamlNode, what: string): [string, YamlNode][] =>
    [...(asMap(node, what, problems)?.entries ?? [])].map(([name, { value }]) => [name, value]);
  const fault = (node: YamlNode, code: string, message: string, hint: string): void => {
    problems.push(errorAt(node.origin, code, message, hint));
  };

  if (textOf(at('untwist-geometry'), 'untwist-geometry') !== '1')
    fault(at('untwist-geometry'), 'geometry-version', 'this program reads version 1 of geometry files', 'write 1');
  const symbols = (key: string): GeometrySymbol[] =>
    entriesOf(at(key), key).map(([name, node]) => {
      const record = asRecord(node, name, { required: ['dimension', 'latex', 'meaning'] }, problems);
      const read = (k: string): string => (record.has(k) ? textOf(record.get(k)!, k) : '');
      const dimension = parseDimension(read('dimension'));
      if (dimension === undefined) fault(node, 'dimension', `${name} has no valid dimension`, 'write mass^2 or 1');
      return { name, latex: read('latex'), meaning: read('meaning'), dimension: dimension ?? 0 };
    });
  const parameters = symbols('parameters');
  const fields = symbols('fields');
  const variableFields = symbols('variable-fields');
  const radicals = new Map(entriesOf(at('radicals'), 'radicals').map(([name, node]) => [name, textOf(node, name)]));
  for (const [name, square] of radicals)
    if (!parameters.some((p) => p.name === square))
      fault(
        at('radicals'),
        'geometry-radical',
        `${name} is the root of ${square}, which is no parameter`,
        'declare it',
      );
  if (problems.length > 0) stop();

  const parameterNames = parameters.map((p) => p.name);
  const ringOver = (names: readonly string[], order: number): Ring =>
    makeRing([
      ...names.flatMap((name) => jetsOf(name, order)),
      ...constantsOf(parameterNames),
      ...[...radicals.values()].map((square) => ({ kind: 'radical', name: radicalName(square), square }) as const),
    ]);
  const rename = (name: string): string => {
    const square = radicals.get(name);
    return square === undefined ? name : radicalName(square);
  };
  const ring = ringOver(
    fields.map((f) => f.name),
    MAX_JET_ORDER,
  );
  const expression = (node: YamlNode, what: string, into: Ring, names: readonly string[]): Poly | undefined => {
    const scalar = asText(node, what, problems);
    if (!scalar) return undefined;
    const known = [...names, ...parameterNames, ...radicals.keys()];
    let parsed: ScalarSum;
    try {
      parsed = parseScalar(passageOf(scalar), {
        isSymbol: (name) => known.includes(name),
        names: known,
        allowJets: true,
      });
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
      return undefined;
    }
    const missing = parsed.flatMap((t) => t.powers).find(([name]) => !into.position.has(rename(name)));
    if (missing) {
      fault(node, 'bad-jet', `${missing[0]} is a derivative beyond what ${what} may contain`, 'lower its order');
      return undefined;
    }
    return polyOfScalar(into, parsed, rename);
  };
  const fieldNames = fields.map((f) => f.name);
  const inFields = (node: YamlNode, what: string): Poly | undefined => expression(node, what, ring, fieldNames);

  const cobasis = (asList(at('cobasis'), 'cobasis', problems)?.items ?? []).map((n) => textOf(n, 'cobasis'));
  if (cobasis.length !== 4 || new Set(cobasis).size !== 4)
    fault(at('cobasis'), 'geometry-cobasis', 'a cobasis has four different one-forms', 'dt first, then three of space');
  const basisOf = (words: string, node: YamlNode): number[] =>
    words.split(/\s+/).map((word) => {
      const i = cobasis.indexOf(word);
      if (i < 0)
        fault(node, 'geometry-basis', `${word} is no one-form of the cobasis`, `they are ${cobasis.join(', ')}`);
      return i;
    });
  const form = (node: YamlNode, what: string, degree: number): FormTerm[] =>
    entriesOf(node, what).flatMap(([words, value]) => {
      const basis = basisOf(words, value);
      if (basis.length !== degree || new Set(basis).size !== degree)
        fault(
          value,
          'geometry-form',
          `${words} is no ${degree}-form`,
          'write different one-forms, as many as its degree',
        );
      const poly = inFields(value, what);
      return poly ? [{ basis, value: poly }] : [];
    });
  const structure = new Map(
    entriesOf(at('structure'), 'structure').map(([name, node]) => {
      const basis = basisOf(name, node);
      if (basis.length !== 1) fault(node, 'geometry-form', `${name} is no one-form`, 'give d of one basis form');
      return [basis[0]!, form(node, `d ${name}`, 2)];
    }),
  );
  const coframeNode = asRecord(at('coframe'), 'coframe', { required: cobasis }, problems);
  const coframe = cobasis.flatMap((name) => {
    const node = coframeNode.get(name);
    const value = node && inFields(node, `coframe ${name}`);
    if (node && value && value.size !== 1)
      fault(node, 'geometry-coframe', 'a coframe entry is one term', 'this program takes diagonal coframes');
    return value ? [value] : [];
  });
  const connection = entriesOf(at('connection'), 'connection').map(([place, node]) => {
    const match = /^([0-3]) ([0-3])$/.exec(place);
    if (!match || match[1] === match[2])
      fault(node, 'geometry-connection', `"${place}" is no pair of different frame indices`, 'write "1 0"');
    return { row: Number(match?.[1]), column: Number(match?.[2]), terms: form(node, `connection ${place}`, 1) };
  });
  const components = entriesOf(at('components'), 'components').flatMap(([name, node]) => {
    const record = asRecord(node, name, { required: ['value', 'latex'] }, problems);
    const valueNode = record.get('value');
    const value = valueNode && inFields(valueNode, name);
    return value ? [{ name, latex: textOf(record.get('latex') ?? node, name), value }] : [];
  });
  const lapse = textOf(at('lapse'), 'lapse');
  const rates = new Map(entriesOf(at('rates'), 'rates').map(([name, node]) => [name, textOf(node, name)]));
  for (const name of [lapse, ...rates.keys()])
    if (!fieldNames.includes(name))
      fault(root, 'geometry-role', `${name} is no field`, `they are ${fieldNames.join(', ')}`);
  const variables = entriesOf(at('variables'), 'variables').map(([key, node]) => {
    const wanted = key.split(',');
    const chosen = wanted.flatMap((name) => variableFields.filter((f) => f.name === name));
    if (chosen.length !== wanted.length)
      fault(node, 'geometry-variables', `${key} names a symbol that variable-fields lacks`, 'declare it there');
    const replaced = entriesOf(node, key);
    const kept = fields.filter((f) => !replaced.some(([name]) => name === f.name));
    const all = [...kept, ...chosen];
    // One order more: an image may contain a velocity.
    const into = ringOver(
      all.map((f) => f.name),
      MAX_JET_ORDER + 1,
    );
    const images = new Map(
      replaced.flatMap(([name, value]) => {
        const names = all.map((f) => f.name);
        const poly = expression(value, name, into, names);
        return poly ? [[name, poly] as const] : [];
      }),
    );
    return { key, fields: all, images, ring: into };
  });
  const isotropy = readIsotropy(values.get('isotropy'), problems);
  if (problems.length > 0) stop();
  return {
    title: textOf(at('title'), 'title'),
    source: textOf(at('source'), 'source'),
    why: textOf(at('why'), 'why'),
    parameters,
    fields,
    ring,
    structure,
    coframe,
    connection,
    components,
    lapse,
    rates,
    isotropic: isotropicRoles(values.get('isotropic'), { fieldNames, parameterNames }, problems, stop),
    isotropy,
    variables,
  };
}

function isotropicRoles(
  node: YamlNode | undefined,
  known: { readonly fieldNames: readonly string[]; readonly parameterNames: readonly string[] },
  problems: Diagnostic[],
  stop: () => never,
): IsotropicRoles | undefined {
  if (!node) return undefined;
  const record = asRecord(node, 'isotropic', { required: ['scale', 'curvature', 'scalars'] }, problems);
  if (problems.length > 0) stop();
  const scale = asText(record.get('scale')!, 'scale', problems)?.text ?? '';
  const curvature = asText(record.get('curvature')!, 'curvature', problems)?.text ?? '';
  const scalars = (asList(record.get('scalars')!, 'scalars', problems)?.items ?? []).map(
    (n) => asText(n, 'scalars', problems)?.text ?? '',
  );
  for (const name of [scale, ...scalars])
    if (!known.fieldNames.includes(name))
      problems.push(
        errorAt(node.origin, 'geometry-role', `${name} is no field`, `they are ${known.fieldNames.join(', ')}`),
      );
  if (!known.parameterNames.includes(curvature))
    problems.push(errorAt(node.origin, 'geometry-role', `${curvature} is no parameter`, 'declare it under parameters'));
  if (problems.length > 0) stop();
  return { scale, curvature, scalars };
}

/** Folder of the bundled geometry files, seen from src/ and from dist/ alike. */
export const GEOMETRY_FOLDER = new URL('../../rules/geometry/', import.meta.url);

/** The bundled file of that name, or undefined when there is none. */
export function readGeometryFile(id: string): GeometryFile | undefined {
  const url = new URL(`${id}.yaml`, GEOMETRY_FOLDER);
  let text: string;
  try {
    text = readFileSync(url, 'utf8');
  } catch {
    return undefined;
  }
  return readGeometryText(text, `rules/geometry/${id}.yaml`);
}
