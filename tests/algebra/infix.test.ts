import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, generator, monomial, negate, power, zero } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';
import { type Arithmetic, evaluate } from '../oracle/infix.js';
import { MECHANICS, namesOf, RINGS, sums, tries } from './arbitrary.js';
import { expectSame, minus, number, plus, reduced, type Slow, symbol, times, toKernel, toThe } from './textbook.js';

const derivative = (name: string, n: number): string => (n === 0 ? name : `D(${name},${n})`);
/** Reads the text into schoolbook polynomials; divisors are single terms. */
const reading: Arithmetic<Slow> = {
  integer: (n) => number(E.q(n)),
  name: (name, n) => symbol(derivative(name, n)),
  add: plus,
  sub: minus,
  mul: times,
  div: (x, y) => times(x, toThe(y, -1)),
  pow: toThe,
};

describe('infix text', () => {
  it('is read back as the value', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...RINGS, MECHANICS).chain((ring) => sums(namesOf(ring)).map((p) => ({ ring, p }))),
        ({ ring, p }) => {
          const value = toKernel(ring, p);
          expectSame(value, ring === MECHANICS ? reduced(p, 's', 'k') : p);
          const text = infix(value);
          expect(text).toMatch(/^[-+*/^(), 0-9A-Za-z_]+$/);
          expectSame(toKernel(ring, evaluate(text, reading)), ring === MECHANICS ? reduced(p, 's', 'k') : p);
        },
      ),
      tries(300),
    );
  });

  it('reads as one would write it', () => {
    const ring = MECHANICS;
    const term = (c: Q, ...powers: [string, number][]) => monomial(ring, rational(c.n, c.d), powers);
    expect(infix(zero(ring))).toBe('0');
    expect(infix(constant(ring, rational(-1, 2)))).toBe('-1/2');
    expect(infix(constant(ring, 1))).toBe('1');
    expect(infix(generator(ring, 'a', -1))).toBe('1/a');
    expect(infix(term(E.q(-1), ['a', 2]))).toBe('-a^2');
    expect(infix(term(E.q(3, 2), ['a', -2], ['N', -1], ['D(a,1)', 2], ['c', 1]))).toBe('3*c*D(a,1)^2/(2*N*a^2)');
    expect(infix(add(generator(ring, 'a'), negate(generator(ring, 'c'))))).toBe('a - c');
    expect(infix(power(add(generator(ring, 'a'), constant(ring, -1)), 2))).toBe('a^2 - 2*a + 1');
    expect(infix(term(E.q(2n ** 70n, 3n), ['rho', 1]))).toBe(`${2n ** 70n}*rho/3`);
  });
});
