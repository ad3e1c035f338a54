import { describe, expect, it } from 'vitest';
import { lagrangianInput, userFault } from '../../src/cli/lagrangian-input.js';
import { CanonicalLimitError } from '../../src/tensor/canonical.js';
import { canonicalSum } from '../../src/tensor/expression.js';
import { printSum } from '../../src/tensor/print-sum.js';
import { TooLargeError } from '../../src/tensor/random-values.js';
import { RelationLimitError } from '../../src/tensor/relations.js';
import { SymmetryError } from '../../src/tensor/symmetry.js';
import { errorCodes } from '../notation/rendered.js';
import { THEORY, world } from './world.js';

const read = (text: string, set: readonly string[] = []) => lagrangianInput('-', set, world({ stdin: text }));

describe('lagrangianInput', () => {
  it('keeps what was typed and what the relations make of it', async () => {
    const input = await read(THEORY, ['b3 = 2 c0']);
    const text = (terms: typeof input.typed): string =>
      printSum(canonicalSum(terms, input.kinds), input.style('plain'));
    expect(text(input.typed)).toBe('1/2 c0 M^2 R + b3 M^2 T_a T^a');
    expect(text(input.terms)).toBe('1/2 c0 M^2 R + 2 c0 M^2 T_a T^a');
    expect([...input.facts].sort()).toEqual(['constant M', 'constant b3', 'constant c0']);
  });

  it('knows densities of matter and k as symbols of relations', async () => {
    const input = await read(THEORY, ['rho_dust = 0', 'k = 0']);
    expect(input.theory.relations).toHaveLength(2);
    expect(input.terms).toHaveLength(2);
  });

  it('prints in the conventions of the file', async () => {
    const input = await read(THEORY.replace('matter', 'conventions: { torsion: half }\nmatter'));
    expect(printSum(canonicalSum(input.typed, input.kinds), input.style('plain'))).toBe(
      '1/2 c0 M^2 R + b3 M^2 T_a T^a',
    );
  });
});

describe('userFault', () => {
  it.each([
    [new CanonicalLimitError(), 'arrangements-limit'],
    [new SymmetryError('too much'), 'bad-symmetry'],
    [new TooLargeError(), 'relations-limit'],
    [new RelationLimitError(), 'relations-limit'],
  ])('%s is the fault of the input', (error, code) => {
    expect(
      errorCodes(() =>
        userFault('x.yaml', () => {
          throw error;
        }),
      ),
    ).toEqual([code]);
  });

  it('leaves other errors alone', () => {
    expect(() =>
      userFault('x.yaml', () => {
        throw new Error('ours');
      }),
    ).toThrow('ours');
    expect(userFault('x.yaml', () => 3)).toBe(3);
  });
});
