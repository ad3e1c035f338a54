import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { add, constant, equals, generator, multiply, type Poly, scale } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { lowest, scalingBetween } from '../../src/compare/scaling.js';

const ring = makeRing([...jetsOf('x', 2), ...jetsOf('y', 2), ...constantsOf(['M', 'b', 'c'])]);
const g = (name: string, n = 1): Poly => generator(ring, name, n);
const of = (...factors: Poly[]): Poly => factors.reduce(multiply, constant(ring, 1));
const first = [add(of(g('M', 2), g('x')), g('y')), add(of(g('M', 2), g('D(x,1)')), scale(of(g('b'), g('y', 2)), 3))];

/** c times the equations with M² replaced by s M². */
const scaled = (c: Poly, s: Poly): Poly[] => [
  multiply(c, add(of(s, g('M', 2), g('x')), g('y'))),
  multiply(c, add(of(s, g('M', 2), g('D(x,1)')), scale(of(g('b'), g('y', 2)), 3))),
];
const shown = (second: readonly Poly[]): string | undefined => {
  const s = scalingBetween(first, second, 'M');
  return s && [s.factor.top, s.factor.bottom, s.massSquared.top, s.massSquared.bottom].map(infix).join(' ');
};

describe('constant factors and M²', () => {
  it('are found together', () => {
    expect(shown(scaled(constant(ring, 1), constant(ring, 2)))).toBe('1 1 2 1');
    expect(shown(scaled(scale(g('c'), 5), constant(ring, 1)))).toBe('5*c 1 1 1');
    expect(shown(scaled(constant(ring, rational(-1, 2)), of(g('b'), g('c'))))).toBe('-1/2 1 b*c 1');
    expect(shown(scaled(constant(ring, 1), add(g('b'), g('c'))))).toBe('1 1 b + c 1');
    expect(shown(first)).toBe('1 1 1 1');
  });

  it('are not found where there are none', () => {
    expect(shown([first[0]!, scale(first[1]!, 2)])).toBeUndefined();
    expect(shown([add(first[0]!, g('x')), first[1]!])).toBeUndefined();
    expect(shown([multiply(first[0]!, g('x')), multiply(first[1]!, g('x'))])).toBeUndefined();
    const cubic = [add(of(g('M', 4), g('x')), add(of(g('M', 2), g('y')), g('x', 2)))];
    const other = [add(scale(of(g('M', 4), g('x')), 3), add(scale(of(g('M', 2), g('y')), 2), g('x', 2)))];
    expect(scalingBetween(cubic, other, 'M')).toBeUndefined();
    const right = [add(scale(of(g('M', 4), g('x')), 4), add(scale(of(g('M', 2), g('y')), 2), g('x', 2)))];
    expect(scalingBetween(cubic, right, 'M')).toBeDefined();
  });

  it('quotients are cancelled where one side divides the other', () => {
    const sum = add(g('b'), g('c'));
    const one = lowest({ top: multiply(sum, g('b')), bottom: sum });
    expect([infix(one.top), infix(one.bottom)]).toEqual(['b', '1']);
    const two = lowest({ top: g('b'), bottom: multiply(scale(sum, 2), g('b')) });
    expect(equals(two.bottom, scale(sum, 2))).toBe(true);
  });
});
