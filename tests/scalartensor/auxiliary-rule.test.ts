import { describe, expect, it } from 'vitest';
import { EXECUTORS, FIELD, LETTERS, letterName, PATTERN_RING, RATE } from '../../src/scalartensor/auxiliary-rule.js';

describe('letters of rules', () => {
  it('are generators that no user can spell', () => {
    for (const { name } of PATTERN_RING.generators) expect(name).toMatch(/[^A-Za-z0-9_]/);
    expect([RATE, FIELD, ...LETTERS.map(letterName)].every((n) => PATTERN_RING.position.has(n))).toBe(true);
    expect(new Set(EXECUTORS).size).toBe(EXECUTORS.length);
  });
});
