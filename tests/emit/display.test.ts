import { describe, expect, it } from 'vitest';
import { evaluate } from '../../src/algebra/collect.js';
import { isCanonical } from '../../src/algebra/poly.js';
import {
  addRational,
  equalRational,
  gcd,
  multiplyRational,
  ONE,
  powerRational,
  type Rational,
  signOfRational,
  ZERO,
} from '../../src/algebra/rational.js';
import { type DisplaySum, type Factor, viewerOf } from '../../src/emit/display.js';
import { displayPoint } from './display-point.js';
import { FIXTURES, fixture } from './latex-fixtures.js';

type Values = ReadonlyMap<string, Rational>;

const productAt = (factors: readonly Factor[], at: Values): Rational =>
  factors.reduce(
    (p, { symbol, exponent }) => multiplyRational(p, powerRational(at.get(symbol.generator)!, exponent)),
    ONE,
  );

/** Value of the parts that a printer is given, put together as the invariant says. */
function sumValue(sum: DisplaySum, at: Values): Rational {
  let total = ZERO;
  for (const { content, common, bracket, monomial } of sum.terms) {
    const inner =
      bracket.length === 0
        ? ONE
        : bracket.reduce((s, t) => addRational(s, multiplyRational(t.coefficient, productAt(t.factors, at))), ZERO);
    const outer = multiplyRational(productAt(common, at), productAt(monomial, at));
    total = addRational(total, multiplyRational(multiplyRational(content, inner), outer));
  }
  return multiplyRational(productAt(sum.divided, at), total);
}

describe.each(FIXTURES)('display of %s', (name) => {
  const derivation = fixture(name);
  const keys = [undefined, ...derivation.geometry.variables.map((v) => v.key)];

  it.each(keys)('equals the expressions at N = 1 in the variables %s', (key) => {
    const viewer = viewerOf(derivation, key);
    const expressions = [derivation.lagrangian, derivation.dropped, ...derivation.equations.values()];
    for (let seed = 1; seed <= 3; seed++) {
      const { ring, display } = displayPoint(derivation, viewer, seed);
      for (const p of expressions)
        for (const divide of [true, false]) {
          expect(isCanonical(p)).toBe(true);
          const shown = sumValue(viewer.sum(p, { divide }), display);
          expect(equalRational(shown, evaluate(p, ring)), `seed ${seed}`).toBe(true);
        }
    }
  });

  it('factors every coefficient completely', () => {
    const viewer = viewerOf(derivation);
    for (const p of derivation.equations.values())
      for (const { bracket } of viewer.sum(p).terms) {
        if (bracket.length === 0) continue;
        expect(bracket.length).toBeGreaterThan(1);
        expect(signOfRational(bracket[0]!.coefficient)).toBe(1);
        const denominators = bracket.map((t) => t.coefficient.den);
        const common = denominators.reduce((a, b) => (a / gcd(a, b)) * b, 1n);
        expect(common === 1n || common > 1000n).toBe(true);
        expect(bracket.reduce((a, t) => gcd(a, t.coefficient.num), 0n)).toBe(1n);
        const shared = bracket[0]!.factors.filter(({ symbol, exponent }) =>
          bracket.every((t) =>
            t.factors.some((f) => f.symbol === symbol && Math.sign(f.exponent) === Math.sign(exponent)),
          ),
        );
        expect(shared).toEqual([]);
      }
  });

  it('gives each monomial one term', () => {
    const viewer = viewerOf(derivation);
    for (const p of derivation.equations.values()) {
      const monomials = viewer
        .sum(p)
        .terms.map((t) => t.monomial.map((f) => `${f.symbol.generator}^${f.exponent}`).join(' '));
      expect(new Set(monomials).size).toBe(monomials.length);
    }
  });
});

describe('variables', () => {
  it('are those of the geometry when its own are asked for', () => {
    expect(viewerOf(fixture('quartic'), 'phi, psi').variables).toBeUndefined();
    expect(viewerOf(fixture('quartic'), 'u,v').fields.map((f) => f.name)).toEqual(['N', 'a', 'u', 'v']);
  });

  it('are refused with what the geometry offers', () => {
    expect(() => viewerOf(fixture('quartic'), 'x,y')).toThrow(/"x,y".*phi,psi and u,v and h,f/);
    expect(() => viewerOf(fixture('anisotropic'), 'u,v')).toThrow(RangeError);
  });
});

describe('overall powers of the scale factor', () => {
  it('are those of the volume for the lapse and one less for the scale factor', () => {
    const d = fixture('einstein-cartan');
    const viewer = viewerOf(d);
    const powers = [...d.equations].map(([q, e]) => [q, viewer.sum(e).divided[0]?.exponent]);
    expect(powers).toEqual([
      ['N', 3],
      ['a', 2],
      ['phi', 3],
      ['psi', 3],
    ]);
  });
});
