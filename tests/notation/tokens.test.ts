import { describe, expect, it } from 'vitest';
import { type Diagnostic, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { plainPassage } from '../../src/notation/passage.js';
import { clip, tokenize } from '../../src/notation/tokens.js';

const lex = (text: string) => {
  const problems: Diagnostic[] = [];
  const tokens = tokenize(plainPassage(text, 'x'), problems);
  return { tokens, problems, text: tokens.map((t) => `${t.kind}:${t.text}`).join(' ') };
};

describe('tokenize', () => {
  it('reads words, integers, macros and marks with their places', () => {
    const source = '2c0 R_{ab}^\\mu';
    const { tokens, text } = lex(source);
    expect(text).toBe('integer:2 word:c0 word:R mark:_ mark:{ word:ab mark:} mark:^ macro:mu end:');
    for (const t of tokens.slice(0, -1)) expect(source.slice(t.start, t.end).replace('\\', '')).toBe(t.text);
  });

  it('drops spacing and sizing, and reads products and brackets by their macros', () => {
    expect(lex('a~\\, \\; \\! \\: \\> \\quad\\qquad \\ b \\left( \\bigr) \\cdot \\times \\lbrace \\}').text).toBe(
      'word:a word:b mark:( mark:) mark:* mark:* mark:\\{ mark:\\} end:',
    );
    expect(lex('T_{\\phantom{a}bc}').text).toBe('word:T mark:_ mark:{ word:bc mark:} end:');
  });

  it('takes Greek letters, typographic signs and superscript digits for their TeX spelling', () => {
    expect(lex('α − Λ·ε × M² g⁻¹²').text).toBe(
      'macro:alpha mark:- macro:Lambda mark:* macro:epsilon mark:* word:M mark:^ integer:2 word:g mark:^ mark:- integer:12 end:',
    );
  });

  it('reports every stray character and decimal point', () => {
    const { problems } = lex('0.5 a # .25 \u0000;');
    expect(problems.map((d) => d.code)).toEqual([
      'decimal-point',
      'unexpected-character',
      'decimal-point',
      'unexpected-character',
    ]);
    expect(renderDiagnostic(problems[0]!)).toBe(
      [
        'x:1:1: error: 0.5 has a decimal point',
        '    0.5 a # .25 \ufffd;',
        '    ^^^',
        'hint: write a fraction: 1/2',
      ].join('\n'),
    );
  });

  it.each([
    ['0.5', '1/2'],
    ['1.25', '5/4'],
    ['3.', '3'],
    ['.2', '1/5'],
    ['0.0', '0'],
    [`0.${'3'.repeat(40)}`, 'p/q'],
  ])('%s as a fraction', (decimal, fraction) => {
    expect(lex(decimal).problems[0]!.hint).toBe(`write a fraction: ${fraction}`);
  });

  it('stops after enough faults', () => {
    expect(lex('#'.repeat(100_000)).problems.length).toBeLessThan(30);
  });
});

describe('clip', () => {
  it('shortens long texts only', () => {
    expect(clip('abc')).toBe('abc');
    expect(clip('a'.repeat(100))).toHaveLength(38);
  });
});
