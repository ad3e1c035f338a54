import { describe, expect, it } from 'vitest';
import { eulerLagrange, timeDerivative } from '../../src/algebra/calculus.js';
import { moveTo } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import {
  add,
  equals,
  generator,
  isCanonical,
  isZero,
  multiply,
  negate,
  type Poly,
  subtract,
} from '../../src/algebra/poly.js';
import { jetName } from '../../src/algebra/ring.js';
import { BoundError } from '../../src/compare/budget.js';
import { equationsIn, jetSpace, MAX_ORDER, movingFields } from '../../src/compare/jet-space.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { derivationOf, EINSTEIN_CARTAN, poly, spaceOf } from './derivations.js';

const fluid = '{ fluid: brine, w: "1/5" }';

describe('jets at lapse 1 with expansion rates', () => {
  const d = derivationOf({ ...EINSTEIN_CARTAN, matter: ['dust', fluid] });
  const space = jetSpace([d]);
  const g = (name: string): Poly => generator(space.ring, name);

  it('knows the rate of every kind of generator', () => {
    expect(equals(space.rate(g('a')), multiply(g('a'), g('H')))).toBe(true);
    expect(equals(space.rate(g('phi')), g('D(phi,1)'))).toBe(true);
    expect(isZero(space.rate(g('rho_dust')))).toBe(true);
    expect(isZero(space.rate(g('k')))).toBe(true);
    // ρ ∝ a^(−3(1 + 1/5)).
    expect(infix(space.rate(g('rho_brine')))).toBe('-18*rho_brine*H/5');
    expect(() => space.rate(g(jetName('phi', MAX_ORDER)))).toThrow(BoundError);
  });

  it('obeys the product rule', () => {
    const names = ['a', 'H', 'phi', 'D(phi,1)', 'psi', 'rho_brine', 'rho_dust', 'k', 'rho', 'p'];
    for (let run = 0; run < runs(20); run++) {
      const random = new Random(firstSeed(9100) + run);
      const [p, q] = [randomPoly(random, space.ring, names), randomPoly(random, space.ring, names)];
      const right = add(multiply(space.rate(p), q), multiply(p, space.rate(q)));
      expect(equals(space.rate(multiply(p, q)), right)).toBe(true);
    }
  });

  it('translates: the rate of a translation is the translation of the time derivative', () => {
    const names = ['a', 'D(a,1)', 'D(a,2)', 'phi', 'D(phi,1)', 'psi', 'N', 'k', 'rho_dust', 'rho_brine'];
    for (let run = 0; run < runs(20); run++) {
      const p = randomPoly(new Random(firstSeed(9200) + run), d.ring, names);
      const image = space.translate(p);
      expect(isCanonical(image)).toBe(true);
      expect(equals(space.translate(timeDerivative(p)), space.rate(image))).toBe(true);
    }
    expect(infix(space.translate(generator(d.ring, 'D(a,3)')))).toBe('a*D(H,2) + 3*H*a*D(H,1) + H^3*a');
  });

  it('has the equations of the theory when the totals are put in', () => {
    const equations = equationsIn(space, d, false);
    expect([...equations.keys()]).toEqual(['N', 'a', 'phi', 'psi', 'density', 'pressure']);
    const volume = space.translate(moveTo(d.geometry.spatialVolume, d.ring));
    const own = space.translate(d.equations.get('N')!);
    const difference = subtract(equations.get('N')!, own);
    // −V ρ in the place of −V Σ ρ_i.
    expect(equals(difference, negate(multiply(volume, equations.get('density')!)))).toBe(true);
    expect([...equationsIn(space, d, true).keys()]).toEqual(['N', 'a', 'phi', 'psi']);
  });

  it('takes matter of any pressure to be conserved: the Noether identity', () => {
    const equations = equationsIn(space, d, true);
    let total = space.rate(equations.get('N')!);
    total = subtract(total, multiply(multiply(g('a'), g('H')), equations.get('a')!));
    for (const q of ['phi', 'psi']) total = subtract(total, multiply(g(jetName(q, 1)), equations.get(q)!));
    // dE_N/dt − Σ q̇ E_q = −V (ρ̇ + 3H(ρ + p)).
    const continuity = add(g('D(rho,1)'), poly(space, [3, 'H', 'rho'], [3, 'H', 'p']));
    const volume = space.translate(d.geometry.spatialVolume);
    expect(isZero(add(total, multiply(volume, continuity)))).toBe(true);
  });

  it('finds other names for the totals where a theory has constants p and rho', () => {
    const other = jetSpace([derivationOf({ lagrangian: 'p M^2 R', constants: ['p'] })]);
    expect(other.totals).toEqual({ rho: 'rho', p: 'p_total' });
    expect(other.ring.position.has('D(p_total,1)')).toBe(true);
  });

  it('works on other geometries and with multipliers', () => {
    const bianchi = derivationOf({ ...EINSTEIN_CARTAN, geometry: 'bianchi-i' });
    const wide = jetSpace([bianchi]);
    expect([...wide.rates.values()]).toEqual(['H_x', 'H_y', 'H_z']);
    expect(equals(wide.rate(generator(wide.ring, 'a_y')), poly(wide, [1, 'a_y', 'H_y']))).toBe(true);
    const free = derivationOf({ ...EINSTEIN_CARTAN, constrain: ['T^a_{bc}'] });
    const fields = movingFields(free);
    expect(fields.length).toBeGreaterThan(3);
    const more = jetSpace([free]);
    const multiplier = fields.at(-1)!;
    expect(more.places[more.ring.position.get(multiplier)!]!.role).toBe('multiplier');
  });

  it('is shared by two theories', () => {
    const both = jetSpace([d, derivationOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] })]);
    for (const name of ['c', 'rho_dust', 'rho_brine', 'Lambda']) expect(both.ring.position.has(name)).toBe(true);
    expect(isZero(both.rate(generator(both.ring, 'Lambda')))).toBe(true);
  });
});

it('the lapse is set to 1 after the variation, not before', () => {
  const d = derivationOf(EINSTEIN_CARTAN);
  const space = spaceOf();
  expect(isZero(space.translate(eulerLagrange(d.lagrangian, 'N')))).toBe(false);
});
