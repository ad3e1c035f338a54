import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { equivalence } from '../../src/compare/equivalence.js';
import { jetSpace } from '../../src/compare/jet-space.js';
import { BOUNDS, type Bound } from '../../src/compare/system.js';
import { derivationOf, EINSTEIN_CARTAN, TORSION_SCALAR, type Wanted } from './derivations.js';

const TELEPARALLEL: Wanted = { lagrangian: `-1/2 M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] };
const BOTH = new Set(['phi', 'psi']);

function between(a: Wanted, b: Wanted, shared: ReadonlySet<string>, anyMatter = true, bound: Bound = BOUNDS[0]) {
  const [first, second] = [derivationOf(a), derivationOf(b)];
  return equivalence(jetSpace([first, second]), [first, second], shared, anyMatter, bound);
}

describe('the same solutions', () => {
  it('of the connection and the metric', () => {
    const mass: Wanted = { lagrangian: '1/2 M^2 R + c M^2 T_a T^a', constants: ['c'] };
    expect(between(EINSTEIN_CARTAN, mass, BOTH)).toMatchObject({
      result: 'same',
      eliminated: [[], []],
      compared: [4, 4],
    });
    const free = between({ ...EINSTEIN_CARTAN, constrain: ['T^a_{bc}'] }, EINSTEIN_CARTAN, BOTH);
    expect(free).toMatchObject({ result: 'same' });
    expect(free.result === 'same' && free.eliminated[0].length).toBeGreaterThan(1);
  });

  it('of the metric alone', () => {
    expect(between(TELEPARALLEL, EINSTEIN_CARTAN, BOTH).result).toBe('different');
    expect(between(TELEPARALLEL, EINSTEIN_CARTAN, new Set()).result).toBe('same');
    expect(between(EINSTEIN_CARTAN, TELEPARALLEL, new Set()).result).toBe('same');
  });

  it('for some matter only', () => {
    const square: Wanted = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'], matter: ['radiation'] };
    const plain: Wanted = { ...EINSTEIN_CARTAN, matter: ['radiation'] };
    expect(between(plain, square, BOTH, true).result).toBe('different');
    expect(between(plain, square, BOTH, false).result).toBe('same');
  });
});

describe('a difference', () => {
  it('is an equation of one theory with what it comes to in the other', () => {
    const found = between(TELEPARALLEL, { lagrangian: 'M^2 R' }, new Set());
    if (found.result !== 'different') throw new Error(found.result);
    const { of, equation, poly, counterpart, residual } = found.missing;
    expect([of, equation]).toEqual([1, 'rho']);
    expect(infix(poly)).toBe('rho*a^2 - 3*M^2*H^2*a^2 - 3*k*M^2');
    expect(infix(counterpart!)).toBe('rho*a^2 - 6*M^2*H^2*a^2 - 6*k*M^2');
    expect(infix(residual.top)).toBe('3*M^2*H^2*a^2 + 3*k*M^2');
  });
});

describe('what is not decided', () => {
  it('is told', () => {
    const square: Wanted = { lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] };
    const found = between(square, EINSTEIN_CARTAN, new Set(), true, {
      products: 30,
      terms: 30,
    } as unknown as (typeof BOUNDS)[number]);
    expect(found).toMatchObject({ result: 'undecided' });
    expect(found.result === 'undecided' && found.reason).toMatch(
      /the elimination needs more than|a polynomial of more/,
    );
  });
});
