import { describe, expect, it } from 'vitest';
import { substitute } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { constant, generator, monomial, type Poly, subtract } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { applyImposed, type Imposed, solveRelations } from '../../src/notation/impose.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseRelation } from '../../src/notation/scalar.js';
import { polyOfScalar } from '../../src/notation/scalar-poly.js';
import type { Relation } from '../../src/notation/theory.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { toRational } from '../random-poly.js';

const CONSTANTS = ['c0', 'c1', 'c2', 'c3'];
const ring = makeRing([
  { kind: 'source', name: 'rho_x', exponents: new Map() },
  ...constantsOf([...CONSTANTS, 'M', 'k', 'rho_dust']),
]);

const relation = (text: string): Relation =>
  parseRelation(plainPassage(text, '--set'), { isSymbol: (name) => ring.position.has(name) });
const solve = (...texts: string[]): Imposed => solveRelations(ring, texts.map(relation), CONSTANTS);
const outcome = (...texts: string[]): Record<string, string> => {
  const { eliminated, conditions } = solve(...texts);
  return {
    ...Object.fromEntries([...eliminated].map(([name, p]) => [name, infix(p)])),
    ...Object.fromEntries(conditions.map(({ value }, i) => [`condition ${i + 1}`, infix(value)])),
  };
};

function refusal(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  return 'accepted';
}

const codeOf = (work: () => unknown): string => {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics[0]!.code;
    throw error;
  }
  return 'accepted';
};

describe('solveRelations', () => {
  const rows: readonly (readonly [what: string, relations: readonly string[], expected: Record<string, string>])[] = [
    ['eliminates a constant that stands alone on the left', ['c1 = -2 c3'], { c1: '-2*c3' }],
    ['also when another could go', ['c0 = c3'], { c0: 'c3' }],
    ['also when its value is no polynomial', ['c0 = c1/c2'], { c0: 'c1/c2' }],
    ['takes the last declared constant otherwise', ['c1 + c2 = 0'], { c2: '-c1' }],
    ['whatever the order in which they are typed', ['2 c2 + c1 = 0'], { c2: '-c1/2' }],
    ['reads a relation with the constant on the right', ['0 = c1 - 3'], { c1: '3' }],
    ['does not take a coefficient of -1 for a constant that stands alone', ['-c1 = c2'], { c2: '-c1' }],
    ['passes over a constant with a symbolic coefficient', ['c1 + c2 c3 = 0'], { c1: '-c2*c3' }],
    ['passes over one that also occurs squared', ['c1 + c2 + c2^2 = 0'], { c1: '-c2^2 - c2' }],
    ['passes over one that is also a divisor', ['c1 + c2 + 1/c2 = 0'], { c1: '-c2 - 1/c2' }],
    ['keeps what it cannot solve as a condition', ['c1 c2 = 1'], { 'condition 1': 'c1*c2 - 1' }],
    ['keeps a power as a condition', ['c1^2 = 4'], { 'condition 1': 'c1^2 - 4' }],
    ['solves for no scale', ['M^2 = 3', '2 M = c1^2'], { 'condition 1': 'M^2 - 3', 'condition 2': '-c1^2 + 2*M' }],
    ['eliminates a scale that stands alone', ['M = 2'], { M: '2' }],
    ['eliminates the curvature and densities that stand alone', ['k = 0', 'rho_dust = c1'], { k: '0', rho_dust: 'c1' }],
    ['but solves for no such symbol', ['2 k = 1'], { 'condition 1': '2*k - 1' }],
    ['uses earlier relations in later ones', ['c1 = c2', 'c2 = 5'], { c1: '5', c2: '5' }],
    ['solves for another constant when the one on the left is gone', ['c1 = -2 c3', 'c1 = 4'], { c1: '4', c3: '-2' }],
    [
      'lets a later relation change what is left of a condition',
      ['c1 c2 = c3^2', 'c1 = 2'],
      { c1: '2', 'condition 1': '2*c2 - c3^2' },
    ],
    ['drops a condition that a later relation fulfils', ['c1 c2 = 0', 'c1 = 0'], { c1: '0' }],
    ['says nothing about a relation that holds anyhow', ['c1 = c2', 'c2 = c1', 'c1 = c1'], { c1: 'c2' }],
    ['does not put a symbol in terms of itself', ['c1 = c1 + c2'], { c2: '0' }],
    ['leaves a relation of a symbol with itself a condition', ['c1 = c1^2'], { 'condition 1': '-c1^2 + c1' }],
    ['takes zero for a density that changes with time', ['rho_x = 0'], { rho_x: '0' }],
  ];
  for (const [what, relations, expected] of rows)
    it(what, () => {
      expect(outcome(...relations)).toEqual(expected);
    });

  it('keeps the order of elimination, and says which relation eliminated a symbol', () => {
    const { eliminated, origins } = solve('c2 = 1', 'c0 = 2');
    expect([...eliminated.keys()]).toEqual(['c2', 'c0']);
    expect(origins.get('c0')!.source).toBe('c0 = 2');
  });

  it('keeps the text of a condition as it was typed', () => {
    expect(solve('c1  c2 =\n 1').conditions.map((c) => c.text)).toEqual(['c1 c2 = 1']);
  });

  it('solves random linear relations: all of them hold, values are free of what was eliminated', () => {
    for (let i = 0; i < runs(60); i++) {
      const seed = firstSeed(53 * i);
      const random = new Random(seed);
      const texts = Array.from({ length: 1 + random.below(4) }, () => {
        const side = (): string =>
          CONSTANTS.filter(() => random.chance(60))
            .map((c) => `${random.below(7) - 3} ${c}`)
            .concat(`${random.below(5) - 2}`)
            .join(' + ')
            .replaceAll('+ -', '- ');
        return random.chance(30) ? `${random.pick(CONSTANTS)} = ${side()}` : `${side()} = ${side()}`;
      });
      let imposed: Imposed;
      try {
        imposed = solve(...texts);
      } catch (error) {
        if (!(error instanceof InputError)) throw error;
        expect(isSolvable(texts), `seed ${seed}: ${texts.join('; ')}`).toBe(false);
        continue;
      }
      expect(isSolvable(texts), `seed ${seed}: ${texts.join('; ')}`).toBe(true);
      expect(imposed.conditions).toEqual([]);
      for (const value of imposed.eliminated.values())
        for (const name of imposed.eliminated.keys()) expect(infix(value)).not.toMatch(new RegExp(`\\b${name}\\b`));
      for (const text of texts) {
        const { left, right } = relation(text);
        const rest = subtract(polyOfScalar(ring, left), polyOfScalar(ring, right));
        expect(infix(substitute(rest, imposed.eliminated)), `seed ${seed}: ${text}`).toBe('0');
      }
    }
  });
});

/** Whether linear equations have a solution, by elimination on numbers. */
function isSolvable(texts: readonly string[]): boolean {
  const rows = texts.map((text) => {
    const { left, right } = relation(text);
    const p = subtract(polyOfScalar(ring, left), polyOfScalar(ring, right));
    const at = (values: readonly number[]): number => {
      const point = new Map(CONSTANTS.map((c, i) => [c, constant(ring, values[i]!)]));
      const value = substitute(p, point);
      return value.size === 0 ? 0 : Number(value.numerators[0]!) / Number(value.denominator);
    };
    const base = at([0, 0, 0, 0]);
    return [...CONSTANTS.map((_, i) => at(CONSTANTS.map((_, j) => (i === j ? 1 : 0))) - base), base];
  });
  for (let column = 0; column < CONSTANTS.length; column++) {
    const pivot = rows.find((r) => r.slice(0, column).every((x) => x === 0) && r[column] !== 0);
    if (!pivot) continue;
    for (const r of rows)
      if (r !== pivot) {
        const factor = r[column]! / pivot[column]!;
        r.forEach((x, i) => {
          const y = x - factor * pivot[i]!;
          r[i] = Math.abs(y) < 1e-9 ? 0 : y;
        });
      }
  }
  return rows.every((r) => r.slice(0, -1).some((x) => x !== 0) || r.at(-1) === 0);
}

describe('relations that cannot hold', () => {
  it('are refused with the place of the later one', () => {
    expect(refusal(() => solve('c1 = 1', 'c1 = 2'))).toBe(
      [
        '--set:1:1: error: the relation contradicts what is already imposed',
        '    c1 = 2',
        '    ^^^^^^',
        'hint: drop one of the relations',
      ].join('\n'),
    );
  });

  it('are refused when a number remains, alone or of a condition', () => {
    expect(codeOf(() => solve('1 = 2'))).toBe('contradiction');
    expect(codeOf(() => solve('c1 = c1 + 1'))).toBe('contradiction');
    expect(refusal(() => solve('c1 c2 = 1', 'c1 = 0'))).toContain('already imposed together with "c1 c2 = 1"');
  });

  it('are refused when conditions exclude each other', () => {
    expect(codeOf(() => solve('c1 c2 = 1', 'c1 c2 = 2'))).toBe('contradiction');
    expect(codeOf(() => solve('c1 c2 = c3^2', '2 c1 c2 = 2 c3^2 + 1'))).toBe('contradiction');
    // Only with a value for c3 do the two exclude each other.
    expect(codeOf(() => solve('c1 c2 = 1', 'c1 c2 = c3^2', 'c3 = 2'))).toBe('contradiction');
    expect(codeOf(() => solve('c1 c2 = c3', 'c0^2 = c0 c1 + c2^2 c3^2', 'c1 c2 = 2 c3'))).toBe('accepted');
  });

  it('are refused for a density that changes with time', () => {
    const text = refusal(() => solve('c1 = rho_x'));
    expect(text).toContain('rho_x changes with time and cannot be tied to constants');
    expect(codeOf(() => solve('rho_x = 5'))).toBe('contradiction');
    expect(codeOf(() => solve('c1 = 2', 'rho_x + c1 = 2'))).toBe('accepted');
  });
});

it('a parameter that the geometry lacks is refused', () => {
  const flat = makeRing(constantsOf(CONSTANTS));
  expect(refusal(() => solveRelations(flat, [relation('c0 = 1'), relation('k = 0')], CONSTANTS))).toBe(
    [
      '--set:1:1: error: the geometry of this theory has no k',
      '    k = 0',
      '    ^^^^^',
      'hint: leave the relation out, or choose another geometry',
    ].join('\n'),
  );
});

describe('applyImposed', () => {
  const p: Poly = monomial(ring, rational(3), [
    ['c0', -1],
    ['c1', 2],
  ]);
  const imposedOn = (...texts: string[]): Poly => {
    const { eliminated, origins } = solve(...texts);
    return applyImposed(p, eliminated, origins);
  };

  it('puts values in, also into divisors', () => {
    expect(infix(imposedOn('c0 = 2 c2', 'c1 = c2 + c3'))).toBe('3*c2/2 + 3*c3 + 3*c3^2/(2*c2)');
    expect(imposedOn('c3 = 1')).toBe(p);
  });

  it('points at the relation that makes a divisor zero or a sum', () => {
    expect(refusal(() => imposedOn('c2 = 1', 'c0 = 0'))).toBe(
      [
        '--set:1:1: error: a division by c0, which is zero by the imposed relations',
        '    c0 = 0',
        '    ^^^^^^',
        'hint: a divisor is a number or a product of constants that are not zero',
      ].join('\n'),
    );
    expect(refusal(() => imposedOn('c0 = c1 + c2'))).toContain(
      'a division by c0, which the imposed relations make a sum',
    );
    expect(refusal(() => solve('c1 = 1/c0', 'c0 = 0'))).toContain('a division by c0');
  });

  it('refuses what would become too long, at once', () => {
    const start = performance.now();
    const high = generator(ring, 'c0', 60);
    const { eliminated, origins } = solve('c0 = (c1 + c2 + c3 + M + k)^4');
    expect(codeOf(() => applyImposed(high, eliminated, origins))).toBe('terms-limit');
    const digits = solve('c0 = 2^60 c1');
    expect(codeOf(() => applyImposed(high, digits.eliminated, digits.origins))).toBe('digits-limit');
    const exponents = solve('c0 = c1^60');
    expect(codeOf(() => applyImposed(high, exponents.eliminated, exponents.origins))).toBe('exponent-limit');
    expect(performance.now() - start).toBeLessThan(5000);
  });

  it('agrees with numbers put in one by one', () => {
    for (let i = 0; i < runs(20); i++) {
      const random = new Random(firstSeed(59 * i));
      const [x, y] = [random.rational(true), random.rational(true)];
      const point = new Map([
        ['c2', constant(ring, toRational(x))],
        ['c3', constant(ring, toRational(y))],
      ]);
      const imposed = imposedOn('c0 = 2 c2', 'c1 = c2 - 3 c3');
      const direct = new Map([
        ['c0', constant(ring, rational(2n * x.n, x.d))],
        ['c1', constant(ring, rational(x.n * y.d - 3n * y.n * x.d, x.d * y.d))],
      ]);
      expect(infix(substitute(imposed, point))).toBe(infix(substitute(p, direct)));
    }
  });
});
