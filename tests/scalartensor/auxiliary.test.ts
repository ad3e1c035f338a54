import { describe, expect, it } from 'vitest';
import { type Fraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { add, generator, isZero, multiply, type Poly, power, sum } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { vectorRoles } from '../../src/every-k.js';
import { loadGeometry } from '../../src/geometry/build.js';
import { integrateDirectly, integrateOut } from '../../src/scalartensor/auxiliary.js';
import { fieldRules } from '../../src/scalartensor/auxiliary-file.js';
import { backgroundOf } from '../../src/scalartensor/constraint-vector.js';
import { isComparable, sameEquations } from '../../src/scalartensor/elimination-check.js';
import {
  EXPANSION,
  rateAlong,
  SPATIAL_CURVATURE,
  type VectorForm,
  vectorRing,
} from '../../src/scalartensor/vector-form.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const NAMES = { constants: ['m', 'f', 'g'], scalars: ['q', 'r', 's'] };
const form = (text: string, names = NAMES): VectorForm => formOf(text, names, exampleRing(names));
const shown = (f: Fraction): string => [f.numerator, ...f.denominator.map((d) => d.base)].map(infix).join(' / ');

const SCALARS = ['phi', 'psi', 'chi'];
const ring = vectorRing(SCALARS, ['c']);
const jets = makeRing([...['N', 'a', ...SCALARS].flatMap((q) => jetsOf(q, 5)), ...constantsOf(['k', 'c'])]);
const background = backgroundOf(vectorRoles(loadGeometry('flrw', '-+++'))!, jets);
const g = (name: string): Poly => generator(ring, name);

describe('integrateOut', () => {
  it('follows every branch through the fields that come after', async () => {
    const branches = await integrateOut(form('m q^4 - 2 f q^2 r + g r^2'), ['q', 'r'], fieldRules());
    expect(branches.map((b) => b.steps.map((s) => `${s.rule} ${shown(s.solved!.value)}`))).toEqual([
      ['algebraic-field 0', 'gaussian-field 0'],
      ['algebraic-field root(1)/m', 'gaussian-field 0'],
    ]);
    expect(branches.map((b) => b.form.scalars)).toEqual([['s'], ['s']]);
  });

  it('keeps a field that no rule takes, with the reason of each', async () => {
    const [branch] = await integrateOut(form('m D(q,1)^2 + f q'), ['q'], fieldRules());
    expect(branch!.form.scalars).toContain('q');
    expect(branch!.refused[0]!.reasons.map((r) => r.rule)).toEqual(fieldRules().map((r) => r.id));
    expect(branch!.refused[0]!.reasons.every((r) => r.reason !== '')).toBe(true);
  });

  it('stops at a root that is left', async () => {
    const [branch] = await integrateOut(form('m q^3 - 3 f q + r^2'), ['q', 'r'], fieldRules());
    expect(branch!.form.roots!.map((r) => r.name)).toEqual(['root(1)']);
    expect(branch!.refused[0]!.reasons[0]!.reason).toContain('root');
  });

  it('stops at a constraint or a conserved charge, which the form alone does not know about', async () => {
    for (const text of ['m r D(q,1) + f r^2', 'q r^3 - f q + m r^2']) {
      const [branch] = await integrateOut(form(text), ['q', 'r'], fieldRules());
      expect([branch!.steps.length, branch!.refused.map((r) => r.field)], text).toEqual([1, ['r']]);
      expect(isComparable(branch!), text).toBe(false);
    }
  });

  it('states where a coefficient must not vanish', async () => {
    const [branch] = await integrateOut(form('m r q^2 + f q'), ['q'], fieldRules());
    expect(branch!.steps[0]!.loses.map((l) => l.where && shown(l.where))).toEqual(['r*m']);
  });

  it('a multiplier and the field that its constraint determines go together; where it is divided by something, that is stated', async () => {
    const [branch] = await integrateOut(form('q r s - f q + m r^2'), ['q'], fieldRules());
    expect(branch!.form.scalars).toEqual(['s']);
    expect(branch!.steps[0]!.solved!.field).toBe('r');
    expect(branch!.steps[0]!.loses.at(-1)!.where && shown(branch!.steps[0]!.loses.at(-1)!.where!)).toBe('s');
  });
});

/** Quadratic in φ and ψ, linear in their rates with functions of χ in front: what a linearised theory is like. */
function randomForm(random: Random): VectorForm {
  const f = (): Poly => randomPoly(random, ring, ['chi', 'c'], { terms: 2, exponents: [0, 2] });
  const pieces = [
    multiply(f(), g(rateAlong('phi'))),
    multiply(f(), g(rateAlong('psi'))),
    multiply(f(), multiply(g(EXPANSION), g('phi'))),
    multiply(f(), power(g(EXPANSION), 2)),
    multiply(f(), multiply(g('phi'), g('psi'))),
    multiply(f(), power(g('phi'), 2)),
    multiply(f(), power(g('psi'), 2)),
    multiply(f(), g(SPATIAL_CURVATURE)),
    multiply(f(), power(g(rateAlong('chi')), 2)),
  ];
  return { value: fraction(add(sum(ring, pieces), add(power(g('phi'), 2), power(g('psi'), 2)))), scalars: SCALARS };
}

describe('integrating two coupled fields out', () => {
  it('leaves the equations of lapse, scale factor and the third field, for every k', async () => {
    let compared = 0;
    for (let run = 0; run < runs(12); run++) {
      const seed = firstSeed(76_000) + run;
      const start = randomForm(new Random(seed));
      for (const branch of await integrateOut(start, ['phi', 'psi'], fieldRules())) {
        if (branch.refused.length > 0 || !isComparable(branch)) continue;
        expect(sameEquations(start, branch, ['N', 'a'], background), `seed ${seed}`).toBe(true);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(runs(12) / 3);
  });

  it('the comparison sees a wrong result', async () => {
    const start = randomForm(new Random(7));
    const [branch] = await integrateOut(start, ['phi', 'psi'], fieldRules());
    const spoilt = {
      ...branch!.form,
      value: fraction(add(branch!.form.value.numerator, g('chi')), branch!.form.value.denominator),
    };
    expect(isComparable(branch!)).toBe(true);
    expect(sameEquations(start, { ...branch!, form: spoilt }, ['N', 'a'], background)).toBe(false);
  });
});

describe('integrateDirectly', () => {
  it('takes rules without branches, or nothing', () => {
    const done = integrateDirectly(form('f q theta + m q^2 + r^2'), ['q', 'r'], fieldRules());
    expect(done!.steps.map((s) => s.rule)).toEqual(['gaussian-field', 'gaussian-field']);
    expect(integrateDirectly(form('m q^4 + f q^2'), ['q'], fieldRules())).toBeUndefined();
    expect(integrateDirectly(form('q r^3 - f q'), ['q'], fieldRules())).toBeUndefined();
    expect(isZero(done!.form.value.numerator)).toBe(false);
  });
});
