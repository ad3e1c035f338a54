import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import {
  add,
  constant,
  equals,
  generator,
  isCanonical,
  multiply,
  type Poly,
  power,
  scale,
  subtract,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, makeRing } from '../../src/algebra/ring.js';
import { factorsOfReply, ReplyError, readReply, valueOfReply } from '../../src/cas/reply.js';
import { sums, tries } from '../algebra/arbitrary.js';
import { toKernel } from '../algebra/textbook.js';

const ring = makeRing(constantsOf(['v1', 'v2', 'v3']));
const [x, y] = [generator(ring, 'v1'), generator(ring, 'v2')];
const images = new Map(['v1', 'v2', 'v3'].map((name) => [name, generator(ring, name)]));
const value = (text: string, maxExponent = 20): Poly => valueOfReply(readReply(text), ring, images, maxExponent);

describe('a reply', () => {
  it('has the value that the kernel printed', () => {
    fc.assert(
      fc.property(sums(['v1', 'v2', 'v3']), (p) => {
        const q = toKernel(ring, p);
        expect(equals(value(infix(q)), q)).toBe(true);
      }),
      tries(200),
    );
  });

  it('is read with the usual precedence', () => {
    const one = constant(ring, 1);
    const cases: [string, Poly][] = [
      ['-v1^2', scale(power(x, 2), -1)],
      ['(-v1)^2', power(x, 2)],
      ['v1-v2-1', subtract(subtract(x, y), one)],
      ['v1/2*v2', scale(multiply(x, y), rational(1, 2))],
      ['v1/(2*v2)', scale(multiply(x, power(y, -1)), rational(1, 2))],
      ['2*-v1', scale(x, -2)],
      ['v1--+v2', add(x, y)],
      ['v1^(-2)+v1^-2', scale(power(x, -2), 2)],
      [' ( v1 +v2 ) ^ 2 ', power(add(x, y), 2)],
      ['1000000000000000000000000000*v1', scale(x, rational(10n ** 27n))],
      ['((v1^2)^3)^2', power(x, 12)],
      ['v1^0', one],
    ];
    for (const [text, want] of cases) {
      expect(isCanonical(value(text))).toBe(true);
      expect(equals(value(text), want), text).toBe(true);
    }
  });

  it('comes apart into the factors of its outermost product', () => {
    const parts = (text: string) =>
      factorsOfReply(readReply(text)).map(({ base, power: n }) => [infix(valueOfReply(base, ring, images, 20)), n]);
    expect(parts('-2*(v1+v2)^2*(v1-1)/v2')).toEqual([
      ['-1', 1],
      ['2', 1],
      ['v1 + v2', 2],
      ['v1 - 1', 1],
      ['v2', -1],
    ]);
    expect(parts('v1+v2')).toEqual([['v1 + v2', 1]]);
    expect(parts('((v1+1)^2*v2)^3')).toEqual([
      ['v1 + 1', 6],
      ['v2', 3],
    ]);
    expect(parts('-(-v1)')).toEqual([
      ['-1', 1],
      ['-1', 1],
      ['v1', 1],
    ]);
  });

  it('is refused when it is anything else', () => {
    const refused = [
      '',
      ' ',
      '0.5*v1',
      'v1+',
      '*v1',
      'v1 v2',
      '2v1',
      '(v1',
      'v1)',
      'sqrt(v1)',
      'v1^v2',
      'v1^(1/2)',
      'v1^2^3',
      'v1^99999',
      'v1=2',
      'v1;v2',
      '[v1]',
      'v1^()',
      'Infinity(',
      '1e5',
      '"v1"',
      '²',
    ];
    for (const text of refused) expect(() => value(text), text).toThrow(ReplyError);
    expect(() => value('v4')).toThrow("unknown name 'v4' in a reply");
    expect(() => value('constructor')).toThrow('unknown name');
    expect(() => value('Stop: number too big to factor')).toThrow("unexpected ':' in a reply");
    expect(() => value('v1/0')).toThrow('division by zero');
    expect(() => value('1/(v1+v2)')).toThrow('a sum has no inverse');
  });

  it('is refused beyond stated limits instead of costing time', () => {
    expect(() => value('(v1+v2)^21')).toThrow('the power 21 in a reply');
    expect(() => value('((v1+v2)^5)^5')).toThrow(ReplyError);
    expect(() => value('(((2^19)^19)^19)^19')).toThrow(ReplyError);
    expect(() => readReply('('.repeat(20_000))).toThrow('nested more than 200 deep');
    expect(() => readReply('-'.repeat(20_000))).toThrow('more than 200 signs');
    expect(() => readReply(`v1${'+v1'.repeat(6_000)}`)).toThrow('more than 5000 operators');
    expect(() => readReply('v1'.repeat(200_000))).toThrow('400000 characters');
    expect(() => readReply('9'.repeat(2_000))).toThrow('2000 digits');
    expect(equals(value(`v1${'+v1'.repeat(4_000)}`), scale(x, 4_001))).toBe(true);
  });
});
