import { describe, expect, it } from 'vitest';
import { type Answer, ask, isFact, PREDICATES } from '../../src/tensor/conditions.js';
import type { Match } from '../../src/tensor/match.js';
import { sum } from './rewriting.js';

const match: Match = {
  taken: [0],
  sign: 1,
  bound: new Map([
    ['?a', { name: 'x', up: false }],
    ['?b', { name: 'a', up: false }],
    ['?c', { name: 'a', up: true }],
  ]),
};
const asked = (text: string, product: string, ...given: string[]): Answer => {
  const [predicate, ...variables] = text.split(' ') as [string, ...string[]];
  expect(variables).toHaveLength(PREDICATES.get(predicate)!.arity);
  return ask([{ predicate, variables }], { term: sum(product)[0]!, match, given: new Set(given) });
};

describe('conditions', () => {
  it('facts are unknown until stated', () => {
    for (const fact of ['modulo-boundary', 'torsion-free']) {
      expect(asked(fact, 'R')).toBe('unknown');
      expect(asked(fact, 'R', fact)).toBe('yes');
      expect(asked(fact, 'R', `not ${fact}`)).toBe('no');
    }
  });

  it('a coefficient is constant when all its symbols are known to be', () => {
    expect(asked('constant-coefficient', '2 R')).toBe('yes');
    expect(asked('constant-coefficient', 'c1 R')).toBe('unknown');
    expect(asked('constant-coefficient', 'c1 R', 'constant c1')).toBe('yes');
    expect(asked('constant-coefficient', 'c1 c2 R', 'constant c1')).toBe('unknown');
    expect(asked('constant-coefficient', 'c1 c2 R', 'not constant c1')).toBe('no');
  });

  it('speak about the match', () => {
    expect(asked('alone', 'T_a T^a')).toBe('no');
    expect(asked('alone', 'R')).toBe('yes');
    expect(asked('contracted ?b ?c', 'R')).toBe('yes');
    expect(asked('contracted ?a ?c', 'R')).toBe('no');
    expect(asked('apart ?a ?c', 'R')).toBe('yes');
    expect(asked('apart ?b ?c', 'R')).toBe('no');
    expect(asked('free ?a', 'R_{xb} T^b')).toBe('yes');
    expect(asked('free ?b', 'R_{xb} T^b')).toBe('no');
  });

  it('together say no before unknown before yes', () => {
    const two = (...predicates: string[]): Answer =>
      ask(
        predicates.map((predicate) => ({ predicate, variables: [] })),
        { term: sum('T_a T^a')[0]!, match, given: new Set() },
      );
    expect(two('torsion-free', 'alone')).toBe('no');
    expect(two('torsion-free', 'constant-coefficient')).toBe('unknown');
    expect(two('constant-coefficient')).toBe('yes');
    expect(two()).toBe('yes');
  });

  it('know the facts', () => {
    for (const fact of ['modulo-boundary', 'not torsion-free', 'constant alpha_1', 'not constant x'])
      expect(isFact(fact)).toBe(true);
    for (const text of ['flat', 'constant', 'constant 1', 'not', '']) expect(isFact(text)).toBe(false);
  });
});
