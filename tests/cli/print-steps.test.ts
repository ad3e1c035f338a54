import { describe, expect, it } from 'vitest';
import { printSteps, stepsJson } from '../../src/cli/print-steps.js';
import { sum } from '../tensor/rewriting.js';

const STEPS = [{ ruleId: 'trace', before: sum('c1 T_a T^a'), after: sum('R - x R'), why: 'a test' }];

describe('steps', () => {
  it('as text', () => {
    expect(printSteps(STEPS, { form: 'plain' }, false)).toBe('1. trace: a test\n     c1 T_a T^a\n   = (1 - x) R\n');
    expect(printSteps(STEPS, { form: 'plain' }, true)).toContain('\u001b[1mtrace\u001b[22m');
    expect(printSteps([], { form: 'plain' }, false)).toBe('No step was needed.\n');
  });

  it('as data', () => {
    expect(stepsJson(STEPS, { form: 'plain' })).toEqual([
      { rule: 'trace', before: 'c1 T_a T^a', after: '(1 - x) R', why: 'a test' },
    ]);
    expect(stepsJson([{ ...STEPS[0]!, after: [] }], { form: 'latex' })[0]!.after).toBe('0');
  });
});
