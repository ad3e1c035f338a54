import { describe, expect, it } from 'vitest';
import { slugOf } from '../../src/notation/slug.js';

describe('slugOf', () => {
  it.each([
    ['Harbour light', 'harbour-light'],
    ['  R² & T²!  ', 'r2-t2'],
    ['Größe', 'grosse'],
    ["l'été Ångström", 'lete-angstrom'],
    ['α-model Λ', 'alpha-model-lambda'],
    ['ς', 'sigma'],
    ['../../etc/passwd', 'etc-passwd'],
    ['<b>x</b>', 'b-x-b'],
    ['漢字', 'theory'],
    ['---', 'theory'],
    ['', 'theory'],
  ])('%j → %s', (name, slug) => {
    expect(slugOf(name)).toBe(slug);
  });
  it('is short and safe for any text', () => {
    const slug = slugOf('word '.repeat(100));
    expect(slug.length).toBeLessThanOrEqual(60);
    expect(slug).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/);
  });
});
