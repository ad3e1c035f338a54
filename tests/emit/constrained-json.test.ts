import { describe, expect, it } from 'vitest';
import { constant, equals, generator, multiply, type Poly, power } from '../../src/algebra/poly.js';
import type { Derivation, SpinElimination } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { constrainedSymbols, fractionText } from '../../src/emit/constrained-json.js';
import { derivationObject, parametersOf } from '../../src/emit/json.js';
import { plainPassage } from '../../src/notation/passage.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import { theoryText, type Wanted } from '../oracle/pipeline.js';

const of = (wanted: Wanted): Derivation => derive(readTheory(theoryText(wanted), 'lee.yaml'));
// biome-ignore lint/suspicious/noExplicitAny: the object as another program sees it
const json = (d: Derivation): any => JSON.parse(JSON.stringify(derivationObject(d)));

const TELEPARALLEL = '-1/2 M^2 (1/4 T_{abc} T^{abc} + 1/2 T_{abc} T^{bac} - T_a T^a)';
const constrained = of({ lagrangian: TELEPARALLEL, constrain: ['R^a_{bcd}'], matter: ['dust'] });
const spinning = of({
  lagrangian: '1/2 M^2 R + M^2/4/gamma \\epsilon^{abcd} R_{abcd}',
  constants: ['q', 'gamma'],
  tensors: ['S: { indices: 1, dimension: mass^3 }'],
  matter: ['{ spin: sigma, axial: q }', '{ spin: S, coupling: "S_a T^a" }'],
});

const parsed = (text: string, ring: Poly['ring']): Poly =>
  polyOfScalar(
    ring,
    parseScalar(plainPassage(text, 'json'), { isSymbol: (n) => ring.position.has(n), allowJets: true }),
  );

describe('multipliers and branches', () => {
  it('are texts that give the polynomials back, roots by their names', () => {
    const { branches, multipliers, branchesComplete } = json(constrained);
    expect(branchesComplete).toBe(true);
    const { branches: own, tensors } = constrained.constrained!;
    tensors[0]!.multipliers.forEach((m, i) => {
      const field = multipliers[0].fields[i];
      expect(equals(parsed(field.vanishes, m.value.ring), m.value)).toBe(true);
      expect(Object.keys(field.tensor).every((key) => /^i[0-3]{4}$/.test(key))).toBe(true);
    });
    own.forEach((b, i) => {
      for (const [q, p] of b.equations) expect(equals(parsed(branches[i].equations[q], b.ring), p)).toBe(true);
      expect(branches[i].remaining).toEqual([]);
    });
    expect(branches[0].roots).toEqual({ 'sqrt(k)': 'k' });
    expect(branches[2].solution).toEqual({ psi: '0', phi: 'sqrt(-k)/a' });
    expect(branches[2].conditions).toEqual(['k < 0']);
  });

  it('are absent without constraints', () => {
    expect(Object.keys(json(spinning))).not.toContain('branches');
    expect(Object.keys(json(constrained))).not.toContain('spin');
  });
});

describe('spin', () => {
  it('has its densities among the parameters', () => {
    expect(parametersOf(spinning)).toEqual(expect.arrayContaining(['sigma', 'S_1', 'q', 'gamma']));
    expect(constrainedSymbols(spinning)).toContain('sigma');
    expect(json(spinning).spin.densities).toEqual(['sigma', 'S_1']);
    expect(json(spinning).spin.tensors).toEqual([
      { tensor: 'S', independent: 4, components: [{ name: 'S_1', tensor: { i0: '1' } }] },
    ]);
  });

  it('writes fractions that have their value', () => {
    const elimination = spinning.spin!.elimination as SpinElimination;
    const { ring } = elimination.rho.numerator;
    for (const f of [...elimination.solution.values(), elimination.rho, elimination.p!]) {
      const text = fractionText(f);
      // text · denominator = numerator: with one factor the text is (numerator)/(base).
      expect(f.denominator.map((d) => d.power)).toEqual([1]);
      const [top, below] = text.split('/(gamma^2 + 1)');
      expect(below).toBe('');
      expect(equals(parsed(top!, ring), f.numerator)).toBe(true);
    }
    const x = generator(ring, 'q');
    const two = { base: x, power: 2 };
    expect(
      fractionText({ numerator: constant(ring, 1), denominator: [two, { base: multiply(x, power(x, 0)), power: 1 }] }),
    ).toBe('1/((q)^2*(q))');
  });

  it('says why nothing was eliminated', () => {
    const d = of({ lagrangian: 'M^2 R + R^2', matter: ['{ spin: sigma, axial: 1 }'] });
    expect(json(d).spin.elimination).toEqual({ found: false, reason: expect.stringContaining('torsion propagates') });
  });
});
