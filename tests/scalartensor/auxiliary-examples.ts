/**
 * The notation of examples in rules/auxiliary: texts to vector forms and back. D(q,1) is n·∂q, theta the expansion of n, R3 the
 * curvature of its surfaces, R that of the metric, X_q_r = −½ ∂q·∂r, rootJ the root of the current, r1 the root of an equation.
 */
import { fraction } from '../../src/algebra/fraction.js';
import { constantsOf, makeRing, type Ring } from '../../src/algebra/ring.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import type { AuxiliaryRuleFile } from '../../src/scalartensor/auxiliary-rule.js';
import { rootName } from '../../src/scalartensor/stationary-roots.js';
import {
  CURRENT_ROOT,
  EXPANSION,
  kineticName,
  METRIC_CURVATURE,
  pairsOf,
  rateAlong,
  SPATIAL_CURVATURE,
  type VectorForm,
  vectorRing,
} from '../../src/scalartensor/vector-form.js';

export type Names = Pick<AuxiliaryRuleFile, 'constants' | 'scalars'>;

/** The ring of a file's examples; `withRoot` adds the root of an equation. */
export function exampleRing({ constants, scalars }: Names, withRoot = false): Ring {
  const ring = vectorRing(scalars, constants);
  return withRoot ? makeRing([...ring.generators, ...constantsOf([rootName(1)])]) : ring;
}

function spelled({ scalars }: Names): Map<string, string> {
  const names = new Map([
    ['theta', EXPANSION],
    ['R3', SPATIAL_CURVATURE],
    ['R', METRIC_CURVATURE],
    ['rootJ', CURRENT_ROOT],
    ['r1', rootName(1)],
  ]);
  for (const q of scalars) names.set(`D(${q},1)`, rateAlong(q));
  for (const [a, b] of pairsOf(scalars)) names.set(`X_${a}_${b}`, kineticName(a, b));
  return names;
}

/** The form that a text means; a sum as a divisor is none. */
export function formOf(text: string, names: Names, ring: Ring): VectorForm {
  const words = spelled(names);
  const known = new Set([...names.constants, ...names.scalars, ...words.keys()]);
  const parsed = parseScalar(plainPassage(text, 'example'), { isSymbol: (n) => known.has(n), allowJets: true });
  return { value: fraction(polyOfScalar(ring, parsed, (n) => words.get(n) ?? n)), scalars: names.scalars };
}
