import { describe, expect, it } from 'vitest';
import { equalFraction, type Fraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { rational } from '../../src/algebra/rational.js';
import {
  dependsOnlyOn,
  leadingCoefficientOf,
  rescaled,
  seriesPower,
  seriesProduct,
  shapeOf,
  simplified,
  slopeSeries,
} from '../../src/scalartensor/kinetic-shape.js';
import { poly, ring } from './forms.js';

const over = (top: string, ...bottom: readonly (readonly [string, number])[]): Fraction =>
  fraction(
    poly(top),
    bottom.map(([base, power]) => ({ base: poly(base), power })),
  );
const same = (f: Fraction, top: string, ...bottom: readonly (readonly [string, number])[]): void =>
  expect(equalFraction(f, over(top, ...bottom)), infix(f.numerator)).toBe(true);

describe('the shape of a kinetic coefficient', () => {
  it('takes out powers of the field and values at zero', () => {
    const shape = shapeOf(over('6 c psi^2', ['c + d psi^2', 2]), 'psi', []);
    expect(shape.power).toBe(2);
    same(shape.constant, '6/c');
    expect(shape.factors.map((f) => f.exponent)).toEqual([-2]);
    same(shape.factors[0]!.coefficients[1]!, 'd/c');
  });

  it('sees squares above the line and joins equal brackets', () => {
    const square = shapeOf(over('M^2 + 2 M psi + psi^2', ['M^2 + d psi^2', 1]), 'psi', []);
    expect(square.factors.map((f) => [f.coefficients.length, f.exponent])).toEqual([
      [1, 2],
      [2, -1],
    ]);
    const joined = shapeOf(over('c + d psi^2', ['2 c M^2 + 2 d M^2 psi^2', 3]), 'psi', [poly('c'), poly('d')]);
    expect(joined.factors.map((f) => f.exponent)).toEqual([-2]);
  });

  it('of a constant has no brackets', () => {
    expect(shapeOf(over('12 c - d'), 'psi', [])).toMatchObject({ power: 0, factors: [] });
    expect(leadingCoefficientOf(shapeOf(over('c psi'), 'psi', []))).toBeUndefined();
  });
});

describe('measuring the field in its own unit', () => {
  it('makes numbers of one quadratic bracket, for either sign', () => {
    const shape = shapeOf(over('c', ['c + d psi^2', 2]), 'psi', []);
    for (const sign of [1, -1] as const) {
      const unit = rescaled(shape, sign)!;
      expect(unit.degree).toBe(2);
      same(unit.unit, sign === 1 ? 'c/d' : '-c/d');
      expect(unit.square).toEqual({
        power: 0,
        factors: [{ coefficients: [rational(0), rational(sign)], exponent: -2 }],
      });
    }
  });

  it('works for several brackets with ratios that are numbers, and is refused otherwise', () => {
    const numbers = shapeOf(over('M^2 + 3 c psi^2', ['M^2 + c psi^2', 2]), 'psi', []);
    const found = rescaled(numbers, 1)!.square.factors.map((f) => [f.coefficients[1]!, f.exponent] as const);
    // The first bracket sets the unit; the other keeps its ratio to it.
    expect(found.map(([, exponent]) => exponent)).toEqual([1, -2]);
    expect(found[0]![0].num * found[1]![0].den).toBe(3n * found[1]![0].num * found[0]![0].den);
    const letters = shapeOf(over('M^2 + d psi^2', ['M^2 + c psi^2', 2]), 'psi', []);
    expect(rescaled(letters, 1)).toBeUndefined();
    const linear = shapeOf(over('1', ['M + psi + c psi^2', 1]), 'psi', []);
    expect(rescaled(linear, 1)).toBeUndefined();
  });
});

describe('series', () => {
  it('of a power obeys the binomial theorem', () => {
    const [b1, b2, b3] = seriesPower([over('c')], rational(1, 2), 3, ring) as [Fraction, Fraction, Fraction];
    same(b1, '1/2 c');
    same(b2, '-1/8 c^2');
    same(b3, '1/16 c^3');
    const inverse = seriesPower([over('c'), over('d')], rational(-1), 4, ring);
    const product = seriesProduct([over('c'), over('d')], inverse, 4, ring);
    expect(product.every((f) => f.numerator.size === 0)).toBe(true);
  });

  it('of dz/dψ squares to the coefficient: √(1 + dψ²)/(1 + cψ²) = 1 + (d/2 − c)ψ² + …', () => {
    const shape = shapeOf(over('1 + d psi^2', ['1 + c psi^2', 2]), 'psi', []);
    const { halves, slope } = slopeSeries(shape, 4);
    expect(halves).toBe(0);
    same(slope[2]!, '1/2 d - c');
    same(slope[4]!, '-1/8 d^2 - 1/2 c d + c^2');
  });
});

describe('small parts', () => {
  it('cancel what the candidates show and know the fields of a fraction', () => {
    const f = simplified(over('c m + d m', ['c e + d e', 1]), [poly('c + d')]);
    same(f, 'm/e');
    expect(f.denominator).toEqual([]);
    expect(dependsOnlyOn(over('c psi'), 'psi')).toBe(true);
    expect(dependsOnlyOn(over('c', ['phi + M', 1]), 'psi')).toBe(false);
  });
});
