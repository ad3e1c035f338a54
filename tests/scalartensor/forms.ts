/** Bi-scalar forms for the tests of frames and canonical fields, written down directly or read from text. */
import { moveTo } from '../../src/algebra/collect.js';
import type { Poly } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing, type Ring } from '../../src/algebra/ring.js';
import { type Knowledge, knowledgeOf, type Relation } from '../../src/algebra/signs.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import type { BiScalarFunctions, BiScalarRoles } from '../../src/scalartensor/biscalar.js';

const geometry = loadGeometry('flrw', '-+++');
const CONSTANTS = ['k', 'c', 'd', 'e', 'm', 'tau', 'M'];

export const ring: Ring = makeRing([...geometry.fields.flatMap((f) => jetsOf(f.name, 3)), ...constantsOf(CONSTANTS)]);

/** A polynomial in phi, psi and the constants. */
export const poly = (text: string): Poly =>
  polyOfScalar(ring, parseScalar(plainPassage(text, 'test'), { isSymbol: (name) => ring.position.has(name) }));

export const roles: BiScalarRoles = {
  lapse: 'N',
  ...geometry.isotropic!,
  metricCurvature: moveTo(geometry.metricCurvature, ring),
  volume: moveTo(geometry.volume, ring),
};

export interface FormTexts {
  readonly g4: string;
  readonly kinetic?: readonly [phiphi: string, phipsi: string, psipsi: string];
  readonly current?: readonly [phi: string, psi: string];
  readonly potential?: string;
}

export const formOf = ({
  g4,
  kinetic = ['0', '0', '0'],
  current = ['0', '0'],
  potential = '0',
}: FormTexts): BiScalarFunctions => ({
  g4: poly(g4),
  kinetic: new Map(['phi,phi', 'phi,psi', 'psi,psi'].map((key, i) => [key, poly(kinetic[i]!)])),
  current: new Map(['phi', 'psi'].map((key, i) => [key, poly(current[i]!)])),
  potential: poly(potential),
});

/** `c > 0` and the like; M is positive always. */
export const knowing = (...texts: readonly string[]): Knowledge =>
  knowledgeOf(
    ring,
    texts.map((text) => {
      const [, left, relation, right] = /^(.*?)(>=|!=|[>=])(.*)$/.exec(text)!;
      return { value: poly(`${left} - (${right})`), relation: relation as Relation, text };
    }),
    new Map([['M', 'M > 0']]),
  );

/** ½M²R − ½(∂ψ)² − ψ²R/12, with a quartic potential. */
export const conformalScalar = formOf({
  g4: '1/2 M^2 - 1/12 psi^2',
  kinetic: ['0', '0', '1'],
  potential: 'c psi^4 + d M^2 psi^2',
});
