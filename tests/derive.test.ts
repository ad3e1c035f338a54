import { describe, expect, it } from 'vitest';
import { involves, substitute } from '../src/algebra/collect.js';
import { infix } from '../src/algebra/infix.js';
import { dependsOn } from '../src/algebra/linear.js';
import { constant, generator, isZero, type Poly, scale, sum } from '../src/algebra/poly.js';
import { rational } from '../src/algebra/rational.js';
import type { BiScalarForm, Derivation } from '../src/derivation.js';
import { derive } from '../src/derive.js';
import { InputError, renderDiagnostic } from '../src/notation/diagnostics.js';
import { readTheory } from '../src/notation/read-theory.js';
import * as E from './oracle/exact.js';
import { derived, equationsAt, shown, theoryText, type Wanted } from './oracle/pipeline.js';
import { firstSeed, Random, runs } from './oracle/random.js';
import { factorsOf } from './oracle/reading.js';
import { type Fluid, torsionTheory } from './oracle/variation.js';

const COUPLINGS = ['c0', 'a1', 'a2', 'a3', 'a4', 'a5', 'a6', 'b1', 'b2', 'b3'];
const GENERAL = `1/2 c0 M^2 R
  + a1 R^2 + a2 R_{ab} R^{ab} + a3 R_{ab} R^{ba}
  + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + a6 R_{abcd} R^{cdab}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} + b3 T_a T^a )`;

const of = (wanted: Wanted): Derivation => derive(readTheory(theoryText(wanted), 'quay.yaml'));
const general = (more: Partial<Wanted> = {}): Derivation => of({ lagrangian: GENERAL, constants: COUPLINGS, ...more });

function refusal(wanted: Wanted): string {
  try {
    of(wanted);
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  return 'accepted';
}

function formOf(d: Derivation): BiScalarForm {
  if (d.scalarTensor.form === 'none') throw new Error(d.scalarTensor.reason);
  return d.scalarTensor;
}

describe('matter', () => {
  const rows: readonly (readonly [text: string, fluid: Fluid, isSource: boolean])[] = [
    ['dust', { density: 'rho_dust', w: E.ZERO }, false],
    ['radiation', { density: 'rho_radiation', w: E.q(1, 3) }, false],
    ['{ vacuum: Lambda }', { density: 'Lambda', w: E.q(-1) }, false],
    ['{ fluid: x, w: "1/5" }', { density: 'rho_x', w: E.q(1, 5) }, true],
    ['{ fluid: x, w: 1 }', { density: 'rho_x', w: E.ONE }, false],
    ['{ fluid: x, w: -1 }', { density: 'rho_x', w: E.q(-1) }, false],
    ['{ fluid: x, w: "-2/3" }', { density: 'rho_x', w: E.q(-2, 3) }, false],
    ['{ fluid: x, w: "-7/5" }', { density: 'rho_x', w: E.q(-7, 5) }, true],
    ['{ fluid: x, w: 40 }', { density: 'rho_x', w: E.q(40) }, false],
    ['{ fluid: x, w: "1/170" }', { density: 'rho_x', w: E.q(1, 170) }, true],
  ];
  for (const geometry of ['flrw', 'bianchi-i'] as const)
    for (const [text, fluid, isSource] of rows)
      it(`${text} gives the equations of the second derivation on ${geometry}`, () => {
        const json = derived({ lagrangian: '1/2 M^2 R', geometry, matter: [text] });
        const oracle = {
          geometry,
          signature: '-+++',
          matter: [fluid],
          lagrangian: [{ coefficient: E.q(1, 2), symbols: [['M', 2]], factors: factorsOf('R') }],
        } as const;
        for (let i = 0; i < runs(2); i++) {
          const seed = firstSeed(61 * i);
          const point = new Random(seed).point(geometry, ['M', fluid.density]);
          const { equations } = torsionTheory(oracle, point);
          expect(shown(equationsAt(json, point)), `seed ${seed}`).toEqual(shown(equations));
        }
        const { sources } = json as unknown as { sources: string[] };
        // On three scale factors 1 + w must be an integer for a power law.
        const power = geometry === 'flrw' ? !isSource : fluid.w.d === 1n;
        expect(sources).toEqual(power ? [] : [fluid.density]);
      });

  it('counts by its own density and pressure', () => {
    const { fluids } = of({ lagrangian: 'M^2 R', matter: ['radiation', '{ fluid: x, w: "1/5" }'] });
    expect(fluids.map((f) => [f.name, infix(f.rho), infix(f.pressure), f.isSource])).toEqual([
      ['radiation', 'rho_radiation/a^4', 'rho_radiation/(3*a^4)', false],
      ['x', 'rho_x', 'rho_x/5', true],
    ]);
  });

  it('is refused where its power law leaves the range of exponents', () => {
    for (const w of ['167', '-169', '1000000000000000000000'])
      expect(refusal({ lagrangian: 'M^2 R', matter: [`{ fluid: x, w: ${w} }`] })).toContain(
        `the density of x with w = ${w} goes with a power of the scale factor beyond 500`,
      );
    expect(refusal({ lagrangian: 'M^2 R', matter: ['{ fluid: x, w: 165 }'] })).toBe('accepted');
  });

  it('is no part of the scalar-tensor form or of the effective fluid', () => {
    const [bare, full] = [general(), general({ matter: ['dust', '{ fluid: x, w: "1/5" }'] })];
    expect(infix(formOf(full).potential)).toBe(infix(formOf(bare).potential));
    expect(infix(full.friedmann!.rhoT)).toBe(infix(bare.friedmann!.rhoT));
    expect(infix(full.reducedGravity)).toBe(infix(bare.reducedGravity));
    expect(infix(full.lagrangian)).not.toBe(infix(bare.lagrangian));
  });
});

describe('signature', () => {
  it('changes nothing when the affected coefficients are flipped', () => {
    const minus = GENERAL.replace('1/2 c0', '-1/2 c0').replace('M^2 (', '-M^2 (').replace('+ -M^2', '- M^2');
    const [one, other] = [
      derived({ lagrangian: GENERAL, constants: COUPLINGS, matter: ['dust'] }),
      derived({ lagrangian: minus, constants: COUPLINGS, matter: ['dust'], signature: '+---' }),
    ];
    expect({ ...other, warnings: [] }).toEqual({ ...one, warnings: [] });
  });

  it('changes the equations when they are not', () => {
    const one = derived({ lagrangian: GENERAL, constants: COUPLINGS });
    const other = derived({ lagrangian: GENERAL, constants: COUPLINGS, signature: '+---' });
    expect(other.equations.N).not.toBe(one.equations.N);
  });
});

describe('what a background sees of the quadratic class', () => {
  const d = general();
  const symbol = (name: string): Poly => generator(d.ring, name);
  const combine = (parts: Readonly<Record<string, number>>): Poly =>
    sum(
      d.ring,
      Object.entries(parts).map(([name, n]) => scale(symbol(name), rational(n))),
    );
  // Read off the contractions of the geometry: coefficients of A1² + A4² and so on modulo A1 A4 − A2 A3.
  const expected = [
    symbol('c0'),
    combine({ a1: 36, a2: 12, a3: 12, a4: 12, a5: 6, a6: 12 }),
    combine({ a4: -12, a5: 6 }),
    combine({ a1: 72, a2: 12, a3: 12, a5: 12, a6: -24 }),
    combine({ b1: -6, b2: -3, b3: -9 }),
    combine({ b1: 24, b2: -24 }),
  ];

  it('is three combinations of curvature, two of torsion and the linear one', () => {
    expect(d.combinations).toHaveLength(expected.length);
    for (const p of expected) expect(dependsOn(p, d.combinations), infix(p)).toBe(true);
    for (const p of d.combinations) expect(dependsOn(p, expected), infix(p)).toBe(true);
  });

  it('loses k exactly when P = 0 and c0 = 0', () => {
    const [c0, p] = expected as [Poly, Poly];
    expect(d.screening).toHaveLength(2);
    for (const q of [c0, p]) expect(dependsOn(q, d.screening!), infix(q)).toBe(true);
    const screened = general({ impose: ['c0 = 0', 'a1 = -1/3 a2 - 1/3 a3 - 1/3 a4 - 1/6 a5 - 1/3 a6'] });
    expect([...screened.equations.values()].some((e) => involves(e, 'k'))).toBe(false);
    expect(screened.screening).toEqual([]);
    const almost = general({ impose: ['c0 = 0'] });
    expect([...almost.equations.values()].some((e) => involves(e, 'k'))).toBe(true);
  });

  it('is nothing of the Gauss–Bonnet combination', () => {
    const topological = of({ lagrangian: 'R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab}', scales: [] });
    expect([...topological.equations.values()].every(isZero)).toBe(true);
    expect([topological.combinations, topological.screening]).toEqual([[], []]);
    expect(isZero(topological.reducedGravity)).toBe(true);
    expect(isZero(topological.dropped)).toBe(false);
  });

  it('cannot lose k in Einstein–Cartan theory', () => {
    expect(of({ lagrangian: '1/2 M^2 R' }).screening!.map(infix)).toEqual(['1']);
  });
});

describe('validity of the bi-scalar form', () => {
  it('is every k exactly when the obstruction vanishes', () => {
    // (k/a²) [3Pφ² + (S − 2P)ψ² + 6 c0 + t_u] + P k²/a⁴ with c0 = ½M² and t_u = −3M².
    const screened = of({ lagrangian: '1/2 M^2 R + 1/3 M^2 T_a T^a' });
    expect(formOf(screened).validFor).toBe('every k');
    expect(isZero(formOf(screened).obstruction)).toBe(true);
    expect(screened.checks.map((c) => c.name)).toContain('scalar-tensor form at every k');
    const other = of({ lagrangian: '1/2 M^2 R + 1/4 M^2 T_a T^a' });
    expect(formOf(other).validFor).toBe('k = 0');
    expect(infix(formOf(other).obstruction)).toBe('3*k*M^2/(4*a^2)');
  });

  it('speaks of every k also where k is imposed', () => {
    const d = of({ lagrangian: '1/2 M^2 R', impose: ['k = 0'] });
    expect(formOf(d).validFor).toBe('k = 0');
    expect(infix(formOf(d).obstruction)).toBe('3*k*M^2/a^2');
    expect([...d.equations.values()].some((e) => involves(e, 'k'))).toBe(false);
    expect(involves(d.friedmann!.rhoT, 'k')).toBe(false);
  });

  it('ends with a reason where there is no form', () => {
    const cubic = of({ lagrangian: 'c0 T_a T^a R_{bc} R^{bc}', constants: ['c0'] });
    expect(cubic.scalarTensor).toMatchObject({
      form: 'none',
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
    });
    const bianchi = of({ lagrangian: '1/2 M^2 R', geometry: 'bianchi-i' });
    expect(bianchi.scalarTensor).toMatchObject({
      form: 'none',
      reason: 'a metric analogue is defined on an isotropic background; the geometry bianchi-i is none',
    });
    expect([bianchi.screening, bianchi.friedmann]).toEqual([undefined, undefined]);
  });
});

describe('Lagrangians at the edge', () => {
  const rows: readonly (readonly [string, string, string])[] = [
    ['M^4', '-M^4', 'M^4*N*a^3'],
    ['c0', '-c0', 'c0*N*a^3'],
    ['-7/3', '7/3', '-7*N*a^3/3'],
  ];
  for (const [lagrangian, potential, reduced] of rows)
    it(`${lagrangian} is a cosmological constant`, () => {
      const d = of({ lagrangian, constants: ['c0'] });
      expect(infix(d.gravity)).toBe(reduced);
      expect(infix(formOf(d).potential)).toBe(potential);
      expect(d.invariants).toEqual([]);
      expect(d.combinations.map(infix)).toEqual(lagrangian === 'c0' ? ['c0'] : []);
    });

  it('that relations make zero leaves matter alone', () => {
    const d = of({ lagrangian: 'c0 R', constants: ['c0'], impose: ['c0 = 0'], matter: ['dust'] });
    expect(d.terms).toEqual([]);
    expect([...d.equations].map(([q, e]) => `${q}: ${infix(e)}`)).toEqual(['N: -rho_dust', 'a: 0', 'phi: 0', 'psi: 0']);
    expect(formOf(d).validFor).toBe('every k');
    expect(d.friedmann!.wT).toBeDefined();
  });

  it('that vanish on the geometry are listed with their value', () => {
    const d = of({ lagrangian: 'c0 T_a T_b T^{acd} T^b{}_{cd}', constants: ['c0'] });
    expect(d.invariants.map((i) => infix(i.value))).toEqual(['0']);
    expect(isZero(d.gravity)).toBe(true);
    expect(d.combinations).toEqual([]);
  });

  it('have no equation of state when nothing is left of the effective fluid', () => {
    const d = of({ lagrangian: 'c0 R', constants: ['c0'], impose: ['M = 0', 'c0 = 0'] });
    expect(d.friedmann!.wT).toBeUndefined();
  });

  it('collect products that differ only in their dummies', () => {
    const d = of({ lagrangian: 'c0 R_{ab} R^{ab} + 3 R_{xy} R^{xy} - R_{ab} R^{ba}', constants: ['c0'] });
    expect(d.terms.map((t) => infix(t.coefficient))).toEqual(['c0 + 3', '-1']);
  });
});

describe('relations', () => {
  it('take the place of couplings before anything else', () => {
    const imposed = general({ impose: ['b1 = -2 b3', 'a1 = 0'] });
    const plain = general();
    const values = new Map([
      ['b1', scale(generator(plain.ring, 'b3'), -2)],
      ['a1', constant(plain.ring, 0)],
    ]);
    for (const [q, e] of plain.equations) expect(infix(substitute(e, values))).toBe(infix(imposed.equations.get(q)!));
  });

  it('reach the Planck mass of the Friedmann form', () => {
    const d = of({ lagrangian: 'c0 R', constants: ['c0'], impose: ['M = 2'] });
    expect(involves(d.friedmann!.rhoT, 'M')).toBe(false);
    expect(infix(d.friedmann!.rhoT)).toContain('12*D(a,1)^2/(N^2*a^2)');
  });

  it('that make a divisor zero are refused at their place', () => {
    expect(refusal({ lagrangian: '1/c0 R', constants: ['c0'], impose: ['c0 = 0'] })).toMatch(
      /^quay\.yaml:\d+:\d+: error: a division by c0, which is zero by the imposed relations\n/,
    );
  });

  it('that tie a constant to a changing density are refused', () => {
    const wanted = { lagrangian: 'c0 R', constants: ['c0'], matter: ['{ fluid: x, w: "1/5" }'] };
    expect(refusal({ ...wanted, impose: ['c0 = rho_x'] })).toContain('rho_x changes with time');
    expect(refusal({ ...wanted, impose: ['rho_x = 0'] })).toBe('accepted');
  });
});

describe('names', () => {
  it('of JavaScript are names like others', () => {
    const names = ['constructor', 'toString', 'valueOf', 'hasOwnProperty'];
    const json = derived({ lagrangian: names.map((n) => `${n} R`).join(' + '), constants: names });
    expect(json.parameters).toEqual(expect.arrayContaining(names));
    const plain = derived({ lagrangian: 'p R + q R + r R + s R', constants: ['p', 'q', 'r', 's'] });
    const short = names.reduce((text, name, i) => text.replaceAll(name, 'pqrs'[i]!), json.equations.psi!);
    expect(short).toBe(plain.equations.psi);
  });

  it('kappa and those of components are free', () => {
    const d = of({ lagrangian: 'kappa R + A1 R_{ab} R^{ab}', constants: ['kappa', 'A1'] });
    expect(d.combinations.map(infix)).toEqual(['kappa', 'A1']);
  });

  it('of the fields and rates of a geometry are taken there', () => {
    expect(refusal({ lagrangian: 'a_x R', constants: ['a_x'], geometry: 'bianchi-i' })).toBe(
      'error: a_x is the scale factor of the first axis of the geometry bianchi-i\nhint: choose another name',
    );
    expect(refusal({ lagrangian: 'H_x R', constants: ['H_x'], geometry: 'bianchi-i' })).toContain(
      'H_x is the expansion rate of a_x',
    );
    expect(refusal({ lagrangian: 'a_x H_x R', constants: ['a_x', 'H_x'] })).toBe('accepted');
  });
});

describe('refusals', () => {
  const text = (geometry: string): string => `${theoryText({ lagrangian: 'M^2 R' })}geometry: ${geometry}\n`;
  const message = (source: string): string => {
    try {
      derive(readTheory(source, 'quay.yaml'));
    } catch (error) {
      if (error instanceof InputError) return error.diagnostics.map((d) => d.message).join('; ');
      throw error;
    }
    return 'accepted';
  };

  it('name an unknown geometry', () => {
    expect(message(text('flwr'))).toBe('there is no geometry flwr');
  });

  it('say why a geometry with a trace is not varied', () => {
    expect(message(text('bianchi-v'))).toBe('the structure constants of the geometry bianchi-v have a non-zero trace');
  });

  it('state the limit that a product exceeds, quickly', () => {
    const start = performance.now();
    expect(refusal({ lagrangian: 'R^9', scales: [], geometry: 'bianchi-i' })).toMatch(
      /^error: the product R\^9 is too large for this program: the reduced Lagrangian would have more than \d+ terms\n/,
    );
    expect(performance.now() - start).toBeLessThan(20_000);
  });

  it('never take a declared tensor for something else', () => {
    const source = theoryText({ lagrangian: 'S_{ab} S^{ab}' }).replace(
      'lagrangian:',
      'tensors: { S: { indices: 2 } }\nlagrangian:',
    );
    expect(message(source)).toBe('S_{ab} S^{ab} cannot be reduced: the tensor S has no components on a geometry');
  });
});

describe('a derivation', () => {
  it('holds every check it made', () => {
    const { checks, geometry } = general({ matter: ['dust'] });
    expect(checks.slice(0, geometry.checks.length).map((c) => c.name)).toEqual(geometry.checks.map((c) => c.name));
    expect(checks.slice(geometry.checks.length).map((c) => c.name)).toEqual([
      'Noether identity of time reparametrisation',
      'continuity of matter',
      'total derivatives',
      'equations without total derivatives',
      'conservation of the effective fluid',
      'scalar-tensor form',
    ]);
    expect(general().checks.every((c) => c.holds && c.detail !== '')).toBe(true);
  });

  it('is frozen, and shares its ring with derivations of the same symbols', () => {
    const [one, two] = [general(), general({ impose: ['a1 = 0'] })];
    expect(Object.isFrozen(one)).toBe(true);
    expect(two.ring).toBe(one.ring);
  });

  it('tells what it is doing', () => {
    const steps: string[] = [];
    derive(readTheory(theoryText({ lagrangian: 'M^2 R + R^2' }), 'quay.yaml'), (what) => steps.push(what));
    expect(steps).toEqual([
      'contracting product 1 of 2',
      'contracting product 2 of 2',
      'varying the Lagrangian',
      'looking for the scalar-tensor form',
    ]);
  });

  it('of the ten couplings takes milliseconds', () => {
    const theory = readTheory(theoryText({ lagrangian: GENERAL, constants: COUPLINGS, matter: ['dust'] }), 'quay.yaml');
    const times = Array.from({ length: 30 }, () => {
      const start = performance.now();
      derive(theory);
      return performance.now() - start;
    }).sort((x, y) => x - y);
    // A generous bound for a busy machine; the benchmark has the figures.
    expect(times[3]).toBeLessThan(50);
  });
});
