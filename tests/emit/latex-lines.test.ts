import { describe, expect, it } from 'vitest';
import { fillLines } from '../../src/emit/latex-fill.js';
import {
  displayBody,
  type Equation,
  equationDisplays,
  numberedDisplay,
  rowDisplays,
} from '../../src/emit/latex-lines.js';
import type { TexTerm } from '../../src/emit/latex-math.js';
import { extentOf, widthOf } from '../../src/emit/latex-width.js';

const term = (...head: readonly string[]): TexTerm => ({ negative: false, head, inner: [], tail: [] });
const minus = (t: TexTerm): TexTerm => ({ ...t, negative: true });
const bracket = (n: number, tail: string): TexTerm => ({
  negative: false,
  head: ['12'],
  inner: Array.from({ length: n }, (_, i) => ({ ...term(`${i + 2}`, `a_{${i + 1}}`), negative: i % 3 === 2 })),
  tail: [tail],
});
const COLUMN = 246;
const bodies = (lines: readonly string[]): string[] => lines.map((l) => l.replace('&', ''));
const part = (n: number): string => `P^{[${n}]}`;

describe('lines', () => {
  it('keep a short equation on one', () => {
    expect(equationDisplays({ left: 'x', terms: [term('a'), minus(term('b'))], right: '= 0' })).toEqual([
      ['x = a - b = 0'],
    ]);
  });

  it('are broken before signs and aligned at the relation', () => {
    const terms = Array.from({ length: 9 }, (_, i) =>
      (i % 2 ? minus : (t: TexTerm) => t)(term('a_{1}', `\\phi^{${i}}`, 'H^{2}')),
    );
    const [lines = []] = equationDisplays({ left: 'x', terms });
    expect(lines.length).toBeGreaterThan(1);
    expect(lines[0]).toMatch(/^x &= a_/);
    for (const line of lines.slice(1)) expect(line).toMatch(/^&\\quad \{\}[+-] a_/);
    for (const line of bodies(lines)) expect(widthOf(line)).toBeLessThanOrEqual(210);
  });

  it('begin at the margin when the left side is long', () => {
    const terms = Array.from({ length: 9 }, () => term('a_{1}', '\\phi^{2}', 'H^{2}'));
    const [lines = []] = equationDisplays({ left: 'R_{abcd} R^{abce} R_{ef} R^{fd}', terms });
    expect(lines[0]).toMatch(/^&R_/);
  });

  it('break a bracket that is too long, in pieces of even length, and never use sizes that cannot be broken', () => {
    const [lines = []] = equationDisplays({ left: 'E', terms: [term('x'), bracket(9, '\\phi^{2}'), term('y')] });
    expect(lines).toEqual([
      'E &= x',
      '&\\quad {}+ 12 \\bigl( 2 a_{1} + 3 a_{2} - 4 a_{3} + 5 a_{4} + 6 a_{5}',
      '&\\qquad {}- 7 a_{6} + 8 a_{7} + 9 a_{8} - 10 a_{9} \\bigr) \\phi^{2}',
      '&\\quad {}+ y',
    ]);
    expect(lines.join('')).not.toMatch(/\\left|\\right/);
  });

  it('break a product that is too long with a multiplication sign', () => {
    const factors = Array.from({ length: 14 }, (_, i) => `\\alpha_{${i + 10}}^{3}`);
    const [lines = []] = equationDisplays({ left: 'E', terms: [minus(term(...factors))] });
    expect(lines.length).toBeGreaterThan(1);
    expect(lines[1]).toMatch(/^&\\q?quad \{\}\\times /);
    for (const line of bodies(lines)) expect(widthOf(line)).toBeLessThanOrEqual(COLUMN);
  });

  it('put a sum without a left side at the margin', () => {
    expect(rowDisplays([{ left: '', terms: [minus(term('a'))], right: '= 0' }])).toEqual([['&-a = 0']]);
    expect(displayBody(['&-a = 0'])).toBe('-a = 0');
  });

  it('fit for sums of every length, with room for the number on the last', () => {
    for (let n = 1; n < 60; n++) {
      const terms = Array.from({ length: n }, (_, i) =>
        i % 4 === 0 ? bracket((i * n) % 23, '\\dot{\\phi}') : term('3', 'H^{2}'),
      );
      const usable = terms.map((t) => (t.inner.length < 2 ? term('q', '\\psi') : t));
      for (const lines of equationDisplays({ left: '\\frac{E_{\\phi}}{a^{3}}', terms: usable, right: '= 0', part })) {
        for (const line of bodies(lines)) expect(widthOf(line)).toBeLessThanOrEqual(COLUMN - 8);
        expect(widthOf(bodies(lines).at(-1)!)).toBeLessThanOrEqual(COLUMN - 34);
      }
    }
  });

  it('filled into a given room keep what they are given', () => {
    const terms = Array.from({ length: 30 }, (_, i) => term(`x_{${i}}`));
    const lines = fillLines(terms, '= 0', { first: 40, rest: 100, reserve: 20 });
    expect(lines.map((l) => l.tex).join(' ')).toBe(`${terms.map((t) => t.head[0]).join(' + ')} = 0`);
    expect(widthOf(lines[0]!.tex)).toBeLessThanOrEqual(40);
    for (const { tex } of lines) expect(widthOf(tex)).toBeLessThanOrEqual(100);
    expect(widthOf(lines.at(-1)!.tex)).toBeLessThanOrEqual(80);
  });
});

describe('displays', () => {
  const tall: Equation = {
    left: 'E',
    terms: Array.from({ length: 40 }, (_, i) => bracket(6, `\\frac{k}{a^{2}} \\phi^{${i}}`)),
    right: '= 0',
    part,
  };

  it('are several when one would be taller than half a page, and say how they add up', () => {
    const displays = equationDisplays(tall);
    expect(displays.length).toBeGreaterThan(3);
    const names = displays.slice(1).map((_, i) => part(i + 1));
    expect(
      bodies(displays[0]!)
        .join(' ')
        .replace(/\s*\\quad \{\}/g, ''),
    ).toContain(names.slice(0, 2).join(' + '));
    displays.slice(1).forEach((lines, i) => {
      expect(bodies(lines)[0]!.startsWith(names[i]!)).toBe(true);
      const height = lines.reduce((h, l) => h + extentOf(l).height + extentOf(l).depth + 4, 0);
      expect(height).toBeLessThanOrEqual(275);
    });
    expect(
      displays
        .slice(1)
        .join(' ')
        .match(/\\phi\^/g),
    ).toHaveLength(40);
  });

  it('split a bracket that alone is too tall', () => {
    const displays = equationDisplays({ left: 'E', terms: [bracket(400, '\\phi')], part });
    expect(displays.length).toBeGreaterThan(2);
    const all = displays.slice(1).flat().join(' ');
    for (const i of [1, 200, 400]) expect(all).toContain(`a_{${i}}`);
    expect(all.match(/\\bigl\(/g)!.length).toBe(all.match(/\\bigr\) \\phi/g)!.length);
  });

  it('of rows break between rows, and take a long row apart', () => {
    const rows = Array.from({ length: 40 }, (_, i): Equation => ({ left: `c_{${i}}`, terms: [term('x')] }));
    const displays = rowDisplays([...rows, tall]);
    expect(displays.length).toBeGreaterThan(5);
    expect(displays.flat().filter((l) => /^c_\{\d+\} &= x$/.test(l))).toHaveLength(40);
  });

  it('have one number and one label', () => {
    expect(numberedDisplay(['x = y'], 'eq:a:b')).toBe('\\begin{equation} \\label{eq:a:b}\nx = y\n\\end{equation}');
    expect(numberedDisplay(['x &= y', '&\\quad {}+ z'], 'l')).toBe(
      '\\begin{equation} \\label{l}\n\\begin{split}\n  x &= y \\\\\n  &\\quad {}+ z\n\\end{split}\n\\end{equation}',
    );
    expect(numberedDisplay(['x &= y', '&+ 1', '&+ 2', '&+ 3'], 'l')).toBe(
      '\\begin{align}\n  x &= y \\notag \\\\\n  &+ 1 \\notag \\\\\n  &+ 2 \\notag \\\\\n  &+ 3 \\label{l}\n\\end{align}',
    );
  });
});
