import { describe, expect, it } from 'vitest';
import { plainPassage } from '../../src/notation/passage.js';
import { printScalar } from '../../src/notation/print.js';
import { assumptionToMass, parseAssumption } from '../../src/notation/read-assumptions.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { errorText, theoryFile } from './rendered.js';

const NAMES = ['a4', 'b3', 'k', 'M', 'kappa'];
const parse = (text: string) =>
  parseAssumption(plainPassage(text, '--assume'), { isSymbol: (n) => NAMES.includes(n), names: NAMES });
const shown = (text: string): string => {
  const { left, relation, right } = parse(text);
  return `${printScalar(left)} ${relation} ${printScalar(right)}`;
};
const file = (...lines: string[]) =>
  theoryFile('constants: [a4, b3]', 'scales: { M: mass }', 'lagrangian: a4 R^2 + b3 M^2 R', ...lines);

describe('an assumption', () => {
  it('is one comparison of polynomials', () => {
    expect(shown('a4 > 0')).toBe('a4 > 0');
    expect(shown('3 a4^2 - b3 <= 1/2 k')).toBe('3 a4^2 - b3 <= 1/2 k');
    expect(shown('a4 ≥ b3')).toBe('a4 >= b3');
    expect(shown('a4 \\leq b3')).toBe('a4 <= b3');
    expect(shown('a4 \\ne 0')).toBe('a4 != 0');
    expect(parse('  a4   >  0 ').text).toBe('a4 > 0');
  });

  it('is refused with the place of the fault', () => {
    expect(errorText(() => parse('a4 = 0'))).toContain('needs one of the signs');
    expect(errorText(() => parse('0 < a4 < 1'))).toMatch(/second comparison.*\n.*\n +\^/);
    expect(errorText(() => parse('a4 >'))).toContain('nothing stands beside >');
    expect(errorText(() => parse('a5 > b9'))).toMatch(/unknown symbol a5[\s\S]*unknown symbol b9/);
  });

  it('is translated to the Planck mass', () => {
    const { right } = assumptionToMass(parse('a4 > kappa'), 'kappa');
    expect(printScalar(right)).toBe('M^{-2}');
  });
});

describe('the key assume', () => {
  it('takes a list or one text, and the command line adds to it', () => {
    const theory = readTheory(file('assume: ["a4 > 0", "k >= 0"]'), 'x.yaml', { assume: ['b3 < 0'] });
    expect(theory.assumptions!.map((a) => a.text)).toEqual(['a4 > 0', 'k >= 0', 'b3 < 0']);
    expect(readTheory(file('assume: "a4 > 0"'), 'x.yaml').assumptions).toHaveLength(1);
    expect(readTheory(file(), 'x.yaml').assumptions).toBeUndefined();
  });

  it('names what is no constant', () => {
    expect(errorText(() => readTheory(file('assume: ["phi > 0"]'), 'x.yaml'))).toMatch(/x\.yaml:\d+:\d+: error: .*phi/);
  });
});
