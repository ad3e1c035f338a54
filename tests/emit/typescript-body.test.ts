import { describe, expect, it } from 'vitest';
import { add, constant, generator, multiply, type Poly, zero } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { functionBody, wrapped } from '../../src/emit/typescript-body.js';
import { deriveText } from './emitted-module.js';

const d = deriveText(`untwist: 1
name: Harbour light
constants: [delete, jets, b1]
lagrangian: "delete R + jets R^2 + b1 T_a T^a"
`);
const g = (name: string, exponent = 1): Poly => generator(d.ring, name, exponent);

describe('functionBody', () => {
  it('reads only what it needs, under names that are safe', () => {
    const body = functionBody(d, [{ numerator: multiply(multiply(g('delete'), g('jets')), g('D(a,2)', 2)) }]);
    expect(body.text.split('\n')).toEqual([
      '  const { delete: delete_, jets: jets_ } = couplings;'.replace('delete:', '"delete":'),
      '  const [, , aDdot] = jets.a;',
      '  const aDdotPow2 = aDdot * aDdot;',
      '  return delete_ * jets_ * aDdotPow2;',
    ]);
    expect(body).toMatchObject({ usesCouplings: true, usesJets: true });
  });

  it('reads nothing for a number', () => {
    const body = functionBody(d, [{ numerator: constant(d.ring, rational(-7, 3)) }]);
    expect(body).toEqual({ text: '  return -(7 / 3);', usesCouplings: false, usesJets: false });
    expect(functionBody(d, [{ key: 'phi,psi', numerator: zero(d.ring) }]).text).toBe(
      '  return {\n    "phi,psi": 0,\n  };',
    );
  });

  it('puts a quotient in brackets', () => {
    const base = add(g('a'), g('b1'));
    const body = functionBody(d, [{ numerator: g('N'), denominator: [{ base, power: 2 }] }]);
    expect(body.text.split('\n').at(-1)).toMatch(/^ {2}return \(N\) \/ \(\((.*)\) \* \(\1\)\);$/);
  });
});

describe('wrapped', () => {
  it('breaks a long list into lines', () => {
    const items = Array.from({ length: 40 }, (_, i) => `item${i}`);
    const lines = wrapped(items, ' ', '  ').split('\n');
    expect(lines.length).toBeGreaterThan(2);
    expect(Math.max(...lines.map((l) => l.length))).toBeLessThan(120);
    expect(lines.join('').match(/item\d+/g)).toEqual(items);
    expect(wrapped(['a', 'b'], ' ', '')).toBe(' a, b ');
  });
});
