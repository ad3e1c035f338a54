import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { equals, type Poly } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { derivationJson, derivationObject, FORMAT_VERSION, parametersOf } from '../../src/emit/json.js';
import { plainPassage } from '../../src/notation/passage.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import * as E from '../oracle/exact.js';
import { atPoint } from '../oracle/infix.js';
import { theoryText, type Wanted } from '../oracle/pipeline.js';
import { firstSeed, Random } from '../oracle/random.js';

const COUPLINGS = ['c0', 'a1', 'a5', 'b1', 'b3', 's'];
const FULL: Wanted = {
  lagrangian: `1/2 c0 M^2 R + a1 R^2 + a5 R_{abcd} R^{acbd} + M^2 ( b1 T_{abc} T^{abc} + b3 T_a T^a )
    + s \\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}`,
  constants: COUPLINGS,
  matter: ['dust', 'radiation', '{ vacuum: Lambda }', '{ fluid: chi, w: "1/5" }'],
};

const of = (wanted: Wanted): Derivation => derive(readTheory(theoryText(wanted), 'quay.yaml'));
/** What another program reads. */
const read = (wanted: Wanted): Record<string, unknown> => JSON.parse(derivationJson(of(wanted)));

/** Every expression of the object, by its path. */
function expressionsIn(value: unknown, path: string): [string, string][] {
  if (typeof value === 'string') return [[path, value]];
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, inner]) => expressionsIn(inner, `${path}/${key}`));
}

const EXPRESSIONS = ['lagrangian', 'reduced', 'dropped', 'equations', 'combinations', 'screening', 'friedmann'];
const allExpressions = (json: Record<string, unknown>): [string, string][] => [
  ...EXPRESSIONS.flatMap((key) => expressionsIn(json[key], key)),
  ...expressionsIn(json.scalarTensor, 'scalarTensor').filter(([path]) => !/form$|validFor$|reason$/.test(path)),
  ...expressionsIn(json.eliminated, 'eliminated'),
];

const namesIn = (text: string): Set<string> =>
  new Set([...text.matchAll(/[A-Za-z][A-Za-z0-9_]*/g)].map(([name]) => name).filter((name) => name !== 'D'));

describe('derivation.json', () => {
  it('has its keys in a fixed order', () => {
    expect(Object.keys(read(FULL))).toEqual([
      'untwist',
      'theory',
      'geometry',
      'variables',
      'parameters',
      'sources',
      'fluids',
      'eliminated',
      'conditions',
      'lagrangian',
      'reduced',
      'dropped',
      'equations',
      'combinations',
      'screening',
      'friedmann',
      'scalarTensor',
      'checks',
      'warnings',
    ]);
  });

  it('says what it is about', () => {
    const json = read(FULL);
    expect(json).toMatchObject({
      untwist: FORMAT_VERSION,
      theory: 'Outer mole',
      geometry: 'flrw',
      variables: ['N', 'a', 'phi', 'psi'],
      sources: ['rho_chi'],
      fluids: [
        { name: 'dust', density: 'rho_dust', w: '0' },
        { name: 'radiation', density: 'rho_radiation', w: '1/3' },
        { name: 'Lambda', density: 'Lambda', w: '-1' },
        { name: 'chi', density: 'rho_chi', w: '1/5' },
      ],
      conditions: [],
      warnings: [],
    });
    expect(Object.keys(json.equations as object)).toEqual(['N', 'a', 'phi', 'psi']);
    expect(Object.keys(json.scalarTensor as object)).toEqual([
      'form',
      'validFor',
      'G4',
      'kinetic',
      'current',
      'potential',
      'curvatureObstruction',
    ]);
    expect(Object.keys((json.scalarTensor as { kinetic: object }).kinetic)).toEqual(['phi,phi', 'phi,psi', 'psi,psi']);
  });

  it('lists exactly the symbols of its expressions as parameters', () => {
    for (const wanted of [
      FULL,
      { lagrangian: '1/2 M^2 R' },
      { lagrangian: 'c0 T_a T^a', constants: ['c0'], impose: ['c0 = 3'] },
      { lagrangian: 'R_{ab} R^{ab}', scales: [] },
      { lagrangian: '1/2 M^2 R', geometry: 'bianchi-i', matter: ['radiation'] },
      { lagrangian: 'c0 R', constants: ['c0', 'c1', 'c2'], impose: ['c1 c2 = 1'] },
    ] as const satisfies readonly Wanted[]) {
      const json = read(wanted);
      const used = new Set(allExpressions(json).flatMap(([, text]) => [...namesIn(text)]));
      for (const condition of json.conditions as string[]) for (const name of namesIn(condition)) used.add(name);
      for (const name of json.variables as string[]) used.delete(name);
      expect([...(json.parameters as string[])].sort()).toEqual([...used].sort());
      expect(parametersOf(of(wanted))).toEqual(json.parameters);
    }
  });

  it('has parameters beyond the couplings: k, M and densities', () => {
    expect(read(FULL).parameters).toEqual(
      expect.arrayContaining(['k', 'M', 'Lambda', 'rho_dust', 'rho_radiation', 'rho_chi']),
    );
  });

  it('has no source that a relation made zero', () => {
    const json = read({ lagrangian: '1/2 M^2 R', matter: ['{ fluid: x, w: "1/5" }'], impose: ['rho_x = 0'] });
    expect([json.sources, json.parameters]).toEqual([[], ['k', 'M']]);
  });

  it('prints texts that another reader evaluates to the values of the kernel', () => {
    const d = of(FULL);
    const json = derivationObject(d) as Record<string, unknown>;
    const random = new Random(firstSeed(1));
    const symbols = d.ring.generators.filter((g) => g.kind !== 'jet').map((g) => g.name);
    const point = random.point('flrw', symbols, 3);
    const values = new Map(
      d.ring.generators.map((g) => {
        const x =
          g.kind === 'jet' ? point.fields[g.field]![g.order]! : g.name === 'k' ? point.k : point.constants[g.name]!;
        return [g.name, rational(x.n, x.d)];
      }),
    );
    const compare = (text: unknown, p: Poly): void => {
      const { num, den } = evaluate(p, values);
      expect(E.show(atPoint(text as string, point))).toBe(E.show(E.q(num, den)));
    };
    compare(json.lagrangian, d.lagrangian);
    compare(json.reduced, d.reducedGravity);
    compare(json.dropped, d.dropped);
    for (const [q, p] of d.equations) compare((json.equations as Record<string, string>)[q], p);
    compare((json.friedmann as { p_T: string }).p_T, d.friedmann!.pT);
  });

  it('prints texts that the program reads back to the same polynomials', () => {
    const d = of(FULL);
    const known = new Set(d.ring.generators.map((g) => g.name));
    for (const p of [d.lagrangian, ...d.equations.values(), d.friedmann!.rhoT, ...d.combinations]) {
      const options = { isSymbol: (name: string) => known.has(name), allowJets: true };
      const again = polyOfScalar(d.ring, parseScalar(plainPassage(infix(p), 'text'), options));
      expect(infix(again)).toBe(infix(p));
      expect(equals(again, p)).toBe(true);
    }
  });

  it('gives eliminated symbols and conditions', () => {
    const json = read({
      lagrangian: 'c0 R + c1 R^2 + c2 T_a T^a',
      constants: ['c0', 'c1', 'c2'],
      impose: ['c1 = -2 c0', 'c2^2 = c0^2', 'k = 0'],
    });
    expect(json.eliminated).toEqual({ c1: '-2*c0', k: '0' });
    expect(json.conditions).toEqual(['-c0^2 + c2^2 = 0']);
  });

  it('has no Friedmann form, no screening and a reason on an anisotropic geometry', () => {
    const json = read({ lagrangian: '1/2 M^2 R', geometry: 'bianchi-i' });
    expect(json).not.toHaveProperty('friedmann');
    expect(json).not.toHaveProperty('screening');
    expect(json.scalarTensor).toEqual({
      form: 'none',
      reason: 'a metric analogue is defined on an isotropic background; the geometry bianchi-i is none',
    });
    expect((json.variables as string[]).length).toBe(10);
  });

  it('gives the offending terms when there is no form in the class', () => {
    const json = read({ lagrangian: 'c0 (T_a T^a)^2', constants: ['c0'] });
    expect(json.scalarTensor).toEqual({
      form: 'none',
      reason: 'terms of more than second degree in the velocities have no counterpart in this class',
      offending: '81*c0*D(a,1)^4/a^4 - 324*c0*phi*D(a,1)^3/a^3',
    });
  });

  it('repeats warnings, and the names and details of checks', () => {
    const json = read({ lagrangian: 'R', scales: [] });
    expect(json.warnings).toEqual(['the term R has mass dimension 2, a Lagrangian has 4']);
    const checks = json.checks as { name: string; holds: boolean; detail: string }[];
    expect(checks.every((c) => c.holds && Object.keys(c).join() === 'name,holds,detail')).toBe(true);
  });

  it('survives names that JavaScript objects have', () => {
    const json = read({
      lagrangian: 'constructor R',
      constants: ['constructor', 'toString'],
      impose: ['toString = 1'],
    });
    expect(json.parameters).toContain('constructor');
    expect(Object.keys(json.eliminated as object)).toEqual(['toString']);
  });

  it('is indented and ends with a line end', () => {
    const text = derivationJson(of({ lagrangian: '1/2 M^2 R' }));
    expect(text.startsWith('{\n  "untwist": 1,\n')).toBe(true);
    expect(text.endsWith('}\n')).toBe(true);
  });
});
