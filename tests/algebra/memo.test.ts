import { expect, it } from 'vitest';
import { remember } from '../../src/algebra/memo.js';

it('makes each value once', () => {
  const memo = new Map<string, number>();
  let made = 0;
  const make = (): number => {
    made++;
    return 7;
  };
  expect([remember(memo, 'x', make), remember(memo, 'x', make), remember(memo, 'y', make)]).toEqual([7, 7, 7]);
  expect(made).toBe(2);
});
