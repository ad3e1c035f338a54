import { describe, expect, it } from 'vitest';
import { infix } from '../../src/algebra/infix.js';
import { generator } from '../../src/algebra/poly.js';
import { fieldRules, ruleById } from '../../src/scalartensor/auxiliary-file.js';
import { type Binding, prepared, verifyBinding, verifyTemplate } from '../../src/scalartensor/auxiliary-match.js';
import { letterName, PATTERN_RING } from '../../src/scalartensor/auxiliary-rule.js';
import { exampleRing, formOf } from './auxiliary-examples.js';

const NAMES = { constants: ['m', 'f', 'g'], scalars: ['q', 'r'] };
const form = (text: string) => formOf(text, NAMES, exampleRing(NAMES));
const gaussian = ruleById('gaussian-field');
const shown = (binding: Binding): unknown =>
  typeof binding === 'string'
    ? binding
    : Object.fromEntries([...binding].map(([letter, f]) => [letter, infix(f.numerator)]));

describe('prepared', () => {
  it('binds letters to what stands in front, zero where nothing does', () => {
    expect(shown(prepared(gaussian, form('m r q^2 + g'), 'q'))).toEqual({ '?a': 'r*m', '?b': '0', '?c': 'g' });
    expect(shown(prepared(ruleById('velocity-by-parts'), form('m q D(q,1) + f q'), 'q'))).toEqual({
      '?b': 'q*m',
      '?c': 'q*f',
    });
  });

  it('says why a rule does not apply', () => {
    expect(prepared(gaussian, form('m r'), 'q')).toBe('the field does not occur');
    expect(prepared(gaussian, form('m q^3'), 'q')).toBe('the field enters to another power');
    expect(prepared(gaussian, form('m q^2 + D(q,1)'), 'q')).toBe('a velocity of the field enters otherwise');
    expect(prepared(gaussian, form('m q'), 'q')).toBe('nonzero ?a: no');
    expect(prepared(ruleById('velocity-by-parts'), form('m theta D(q,1)'), 'q')).toBe('still ?b: no');
    expect(prepared(ruleById('velocity-by-parts'), form('m/q D(q,1) + q'), 'q')).toBe('integrable ?b: no');
  });
});

describe('verifyTemplate', () => {
  it('accepts every bundled rule that inserts a solution, and no false one', () => {
    for (const rule of fieldRules().filter((r) => r.does === 'replace'))
      expect(() => verifyTemplate(rule)).not.toThrow();
    const letter = (name: string) => generator(PATTERN_RING, letterName(name));
    const results = new Map([...gaussian.results, ['field', letter('b')] as const]);
    expect(() => verifyTemplate({ ...gaussian, results })).toThrow('does not solve');
    const other = new Map([...gaussian.results, ['becomes', letter('c')] as const]);
    expect(() => verifyTemplate({ ...gaussian, results: other })).toThrow('is not the one with its solution');
  });
});

describe('verifyBinding', () => {
  it('notices letters that do not make up the form', () => {
    const start = form('m q^2 + f q + g');
    const bound = prepared(gaussian, start, 'q') as Exclude<Binding, string>;
    expect(() => verifyBinding(gaussian, start, 'q', bound)).not.toThrow();
    const spoilt = new Map([...bound, ['?b', bound.get('?c')!] as const]);
    expect(() => verifyBinding(gaussian, start, 'q', spoilt)).toThrow('does not match');
  });
});
