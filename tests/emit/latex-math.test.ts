import { describe, expect, it } from 'vitest';
import { constant, generator, type Poly, product, scale, sum } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { type DisplaySum, sumOf } from '../../src/emit/display.js';
import type { DisplaySymbol, SymbolRole } from '../../src/emit/display-symbols.js';
import { inlineTex, overTex, powerTex, productTex, pulledOutTex, rateTex, sumTex } from '../../src/emit/latex-math.js';

const symbol = (name: string, role: SymbolRole, latex = name, order = 0): DisplaySymbol => ({
  generator: order === 0 ? name : `D(${name},${order})`,
  name,
  latex,
  role,
  order,
  rank: 0,
  dimension: name === 'k' ? 2 : 0,
  isAbbreviated: false,
});
const list = [
  symbol('a1', 'constant', 'a_{1}'),
  symbol('a2', 'constant', 'a_{2}'),
  symbol('al', 'constant', '\\alpha_0'),
  symbol('cp', 'constant', "c'"),
  symbol('M', 'scale', 'M'),
  symbol('k', 'parameter', 'k'),
  symbol('rho', 'density', '\\rho_{\\mathrm{dust}}'),
  symbol('a', 'length', 'a'),
  symbol('phi', 'field', '\\phi'),
  symbol('psi', 'field', '\\psi'),
  symbol('phi', 'field', '\\phi', 1),
];
const table = new Map(list.map((s) => [s.generator, s]));
const ring = makeRing(constantsOf(table.keys()));
const g = (name: string, n = 1): Poly => generator(ring, name, n);
const times = (...factors: readonly (Poly | number)[]): Poly =>
  product(
    ring,
    factors.map((f) => (typeof f === 'number' ? constant(ring, f) : f)),
  );
const over = (p: Poly, den: number): Poly => scale(p, rational(1, den));
const tex = (...terms: readonly Poly[]): string => inlineTex(sumTex(sumOf(sum(ring, terms), table, false)));

describe('sums', () => {
  it('factor couplings in front of the field monomial', () => {
    expect(tex(times(6, g('a1'), g('D(phi,1)', 2)), times(12, g('a2'), g('D(phi,1)', 2)))).toBe(
      '6 (a_{1} + 2 a_{2}) \\dot{\\phi}^{2}',
    );
    expect(tex(times(-3, g('M', 2), g('a1'), g('phi')), times(3, g('M', 2), g('a2'), g('phi')))).toBe(
      '-3 M^{2} (a_{1} - a_{2}) \\phi',
    );
    expect(tex(over(times(g('a1'), g('phi')), 2), over(times(g('a2'), g('phi')), 3))).toBe(
      '\\tfrac{1}{6} (3 a_{1} + 2 a_{2}) \\phi',
    );
  });

  it('keep symbols apart', () => {
    expect(tex(times(g('al'), g('M')))).toBe('\\alpha_0 M');
    expect(tex(times(g('phi'), g('psi')))).toBe('\\phi \\psi');
    expect(tex(times(g('al', 2), g('phi', 3)))).toBe('\\alpha_0^{2} \\phi^{3}');
  });

  it('write Laurent monomials as the fractions they are known as', () => {
    expect(tex(times(3, g('M', 2), g('k'), g('a', -2)))).toBe('3 M^{2} \\frac{k}{a^{2}}');
    expect(tex(times(g('k', 2), g('a', -4), g('phi', 2)))).toBe('\\frac{k^{2}}{a^{4}} \\phi^{2}');
    expect(tex(times(-1, g('rho'), g('a', -3)))).toBe('-\\frac{\\rho_{\\mathrm{dust}}}{a^{3}}');
    expect(tex(times(g('k'), g('phi', 2), g('a', -4)))).toBe('\\frac{k \\phi^{2}}{a^{4}}');
    expect(tex(g('a', -2))).toBe('\\frac{1}{a^{2}}');
    expect(tex(over(times(3, g('a1'), g('a2', -2)), 2))).toBe('\\frac{3 a_{1}}{2 a_{2}^{2}}');
    expect(tex(times(g('a1'), g('a2', -1), g('phi')), times(g('phi'), g('M', -1)))).toBe(
      '\\Bigl( \\frac{a_{1}}{a_{2}} + \\frac{1}{M} \\Bigr) \\phi',
    );
  });

  it('are 0 and 1 when nothing is left to write', () => {
    expect(tex()).toBe('0');
    expect(tex(constant(ring, 1))).toBe('1');
    expect(tex(constant(ring, -1))).toBe('-1');
    expect(tex(constant(ring, rational(-2, 3)))).toBe('-\\tfrac{2}{3}');
  });

  it('open a bracket that would be alone', () => {
    expect(tex(g('a1'), times(-2, g('a2')))).toBe('a_{1} - 2 a_{2}');
    expect(tex(times(-1, g('a1')), g('a2'))).toBe('-a_{1} + a_{2}');
  });

  it('may have their common number pulled out', () => {
    const p = sum(ring, [times(12, g('phi', 2)), times(-12, g('psi', 2))]);
    const pulled = (of: DisplaySum): string => inlineTex(pulledOutTex(of));
    expect(pulled(sumOf(p, table, false))).toBe('12 (\\phi^{2} - \\psi^{2})');
    expect(pulled(sumOf(times(-9, g('phi', 2)), table, false))).toBe('-9 \\phi^{2}');
  });
});

describe('powers', () => {
  it.each([
    ['\\phi', '\\phi^{2}'],
    ['a_{1}', 'a_{1}^{2}'],
    ['\\alpha_0', '\\alpha_0^{2}'],
    ['\\mathrm{mass}_{1}', '\\mathrm{mass}_{1}^{2}'],
    ['\\tilde{c}_{\\mathrm{x}}', '\\tilde{c}_{\\mathrm{x}}^{2}'],
    ["c'", "(c')^{2}"],
    ['g^{\\star}', '(g^{\\star})^{2}'],
    ['g_{1}^{a}', '(g_{1}^{a})^{2}'],
    ['ab', '(ab)^{2}'],
  ])('of %s are %s', (latex, expected) => {
    expect(powerTex(symbol('x', 'constant', latex), 2)).toBe(expected);
  });

  it('of rates put dots on the letter', () => {
    expect(powerTex(symbol('x', 'field', '\\phi', 2), 3)).toBe('\\ddot{\\phi}^{3}');
    expect(powerTex(symbol('x', 'field', '\\phi_x', 1), 2)).toBe('\\dot{\\phi}_x^{2}');
    expect(powerTex(symbol('x', 'field', '\\phi', 3), 1)).toBe('\\dddot{\\phi}');
    expect(powerTex(symbol('x', 'field', '\\phi', 4), 2)).toBe('(\\phi^{(4)})^{2}');
    expect(rateTex('a_x')).toBe('\\dot{a}_x');
  });
});

describe('left sides', () => {
  it('name what was divided out', () => {
    const factor = (name: string, exponent: number) => ({ symbol: table.get(name)!, exponent });
    expect(overTex('E_{N}', [factor('a', 3)])).toBe('\\frac{E_{N}}{a^{3}}');
    expect(overTex('E', [])).toBe('E');
    expect(overTex('E', [factor('a', -1)])).toBe('E a');
    expect(overTex('L', [factor('a', 3)], ['N'])).toBe('\\frac{L}{N a^{3}}');
    expect(productTex([factor('a', 3)])).toBe('a^{3}');
  });
});
