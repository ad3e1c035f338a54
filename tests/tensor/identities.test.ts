import { describe, expect, it } from 'vitest';
import { constant, scale } from '../../src/algebra/poly.js';
import { canonicalSum } from '../../src/tensor/expression.js';
import { contentOf, type Density, reduceByRelations } from '../../src/tensor/identities.js';
import { kindTable, makeKind } from '../../src/tensor/kinds.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { densityOf } from '../../src/tensor/simplify.js';
import { exchange } from '../../src/tensor/symmetry.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { PRIME, RandomTensors, randomContraction } from '../oracle/tensors.js';
import { RING, shown, sum } from './rewriting.js';

const KINDS = kindTable();
const DENSITIES = ['gauss-bonnet', 'pontryagin', 'nieh-yan'].map((id) =>
  densityOf(bundledRules('identities').find((r) => r.id === id)!),
);
const reduced = (text: string, densities: readonly Density[] = []): string =>
  shown(reduceByRelations(sum(text), KINDS, densities).value);

describe('relations special to four dimensions', () => {
  it('five antisymmetrised indices vanish', () => {
    // T_a A^a − (1/4)… : ε^{abcd} T_abe T_cd^e is a combination of the two independent odd squares.
    expect(reduced('\\epsilon^{abcd} T_{abe} T_{cd}{}^e + \\epsilon^{abcd} T_a T_{bcd}')).toBe(
      '1/4·epsilon(_a_b_c_d)T(_e^a^b)T(^e^c^d)',
    );
  });

  it('resolve in favour of the monomial basis, so that equal sums get equal forms', () => {
    const odd = ['R_{efab} R^{ef}{}_{cd}', 'R_{abef} R_{cd}{}^{ef}', 'R_{ab} R_{cd}', 'R R_{abcd}'];
    for (const product of odd) {
      const text = `\\epsilon^{abcd} ${product}`;
      expect(reduced(text)).toBe(shown(sum(text)));
      expect(reduceByRelations(sum(text), KINDS).steps).toEqual([]);
    }
    const { steps } = reduceByRelations(sum('\\epsilon^{abcd} R_{ab}{}^{ef} R_{efcd}'), KINDS);
    expect(steps.map((s) => s.ruleId)).toEqual(['four-dimensions']);
  });

  it('hold for the naive enumeration, and the steps add up', () => {
    for (let run = 0; run < runs(12); run++) {
      const seed = firstSeed(82_000) + run;
      const random = new Random(seed);
      const heads = random.pick([
        [
          ['R', 4],
          ['R', 4],
          ['epsilon', 4],
        ],
        [
          ['T', 3],
          ['T', 3],
          ['epsilon', 4],
        ],
        [
          ['R', 2],
          ['T', 3],
          ['T', 3],
        ],
      ] as const);
      const before = canonicalSum(
        [{ coefficient: constant(RING, 1), factors: randomContraction(random, heads) }],
        KINDS,
      );
      const { value, steps } = reduceByRelations(before, KINDS);
      const tensors = new RandomTensors(seed, 4);
      const total = (terms: typeof value): bigint =>
        terms.reduce((s, t) => {
          const inverse = powerMod(BigInt(t.coefficient.denominator));
          return s + BigInt(t.coefficient.numerators[0]!) * inverse * BigInt(tensors.value(t.factors));
        }, 0n) % BigInt(PRIME);
      expect((total(before) - total(value)) % BigInt(PRIME), `seed ${seed}`).toBe(0n);
      const replayed = canonicalSum(
        [
          ...before,
          ...steps.flatMap((s) => [
            ...s.before.map((t) => ({ ...t, coefficient: scale(t.coefficient, -1) })),
            ...s.after,
          ]),
        ],
        KINDS,
      );
      expect(shown(replayed), `seed ${seed}`).toBe(shown(value));
    }
  });

  it('among tensors of the user compare what is there', () => {
    const F = makeKind('F', 2, [exchange(2, 0, 1, -1)]);
    const kinds = kindTable([F]);
    const symbol = (names: string) => ({ head: 'F', slots: [...names].map((name, i) => ({ name, up: i % 2 === 1 })) });
    const chain = { coefficient: constant(RING, 1), factors: ['ab', 'bc', 'cd', 'de', 'ef', 'fa'].map(symbol) };
    const cube = { coefficient: constant(RING, 1), factors: ['ab', 'ba', 'cd', 'dc', 'ef', 'fe'].map(symbol) };
    const mixed = { coefficient: constant(RING, 1), factors: ['ab', 'ba', 'cd', 'de', 'ef', 'fc'].map(symbol) };
    // tr F⁶ = ¾ tr F² tr F⁴ − ⅛ (tr F²)³ by the theorem of Cayley and Hamilton.
    const { value } = reduceByRelations(canonicalSum([chain, cube, mixed], kinds), kinds);
    expect(value).toHaveLength(2);
  });

  it('are not looked for in products that are too large', () => {
    // Sixteen tensors in a ring, each joined with those 1, 3 and 5 places on: every cut goes through many lines.
    const slot = (at: number, step: number, up: boolean) => ({ name: `n${(at + 16) % 16}.${step}`, up });
    const factors = Array.from({ length: 16 }, (_, i) => ({
      head: 'H',
      slots: [1, 3, 5].flatMap((step) => [slot(i, step, false), slot(i - step, step, true)]),
    }));
    const sumOfOne = canonicalSum([{ coefficient: constant(RING, 1), factors }], KINDS);
    const { value, skipped } = reduceByRelations([...sumOfOne, ...sum('R^2')], KINDS);
    expect(skipped.map(shown)).toEqual([shown(sumOfOne)]);
    expect(value).toHaveLength(2);
  });

  it('need scalars', () => {
    expect(() => reduceByRelations(sum('R_{xy}'), KINDS)).toThrow(/scalars/);
  });
});

function powerMod(n: bigint): bigint {
  const p = BigInt(PRIME);
  let out = 1n;
  for (let base = n % p, e = p - 2n; e > 0n; e >>= 1n, base = (base * base) % p) if (e & 1n) out = (out * base) % p;
  return out;
}

describe('modulo total derivatives', () => {
  it.each([
    ['R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab}'],
    ['\\epsilon^{abcd} \\epsilon^{efgh} R_{abef} R_{cdgh}'],
    ['c1 \\epsilon^{abcd} R_{efab} R^{ef}{}_{cd}'],
    ['1/2 \\epsilon^{abcd} R_{abcd} - 1/4 \\epsilon^{abcd} T_{eab} T^e{}_{cd}'],
  ])('%s is nothing', (text) => {
    expect(reduced(text, DENSITIES)).toBe('0');
    expect(reduced(text)).not.toBe('0');
  });

  it('finds a density also in another form', () => {
    // The Pontryagin density along the products that the relations do not prefer.
    const { value } = reduceByRelations(sum('\\epsilon^{abcd} R_{ab}{}^{ef} R_{efcd}'), KINDS, DENSITIES);
    const text = shown(value);
    expect(text).not.toContain('R(_e_f^a^b)R(^e^f^c^d)');
    expect(
      reduced(`\\epsilon^{abcd} R_{ab}{}^{ef} R_{efcd} + c1 \\epsilon^{abcd} R_{efab} R^{ef}{}_{cd}`, DENSITIES),
    ).toBe(text);
  });

  it('leaves look-alikes alone', () => {
    for (const text of ['R^2 - 4 R_{ab} R^{ab} + R_{abcd} R^{cdab}', '\\epsilon^{abcd} R_{abef} R_{cd}{}^{ef}'])
      expect(reduced(text, DENSITIES)).not.toBe('0');
  });
});

describe('content', () => {
  it('counts traces as what they are traces of', () => {
    const content = (text: string): string => contentOf(sum(text)[0]!.factors);
    expect(content('R_{ab} R^{ab}')).toBe(content('R^2'));
    expect(content('T_a T^a')).toBe(content('T_{abc} T^{bac}'));
    expect(content('T_a T^a')).not.toBe(content('\\epsilon^{abcd} T_a T_{bcd}'));
    expect(content('R T_a T^a')).not.toBe(content('R^2'));
  });
});
