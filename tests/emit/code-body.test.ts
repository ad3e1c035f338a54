import { describe, expect, it } from 'vitest';
import { add, constant, generator, multiply, type Poly, zero } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { functionCode, localName, wholeBody } from '../../src/emit/code-body.js';
import type { CodeFunction, CodeOutput } from '../../src/emit/code-description.js';
import { print } from '../../src/emit/code-expression.js';
import { FORTRAN_NAMING } from '../../src/emit/code-fortran.js';
import { codeModel } from '../../src/emit/code-model.js';
import { ECMASCRIPT } from '../../src/emit/identifiers.js';
import { firstOrderModule } from './code-fixtures.js';
import { deriveText } from './emitted-module.js';

const d = deriveText(`untwist: 1
name: Harbour light
constants: [delete, jets, b1]
lagrangian: "delete R + jets R^2 + b1 T_a T^a"
`);
const m = codeModel(d, { jacobian: false });
const { input } = m.functions[0]!;
const g = (name: string, exponent = 1): Poly => generator(d.ring, name, exponent);
const options = { naming: ECMASCRIPT, taken: ['couplings', 'jets'], mostTerms: 1000, partTerms: 500 };
const bodyOf = (...outputs: Pick<CodeOutput, 'numerator' | 'denominator'>[]) => wholeBody(m, input, outputs, options);
const PLAIN = { literal: (t: string) => t, element: (l: string, i: number) => `${l}[${i}]`, root: (a: string) => a };

describe('wholeBody', () => {
  it('reads only what it needs, under names that are safe', () => {
    const body = bodyOf({ numerator: multiply(multiply(g('delete'), g('jets')), g('D(a,2)', 2)) });
    expect(body.reads).toEqual([
      { kind: 'jet', local: 'aDdot', field: 'a', order: 2 },
      { kind: 'coupling', local: 'delete_', key: 'delete' },
      { kind: 'coupling', local: 'jets_', key: 'jets' },
    ]);
    expect(body.steps.map((s) => `${s.name} = ${print(s.value, PLAIN)}`)).toEqual(['aDdotPow2 = aDdot * aDdot']);
    expect(body.results.map((e) => print(e, PLAIN))).toEqual(['delete_ * jets_ * aDdotPow2']);
    expect(body).toMatchObject({ usesCouplings: true, usesInput: true });
  });

  it('reads nothing for a number', () => {
    const body = bodyOf({ numerator: constant(d.ring, rational(-7, 3)) }, { numerator: zero(d.ring) });
    expect(body.results.map((e) => print(e, PLAIN))).toEqual(['-(7 / 3)', '0']);
    expect(body).toMatchObject({ reads: [], steps: [], usesCouplings: false, usesInput: false });
  });

  it('names what a quotient consists of', () => {
    const base = add(g('a'), g('b1'));
    const body = bodyOf({ numerator: g('N'), denominator: [{ base, power: 2 }] });
    expect(print(body.results[0]!, PLAIN)).toBe('numerator / (denominator * denominator)');
    expect(body.steps.map((s) => s.name)).toEqual(['numerator', 'denominator']);
  });

  it('reads a list by place and the square of a root once', () => {
    const first = firstOrderModule();
    const body = wholeBody(first, first.functions[2]!.input, first.functions[2]!.outputs, options);
    expect(body.reads).toEqual([
      { kind: 'entry', local: 'psi', index: 3 },
      { kind: 'coupling', local: 'k', key: 'k' },
      { kind: 'root', local: 'kappa', of: 'k' },
    ]);
  });

  it('refuses a symbol that no argument provides', () => {
    const poor = { ...m, parameters: [] };
    expect(() => wholeBody(poor, input, [{ numerator: g('b1') }], options)).toThrow('no value for b1');
    expect(() => bodyOf({ numerator: g('D(a,3)') })).toThrow('no value for D(a,3)');
  });
});

describe('functionCode', () => {
  const equations = m.functions.find((f) => f.name === 'equations') as CodeFunction;

  it('is whole while it is short', () => {
    expect(functionCode(m, equations, options).parts).toEqual([]);
  });

  it('keeps small outputs together and cuts a large one into a sum', () => {
    const { parts, body } = functionCode(m, equations, { ...options, mostTerms: 20, partTerms: 12 });
    expect(parts.length).toBeGreaterThan(3);
    expect(parts.map((p) => p.name)).toEqual(parts.map((_, i) => `equationsPart${i + 1}`));
    expect(body.results).toHaveLength(equations.outputs.length);
    expect(body.calls.map((c) => c.count)).toEqual(parts.map((p) => p.body.results.length));
    const texts = body.results.map((e) => print(e, PLAIN));
    expect(texts.some((t) => / \+ part\d+\[0\]/.test(t))).toBe(true);
    expect(texts.join(' + ').match(/part\d+\[\d+\]/g)).toHaveLength(
      parts.reduce((n, p) => n + p.body.results.length, 0),
    );
  });
});

describe('localName', () => {
  it('tells orders apart', () => {
    const jet = (order: number) =>
      ({ kind: 'jet', name: order === 0 ? 'a' : `D(a,${order})`, field: 'a', order }) as const;
    expect([0, 1, 2, 3].map((n) => localName(jet(n), ECMASCRIPT))).toEqual(['a', 'aDot', 'aDdot', 'aD3']);
    expect([1, 3].map((n) => localName(jet(n), FORTRAN_NAMING))).toEqual(['a_dot', 'a_d3']);
  });
});
