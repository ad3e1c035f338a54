import { describe, expect, it } from 'vitest';
import { editDistance, nearest, splitWord } from '../../src/notation/suggest.js';

describe('editDistance', () => {
  it.each([
    ['', '', 0],
    ['abc', 'abc', 0],
    ['abc', 'abd', 1],
    ['abc', 'ab', 1],
    ['abc', 'xabc', 1],
    ['abc', 'acb', 1],
    ['abcd', 'badc', 2],
    ['', 'abc', 3],
  ])('%s → %s takes %i', (a, b, n) => {
    expect(editDistance(a, b)).toBe(n);
    expect(editDistance(b, a)).toBe(n);
  });
});

describe('nearest', () => {
  it('finds the name that is one edit away, preferring the same first letter', () => {
    expect(nearest('b4', ['a4', 'b1', 'b2'])).toBe('b1');
    expect(nearest('constant', ['name', 'constants'])).toBe('constants');
    expect(nearest('dusk', ['dust', 'fluid'])).toBe('dust');
  });
  it('suggests a single letter only for its other case', () => {
    expect(nearest('m', ['x', 'M'])).toBe('M');
    expect(nearest('q', ['x', 'M'])).toBeUndefined();
  });
  it('is silent when nothing is near, and on absurdly long words', () => {
    expect(nearest('lagrangian', ['matter'])).toBeUndefined();
    expect(nearest('x'.repeat(1e6), ['x'.repeat(1e6 - 1)])).toBeUndefined();
  });
});

describe('splitWord', () => {
  const known = (name: string): boolean => ['c0', 'M', 'R', 'c'].includes(name);
  it('reads run-together names', () => {
    expect(splitWord('c0M', known)).toBe('c0 M');
    expect(splitWord('2c0MR', known)).toBe('2 c0 M R');
  });
  it('has nothing to say of one name or of unknown parts', () => {
    expect(splitWord('c0', known)).toBeUndefined();
    expect(splitWord('c0q', known)).toBeUndefined();
    expect(splitWord('M'.repeat(100), known)).toBeUndefined();
  });
});
