import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { plainPassage } from '../../src/notation/passage.js';
import {
  lagrangianLines,
  latexLagrangian,
  latexScalar,
  latexTerms,
  printLagrangian,
  printScalar,
} from '../../src/notation/print.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { collectScalars } from '../../src/notation/scalar-term.js';
import type { LagrangianTerm, ScalarTerm, TensorFactor, TensorHead } from '../../src/notation/theory.js';
import { SYMBOLS, symbol, terms } from './rendered.js';

const NAMES = ['c0', 'c', 'b_2', 'alpha_1', 'Lambda', 'M', 'constructor', 'delta', 'A_1'];
const DECLARED = NAMES.map((name) => symbol(name));
const INDICES = [...'abcdefxyzAB', '\\mu', '\\nu', '\\Lambda', '\\epsilon', '\\rho'];
const SLOTS: readonly (readonly [TensorHead, number])[] = [
  ['R', 0],
  ['R', 2],
  ['R', 4],
  ['T', 1],
  ['T', 3],
  ['A', 1],
  ['epsilon', 4],
  ['eta', 2],
];

const scalar: fc.Arbitrary<ScalarTerm> = fc.record({
  coefficient: fc
    .tuple(
      fc.bigInt({ min: -99n, max: 99n }).filter((n) => n !== 0n),
      fc.bigInt({ min: 1n, max: 20n }),
    )
    .map(([n, d]) => rational(n, d)),
  powers: fc
    .uniqueArray(fc.tuple(fc.constantFrom(...NAMES), fc.constantFrom(-12, -2, -1, 1, 2, 12)), {
      selector: ([n]) => n,
      maxLength: 3,
    })
    .map((powers) => powers.sort(([x], [y]) => (x < y ? -1 : 1))),
});

/** Factors whose slots are paired at random: each pair gets one name, once up and once down. */
const factors: fc.Arbitrary<readonly TensorFactor[]> = fc
  .tuple(
    fc.array(fc.constantFrom(...SLOTS), { maxLength: 4 }),
    fc.shuffledSubarray(INDICES, { minLength: INDICES.length }),
    fc.array(fc.nat(1000), { minLength: 40, maxLength: 40 }),
  )
  .map(([chosen, names, random]) => {
    const heads = [...chosen];
    const count = (): number => heads.reduce((n, [, slots]) => n + slots, 0);
    if (count() % 2 === 1) heads.push(['T', 1]);
    const order = Array.from({ length: count() }, (_, i) => [random[i]!, i] as const)
      .sort(([x], [y]) => x - y)
      .map(([, i]) => i);
    const slots = new Map<number, { name: string; up: boolean }>();
    for (let i = 0; i < order.length; i += 2) {
      const up = random[20 + i]! % 2 === 0;
      slots.set(order[i]!, { name: names[i / 2]!, up });
      slots.set(order[i + 1]!, { name: names[i / 2]!, up: !up });
    }
    let next = 0;
    return heads.map(([head, n]) => ({ head, slots: Array.from({ length: n }, () => slots.get(next++)!) }));
  });

const key = ({ scalar: { powers }, factors: all }: LagrangianTerm): string =>
  JSON.stringify([powers, all.map((f) => JSON.stringify(f)).sort()]);
const lagrangian: fc.Arbitrary<readonly LagrangianTerm[]> = fc.uniqueArray(
  fc.tuple(scalar, factors).map(([s, f]): LagrangianTerm => ({ scalar: { ...s }, factors: f })),
  {
    selector: key,
    minLength: 1,
    maxLength: 5,
  },
);

describe('printLagrangian', () => {
  it('is read back to the same terms, plain and in Unicode', () => {
    fc.assert(
      fc.property(lagrangian, (x) => {
        expect(terms(printLagrangian(x), DECLARED)).toEqual(x);
        expect(terms(printLagrangian(x, { symbols: DECLARED }), DECLARED)).toEqual(x);
        expect(terms(printLagrangian(x, { unicode: true }), DECLARED)).toEqual(x);
      }),
    );
  });

  it('is a fixed point: printing what was read prints the same', () => {
    fc.assert(
      fc.property(lagrangian, (x) => {
        const text = printLagrangian(x);
        expect(printLagrangian(terms(text, DECLARED))).toBe(text);
      }),
    );
  });

  it('prints constants before scales in the declared order', () => {
    const x = terms('M^2 c0/2 R - 3/4 b1/M^2 R^2 \\epsilon^{abcd} R_{abcd} + T^{a}{}_{bc} T_{a}{}^{bc} - 1 + c0');
    expect(printLagrangian(x, { symbols: SYMBOLS })).toBe(
      '1/2 c0 M^2 R - 3/4 b1 M^{-2} R^2 \\epsilon^{abcd} R_{abcd} + T^a{}_{bc} T_a{}^{bc} - 1 + c0',
    );
    expect(printLagrangian(x, { symbols: SYMBOLS, unicode: true })).toBe(
      '1/2 c0 M² R − 3/4 b1 M⁻² R² ε^{abcd} R_{abcd} + T^a{}_{bc} T_a{}^{bc} − 1 + c0',
    );
    expect(lagrangianLines(x, { symbols: SYMBOLS })[1]).toBe('- 3/4 b1 M^{-2} R^2 \\epsilon^{abcd} R_{abcd}');
  });

  it('keeps Greek indices apart from the letters behind them', () => {
    expect(printLagrangian(terms('R_{\\mu a} R^{\\mu a}'))).toBe('R_{\\mu a} R^{\\mu a}');
    expect(printLagrangian(terms('R_{\\mu a} R^{\\mu a}'), { unicode: true })).toBe('R_{μa} R^{μa}');
    expect(printLagrangian(terms('T_\\mu T^\\mu'), { unicode: true })).toBe('T_μ T^μ');
  });

  it('a negative first term and an empty sum', () => {
    expect(printLagrangian(terms('-R + c0'))).toBe('-R + c0');
    expect(printLagrangian(terms('-R + c0'), { unicode: true })).toBe('−R + c0');
    expect(printLagrangian([])).toBe('0');
  });
});

describe('LaTeX', () => {
  it('uses the names of the user and fractions', () => {
    const symbols = [...SYMBOLS.filter((s) => s.name !== 'c0'), { ...symbol('c0'), latex: "\\alpha_0'" }];
    const x = terms(
      '-M^2 c0^2/2 R + \\frac{M^2}{4 b1} \\epsilon^{abcd} R_{abcd} + R_{\\mu a} R^{\\mu a}/M^2 - 3/2 T_a A^a',
    );
    expect(latexLagrangian(x, symbols)).toBe(
      "-\\tfrac{1}{2} M^{2} (\\alpha_0')^{2} R + \\frac{M^{2}}{4 b1} \\epsilon^{abcd} R_{abcd} " +
        '+ \\frac{1}{M^{2}} R_{\\mu a} R^{\\mu a} - \\tfrac{3}{2} T_a A^a',
    );
    expect(latexTerms(x, symbols)).toHaveLength(4);
  });

  it('is accepted by a TeX typesetter', () => {
    const symbols = DECLARED.map((s) => ({ ...s, latex: s.name === 'c' ? "c'" : '\\alpha_{1}' }));
    fc.assert(
      fc.property(lagrangian, (x) => {
        katex.renderToString(latexLagrangian(x, symbols), { throwOnError: true, strict: 'error' });
        katex.renderToString(latexLagrangian(x, []), { throwOnError: true, strict: 'error' });
      }),
      { numRuns: 30 },
    );
  });
});

describe('printScalar', () => {
  it('is read back to the same sum', () => {
    const known = (name: string): boolean => NAMES.includes(name);
    fc.assert(
      fc.property(fc.array(scalar, { maxLength: 5 }), (list) => {
        const sum = collectScalars(list);
        expect(parseScalar(plainPassage(printScalar(sum), 'E'), { isSymbol: known })).toEqual(sum);
      }),
    );
  });
  it('has a LaTeX form', () => {
    const sum = parseScalar(plainPassage('-2 b1/c0', 'E'), { isSymbol: () => true });
    expect(latexScalar(sum, [])).toBe('-\\frac{2 b_{1}}{c_{0}}');
  });
});
