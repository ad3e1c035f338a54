import { describe, expect, it } from 'vitest';
import { sumOf, viewerOf } from '../../src/emit/display.js';
import { compareMonomials } from '../../src/emit/display-order.js';
import { sumTex, unsignedTex } from '../../src/emit/latex-math.js';
import { FIXTURES, fixture } from './latex-fixtures.js';

/** The field parts of the terms, in order. */
const monomials = (name: Parameters<typeof fixture>[0], q: string): string[] => {
  const d = fixture(name);
  const viewer = viewerOf(d);
  return viewer
    .sum(d.equations.get(q)!)
    .terms.map((t) => t.monomial)
    .map((monomial) => {
      const [term] = sumTex({
        divided: [],
        terms: [{ content: { num: 1n, den: 1n }, common: [], bracket: [], monomial }],
      });
      return unsignedTex(term!);
    });
};

describe('order of terms', () => {
  it('is highest derivatives, rates, fields, curvature, matter', () => {
    expect(monomials('with-relations', 'N')).toEqual([
      'H^{2}',
      '\\dot{\\phi}^{2}',
      '\\dot{\\psi}^{2}',
      'H \\phi \\dot{\\phi}',
      'H \\psi \\dot{\\psi}',
      'H^{2} \\phi^{2}',
      'H^{2} \\psi^{2}',
      '\\phi^{2}',
      '\\psi^{2}',
      '\\phi^{4}',
      '\\phi^{2} \\psi^{2}',
      '\\psi^{4}',
      '\\frac{k}{a^{2}}',
      '\\frac{k}{a^{2}} \\phi^{2}',
      '\\frac{k}{a^{2}} \\psi^{2}',
      '\\frac{k^{2}}{a^{4}}',
      '\\Lambda',
      '\\frac{\\rho_{\\mathrm{dust}}}{a^{3}}',
      '\\frac{\\rho_{\\mathrm{radiation}}}{a^{4}}',
      '\\rho_{\\chi}',
    ]);
  });

  it('puts the acceleration of the field that was varied first', () => {
    expect(monomials('with-relations', 'phi')[0]).toBe('\\ddot{\\phi}');
    expect(monomials('with-relations', 'psi')[0]).toBe('\\ddot{\\psi}');
    expect(monomials('with-relations', 'a')[0]).toBe('\\dot{H}');
  });

  it.each(FIXTURES)('is total, antisymmetric and transitive on the monomials of %s', (name) => {
    const d = fixture(name);
    const viewer = viewerOf(d);
    const pool = [...d.equations.values()].flatMap((e) =>
      viewer
        .sum(e)
        .terms.map((t) => t.monomial)
        .filter((_, i) => i % 5 === 0 || i < 8),
    );
    const sign = (i: number, j: number): number => Math.sign(compareMonomials(pool[i]!, pool[j]!));
    const text = (i: number): string => pool[i]!.map((f) => `${f.symbol.generator}^${f.exponent}`).join(' ');
    for (let i = 0; i < pool.length; i++)
      for (let j = 0; j < pool.length; j++)
        if (sign(i, j) + sign(j, i) !== 0 || (sign(i, j) === 0) !== (text(i) === text(j)))
          expect(`${text(i)} against ${text(j)}`).toBe('in order');
    const sorted = [...pool.keys()].sort(sign);
    for (let i = 0; i < sorted.length; i++)
      for (let j = i; j < sorted.length; j++)
        if (sign(sorted[i]!, sorted[j]!) > 0)
          expect(`${text(sorted[i]!)} before ${text(sorted[j]!)}`).toBe('transitive');
  });

  it('of couplings in a bracket is that of their declaration', () => {
    const d = fixture('ten-couplings');
    const viewer = viewerOf(d);
    const names = d.combinations.map((p) =>
      sumOf(p, viewer.symbols, false).terms.flatMap((t) => t.bracket.map((b) => b.factors[0]!.symbol.name)),
    );
    const declared = d.theory.symbols.map((s) => s.name);
    expect(names.some((list) => list.length > 4)).toBe(true);
    for (const list of names) {
      const places = list.map((n) => declared.indexOf(n));
      expect(places).toEqual([...places].sort((a, b) => a - b));
    }
  });
});
