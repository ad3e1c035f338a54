import { describe, expect, it } from 'vitest';
import { eulerLagrange } from '../../src/algebra/calculus.js';
import { addFraction, type Fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { isZero, subtract } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { vectorRoles } from '../../src/every-k.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { backgroundOf } from '../../src/scalartensor/constraint-vector.js';
import { metricForm } from '../../src/scalartensor/metric-form.js';
import {
  asFraction,
  asPoly,
  EXPANSION,
  onBackground,
  rateAlong,
  SPATIAL_CURVATURE,
  type VectorForm,
  vectorRing,
} from '../../src/scalartensor/vector-form.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const NAMES = { constants: ['m', 'f', 'g'], scalars: ['q', 'r'] };
const of = (text: string) => metricForm(formOf(text, NAMES, exampleRing(NAMES)));
const shown = (f: Fraction): string => infix(f.numerator);

const SCALARS = ['phi', 'psi'];
const ring = vectorRing(SCALARS, ['c']);
const jets = makeRing([...['N', 'a', ...SCALARS].flatMap((q) => jetsOf(q, 5)), ...constantsOf(['k', 'c'])]);
const background = backgroundOf(vectorRoles(loadGeometry('flrw', '-+++'))!, jets);

describe('metricForm', () => {
  it('of −m θ²/3 + m ³R/2 is m R/2 for every k: the vector disappears', () => {
    const { stop, reached } = of('-1/3 m theta^2 + 1/2 m R3');
    expect([stop, shown(reached!.functions.g4), shown(reached!.remainder)]).toEqual([undefined, 'm/2', '0']);
  });

  it('of a function in front: q² R is −2/3 q² θ² − 4 q θ n·∂q + q² ³R', () => {
    const { stop, reached, steps } = of('-2/3 q^2 theta^2 - 4 q theta D(q,1) + q^2 R3 - m D(q,1)^2 + f D(r,1) - g q^4');
    expect(stop).toBeUndefined();
    const { g4, kinetic, current, potential } = reached!.functions;
    expect([shown(g4), shown(kinetic.get('q,q')!), shown(current.get('r')!), shown(potential)]).toEqual([
      'q^2',
      '-2*m',
      'f',
      'q^4*g',
    ]);
    expect(steps.map((s) => s.rule)).toEqual([
      'expansion-for-curvature',
      'products-of-gradients',
      'unit-timelike-vector',
    ]);
  });

  it('says why it stops: what is left of ³R, by kind, and goes on at ³R = 0', () => {
    const reasons = ['m R3', 'q R3', 'm R3^2', 'm R3 D(q,1)'].map((t) => of(`${t} - f q^2`));
    expect(reasons.map((m) => m.stop!.reason.replace('curvature obstruction: ', ''))).toEqual([
      '³R is left with a constant coefficient that is not the one in front of R',
      '³R is multiplied by a function of the scalars that is not the one in front of R',
      '³R occurs in more than first degree',
      '³R is multiplied by velocities',
    ]);
    for (const m of reasons) expect(shown(m.reached!.functions.potential)).toBe('q^2*f');
  });

  it('stops for good at velocities of third degree, and where θ n·∂q does not belong to θ²', () => {
    for (const [text, rule] of [
      ['theta^3', 'expansion-for-curvature'],
      ['theta D(q,1)^2', 'expansion-for-curvature'],
      ['D(q,1)^3', 'products-of-gradients'],
      ['q theta^2', 'expansion-for-curvature'],
      ['q theta D(r,1)', 'expansion-for-curvature'],
    ] as const) {
      const { stop, reached } = of(text);
      expect([stop?.rule, reached], text).toEqual([rule, undefined]);
    }
  });

  it('changes no equation: the form and what is left of ³R against the start, random functions, every k', () => {
    for (let run = 0; run < runs(25); run++) {
      const seed = firstSeed(75_000) + run;
      const random = new Random(seed);
      const names = [...SCALARS.map(rateAlong), EXPANSION, SPATIAL_CURVATURE, ...SCALARS, 'c'];
      const start: VectorForm = {
        value: asFraction(randomPoly(random, ring, names, { terms: 5, exponents: [0, 2] })),
        scalars: SCALARS,
      };
      const { reached } = metricForm(start);
      if (!reached) continue;
      const whole = { ...reached.form, value: addFraction(reached.form.value, reached.remainder) };
      const [before, after] = [start, whole].map((form) => asPoly(onBackground(form, background))!);
      for (const q of ['N', 'a', ...SCALARS])
        expect(isZero(eulerLagrange(subtract(before!, after!), q)), `seed ${seed}, ${q}`).toBe(true);
    }
  });
});
