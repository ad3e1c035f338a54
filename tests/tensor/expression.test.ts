import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { constant, generator, isCanonical, type Poly } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { canonicalSum, factorsKey, type TensorSymbol, type TensorTerm } from '../../src/tensor/expression.js';
import { kindTable } from '../../src/tensor/kinds.js';

const RING = makeRing(constantsOf(['x', 'y']));
const ONE = constant(RING, 1);
const KINDS = kindTable();

/** `T_abc`, `T^abc`, `T_a^bc`: a height holds until the next mark; words `eps`, `eta`, `del` are ε, η, δ. */
function tensor(text: string): TensorSymbol {
  const [, word, part, rest] = /^([A-Za-z]+)(?:\(([a-z-]+)\))?(.*)$/.exec(text)!;
  const head = { eps: 'epsilon', del: 'delta' }[word!] ?? word!;
  let up = false;
  const slots: { name: string; up: boolean }[] = [];
  for (const c of rest!) {
    if (c === '^' || c === '_') up = c === '^';
    else slots.push({ name: c, up });
  }
  return part === undefined ? { head, slots } : { head, part, slots };
}
const term = (text: string, coefficient: Poly = ONE): TensorTerm => ({
  coefficient,
  factors: text.split(' ').filter(Boolean).map(tensor),
});
const shown = (terms: readonly TensorTerm[]): string => {
  const sum = canonicalSum(terms, KINDS);
  for (const t of sum) expect(isCanonical(t.coefficient)).toBe(true);
  return sum.map((t) => `${infix(t.coefficient)}·${factorsKey(t.factors)}`).join(' + ');
};

describe('metrics', () => {
  it('are contracted away, also in chains and in their own trace', () => {
    expect(shown([term('eta_ab eta^bc T_c T^a')])).toBe('1·T(_a)T(^a)');
    expect(shown([term('eta_ab eta^ab')])).toBe('4·');
    expect(shown([term('del^a_a')])).toBe('4·');
    expect(shown([term('del^a_b R_a^b')])).toBe('1·R()');
    expect(shown([term('eta^ac eta^bd R_abcd')])).toBe('1·R()');
    expect(shown([term('eta^ab eta^cd R_abcd')])).toBe('');
  });

  it('carry free indices on', () => {
    expect(shown([term('eta^xb T_b')])).toBe('1·T(^x)');
    expect(shown([term('eta_ab')])).toBe('1·eta(_a_b)');
    expect(shown([term('eta_ba')])).toBe('1·eta(_a_b)');
  });
});

describe('ε', () => {
  it('two of them are a determinant of metrics, with the sign of the signature', () => {
    expect(shown([term('eps_abcd eps^abcd')])).toBe('-24·');
    expect(shown([term('eps_abcd eps^abce T^d T_e')])).toBe('-6·T(_a)T(^a)');
    expect(shown([term('eps^abcd eps^efgh R_abef R_cdgh')])).toBe(
      '-4·R()R() + 16·R(_a_b)R(^b^a) + -4·R(_a_b_c_d)R(^c^d^a^b)',
    );
  });

  it('pairs go first when there are three or four', () => {
    expect(shown([term('eps_abcd eps^abcd eps_efgh eps^efgh')])).toBe('576·');
    expect(shown([term('eps_abcd eps^abcd eps^efgh R_efgh')])).toBe('-24·epsilon(_a_b_c_d)R(^a^b^c^d)');
  });

  it('vanishes against a symmetric pair', () => {
    expect(shown([term('eps^abcd R_aecb R^e_d'), term('eps^abcd R_aecb R^e_d', constant(RING, -1))])).toBe('');
    expect(shown([term('eps^abcd T_a T_b R_cd')])).toBe('');
  });
});

describe('the axial vector', () => {
  it('is written out', () => {
    expect(shown([term('A_a T^a')])).toBe(shown([term('eps_abcd T^bcd T^a')]));
    // −144 v² on the isotropic geometry, where T_abc T^abc = −6u² + 24v² and T_abc T^bac = −3u² − 24v².
    expect(shown([term('A_a A^a')])).toBe('-2·T(_a_b_c)T(^a^b^c) + 4·T(_a_b_c)T(^b^a^c)');
  });
});

describe('traces', () => {
  it('get their names with their signs', () => {
    expect(shown([term('R^c_acb R^ab')])).toBe('1·R(_a_b)R(^a^b)');
    expect(shown([term('R^c_abc R^ab')])).toBe('-1·R(_a_b)R(^a^b)');
    expect(shown([term('R_ac^c_b R^ab')])).toBe('-1·R(_a_b)R(^a^b)');
    expect(shown([term('T^b_ba T^a')])).toBe('-1·T(_a)T(^a)');
    expect(shown([term('T_ab^b')])).toBe('');
  });
});

describe('sums', () => {
  it('collect like terms over their coefficients and drop what cancels', () => {
    const [x, y] = [generator(RING, 'x'), generator(RING, 'y')];
    expect(shown([term('T_abc T^abc', x), term('T^efg T_egf', y)])).toBe('x - y·T(_a_b_c)T(^a^b^c)');
    expect(shown([term('R_ab R^ba', x), term('R_pq R^qp', constant(RING, rational(-1, 2))), term('R', y)])).toBe(
      'y·R() + x - 1/2·R(_a_b)R(^b^a)',
    );
    expect(shown([term('T_abc T^abc', x), term('T^efg T_egf', x)])).toBe('');
  });

  it('of numbers have one term without factors', () => {
    expect(shown([term('', constant(RING, 2)), term('del^a_a')])).toBe('6·');
    expect(shown([])).toBe('');
  });

  it('keep names and heights of free indices and avoid them for dummies', () => {
    expect(shown([term('R_b^dca T_d')])).toBe('-1·R(_b_d^a^c)T(^d)');
    expect(shown([term('T^a_bc T^d'), term('T^d T^a_cb')])).toBe('');
  });

  it('keep irreducible parts apart from the whole, with their own symmetries', () => {
    expect(shown([term('T(axial)_abc T^bac')])).toBe('-1·T[axial](_a_b_c)T(^a^b^c)');
    expect(shown([term('R(weyl)_abcd R^cdab')])).toBe('1·R[weyl](_a_b_c_d)R(^a^b^c^d)');
    expect(shown([term('R(pseudoscalar)_abab')])).toBe('');
  });
});
