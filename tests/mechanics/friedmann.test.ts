import { describe, expect, it } from 'vitest';
import { eulerLagrange, timeDerivative } from '../../src/algebra/calculus.js';
import { infix } from '../../src/algebra/infix.js';
import {
  add,
  generator,
  monomial,
  multiply,
  negate,
  type Poly,
  power,
  product,
  scale,
  subtract,
  sum,
} from '../../src/algebra/poly.js';
import { type Rational, rational } from '../../src/algebra/rational.js';
import { conservationResidual, type FriedmannRoles, friedmannForm } from '../../src/mechanics/friedmann.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { FIELDS, invariantLagrangian, LAPSE, rate, ring } from './reduced-lagrangian.js';

const M2 = generator(ring, 'M', 2);
const ROLES: FriedmannRoles = { lapse: LAPSE, scale: 'a', curvature: 'k', planckMassSquared: M2 };
const volume = monomial(ring, rational(1), [
  ['a', 3],
  [LAPSE, 1],
]);
const hubble = multiply(rate('a'), generator(ring, 'a', -1));
const curvature = monomial(ring, rational(1), [
  ['k', 1],
  ['a', -2],
]);

const equationsOf = (lagrangian: Poly): Map<string, Poly> =>
  new Map([LAPSE, ...FIELDS].map((q) => [q, eulerLagrange(lagrangian, q)]));

/** General relativity: ½M²R on the metric geometry, total derivatives dropped. */
const relativity = multiply(volume, scale(multiply(M2, subtract(curvature, power(hubble, 2))), 3));
/** A fluid of density d a^-n: −a³N ρ. */
const fluid = (n: number): Poly =>
  negate(
    multiply(
      volume,
      monomial(ring, rational(1), [
        ['d', 1],
        ['a', -n],
      ]),
    ),
  );

const formOf = (lagrangian: Poly) => friedmannForm(equationsOf(lagrangian), ROLES);

describe('friedmannForm', () => {
  it('has no effective fluid in general relativity', () => {
    const { rhoT, pT } = formOf(relativity);
    expect([infix(rhoT), infix(pT)]).toEqual(['0', '0']);
  });

  it('returns the density and pressure of any fluid that is added to it', () => {
    const rows: [number, Rational][] = [
      [0, rational(-1)],
      [2, rational(-1, 3)],
      [3, rational(0)],
      [4, rational(1, 3)],
      [6, rational(1)],
    ];
    for (const [n, w] of rows) {
      const { rhoT, pT } = formOf(add(relativity, fluid(n)));
      const rho = monomial(ring, rational(1), [
        ['d', 1],
        ['a', -n],
      ]);
      expect(infix(rhoT)).toBe(infix(rho));
      expect(infix(pT)).toBe(infix(scale(rho, w)));
    }
  });

  it('returns those of a scalar field: ½φ̇² ± V', () => {
    const velocity = power(rate('phi'), 2);
    const potential = monomial(ring, rational(1), [
      ['d', 1],
      ['phi', 4],
    ]);
    const scalar = multiply(volume, subtract(scale(velocity, rational(1, 2)), potential));
    const { rhoT, pT } = formOf(add(relativity, scalar));
    expect(infix(rhoT)).toBe(infix(add(scale(velocity, rational(1, 2)), potential)));
    expect(infix(pT)).toBe(infix(subtract(scale(velocity, rational(1, 2)), potential)));
  });

  it('holds everything when there is no gravitational Lagrangian', () => {
    const { rhoT, pT } = formOf(scale(relativity, 0));
    const tension = sum(ring, [
      scale(multiply(timeDerivative(hubble), generator(ring, LAPSE, -1)), 2),
      scale(power(hubble, 2), 3),
      curvature,
    ]);
    expect(infix(rhoT)).toBe(infix(scale(multiply(M2, add(power(hubble, 2), curvature)), 3)));
    expect(infix(pT)).toBe(infix(negate(multiply(M2, tension))));
  });

  it('takes the Planck mass from the relations', () => {
    const four = { ...ROLES, planckMassSquared: monomial(ring, rational(4), []) };
    const equations = equationsOf(product(ring, [relativity, generator(ring, 'M', -2)]));
    const { rhoT } = friedmannForm(equations, four);
    expect(infix(rhoT)).toBe(infix(scale(add(power(hubble, 2), curvature), 9)));
  });
});

describe('conservationResidual', () => {
  it('vanishes for every Lagrangian that is invariant under changes of time', () => {
    for (let i = 0; i < runs(30); i++) {
      const seed = firstSeed(37 * i);
      const equations = equationsOf(invariantLagrangian(new Random(seed)));
      const form = friedmannForm(equations, ROLES);
      expect(infix(conservationResidual(form, equations, ROLES)), `seed ${seed}`).toBe('0');
    }
  });

  it('notices a wrong pressure, a wrong density and a wrong field equation', () => {
    const random = new Random(firstSeed(4));
    const equations = equationsOf(add(relativity, invariantLagrangian(random)));
    const form = friedmannForm(equations, ROLES);
    const extra = generator(ring, 'phi');
    const residual = (f: typeof form, e: ReadonlyMap<string, Poly>): string => infix(conservationResidual(f, e, ROLES));
    expect(residual({ ...form, pT: add(form.pT, extra) }, equations)).not.toBe('0');
    expect(residual({ ...form, rhoT: add(form.rhoT, extra) }, equations)).not.toBe('0');
    const wrong = new Map(equations).set('psi', add(equations.get('psi')!, extra));
    expect(residual(form, wrong)).not.toBe('0');
  });
});
