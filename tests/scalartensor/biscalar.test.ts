import { describe, expect, it } from 'vitest';
import { eulerLagrange, partial, timeDerivative } from '../../src/algebra/calculus.js';
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
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { dropTotalDerivatives } from '../../src/mechanics/total-derivatives.js';
import {
  atUnitLapse,
  type BiScalarFunctions,
  type BiScalarRoles,
  biScalarForm,
  pairsOf,
  reducedForm,
} from '../../src/scalartensor/biscalar.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';

const SCALARS = ['phi', 'psi'] as const;
const FIELDS = ['a', ...SCALARS];
const ring = makeRing([...['N', ...FIELDS].flatMap((name) => jetsOf(name, 4)), ...constantsOf(['k', 'c', 'd'])]);
const g = (name: string, e = 1): Poly => generator(ring, name, e);
const rate = (q: string): Poly => multiply(g(`D(${q},1)`), g('N', -1));
const hubble = multiply(rate('a'), g('a', -1));
const volume = multiply(g('N'), g('a', 3));
const metricCurvature = scale(
  sum(ring, [multiply(timeDerivative(hubble), g('N', -1)), scale(power(hubble, 2), 2), multiply(g('k'), g('a', -2))]),
  6,
);
const ROLES: BiScalarRoles = { lapse: 'N', scale: 'a', curvature: 'k', scalars: SCALARS, metricCurvature, volume };

const randomFunction = (random: Random): Poly =>
  random.chance(20) ? zero(ring) : randomPoly(random, ring, ['phi', 'psi', 'c', 'd'], { exponents: [0, 3] });

const randomFunctions = (random: Random): BiScalarFunctions => ({
  g4: randomFunction(random),
  kinetic: new Map(pairsOf(SCALARS).map(([x, y]) => [`${x},${y}`, randomFunction(random)])),
  current: new Map(SCALARS.map((q) => [q, randomFunction(random)])),
  potential: randomFunction(random),
});

/** What derive hands over about a Lagrangian. */
const known = (lagrangian: Poly) => ({
  reduced: dropTotalDerivatives(lagrangian, FIELDS, 'N').reduced,
  equations: new Map(['N', ...FIELDS].map((q) => [q, eulerLagrange(lagrangian, q)])),
});

/** a³N [G4 R + …] with first derivatives, written out by hand: −6 G4 H² − 6 Ġ4 H + 6 k G4/a². */
function byHand({ g4, kinetic, current, potential }: BiScalarFunctions): Poly {
  const flow = sum(
    ring,
    SCALARS.map((q) => multiply(partial(g4, q), rate(q))),
  );
  const parts = [
    scale(product(ring, [g4, hubble, hubble]), -6),
    scale(multiply(flow, hubble), -6),
    scale(product(ring, [g4, g('k'), g('a', -2)]), 6),
    scale(product(ring, [kinetic.get('phi,phi')!, power(rate('phi'), 2)]), rational(1, 2)),
    scale(product(ring, [kinetic.get('phi,psi')!, rate('phi'), rate('psi')]), rational(1, 2)),
    scale(product(ring, [kinetic.get('psi,psi')!, power(rate('psi'), 2)]), rational(1, 2)),
    ...SCALARS.map((q) => multiply(current.get(q)!, rate(q))),
    negate(potential),
  ];
  return multiply(volume, sum(ring, parts));
}

const shown = (f: BiScalarFunctions) => ({
  g4: infix(f.g4),
  kinetic: [...f.kinetic].map(([key, p]) => `${key}: ${infix(p)}`),
  current: [...f.current].map(([key, p]) => `${key}: ${infix(p)}`),
  potential: infix(f.potential),
});

function found(lagrangian: Poly): { readonly functions: BiScalarFunctions; readonly obstruction: Poly } {
  const outcome = biScalarForm(known(lagrangian), ROLES);
  if (!outcome.found) throw new Error(`${outcome.reason}: ${infix(outcome.offending)}`);
  return outcome;
}

const always = (statement: (random: Random, seed: string) => void): void => {
  for (let i = 0; i < runs(15); i++) statement(new Random(firstSeed(47 * i)), `seed ${firstSeed(47 * i)}`);
};

describe('biScalarForm', () => {
  it('reads off the functions that a Lagrangian was made of', () => {
    always((random, seed) => {
      const functions = randomFunctions(random);
      const outcome = found(byHand(functions));
      expect(shown(outcome.functions), seed).toEqual(shown(functions));
      expect(infix(outcome.obstruction), seed).toBe('0');
    });
  });

  it('does so when total derivatives hide them', () => {
    always((random, seed) => {
      const functions = randomFunctions(random);
      const hidden = multiply(g('a', 3), randomFunction(random));
      const outcome = found(add(byHand(functions), timeDerivative(hidden)));
      expect(shown(outcome.functions), seed).toEqual(shown(functions));
    });
  });

  it('turns H F into −⅓ (F_φ φ̇ + F_ψ ψ̇)', () => {
    const f = product(ring, [g('phi', 2), g('psi')]);
    const { functions } = found(product(ring, [volume, hubble, f]));
    expect([...functions.current.values()].map(infix)).toEqual(['-2*phi*psi/3', '-phi^2/3']);
  });

  it('obstructs by what k adds beyond 6 k G4/a²', () => {
    always((random, seed) => {
      const functions = randomFunctions(random);
      const [f, h] = [randomFunction(random), randomFunction(random)];
      const extra = sum(ring, [
        product(ring, [f, g('k'), g('a', -2)]),
        product(ring, [h, power(multiply(g('k'), g('a', -2)), 2)]),
      ]);
      const { obstruction } = found(add(byHand(functions), multiply(volume, extra)));
      expect(infix(subtract(obstruction, extra)), seed).toBe('0');
    });
  });

  it('frees the obstruction from velocities where it can', () => {
    // k (a φ)˙ is a total derivative; k a φ̇ alone is not, and a different multiple of it leaves a remainder.
    const k = g('k');
    const exact = add(product(ring, [k, g('a'), g('D(phi,1)')]), product(ring, [k, g('phi'), g('D(a,1)')]));
    const base = randomFunctions(new Random(firstSeed(3)));
    expect(infix(found(add(byHand(base), exact)).obstruction)).toBe('0');
    const inexact = product(ring, [k, g('phi'), g('D(a,1)')]);
    expect(infix(found(add(byHand(base), inexact)).obstruction)).toBe('-k*D(phi,1)/a^2');
  });

  it('is zero in every function for the zero Lagrangian', () => {
    const { functions, obstruction } = found(zero(ring));
    expect(shown(functions)).toEqual({
      g4: '0',
      kinetic: ['phi,phi: 0', 'phi,psi: 0', 'psi,psi: 0'],
      current: ['phi: 0', 'psi: 0'],
      potential: '0',
    });
    expect(infix(obstruction)).toBe('0');
  });
});

describe('a Lagrangian without a bi-scalar form', () => {
  const refusal = (lagrangian: Poly) => {
    const outcome = biScalarForm(known(lagrangian), ROLES);
    if (outcome.found) throw new Error('a form was found');
    return { reason: outcome.reason, offending: infix(outcome.offending) };
  };
  const base = byHand(randomFunctions(new Random(firstSeed(5))));

  it('has velocities to a power beyond two', () => {
    const cubic = product(ring, [volume, rate('phi'), hubble, hubble, g('c')]);
    expect(refusal(add(base, cubic))).toEqual({
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: 'c*D(a,1)^2*D(phi,1)/a^2',
    });
  });

  it('is found again when such terms cancel', () => {
    const cubic = product(ring, [volume, power(hubble, 3), g('c')]);
    expect(biScalarForm(known(sum(ring, [base, cubic, negate(cubic)])), ROLES).found).toBe(true);
  });

  it('has H φ̇ with a coefficient that is not the derivative of that of H²', () => {
    const mixed = product(ring, [volume, hubble, rate('psi'), g('phi', 2)]);
    expect(refusal(add(base, mixed))).toEqual({
      reason: 'the coefficient of H times a velocity must be the derivative of the coefficient of H² and is not',
      offending: 'phi^2*D(a,1)*D(psi,1)/a',
    });
  });

  it('may have such a term only together with its H²', () => {
    // −6 G4 H² − 6 Ġ4 H with G4 = φ ψ, and with one of its terms missing.
    const whole = byHand({ ...randomFunctions(new Random(1)), g4: multiply(g('phi'), g('psi')) });
    expect(biScalarForm(known(whole), ROLES).found).toBe(true);
    const missing = scale(product(ring, [volume, hubble, rate('psi'), g('phi')]), 6);
    expect(refusal(add(whole, missing)).offending).toBe('-6*phi*psi*D(a,1)^2/a^2');
    const doubled = scale(missing, -1);
    expect(refusal(add(whole, doubled)).offending).toBe('-6*phi*psi*D(a,1)^2/a^2 - 12*phi*D(a,1)*D(psi,1)/a');
  });

  it('names terms that the Lagrangian has: H² ψ² without its partner, for u² v²', () => {
    const difference = subtract(hubble, g('phi'));
    const quartic = product(ring, [volume, difference, difference, g('psi', 2), g('c')]);
    expect(refusal(add(quartic, byHand({ ...randomFunctions(new Random(1)), g4: g('phi') }))).offending).toBe(
      'c*psi^2*D(a,1)^2/a^2',
    );
  });

  it('or knows a length by itself', () => {
    const massive = product(ring, [volume, g('a', 2), g('phi')]);
    expect(refusal(add(base, massive)).offending).toBe('a^2*phi');
  });

  it('is judged at k = 0 only', () => {
    const curved = product(ring, [volume, power(hubble, 3), rate('phi'), g('k')]);
    const { obstruction } = found(add(base, curved));
    expect(infix(obstruction)).toBe('k*D(a,1)^3*D(phi,1)/a^3');
  });
});

describe('the comparison of equations', () => {
  it('notices equations of another theory', () => {
    const lagrangian = byHand(randomFunctions(new Random(firstSeed(7))));
    const right = known(lagrangian);
    for (const q of ['N', ...FIELDS]) {
      const equations = new Map(right.equations).set(q, add(right.equations.get(q)!, g('a')));
      expect(() => biScalarForm({ ...right, equations }, ROLES)).toThrow(`another equation of ${q}`);
    }
  });

  it('notices a metric curvature that is not the one of the volume', () => {
    const lagrangian = byHand({ ...randomFunctions(new Random(2)), g4: add(g('phi', 2), g('c')) });
    const wrong = { ...ROLES, metricCurvature: scale(metricCurvature, 2) };
    expect(() => biScalarForm(known(lagrangian), wrong)).toThrow('another equation of');
  });
});

describe('reducedForm', () => {
  it('is the Lagrangian written out by hand, up to a total derivative', () => {
    always((random, seed) => {
      const functions = randomFunctions(random);
      const difference = subtract(reducedForm(functions, ROLES, ring), byHand(functions));
      expect(infix(dropTotalDerivatives(difference, FIELDS, 'N').reduced), seed).toBe('0');
    });
  });
});

it('pairsOf lists every unordered pair once', () => {
  expect(pairsOf(['x', 'y', 'z'])).toEqual([
    ['x', 'x'],
    ['x', 'y'],
    ['x', 'z'],
    ['y', 'y'],
    ['y', 'z'],
    ['z', 'z'],
  ]);
});

it('atUnitLapse sets the lapse to one and its derivatives to zero', () => {
  const p = sum(ring, [
    g('N', -3),
    multiply(g('D(N,1)'), g('a')),
    monomial(ring, rational(2), [
      ['N', 2],
      ['a', 1],
    ]),
  ]);
  expect(infix(atUnitLapse(p, 'N'))).toBe('2*a + 1');
});
