import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, equals, isZero, multiply, type Poly, zero } from '../../src/algebra/poly.js';
import { readClaim } from '../../src/compare/claim.js';
import { vocabularyOf } from '../../src/compare/vocabulary.js';
import { InputError } from '../../src/notation/diagnostics.js';
import { derivationOf } from './derivations.js';

const vocabulary = vocabularyOf(derivationOf({ lagrangian: '1/2 M^2 R + c R^2', constants: ['c'] }), [
  'x = phi/H',
  'mu = M + c',
]);
const read = (text: string) => readClaim(vocabulary, text);
const total = (terms: readonly { readonly value: Poly }[]): Poly =>
  terms.reduce((sum, t) => add(sum, t.value), zero(vocabulary.space.ring));

describe('reading a claim', () => {
  it('left minus right', () => {
    expect(infix(read('3 M^2 H^2 = rho').poly)).toBe('-rho + 3*M^2*H^2');
    expect(read(' 3  M^2\tH^2 = rho ').text).toBe('3 M^2 H^2 = rho');
    expect(isZero(read('H = H').poly)).toBe(true);
  });

  it.each([
    '3 M^2 (H^2 + k/a^2) = rho',
    '\\dot H = (mu x + 3 p - rho)/(6 c) - 2 H^2 - k/a^2',
    'phi/(H - phi) - 1/x = mu/(M - c) + 2',
    '-(H - phi)(psi + 1) = 1/2 H - (-3) psi',
    '-H/(2 mu) (phi + psi) = -(-x)^2',
  ])('%s is the sum of its terms, and groups are sums of terms', (text) => {
    const claim = read(text);
    expect(equals(total(claim.terms), claim.poly)).toBe(true);
    for (const group of claim.groups) expect(isZero(group.value)).toBe(false);
  });

  it('names terms as they were typed', () => {
    const claim = read('\\dot H = -1/3 (x + 6 mu/c) phi - 2 H^2');
    expect(claim.terms.map((t) => t.text)).toEqual(['\\dot H', '1/3 x phi', '1/3 6 mu/c phi', '2 H^2']);
    expect(claim.groups.map((t) => t.text)).toEqual(['1/3 (x + 6 mu/c) phi']);
    expect(equals(claim.groups[0]!.value, add(claim.terms[1]!.value, claim.terms[2]!.value))).toBe(true);
  });

  it('is cleared of denominators, which are told', () => {
    const claim = read('1/x + psi/(H - phi) = 1/mu');
    expect(claim.divisors.map(infix)).toEqual(['phi', expect.stringContaining('phi')]);
    const back = read('H/phi + psi/(H - phi) - 1/(M + c) = 0');
    expect(equals(multiply(claim.poly, claim.poly), multiply(back.poly, back.poly))).toBe(true);
    expect(read('1/a + 1/M = 0').divisors).toEqual([]);
  });

  it.each([
    ['H = q', 'unknown-symbol', 'define it with --where, or mend the name'],
    ['H', 'missing-equals', 'for example b1 = -2 b3'],
    ['H = R_{ab}', 'unknown-symbol', 'define it with --where, or mend the name'],
    ['H = 1/0', 'division-by-zero', 'it vanishes here'],
    ['H = 0.5', 'decimal-point', 'write a fraction: 1/2'],
    ['D(H,9) = 0', 'exponent-limit', 'smaller orders only'],
    ['(H^60)^20 = 0', 'exponent-limit', 'smaller powers only'],
  ])('%s is refused', (text, code, hint) => {
    try {
      read(text);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(InputError);
      expect((error as InputError).diagnostics[0]).toMatchObject({ code, hint });
    }
  });
});
