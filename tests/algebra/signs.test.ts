import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { scale } from '../../src/algebra/poly.js';
import { rational, signOfRational } from '../../src/algebra/rational.js';
import {
  ANY,
  type Assumption,
  contradictionAmong,
  hasSign,
  NEGATIVE,
  oppositeSigns,
  POSITIVE,
  productSigns,
  signOf,
  VANISHING,
} from '../../src/algebra/signs.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { knowing, poly, ring } from '../scalartensor/forms.js';

const sign = (text: string, ...assumed: readonly string[]): number => signOf(poly(text), knowing(...assumed)).signs;

describe('signs without assumptions', () => {
  it('know scales, squares and sums of like signs', () => {
    expect(sign('3 M^2')).toBe(POSITIVE);
    expect(sign('c^2 + 1')).toBe(POSITIVE);
    expect(sign('-c^2 - d^2 M')).toBe(NEGATIVE | VANISHING);
    expect(sign('c^2 d')).toBe(ANY);
    expect(sign('c')).toBe(ANY);
    expect(sign('0')).toBe(VANISHING);
    expect(sign('1/c^2')).toBe(POSITIVE);
  });

  it('find squares of binomials', () => {
    expect(sign('c^2 + 2 c d + d^2')).toBe(POSITIVE | VANISHING);
    expect(sign('c^2 + c d + d^2')).toBe(POSITIVE | VANISHING);
    expect(sign('c^2 + 3 c d + d^2')).toBe(ANY);
    expect(sign('phi^2 psi^2 - c phi psi + c^2')).toBe(POSITIVE | VANISHING);
  });
});

describe('signs under assumptions', () => {
  it('combine inequalities and list what was used', () => {
    const known = knowing('c > d', 'd > e', 'tau > 0');
    expect(signOf(poly('c - e'), known)).toEqual({ signs: POSITIVE, used: ['c > d', 'd > e'] });
    expect(signOf(poly('e - d'), known)).toEqual({ signs: NEGATIVE, used: ['d > e'] });
    expect(signOf(poly('c - m'), known).signs).toBe(ANY);
  });

  it('multiply them by what has a sign', () => {
    expect(sign('M^2 c - M^2 d', 'c > d')).toBe(POSITIVE);
    expect(sign('c psi^2 - d psi^2', 'c > d')).toBe(POSITIVE | VANISHING);
    expect(sign('c d', 'c > 1', 'd > c')).toBe(POSITIVE);
    expect(sign('c e', 'c > 0', 'e >= 0')).toBe(POSITIVE | VANISHING);
    expect(sign('c d - c - d + 1', 'c > 1', 'd > 1')).toBe(POSITIVE);
  });

  it('use equalities and inequalities of both strengths', () => {
    expect(sign('c - 2 d', 'c = 2 d')).toBe(VANISHING);
    expect(sign('c - d', 'c >= d')).toBe(POSITIVE | VANISHING);
    expect(sign('2 c - 2 d', 'c != d')).toBe(POSITIVE | NEGATIVE);
    expect(sign('c^2', 'c != 0')).toBe(POSITIVE);
  });

  it('answer three ways', () => {
    const known = knowing('c > 0');
    expect(hasSign(poly('c'), POSITIVE, known)).toEqual({ answer: 'yes', used: ['c > 0'] });
    expect(hasSign(poly('-c M'), POSITIVE, known).answer).toBe('no');
    expect(hasSign(poly('d'), POSITIVE, known)).toEqual({ answer: 'unknown', used: [] });
  });

  it('are never wrong at a point where the assumptions hold', () => {
    let decided = 0;
    for (let run = 0; run < runs(150); run++) {
      const random = new Random(firstSeed(9200) + run);
      const names = ['c', 'd', 'e'];
      const point = new Map(ring.generators.map((g) => [g.name, rational(random.below(9) - 4)] as const));
      point.set('M', rational(2));
      const draw = () => randomPoly(random, ring, names, { exponents: [0, 2], terms: 3 });
      const assumptions = [draw(), draw()].map((value, i): Assumption => {
        const s = signOfRational(evaluate(value, point));
        const relation = s === 0 ? ('=' as const) : ('>' as const);
        return { value: s < 0 ? scale(value, -1) : value, relation, text: `A${i}: ${infix(value)}` };
      });
      const knowledge = { ...knowing(), assumptions };
      const p = draw();
      const verdict = signOf(p, knowledge).signs;
      const actual = [NEGATIVE, VANISHING, POSITIVE][signOfRational(evaluate(p, point)) + 1]!;
      expect(verdict & actual, `seed ${firstSeed(9200) + run}`).toBe(actual);
      if (verdict !== ANY) decided++;
      expect(contradictionAmong(knowledge)).toBeUndefined();
    }
    expect(decided).toBeGreaterThan(0);
  });
});

describe('contradictions', () => {
  it('are found among linear inequalities, with the ones that clash', () => {
    expect(contradictionAmong(knowing('c > d', 'd > e', 'e >= c', 'tau > 0'))).toEqual(['c > d', 'd > e', 'e >= c']);
    expect(contradictionAmong(knowing('c >= d', 'd >= c'))).toBeUndefined();
    expect(contradictionAmong(knowing('c >= d', 'd >= c', 'c != d'))).toEqual(['c >= d', 'd >= c', 'c != d']);
    expect(contradictionAmong(knowing('0 > M'))).toContain('0 > M');
  });

  it('are found among products when a sign decides', () => {
    expect(contradictionAmong(knowing('c > 1', 'd > 1', '0 > c d'))).toBeDefined();
    expect(contradictionAmong(knowing('0 > c^2'))).toEqual(['0 > c^2']);
    expect(contradictionAmong(knowing('c > 0', 'c d > 0'))).toBeUndefined();
  });
});

describe('arithmetic of signs', () => {
  it('agrees with that of numbers', () => {
    const all = [-2, -1, 0, 1, 3];
    const of = (x: number) => (x < 0 ? NEGATIVE : x > 0 ? POSITIVE : VANISHING);
    for (const x of all) {
      expect(oppositeSigns(of(x))).toBe(of(-x));
      for (const y of all) expect(productSigns(of(x), of(y))).toBe(of(x * y));
    }
    expect(productSigns(POSITIVE | VANISHING, NEGATIVE)).toBe(NEGATIVE | VANISHING);
    expect(productSigns(ANY, VANISHING)).toBe(VANISHING);
  });
});
