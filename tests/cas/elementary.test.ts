import { describe, expect, it } from 'vitest';
import { equalFraction, fraction } from '../../src/algebra/fraction.js';
import { isZero } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { factorPoly } from '../../src/algebra/squared-integrand.js';
import { derivativeIn, FIELD_RING, FUNCTIONS, squaresTo, VARIABLE } from '../../src/cas/elementary.js';
import { readReply } from '../../src/cas/reply.js';

const poly = (...coefficients: readonly number[]) =>
  factorPoly(
    FIELD_RING,
    VARIABLE,
    coefficients.map((c) => rational(c)),
  );
const slope = (text: string, ...root: readonly number[]) => derivativeIn(readReply(text, FUNCTIONS), poly(...root));

describe('derivatives of elementary functions', () => {
  it('of rational functions and logarithms are rational', () => {
    const one = slope('v1^2/(1+v1)')!;
    expect(equalFraction(one.u, fraction(poly(2), [{ base: poly(1), power: 2 }]))).toBe(false);
    const log = slope('-1/2*log(1-v1)+1/2*log(1+v1)')!;
    expect(equalFraction(log.u, fraction(poly(), [{ base: poly(0, -1), power: 1 }]))).toBe(true);
    expect(isZero(log.v.numerator)).toBe(true);
    expect(equalFraction(slope('arctanh(v1)')!.u, log.u)).toBe(true);
    expect(equalFraction(slope('arctan(v1)')!.u, fraction(poly(), [{ base: poly(0, 1), power: 1 }]))).toBe(true);
  });

  it('of inverse functions with a root are in the field of that root', () => {
    const r = [0, 1];
    for (const text of ['log(v1+(v1^2+1)^(1/2))', 'arcsinh(v1)']) {
      const found = slope(text, ...r)!;
      expect(squaresTo(found, poly(...r), fraction(poly(), [{ base: poly(0, 1), power: 1 }])), text).toBe(true);
    }
    const sine = slope('arcsin(v1)', 0, -1)!;
    expect(squaresTo(sine, poly(0, -1), fraction(poly(), [{ base: poly(0, -1), power: 1 }]))).toBe(true);
  });

  it('handle sums of a function and its algebraic companion', () => {
    const found = slope('1/2*log(v1+(v1^2+1)^(1/2))+1/2*v1*(v1^2+1)^(1/2)', 0, 1)!;
    expect(squaresTo(found, poly(0, 1), fraction(poly(0, 1)))).toBe(true);
    expect(squaresTo(found, poly(0, 1), fraction(poly(0, 2)))).toBe(false);
  });

  it('refuse what leaves the field or whose sign would be a guess', () => {
    expect(slope('(1+2*v1^2)^(1/2)', 0, 1)).toBeUndefined();
    expect(slope('((1+v1)^2)^(1/2)', 0, 1)).toBeUndefined();
    expect(slope('v1*log(v1)', 0, 1)).toBeUndefined();
    expect(slope('log(0)', 0, 1)).toBeUndefined();
    expect(slope('1/(v1-v1)', 0, 1)).toBeUndefined();
  });
});
