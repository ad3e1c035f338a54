import { describe, expect, it } from 'vitest';
import { coefficientOf, evaluate } from '../../src/algebra/collect.js';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, generator, multiply, negate, type Poly, power, scale, zero } from '../../src/algebra/poly.js';
import { rational, toNumber } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { reduced, rootName, rootsOf, type StationaryRoot } from '../../src/scalartensor/stationary-roots.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoint, randomPoly } from '../random-poly.js';

const ring = makeRing(constantsOf(['p', 'q', 's']));
const g = (name: string): Poly => generator(ring, name);
const NAME = rootName(1);
const valueText = ({ value }: StationaryRoot): string =>
  [infix(value.numerator), ...value.denominator.map((d) => infix(d.base))].join(' / ');

describe('rootsOf', () => {
  it('takes out the root 0 and solves a linear rest', async () => {
    const roots = await rootsOf([zero(ring), g('p'), g('q')], NAME);
    expect(roots.map(valueText)).toEqual(['0', '-p/q']);
  });

  it('writes perfect squares without a root, and double roots once', async () => {
    const square = add(g('p'), g('q'));
    const equation = [multiply(g('p'), g('q')), negate(square), constant(ring, 1)];
    expect((await rootsOf(equation, NAME)).map(valueText).sort()).toEqual(['p', 'q']);
    expect(await rootsOf([power(g('p'), 2), scale(g('p'), -2), constant(ring, 1)], NAME)).toHaveLength(1);
  });

  it('gives both signs of a square root with the radicand that must not be negative', async () => {
    const roots = await rootsOf([negate(g('p')), zero(ring), g('q')], NAME);
    expect(roots.map(valueText)).toEqual([`${NAME}/q`, `-${NAME}/q`]);
    expect(roots.map((r) => infix(r.radicand!))).toEqual(['p*q', 'p*q']);
  });

  it('lets a proposer split a cubic, and believes no wrong proposal', async () => {
    // (x − p)(x² + q)
    const equation = [negate(multiply(g('p'), g('q'))), g('q'), negate(g('p')), constant(ring, 1)];
    const asked: string[] = [];
    const split = async (p: Poly) => {
      asked.push(infix(p));
      const x = generator(p.ring, 'x');
      const wide = (name: string): Poly => generator(p.ring, name);
      return [
        { base: add(x, negate(wide('p'))), power: 1 },
        { base: add(multiply(x, x), wide('q')), power: 1 },
      ];
    };
    const roots = await rootsOf(equation, NAME, split);
    expect(asked).toHaveLength(1);
    expect(roots.map(valueText)).toEqual(['p', NAME, `-${NAME}`]);
    const wrong = async (p: Poly) => [
      { base: generator(p.ring, 'x'), power: 1 },
      { base: add(multiply(generator(p.ring, 'x'), generator(p.ring, 'x')), generator(p.ring, 'q')), power: 1 },
    ];
    await expect(rootsOf(equation, NAME, wrong)).rejects.toThrow('does not solve');
  });

  it('keeps the root of a cubic that nobody splits, with numbers for the closed formula that hit it', async () => {
    const [only, ...others] = await rootsOf([g('s'), g('q'), g('p'), constant(ring, 2)], NAME);
    expect(others).toEqual([]);
    const { shift, p, w } = only!.cubic!;
    const at = (f: typeof shift): number => {
      const point = new Map([
        ['p', rational(1)],
        ['q', rational(3)],
        ['s', rational(5, 2)],
      ]);
      const bottom = f.denominator.reduce((n, d) => n * toNumber(evaluate(d.base, point)) ** d.power, 1);
      return toNumber(evaluate(f.numerator, point)) / bottom;
    };
    const [b, c, d] = [at(shift), at(p), at(w)];
    const inner = Math.sqrt(d ** 2 / 4 + c ** 3 / 27);
    const x = Math.cbrt(-d / 2 + inner) + Math.cbrt(-d / 2 - inner) - b;
    expect(2 * x ** 3 + x ** 2 + 3 * x + 2.5).toBeCloseTo(0, 10);
  });

  it('solves random quadratics: their values at random points solve the equation there', async () => {
    for (let run = 0; run < runs(30); run++) {
      const random = new Random(firstSeed(72_000) + run);
      const equation = [0, 1, 2].map(() => randomPoly(random, ring, ['p', 'q', 's']));
      if (equation[2]!.size === 0) continue;
      const point = randomPoint(random, ring);
      const numbers = equation.map((c) => toNumber(evaluate(c, point)));
      for (const root of await rootsOf(equation, NAME)) {
        const radicand = root.radicand ? toNumber(evaluate(root.radicand, point)) : 0;
        if (radicand < 0) continue;
        const text = root.value;
        const r = Math.sqrt(radicand);
        const value = (p: Poly): number =>
          [0, 1].reduce((n, e) => n + toNumber(evaluate(coefficientOf(p, NAME, e), point)) * r ** e, 0);
        const bottom = text.denominator.reduce((n, d) => n * value(d.base) ** d.power, 1);
        if (bottom === 0) continue;
        const x = value(text.numerator) / bottom;
        const size = numbers.reduce((n, c, i) => n + Math.abs(c * x ** i), 1);
        expect(Math.abs(numbers[0]! + numbers[1]! * x + numbers[2]! * x * x) / size).toBeLessThan(1e-9);
      }
    }
  });
});

describe('reduced', () => {
  it('lowers powers of a root by its equation', async () => {
    const [root] = await rootsOf([negate(g('p')), zero(ring), constant(ring, 1)], NAME);
    const cube = { numerator: generator(root!.ring, NAME, 3), denominator: [] };
    expect(infix(reduced(cube, root!.root!).numerator)).toBe(`p*${NAME}`);
  });
});
