import { describe, expect, it } from 'vitest';
import { symbolsOf } from '../../src/algebra/collect.js';
import { isCanonical, isZero, type Poly } from '../../src/algebra/poly.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import {
  type Branch,
  branchesOf,
  branchName,
  conditionText,
  onBranch,
  rootName,
} from '../../src/mechanics/branches.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const FIELDS = ['N', 'a', 'phi', 'psi'];
const CONSTANTS = ['k', 'M', 'c1', 'c2'];
const ring = makeRing([...FIELDS.flatMap((q) => jetsOf(q, 5)), ...constantsOf(CONSTANTS)]);
const known = [...FIELDS, ...CONSTANTS];
const poly = (text: string): Poly =>
  polyOfScalar(ring, parseScalar(plainPassage(text, 'test'), { isSymbol: (n) => known.includes(n), allowJets: true }));
const ROLES = { unknowns: ['phi', 'psi'], positive: ['N', 'a'], parameters: ['k'], scales: ['M'] };

function solved(...texts: readonly string[]): readonly Branch[] {
  const constraints = texts.map(poly);
  const { branches, complete } = branchesOf(constraints, ROLES);
  expect(complete).toBe(true);
  for (const branch of branches)
    constraints.forEach((c, i) => {
      const value = onBranch(c, branch);
      expect(isCanonical(value)).toBe(true);
      expect(isZero(value)).toBe(!branch.remaining.includes(i));
    });
  return branches;
}
const names = (...texts: readonly string[]): string[] => solved(...texts).map(branchName);
const remaining = (...texts: readonly string[]): (readonly number[])[] => solved(...texts).map((b) => b.remaining);

const EXPANSION = 'D(a,1)/(a N)';

describe('branchesOf', () => {
  it('follows a product into its factors and a square into the signs of its constant', () => {
    expect(names('phi psi', 'k/a^2 + phi^2 - psi^2')).toEqual([
      'phi = 0, psi = sqrt(k)/a (k > 0)',
      'phi = psi = 0 (k = 0)',
      'psi = 0, phi = sqrt(-k)/a (k < 0)',
    ]);
  });

  it('checks constraints with derivatives on the solutions of the others', () => {
    expect(names(`D(psi,1)/N + psi ${EXPANSION}`, 'phi', 'k/a^2 - psi^2')).toEqual([
      'phi = 0, psi = sqrt(k)/a (k > 0)',
      'phi = psi = 0 (k = 0)',
    ]);
  });

  it('drops solutions of which another constraint makes something impossible', () => {
    expect(names('phi psi', 'phi - 1/a')).toEqual(['psi = 0, phi = 1/a']);
    expect(names('phi', 'phi - 1/a')).toEqual([]);
    expect(names('phi^2 + 1/a^2')).toEqual([]);
  });

  it('solves linear equations, also for functions with derivatives', () => {
    expect(names(`${EXPANSION} - phi`, 'psi')).toEqual(['psi = 0, phi = D(a,1)/(N*a)']);
    expect(names('c1 phi + c2 psi')).toEqual(['phi = -c2*psi/c1 (c1 != 0)']);
  });

  it('solves quadratic equations with an exact root into both solutions', () => {
    expect(names(`phi^2 - 2 phi ${EXPANSION} + D(a,1)^2/(a^2 N^2) - psi^2`)).toEqual([
      'phi = psi + D(a,1)/(N*a)',
      'phi = -psi + D(a,1)/(N*a)',
    ]);
    expect(names('phi^2 - psi^2')).toEqual(['phi = psi', 'phi = -psi']);
  });

  it('takes a double root once', () => {
    expect(names(`phi^2 - 2 phi ${EXPANSION} + D(a,1)^2/(a^2 N^2)`)).toEqual(['phi = D(a,1)/(N*a)']);
  });

  it('names roots of numbers and of sums, with the condition of the latter', () => {
    expect(names('phi^2 - 2/a^2')).toEqual(['phi = sqrt(2)/a']);
    expect(names('phi^2 - (k - c1)/a^2')).toEqual(['phi = sqrt(k - c1)/a (k - c1 > 0)', 'phi = 0 (k = c1)']);
  });

  it('tells the zeros of parameters apart, and says what couplings it divided by', () => {
    expect(names('k phi + psi', 'psi^2 - 3 k^2/a^2')).toEqual([
      'psi = 0 (k = 0)',
      'phi = -sqrt(3)/a, psi = k*sqrt(3)/a (k != 0)',
    ]);
    expect(names('c1 phi^2 psi')).toEqual(['phi = 0', 'psi = 0 (phi != 0)']);
    expect(names('k - c1')).toEqual(['no field is fixed (k = c1)']);
  });

  it('leaves what it cannot solve', () => {
    expect(remaining('k/a^2 + phi^2 - psi^2')).toEqual([[0]]);
    expect(remaining(`D(phi,1)/N + phi ${EXPANSION}`)).toEqual([[0]]);
    expect(remaining('phi^3 - psi - 1/a^3', 'phi^3 - 1/a^3 - psi')).toEqual([[]]);
    expect(remaining('phi^3 - 2/a^3')).toEqual([[0]]);
    expect(remaining(`D(phi,1) phi`)).toEqual([[], [0]]);
  });

  it('has no branches without constraints', () => {
    expect(branchesOf([], ROLES)).toEqual({ branches: [], complete: true });
    expect(solved('phi - phi').map((b) => symbolsOf(b.solution.get('phi') ?? poly('0')))).toEqual([[]]);
  });

  it('solves constraints that a random solution obeys, in any order', () => {
    for (let run = 0; run < runs(25); run++) {
      const seed = firstSeed(820) + run;
      const random = new Random(seed);
      const value = (): string => random.pick(['0', '1/a', `${EXPANSION}`, '2/a^2', `${EXPANSION} - 3/a`, 'c1/a', 'M']);
      const [phi, psi] = [value(), value()];
      const [zeroPhi, zeroPsi] = [`(phi - (${phi}))`, `(psi - (${psi}))`];
      const shapes = [
        [`${zeroPhi} ${zeroPsi}`, `${zeroPhi} + ${zeroPsi}`],
        [`${zeroPhi} ${zeroPhi}`, `${zeroPsi} + 2 ${zeroPhi}`],
        [`${zeroPhi}`, `${zeroPsi} (psi + M)`],
        [`${zeroPhi} (phi + psi)`, `${zeroPsi}`],
      ];
      const texts = random.shuffled(random.pick(shapes));
      const found = solved(...texts);
      const hit = found.some(
        (b) => b.remaining.length === 0 && isZero(onBranch(poly(zeroPhi), b)) && isZero(onBranch(poly(zeroPsi), b)),
      );
      expect(hit, `seed ${seed}: ${texts.join('; ')} gave ${found.map(branchName).join(' | ')}`).toBe(true);
    }
  });
});

describe('names', () => {
  it('of roots and conditions', () => {
    expect(rootName(poly('3 k'))).toBe('sqrt(3*k)');
    expect(conditionText({ value: poly('-2 k'), relation: '>' })).toBe('k < 0');
    expect(conditionText({ value: poly('3 k'), relation: '>' })).toBe('k > 0');
    expect(conditionText({ value: poly('c1 - k'), relation: '!=' })).toBe('-k + c1 != 0');
  });
});
