import { describe, expect, it } from 'vitest';
import { NO_ISOTROPY, readIsotropy } from '../../src/geometry/read-isotropy.js';
import type { Diagnostic } from '../../src/notation/diagnostics.js';
import { readYaml } from '../../src/notation/yaml-source.js';

function read(text: string): { readonly value: unknown; readonly problems: readonly Diagnostic[] } {
  const problems: Diagnostic[] = [];
  return { value: readIsotropy(readYaml(text, 'test.yaml'), problems), problems };
}

describe('readIsotropy', () => {
  it('planes of rotations and reversed axes', () => {
    expect(read('{ rotations: [1 2, 2 3], reversals: [1 2, "3"] }')).toEqual({
      value: {
        rotations: [
          [1, 2],
          [2, 3],
        ],
        reversals: [[1, 2], [3]],
      },
      problems: [],
    });
  });

  it('without the key there is nothing but the identity', () => {
    const problems: Diagnostic[] = [];
    expect(readIsotropy(undefined, problems)).toBe(NO_ISOTROPY);
    expect(read('{}').value).toEqual({ rotations: [], reversals: [] });
  });

  it('reports what is no axis, with its place', () => {
    for (const text of ['{ rotations: [1 4] }', '{ rotations: [1 1] }', '{ rotations: ["1"] }', '{ reversals: [x] }'])
      expect(read(text).problems).toMatchObject([{ code: 'geometry-isotropy', file: 'test.yaml' }]);
    expect(read('{ turns: [1 2] }').problems).toMatchObject([{ code: 'unknown-key' }]);
  });
});
