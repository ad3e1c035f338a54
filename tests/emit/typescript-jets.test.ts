import { describe, expect, it } from 'vitest';
import { jetLocal, jetOrders, tupleType } from '../../src/emit/typescript-jets.js';
import { deriveText } from './emitted-module.js';

describe('jetOrders', () => {
  it('is as high as any expression needs, and 0 for a field that does not occur', () => {
    const d = deriveText('untwist: 1\nname: x\nscales: { M: mass }\nlagrangian: "1/2 M^2 R"\n');
    expect([...jetOrders(d)]).toEqual([
      ['N', 1],
      ['a', 2],
      ['phi', 1],
      ['psi', 0],
    ]);
  });
});

describe('tupleType', () => {
  it('labels the entries and leaves the end open', () => {
    expect(tupleType(0)).toBe('readonly [value: number, ...higher: number[]]');
    expect(tupleType(4)).toContain('third: number, order4: number, ...higher');
  });
});

describe('jetLocal', () => {
  it('tells orders apart', () => {
    expect([0, 1, 2, 3].map((n) => jetLocal('a', n))).toEqual(['a', 'aDot', 'aDdot', 'aD3']);
  });
});
