/**
 * From the data of a geometry file to a Geometry: completes the connection, checks the cobasis, solves Cartan's
 * equations and names the independent components.
 */

import { readdirSync } from 'node:fs';
import { primitive } from '../algebra/linear.js';
import { remember } from '../algebra/memo.js';
import { equals, generator, isZero, negate, type Poly, product, scale, sum } from '../algebra/poly.js';
import { divideRational, type Rational, rational } from '../algebra/rational.js';
import { constantsOf, makeRing, type Ring } from '../algebra/ring.js';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { nearest } from '../notation/suggest.js';
import type { Origin, Theory } from '../notation/theory.js';
import { type SparseTensor, unpackIndices } from '../tensor/components.js';
import type { FrameMetric } from '../tensor/contraction.js';
import { makeEvaluator } from '../tensor/invariants.js';
import { type Connection, curvatureTensor, type FrameData, torsionFreeConnection, torsionTensor } from './cartan.js';
import {
  addForms,
  bitsOf,
  exteriorDerivative,
  type Form,
  maskOf,
  negateForm,
  TIME_FORM,
  twoFormComponent,
} from './forms.js';
import type { ComponentSymbol, Geometry } from './geometry.js';
import { isInvariant } from './invariant-components.js';
import { type FormTerm, GEOMETRY_FOLDER, type GeometryFile, readGeometryFile } from './read-geometry.js';
import { NO_ISOTROPY } from './read-isotropy.js';

const METRICS: Record<Theory['signature'], FrameMetric> = { '-+++': [-1, 1, 1, 1], '+---': [1, -1, -1, -1] };

const built = new Map<string, Geometry>();

/**
 * The bundled geometry of that name, for a signature of the frame metric. Built once per process.
 * @throws InputError when there is no such file or its data are refused.
 */
export function loadGeometry(id: string, signature: Theory['signature'], origin?: Origin): Geometry {
  return remember(built, `${id} ${signature}`, () => {
    const file = readGeometryFile(id);
    if (!file) {
      const names = geometryNames();
      const near = nearest(id, names);
      const hint = near === undefined ? `there are ${names.join(', ')}` : `did you mean ${near}?`;
      const message = `there is no geometry ${id}`;
      throw new InputError([
        origin
          ? errorAt(origin, 'unknown-geometry', message, hint)
          : { code: 'unknown-geometry', severity: 'error', message, hint },
      ]);
    }
    return buildGeometry(id, file, METRICS[signature]);
  });
}

/** Names of the bundled geometries, sorted. */
export const geometryNames = (): string[] =>
  readdirSync(GEOMETRY_FOLDER)
    .filter((name) => name.endsWith('.yaml'))
    .map((name) => name.slice(0, -'.yaml'.length))
    .sort();

/** A Geometry from the content of a file. @throws InputError naming what is refused. */
export function buildGeometry(id: string, file: GeometryFile, metric: FrameMetric): Geometry {
  const frame: FrameData = { ring: file.ring, structure: structureForms(file), coframe: file.coframe };
  refuseBadCobasis(id, frame);
  const connection = completeConnection(id, file, metric);
  const torsion = torsionTensor(frame, connection, metric);
  const curvature = curvatureTensor(frame, connection, metric);
  refuseBrokenIsotropy(id, file, [torsion, curvature], metric);
  const named = nameComponents(file, [torsion, curvature]);
  const symbols = makeRing(constantsOf(named.map((c) => c.name)));
  const symbolic = (tensor: SparseTensor): SparseTensor => inSymbols(tensor, named, symbols);
  const volume = product(file.ring, file.coframe);
  const traceless = isTraceless(frame);
  return {
    id,
    title: file.title,
    source: file.source,
    why: file.why,
    fields: file.fields,
    parameters: file.parameters,
    ring: file.ring,
    lapse: file.lapse,
    rates: file.rates,
    isotropic: file.isotropic,
    isotropy: file.isotropy,
    variables: file.variables,
    components: named,
    tensors: { ring: symbols, metric, torsion: symbolic(torsion), curvature: symbolic(curvature) },
    frame,
    connection,
    traceless,
    volume,
    spatialVolume: product(file.ring, [volume, generator(file.ring, file.lapse, -1)]),
    metricCurvature: metricCurvature(frame),
    checks: [
      { name: 'dd = 0 on the cobasis', holds: true },
      ...(traceless ? [{ name: 'structure constants have zero trace', holds: true }] : []),
      { name: 'the metric connection has no torsion', holds: true },
      ...(file.isotropy === NO_ISOTROPY ? [] : [{ name: 'torsion and curvature have the isotropy', holds: true }]),
    ],
  };
}

const oneTermForm = ({ basis, value }: FormTerm): Form => {
  const sorted = basis.length < 2 || basis[0]! < basis[1]!;
  return new Map([[maskOf(basis), sorted ? value : negate(value)]]);
};

const structureForms = (file: GeometryFile): Form[] =>
  [0, 1, 2, 3].map((i) => addForms(...(file.structure.get(i) ?? []).map(oneTermForm)));

const refusal = (id: string, code: string, message: string, hint: string): InputError => {
  const diagnostic: Diagnostic = { code, severity: 'error', message, hint, file: `rules/geometry/${id}.yaml` };
  return new InputError([diagnostic]);
};

/** An isotropy that the connection does not have would take components from the tensors that are added to it. */
function refuseBrokenIsotropy(
  id: string,
  { isotropy, ring }: GeometryFile,
  tensors: readonly SparseTensor[],
  metric: FrameMetric,
): void {
  const vanishes = (terms: readonly (readonly [number, Poly])[]): boolean =>
    isZero(
      sum(
        ring,
        terms.map(([sign, value]) => scale(value, sign)),
      ),
    );
  if (tensors.every(({ rank, entries }) => isInvariant(entries, rank, isotropy, metric, vanishes))) return;
  const message = 'torsion or curvature changes under the declared isotropy';
  throw refusal(id, 'geometry-isotropy', message, 'list only what leaves coframe and connection unchanged');
}

/** dd = 0 is the Jacobi identity of the structure constants. */
function refuseBadCobasis(id: string, frame: FrameData): void {
  const { structure } = frame;
  if (structure[TIME_FORM]!.size > 0 || structure.some((f) => [...f.keys()].some((m) => bitsOf(m).includes(TIME_FORM))))
    throw refusal(id, 'geometry-time', 'the structure equations involve dt', 'the first one-form is dt and closed');
  for (const [i, form] of structure.entries())
    if (exteriorDerivative(form, structure).size > 0)
      throw refusal(
        id,
        'geometry-jacobi',
        `d(d θ^${i}) is not zero`,
        'the structure constants violate the Jacobi identity',
      );
}

/**
 * Whether Σ_i C^i_ji = 0 for all j. With a trace, varying a Lagrangian after the symmetry has been imposed gives wrong
 * equations (common practice: class B of the Bianchi types).
 */
function isTraceless({ structure, ring }: FrameData): boolean {
  return [1, 2, 3].every((j) =>
    isZero(
      sum(
        ring,
        [1, 2, 3].flatMap((i) => twoFormComponent(structure[i]!, i, j) ?? []),
      ),
    ),
  );
}

/** Adds Γ^b_a from Γ^a_b by Γ_ab = −Γ_ba. */
function completeConnection(id: string, file: GeometryFile, metric: FrameMetric): Connection {
  const forms: Form[][] = [0, 1, 2, 3].map(() => [0, 1, 2, 3].map(() => new Map()));
  const given = new Set<string>();
  for (const { row, column, terms } of file.connection) {
    if (given.has(`${row} ${column}`) || given.has(`${column} ${row}`))
      throw refusal(
        id,
        'geometry-connection',
        `the connection is given twice for ${row} ${column}`,
        'give one of a pair',
      );
    given.add(`${row} ${column}`);
    const form = addForms(...terms.map(oneTermForm));
    forms[row]![column] = form;
    // Γ^b_a = η^bb Γ_ba = −η^bb Γ_ab = −η^bb η_aa Γ^a_b.
    forms[column]![row] = metric[row]! * metric[column]! > 0 ? negateForm(form) : form;
  }
  return forms;
}

/** One symbol per component up to a rational factor; those that the file names come first, in its order. */
function nameComponents(file: GeometryFile, tensors: readonly SparseTensor[]): ComponentSymbol[] {
  const found: ComponentSymbol[] = [];
  const isKnown = (value: Poly): boolean => found.some((c) => equals(primitive(c.value), primitive(value)));
  const heads = ['T', 'R'];
  tensors.forEach((tensor, which) => {
    for (const [packed, value] of tensor.entries) {
      if (isKnown(value)) continue;
      const named = file.components.find((c) => equals(primitive(c.value), primitive(value)));
      const digits = unpackIndices(packed, tensor.rank).join('');
      found.push(named ?? { name: `${heads[which]}${digits}`, latex: `${heads[which]}_{${digits}}`, value });
    }
  });
  const place = (c: ComponentSymbol): number => {
    const i = file.components.findIndex((n) => n.name === c.name);
    return i < 0 ? file.components.length : i;
  };
  return found.sort((a, b) => place(a) - place(b) || (a.name < b.name ? -1 : 1));
}

/** The tensor with each component written as a rational multiple of its symbol. */
function inSymbols(tensor: SparseTensor, named: readonly ComponentSymbol[], ring: Ring): SparseTensor {
  const shared = new Map<string, Poly>();
  const entries = new Map<number, Poly>();
  for (const [packed, value] of tensor.entries) {
    const i = named.findIndex((c) => equals(primitive(c.value), primitive(value)));
    const factor = ratio(value, named[i]!.value);
    // Equal components share one object, so that products of components are remembered by identity.
    const key = `${i} ${factor.num}/${factor.den}`;
    entries.set(
      packed,
      remember(shared, key, () => scale(generator(ring, named[i]!.name), factor)),
    );
  }
  return { rank: tensor.rank, entries };
}

const ratio = (p: Poly, q: Poly): Rational =>
  divideRational(rational(BigInt(p.numerators[0]!), p.denominator), rational(BigInt(q.numerators[0]!), q.denominator));

/** Curvature scalar of the metric connection, in the internal signature −+++. */
function metricCurvature(frame: FrameData): Poly {
  const metric = METRICS['-+++'];
  const curvature = curvatureTensor(frame, torsionFreeConnection(frame, metric), metric);
  const nothing: SparseTensor = { rank: 3, entries: new Map() };
  const evaluator = makeEvaluator({ ring: frame.ring, metric, torsion: nothing, curvature });
  return evaluator.value([{ head: 'R', slots: [] }]);
}
