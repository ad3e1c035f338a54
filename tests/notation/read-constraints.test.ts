import { describe, expect, it } from 'vitest';
import { readTheory } from '../../src/notation/read-theory.js';
import type { TensorConstraint } from '../../src/notation/theory.js';
import { errorText } from './rendered.js';

const text = (constrain: string, more = ''): string =>
  `untwist: 1\nname: x\nconstants: [c1]\nlagrangian: c1 R\n${more}constrain: ${constrain}\n`;
const read = (constrain: string, more = ''): readonly TensorConstraint[] | undefined =>
  readTheory(text(constrain, more), 'test.yaml').constraints;

describe('readConstraints', () => {
  it('a list or a single expression, with free indices in the order of the text', () => {
    expect(
      read("'R^a_{bcd}'")?.map((c) => [c.text, c.free.map((s) => `${s.up ? '^' : '_'}${s.name}`).join('')]),
    ).toEqual([['R^a_{bcd}', '^a_b_c_d']]);
    expect(read('["T_a", "R", "T_a T^a + c1"]')?.map((c) => c.free.length)).toEqual([1, 0, 0]);
    expect(readTheory('untwist: 1\nname: x\nlagrangian: R\n', 'test.yaml').constraints).toBeUndefined();
  });

  it('in the conventions of the file', () => {
    const [constraint] = read('["T^a_{bc}"]', 'conventions: { torsion: half }\n')!;
    expect(constraint!.terms[0]!.scalar.coefficient).toEqual({ num: 1n, den: 2n });
  });

  it('a constant that only a constraint uses is used', () => {
    const source = 'untwist: 1\nname: x\nconstants: [c1]\nlagrangian: R\nconstrain: ["R - c1"]\n';
    expect(readTheory(source, 'test.yaml').warnings.map((w) => w.code)).toEqual(['mass-dimension']);
  });

  it('refuses what is no constraint, with its place', () => {
    expect(errorText(() => read('["R_{ab} + T_a"]'))).toContain('test.yaml:5:23: error: the summands differ');
    expect(errorText(() => read('["R - R"]'))).toBe(
      'test.yaml:5:14: error: the constraint is zero already\n    constrain: ["R - R"]\n                 ^^^^^\nhint: its terms cancel; leave it out',
    );
    expect(errorText(() => read('["R_{abcd} T_{efg}"]'))).toContain('7 free indices; at most 6');
    expect(errorText(() => read('["c2 R"]'))).toContain('unknown symbol c2');
    expect(errorText(() => read('["S_{a}"]', 'tensors: { S: { indices: 1 } }\n'))).toContain(
      'no geometry gives components to the declared tensor S',
    );
    expect(errorText(() => read('[[R]]'))).toContain('a constraint must be a text');
  });
});
