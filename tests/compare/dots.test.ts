import { describe, expect, it } from 'vitest';
import { withoutDots } from '../../src/compare/dots.js';
import { plainPassage } from '../../src/notation/passage.js';

const read = (text: string): string => withoutDots(plainPassage(text, 'x')).text;

describe('dots', () => {
  it.each([
    ['\\dot{\\phi} = H', 'D(\\phi,1) = H'],
    ['\\dot\\phi^2', 'D(\\phi,1)^2'],
    ['\\ddot a + \\dddot{a}', 'D(a,2) + D(a,3)'],
    ['dot(phi) ddot( psi )', 'D(phi,1) D(psi,2)'],
    ['\\dot{\\rho_{dust}}', 'D(\\rho_{dust},1)'],
    ['\\dot x_1', 'D(x_1,1)'],
    ['3 \\cdot \\dot H', '3 \\cdot D(H,1)'],
    ['D(phi,2)', 'D(phi,2)'],
    ['adot(phi) + x_dot', 'adot(phi) + x_dot'],
    ['\\dot{} + dot() + dot(a b)', '\\dot{} + dot() + dot(a b)'],
  ])('%s', (typed, expected) => {
    expect(read(typed)).toBe(expected);
  });

  it('keep the places of what was typed', () => {
    const typed = 'x + \\dot{\\phi} + yy';
    const { text, locate } = withoutDots(plainPassage(typed, 'x'));
    const cut = (what: string): string => {
      const at = text.indexOf(what);
      const { start, end } = locate(at, at + what.length);
      return typed.slice(start, end);
    };
    expect(cut('D(\\phi,1)')).toBe('\\dot{\\phi}');
    expect(cut('yy')).toBe('yy');
    expect(cut('x')).toBe('x');
    expect(cut(text)).toBe(typed);
    expect(locate(text.length, text.length).start).toBe(typed.length);
  });
});
