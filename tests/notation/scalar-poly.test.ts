import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { isCanonical } from '../../src/algebra/poly.js';
import { constantsOf, ExponentLimitError, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';

const ring = makeRing([
  ...jetsOf('q', 2),
  ...constantsOf(['c', 'k']),
  { kind: 'radical', name: 'sqrt(k)', square: 'k' },
]);
const NAMES = ['q', 'c', 'k', 'kappa'];
const parse = (text: string) =>
  parseScalar(plainPassage(text, 'text'), { isSymbol: (name) => NAMES.includes(name), allowJets: true });

describe('polyOfScalar', () => {
  const rows: readonly (readonly [string, string])[] = [
    ['0', '0'],
    ['c - c', '0'],
    ['\\frac{2}{3} c^2/k - 1', '2*c^2/(3*k) - 1'],
    ['(c + k)^2', 'c^2 + 2*c*k + k^2'],
    ['D(q,2) q - D(q,1)^2/c', 'q*D(q,2) - D(q,1)^2/c'],
  ];
  for (const [text, expected] of rows)
    it(`means ${text}`, () => {
      const p = polyOfScalar(ring, parse(text));
      expect(isCanonical(p)).toBe(true);
      expect(infix(p)).toBe(expected);
    });

  it('gives names of the text other names in the ring', () => {
    const rename = (name: string): string => (name === 'kappa' ? 'sqrt(k)' : name);
    expect(infix(polyOfScalar(ring, parse('kappa^3 + kappa^-2'), rename))).toBe('k*sqrt(k) + 1/k');
  });

  it('refuses what the ring does not have', () => {
    expect(() => polyOfScalar(ring, parse('kappa'))).toThrow('no generator kappa in the ring');
    expect(() => polyOfScalar(ring, parse('D(q,3)'))).toThrow('no generator D(q,3) in the ring');
    const high = parse('c^64').map((t) => ({ ...t, powers: [['c', 512]] as const }));
    expect(() => polyOfScalar(ring, high)).toThrow(ExponentLimitError);
  });
});
