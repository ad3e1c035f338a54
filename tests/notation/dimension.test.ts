import { describe, expect, it } from 'vitest';
import { parseDimension } from '../../src/notation/dimension.js';

describe('parseDimension', () => {
  it.each([
    ['mass', 1],
    ['mass^2', 2],
    [' mass ^ -1 ', -1],
    ['mass^{-4}', -4],
    ['mass^−2', -2],
    ['mass^0', 0],
    ['1', 0],
    ['dimensionless', 0],
  ])('%j is mass to the %i', (text, power) => {
    expect(parseDimension(text)).toBe(power);
  });
  it.each(['', 'length', 'mass^', 'mass^x', 'mass^1/2', 'mass^{2', 'mass^99', 'mass^065', '2', 'Mass^2^2'])(
    '%j is no dimension',
    (text) => {
      expect(parseDimension(text)).toBeUndefined();
    },
  );
});
