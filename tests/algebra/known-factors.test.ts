import { describe, expect, it } from 'vitest';
import { equalFraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { fractionInFactors, inFactors, type ProductForm, signOfProduct } from '../../src/algebra/known-factors.js';
import { constant, equals, multiply, type Poly, power } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { ANY, NEGATIVE, POSITIVE, VANISHING } from '../../src/algebra/signs.js';
import { firstSeed, Random, runs } from '../oracle/random.js';
import { randomPoly } from '../random-poly.js';
import { knowing, poly, ring } from '../scalartensor/forms.js';

const shown = ({ factors }: ProductForm): string[] => factors.map((f) => `${infix(f.base)} ^ ${f.power}`);
const multiplied = ({ number, factors }: ProductForm): Poly =>
  factors.reduce((p, f) => multiply(p, power(f.base, f.power)), constant(ring, number));

describe('a product by known divisors', () => {
  it('takes out symbols and candidates, constants before fields', () => {
    const form = inFactors(poly('-6 M^2 psi (c + d)^2 (c - e)'), [poly('2 c + 2 d')]);
    expect(shown(form)).toEqual(['M ^ 2', 'psi ^ 1', 'c + d ^ 2', 'c - e ^ 1']);
    expect(form.number).toEqual(rational(-6));
    expect(inFactors(poly('0'), [])).toEqual({ number: rational(0), factors: [] });
  });

  it('always multiplies to the polynomial', () => {
    for (let run = 0; run < runs(40); run++) {
      const random = new Random(firstSeed(9400) + run);
      const draw = () => randomPoly(random, ring, ['c', 'd', 'psi'], { exponents: [-1, 2], terms: 3 });
      const [a, b, c] = [draw(), draw(), draw()] as const;
      const p = multiply(multiply(a, a), multiply(b, c));
      expect(equals(multiplied(inFactors(p, [a, b])), p), `seed ${firstSeed(9400) + run}`).toBe(true);
    }
  });

  it('does so for fractions', () => {
    const f = fraction(poly('c e + d e'), [{ base: poly('4 M^2 c + 4 M^2 d'), power: 3 }]);
    const form = fractionInFactors(f, [poly('c + d')]);
    expect(shown(form)).toEqual(['e ^ 1', 'M ^ -6', 'c + d ^ -2']);
    const top = form.factors.filter((x) => x.power > 0);
    const bottom = form.factors.filter((x) => x.power < 0).map((x) => ({ ...x, power: -x.power }));
    expect(equalFraction(fraction(multiplied({ ...form, factors: top }), bottom), f)).toBe(true);
  });
});

describe('the sign of a product', () => {
  const signOf = (text: string, candidates: readonly string[], ...assumed: readonly string[]) =>
    signOfProduct(inFactors(poly(text), candidates.map(poly)), knowing(...assumed));

  it('is that of its factors', () => {
    expect(signOf('-3 c M^2', [], 'c > 0')).toMatchObject({ signs: NEGATIVE, used: ['c > 0', 'M > 0'] });
    expect(signOf('c^2', [], 'c != 0').signs).toBe(POSITIVE);
    expect(signOf('c^2', []).signs).toBe(POSITIVE | VANISHING);
    expect(signOf('0', []).signs).toBe(VANISHING);
  });

  it('leaves the factors on which it depends', () => {
    const { signs, open } = signOf('-2 M (c + d) e^3', ['c + d'], 'e > 0');
    expect(signs).toBe(ANY);
    expect(shown(open)).toEqual(['c + d ^ 1']);
    expect(open.number).toEqual(rational(-1));
  });
});
