import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { isCanonicalScalar } from '../../src/notation/scalar-term.js';
import type { ScalarTerm } from '../../src/notation/theory.js';
import { fromMass, toMass, UNIT_SYMBOLS, type Units } from '../../src/notation/units.js';

const UNITS = Object.keys(UNIT_SYMBOLS) as Units[];
const POINT: Record<string, number> = { M: 1.7, c: 0.6, pi: Math.PI };
POINT.kappa = 1 / POINT.M! ** 2;
POINT.G = 1 / (8 * Math.PI * POINT.M! ** 2);
const value = ({ coefficient: { num, den }, powers }: ScalarTerm): number =>
  powers.reduce((product, [name, n]) => product * POINT[name]! ** n, Number(num) / Number(den));

const monomial = (names: readonly string[]): fc.Arbitrary<ScalarTerm> =>
  fc
    .tuple(
      fc.integer({ min: 1, max: 9 }),
      fc.integer({ min: 1, max: 9 }),
      ...names.map(() => fc.integer({ min: -7, max: 7 })),
    )
    .map(([n, d, ...powers]) => ({
      coefficient: rational(n, d),
      powers: names.map((name, i) => [name, powers[i]!] as const).filter(([, power]) => power !== 0),
    }));

describe.each(UNITS)('%s', (units) => {
  const symbols = UNIT_SYMBOLS[units].map((s) => s.name);
  it('toMass keeps the value and leaves no unit but π', () => {
    const names = ['c', 'M', ...symbols].sort();
    fc.assert(
      fc.property(monomial(names), (term) => {
        const result = toMass(term, units);
        expect(value(result) / value(term)).toBeCloseTo(1, 10);
        expect(result.powers.every(([name]) => ['M', 'c', 'pi'].includes(name))).toBe(true);
        expect(isCanonicalScalar([result])).toBe(true);
      }),
    );
  });
  it('fromMass keeps the value, goes back, and leaves M at most once', () => {
    fc.assert(
      fc.property(monomial(['M', 'c', 'pi']), (term) => {
        const result = fromMass(term, units);
        expect(value(result) / value(term)).toBeCloseTo(1, 10);
        expect(toMass(result, units)).toEqual(term);
        expect(isCanonicalScalar([result])).toBe(true);
        const power = result.powers.find(([name]) => name === 'M')?.[1] ?? 0;
        if (units !== 'mass') expect(Math.abs(power)).toBeLessThanOrEqual(1);
      }),
    );
  });
});
