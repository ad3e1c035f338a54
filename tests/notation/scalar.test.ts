import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { plainPassage } from '../../src/notation/passage.js';
import { printScalar } from '../../src/notation/print.js';
import { parseRelation, parseScalar, type ScalarOptions } from '../../src/notation/scalar.js';
import { isCanonicalScalar } from '../../src/notation/scalar-term.js';
import { errorText } from './rendered.js';

const names = ['a', 'phi', 'T', 'R', 'k', 'b1', 'b3', 'alpha_1', 'a_x'];
const options: ScalarOptions = { isSymbol: (name) => names.includes(name), names, allowJets: true };
const scalar = (text: string, more: Partial<ScalarOptions> = {}) =>
  parseScalar(plainPassage(text, 'E'), { ...options, ...more });
const relation = (text: string) => parseRelation(plainPassage(text, '--set'), options);

describe('parseScalar', () => {
  it.each([
    ['1/2 a + a/2', 'a'],
    ['\\frac{1}{2} \\alpha_1 - alpha_1', '-1/2 alpha_1'],
    ['(a + b1)(a - b1)', 'a^2 - b1^2'],
    ['a^(-2)*phi*3', '3 a^{-2} phi'],
    ['R T', 'R T'],
    ['a_x^2', 'a_x^2'],
    ['a - a', '0'],
    ['0', '0'],
    ['7', '7'],
  ])('%s is %s', (text, printed) => {
    expect(printScalar(scalar(text))).toBe(printed);
    expect(isCanonicalScalar(scalar(text))).toBe(true);
  });

  it.each([
    ['a/(a+b1)', 'E:1:3: error: division by (a+b1), which is a sum'],
    ['b2', 'E:1:1: error: unknown symbol b2'],
    ['ab1', 'E:1:1: error: unknown symbol ab1'],
    ['', 'E:1:1: error: the expression ends too early'],
    ['a = b1', 'E:1:3: error: an expression has no equals sign'],
    ['T_{abc}', 'E:1:1: error: unknown symbol T_abc'],
    ['0.5 a', 'E:1:1: error: 0.5 has a decimal point'],
  ])('%j: %s', (text, line) => {
    expect(errorText(() => scalar(text)).split('\n')[0]).toBe(line);
  });

  it('explains why a name cannot be used', () => {
    expect(errorText(() => scalar('h', { explain: (name) => `${name} is for outputs` }))).toContain('h is for outputs');
  });
});

describe('parseRelation', () => {
  it('keeps both sides, the subject and the folded text', () => {
    expect(relation(' b1 =  -2   b3 ')).toMatchObject({
      left: [{ coefficient: rational(1), powers: [['b1', 1]] }],
      right: [{ coefficient: rational(-2), powers: [['b3', 1]] }],
      subject: 'b1',
      text: 'b1 = -2 b3',
      origin: { file: '--set', start: 0 },
    });
    expect(relation('k=0')).toMatchObject({ subject: 'k', right: [] });
  });

  it.each(['2 b1 = b3', 'b1^2 = b3', 'b1 b3 = 1', 'b1 + b3 = 0', '-b1 = b3', '0 = b1', '1 = b1'])(
    '%s has no subject',
    (text) => {
      expect(relation(text).subject).toBeUndefined();
    },
  );

  it('asks for exactly one equals sign', () => {
    expect(errorText(() => relation('b1'))).toBe(
      ['--set:1:1: error: a relation needs an equals sign', '    b1', '    ^^', 'hint: for example b1 = -2 b3'].join(
        '\n',
      ),
    );
    expect(errorText(() => relation('b1 == 0'))).toBe(
      ['--set:1:4: error: a relation has one equals sign, not ==', '    b1 == 0', '       ^^', 'hint: write ='].join(
        '\n',
      ),
    );
    expect(errorText(() => relation('b1 = 0 = b3'))).toContain('--set:1:8: error: a second equals sign');
    expect(errorText(() => relation('b1 ='))).toContain('--set:1:4: error: the expression ends too early');
    expect(errorText(() => relation('= 1'))).toContain('--set:1:1: error: unexpected =');
  });
});
