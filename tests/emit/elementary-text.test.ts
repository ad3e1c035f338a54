import { describe, expect, it } from 'vitest';
import { FUNCTIONS } from '../../src/cas/elementary.js';
import { readReply } from '../../src/cas/reply.js';
import { elementaryTex, elementaryText } from '../../src/emit/elementary-text.js';

const tree = (text: string) => readReply(text, FUNCTIONS);

describe('elementary functions as text', () => {
  it('have their usual names and no needless brackets', () => {
    expect(elementaryText(tree('1/2*log(v1+(v1^2+1)^(1/2))+1/2*v1*(v1^2+1)^(1/2)'), 'x')).toBe(
      '1/2*log(x + sqrt(x^2 + 1)) + 1/2*x*sqrt(x^2 + 1)',
    );
    expect(elementaryText(tree('arctanh(v1)-arcsinh(2*v1)'), 'x')).toBe('artanh(x) - arsinh(2*x)');
    expect(elementaryText(tree('(1-v1)/(2*(1+v1))'), 'x')).toBe('(1 - x)/(2*(1 + x))');
    expect(elementaryText(tree('1-(2-v1)'), 'x')).toBe('1 - (2 - x)');
    expect(elementaryText(tree('-(1+v1)^(-2)'), 'x')).toBe('-(1 + x)^(-2)');
  });

  it('are TeX', () => {
    expect(elementaryTex(tree('1/2*arctanh(v1)+v1/(2*(-v1^2+1))'), 'x')).toBe(
      '\\frac{1}{2} \\operatorname{artanh} \\bigl( x \\bigr) + \\frac{x}{2 (-x^{2} + 1)}',
    );
    expect(elementaryTex(tree('log(v1)'), 'x')).toBe('\\ln \\bigl( x \\bigr)');
    expect(elementaryTex(tree('(1+v1)^(3/2)'), 'x')).toBe('\\sqrt{1 + x}^{\\,3}');
  });
});
