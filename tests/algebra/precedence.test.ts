import { describe, expect, it } from 'vitest';
import { bracketed, type Level, PRECEDENCE } from '../../src/algebra/precedence.js';

describe('precedence', () => {
  it('brackets what binds less tightly than its place, and nothing else', () => {
    const levels = Object.values(PRECEDENCE) as Level[];
    for (const own of levels)
      for (const place of levels) expect(bracketed('x', own, place)).toBe(own < place ? '(x)' : 'x');
  });

  it('orders the operators as arithmetic does', () => {
    const { sum, product, sign, power, atom } = PRECEDENCE;
    expect([atom, power, sign, product, sum].sort((a, b) => a - b)).toEqual([sum, product, sign, power, atom]);
    expect(new Set(Object.values(PRECEDENCE)).size).toBe(5);
    // -(a^2) and (-a)^2; a*(-b) without brackets.
    expect(bracketed('-a', sign, power)).toBe('(-a)');
    expect(bracketed('a^2', power, sign)).toBe('a^2');
    expect(bracketed('-b', sign, product)).toBe('-b');
  });
});
