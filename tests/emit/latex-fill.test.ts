import { describe, expect, it } from 'vitest';
import { fillLines, flatTerm, joined, widthOf } from '../../src/emit/latex-fill.js';
import type { TexTerm } from '../../src/emit/latex-math.js';

const term = (...head: readonly string[]): TexTerm => ({ negative: false, head, inner: [], tail: [] });
const wide = { first: 100, rest: 100, reserve: 0 };

describe('filling', () => {
  it('puts as many terms on a line as fit', () => {
    const terms = Array.from({ length: 12 }, (_, i) => term(`x_{${i}}`));
    const lines = fillLines(terms, '', wide);
    lines.slice(0, -1).forEach((line, i) => {
      const next = lines[i + 1]!.tex.split(' ').slice(0, 2).join(' ');
      expect(widthOf(line.tex)).toBeLessThanOrEqual(100);
      expect(widthOf(`${line.tex} ${next}`)).toBeGreaterThan(100);
    });
    expect(lines.map((l) => l.indent)).toEqual([0, ...lines.slice(1).map(() => 1)]);
  });

  it('leaves the first line to the left side when nothing fits beside it', () => {
    const lines = fillLines([term('\\alpha_{1}', '\\beta_{2}', '\\gamma_{3}')], '', { ...wide, first: 5 });
    expect(lines.map((l) => l.tex)).toEqual(['', '\\alpha_{1} \\beta_{2} \\gamma_{3}']);
  });

  it('keeps what follows the sum on the last line, or puts it on one of its own', () => {
    const full = fillLines([term('x^{2}')], '= 0', { first: 22, rest: 100, reserve: 0 });
    expect(
      full
        .map((l) => l.tex)
        .join(' ')
        .trim(),
    ).toBe('x^{2} = 0');
    expect(full.length).toBe(2);
  });

  it('starts a new line after a bracket that was broken', () => {
    const long: TexTerm = {
      negative: true,
      head: [],
      inner: Array.from({ length: 8 }, (_, i) => term(`a_{${i}}`)),
      tail: ['\\phi'],
    };
    const lines = fillLines([term('y'), long, term('z')], '', wide);
    expect(lines[0]!.tex).toBe('y');
    expect(lines[1]!.tex).toMatch(/^- \\bigl\( a_\{0\}/);
    expect(lines.at(-1)!.tex).toBe('+ z');
    expect(lines.slice(2, -1).every((l) => l.indent === 2)).toBe(true);
  });

  it('sets a bracket with fractions in larger brackets', () => {
    const inner = Array.from({ length: 9 }, (_, i) => term(`\\frac{a_{${i}}}{b}`));
    const text = fillLines([{ negative: false, head: [], inner, tail: [] }], '', wide)
      .map((l) => l.tex)
      .join(' ');
    expect(text).toMatch(/^\\Bigl\( .* \\Bigr\)$/);
  });
});

it('texts are joined without empty pieces', () => {
  expect(joined('', 'a', '', 'b')).toBe('a b');
  expect(flatTerm({ negative: true, head: ['2'], inner: [term('a'), term('b')], tail: ['x'] })).toBe('2 (a + b) x');
});
