import { transformSync } from 'esbuild';
import { describe, expect, it } from 'vitest';
import { commentText, makeNameTable, propertyKey, stringLiteral } from '../../src/emit/identifiers.js';

const SCREEN_TRICKS = 'a\u202eb\u2066c\u200bd\u2028e\u0000f\u0085g\ufeffh';

describe('makeNameTable', () => {
  it('gives every name once', () => {
    const names = makeNameTable(['jets']);
    expect(['a', 'a', 'a_', 'jets', 'a'].map((n) => names.claim(n))).toEqual(['a', 'a_', 'a__', 'jets_', 'a_v2']);
  });

  it('leaves no word of the language', () => {
    for (const word of ['delete', 'class', 'arguments', 'undefined', 'NaN', 'await', 'eval', 'let', 'Math', 'yield']) {
      const name = makeNameTable([]).claim(word);
      expect(name).toBe(`${word}_`);
      const code = `export function f(o: any) { "use strict"; const { ${propertyKey(word)}: ${name} } = o; return ${name}; }`;
      expect(() => transformSync(code, { loader: 'ts', format: 'esm' })).not.toThrow();
    }
  });
});

describe('propertyKey', () => {
  it('quotes what is not a plain word', () => {
    expect(['a', 'b_1', 'phi,psi', 'delete', '1x', 'é'].map(propertyKey)).toEqual([
      'a',
      'b_1',
      '"phi,psi"',
      '"delete"',
      '"1x"',
      '"é"',
    ]);
  });
});

describe('commentText', () => {
  it('cannot end or open a comment, or start a tag or directive', () => {
    for (const text of [
      '*/ x /*',
      '**//',
      '*\n/',
      '* / */*/',
      '@license @ts-ignore',
      '//# sourceMappingURL=x',
      '/*/*/',
    ]) {
      const clean = commentText(text);
      expect(clean).not.toMatch(/\*\/|\/\*|@|\/\/|\n/);
    }
  });

  it('replaces what a screen would not show', () => {
    expect(commentText(SCREEN_TRICKS)).toBe('a\ufffdb\ufffdc\ufffdd e f g h');
  });
});

describe('stringLiteral', () => {
  it('reads back as the text, in printing characters only', () => {
    for (const text of [SCREEN_TRICKS, '"quoted" \\ \n `$` {x}', '\u{e0001}tag', 'Σ φ²']) {
      const literal = stringLiteral(text);
      expect(JSON.parse(literal)).toBe(text);
      expect(literal).not.toMatch(/[\p{Cf}\p{Zl}\p{Zp}\p{Cc}]/u);
    }
  });
});
