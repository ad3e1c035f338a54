import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { boundOf } from '../../src/scalartensor/potential-bound.js';
import { knowing, poly } from './forms.js';

const bound = (text: string, ...assumed: readonly string[]) => boundOf(poly(text), ['phi', 'psi'], knowing(...assumed));
const verdict = (text: string, ...assumed: readonly string[]): string => bound(text, ...assumed).verdict;

describe('whether a potential is bounded', () => {
  it('is decided by the signs of its terms when they agree', () => {
    expect(verdict('0')).toBe('zero');
    expect(verdict('M^4 + phi^2')).toBe('positive');
    expect(verdict('phi^2 psi^2')).toBe('non-negative');
    expect(verdict('-phi^4 - M^4')).toBe('negative');
    expect(verdict('c phi^2', '0 > c')).toBe('non-positive');
  });

  it('is decided by the leading terms otherwise', () => {
    expect(verdict('phi^4 - M^2 phi^2')).toBe('bounded below');
    expect(verdict('c phi^4 - M^2 phi^2', 'c > 0')).toBe('bounded below');
    expect(verdict('phi^3 + phi^2')).toBe('unbounded');
    expect(verdict('phi^4 + psi^4 - phi^2 psi^2 - M^2 psi^2')).toBe('bounded below');
    expect(verdict('phi^4 + psi^4 + c phi^2 psi^2 - M^2 psi^2', 'c > 0')).toBe('bounded below');
    expect(verdict('phi^4 + psi^4 - 3 phi^2 psi^2')).toBe('unbounded');
    expect(verdict('phi^2 - psi^2')).toBe('unbounded');
    expect(verdict('phi^2 + 3 phi psi + psi^2')).toBe('unbounded');
    expect(verdict('phi^2 + phi psi + psi^2 + M phi')).toBe('bounded below');
    expect(verdict('-phi^4 - psi^4 + phi^2 psi^2 + M^2 psi^2')).toBe('bounded above');
  });

  it('is left open with the signs that are missing, and their assumptions are listed when used', () => {
    expect(verdict('c phi^4 - M^2 phi^2')).toBe('undecided');
    expect(bound('c phi^4 - M^2 phi^2').open.map(infix)).toEqual(['c']);
    expect(bound('c phi^4 - M^2 phi^2', 'c > 1').used).toEqual(['c > 1']);
    expect(verdict('c phi^3')).toBe('undecided');
    expect(verdict('c phi^3', 'c != 0')).toBe('unbounded');
    expect(verdict('phi^3 psi + phi psi^3')).toBe('undecided');
  });
});
