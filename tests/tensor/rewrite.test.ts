import { describe, expect, it } from 'vitest';
import { scale } from '../../src/algebra/poly.js';
import { canonicalSum, type TensorTerm } from '../../src/tensor/expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { matches } from '../../src/tensor/match.js';
import { applyRule, equalSums, neverFired, type Rewriting, rewrite } from '../../src/tensor/rewrite.js';
import type { Rule } from '../../src/tensor/rule.js';
import { bundledRules } from '../../src/tensor/rule-library.js';
import { rules, shown, sum } from './rewriting.js';

const KINDS = kindTable();
const run = (text: string, list: readonly Rule[], given: readonly string[] = [], limits = {}): Rewriting =>
  rewrite(sum(text), list, { kinds: KINDS, given: new Set(given), limits });

/** Every step is what its rule makes of one term, and all steps together lead from the input to the value. */
function replay(text: string, list: readonly Rule[], { value, steps }: Rewriting, given: readonly string[] = []): void {
  let terms: TensorTerm[] = [...sum(text)];
  for (const { ruleId, before, after } of steps) {
    const rule = list.find((r) => r.id === ruleId)!;
    expect(before).toHaveLength(1);
    expect(shown(applyRule(rule, before[0]!, KINDS, new Set(given))!)).toBe(shown(after));
    terms = [...terms, ...before.map((t) => ({ ...t, coefficient: scale(t.coefficient, -1) })), ...after];
  }
  expect(shown(canonicalSum(terms, KINDS))).toBe(shown(value));
}

describe('rewriting', () => {
  it('reaches a fixpoint and can be replayed', () => {
    const list = rules(['T_{?a?b?c}', '\\eta_{?a?b} T_{?c} - \\eta_{?a?c} T_{?b}']);
    const text = 'c1 T_{abc} T^{abc} + R';
    const result = run(text, list);
    expect(result.stop).toBe('fixpoint');
    expect(shown(result.value)).toBe('1·R() + -2*c1·T(_a)T(^a)');
    expect(result.steps.map((s) => [s.ruleId, s.why])).toEqual([['r1', 'test']]);
    replay(text, list, result);
  });

  it('of irreducible parts can be replayed', () => {
    const list = bundledRules('parts');
    for (const text of [
      'c1 R^{(weyl)}_{abcd} R^{(weyl)}{}^{cdab} + x R^2',
      'R^{(pair-antisymmetric)}_{abcd} R^{(ricci-antisymmetric)}{}^{abcd} - c2 T^{(tensor)}_{abc} T^{bac}',
    ]) {
      const result = run(text, list);
      expect(result.stop).toBe('fixpoint');
      expect(result.value.every((t) => t.factors.every((f) => f.part === undefined))).toBe(true);
      replay(text, list, result);
    }
  });

  it('keeps free indices with their heights', () => {
    const list = rules(['R_{?a?b}', 'T_{?a} T_{?b}']);
    expect(shown(run('R^x{}_y', list).value)).toBe('1·T(^x)T(_y)');
    expect(shown(run('R_{xa} T^a', list).value)).toBe('1·T(_x)T(_a)T(^a)');
  });

  it('gives contracted indices of the right side fresh names', () => {
    const list = rules(['T_{?a}', 'R_{?a b} A^b']);
    // Both factors are rewritten, and the a, b of the term do not meet those of the rule.
    const once = run('T_a T^a R_{bc} R^{bc}', rules(['T_{?b}', 'R_{?b a} A^a']));
    expect(shown(once.value)).toBe(shown(run('T_a T^a R_{bc} R^{bc}', list).value));
    expect(once.value[0]!.factors.filter((f) => f.head === 'T' && f.slots.length === 1)).toHaveLength(0);
  });

  it('prefers earlier rules', () => {
    const [a, b] = rules(['R', 'T_a T^a'], ['R', 'A_a A^a']);
    expect(run('R', [a!, b!]).steps[0]!.ruleId).toBe('r1');
    expect(run('R', [b!, a!]).steps[0]!.ruleId).toBe('r2');
  });

  it('tries the next match when a condition fails', () => {
    const text = 'T_{abc} R^{ab} T_{xd}{}^c T^d';
    for (const condition of ['free ?a', 'free ?b']) {
      const list = rules(['T_{?a?b?c}', '\\eta_{?a?b} T_{?c} - \\eta_{?a?c} T_{?b}', condition]);
      const all = [...matches(list[0]!.left, sum(text)[0]!.factors, KINDS)];
      const wanted = condition.slice(-2);
      const holds = all.map((m) => m.bound.get(wanted)!.name === 'x');
      const result = run(text, list);
      expect(result.steps.length > 0, condition).toBe(holds.includes(true));
      // At least one match was passed over.
      expect(holds.includes(false)).toBe(true);
      replay(text, list, result);
    }
    // Only an arrangement of ε after the first has the free index in its last slot.
    const list = rules(['\\epsilon_{?a?b?c?d}', 'T_{?b?c?d} T_{?a}', 'free ?d']);
    const [first] = matches(list[0]!.left, sum('\\epsilon_{xabc} T^{abc}')[0]!.factors, KINDS);
    expect(first!.bound.get('?d')!.name).not.toBe('x');
    expect(run('\\epsilon_{xabc} T^{abc}', list).steps).toHaveLength(1);
  });

  it('fires only on a proved condition', () => {
    const list = rules(['R', '0', 'modulo-boundary']);
    expect(shown(run('R', list).value)).toBe('1·R()');
    expect(shown(run('R', list, ['not modulo-boundary']).value)).toBe('1·R()');
    expect(shown(run('R', list, ['modulo-boundary']).value)).toBe('0');
  });
});

describe('why a run stops', () => {
  it('two rules that undo each other: cycle', () => {
    const list = rules(['R', 'T_a T^a'], ['T_a T^a', 'R']);
    const result = run('R', list);
    expect(result.stop).toBe('cycle');
    replay('R', list, result);
  });

  it('a rule that changes nothing: cycle', () => {
    expect(run('R', rules(['R', 'R'])).stop).toBe('cycle');
  });

  it('a rule that grows: size', () => {
    // Each round replaces every R by two products with more of them.
    const list = rules(['R', 'R T_a T^a + R A_a A^a']);
    expect(run('R', list, [], { size: 20 }).stop).toBe('size');
  });

  it('a rule without end: steps', () => {
    const list = rules(['R', 'R T_a T^a']);
    const result = run('R', list, [], { steps: 4 });
    expect(result.stop).toBe('steps');
    expect(result.steps).toHaveLength(4);
    replay('R', list, result);
  });

  it('a slow one: time', () => {
    let clock = 0;
    const result = rewrite(sum('R'), rules(['R', 'R T_a T^a']), {
      kinds: KINDS,
      limits: { milliseconds: 5 },
      now: () => clock++,
    });
    expect(result.stop).toBe('time');
  });
});

describe('reports', () => {
  it('name the rules that never fired', () => {
    const list = rules(['R', 'T_a T^a'], ['R_{?a?b}', '0']);
    expect(neverFired(list, run('R', list).steps).map((r) => r.id)).toEqual(['r2']);
  });

  it('compare sums', () => {
    expect(equalSums(sum('R_{ab} R^{ba}'), sum('R_{xy} R^{yx}'), KINDS)).toBe(true);
    expect(equalSums(sum('R_{ab} R^{ba}'), sum('R_{ab} R^{ab}'), KINDS)).toBe(false);
    expect(equalSums(sum('c1 R'), sum('c2 R'), KINDS)).toBe(false);
  });
});
