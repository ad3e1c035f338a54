/** Steps of a rewriting for the terminal and as JSON. */
import picocolors from 'picocolors';
import { printSum, type SumStyle } from '../tensor/print-sum.js';
import type { Step } from '../tensor/rewrite.js';

/** Rule, before, after and reason of each step. */
export const stepsJson = (steps: readonly Step[], style: SumStyle) =>
  steps.map(({ ruleId, before, after, why }) => ({
    rule: ruleId,
    before: printSum(before, style),
    after: printSum(after, style),
    why,
  }));

/** One paragraph for each step. */
export function printSteps(steps: readonly Step[], style: SumStyle, color: boolean): string {
  const paint = picocolors.createColors(color);
  if (steps.length === 0) return 'No step was needed.\n';
  return stepsJson(steps, style)
    .map(({ rule, before, after, why }, i) => `${i + 1}. ${paint.bold(rule)}: ${why}\n     ${before}\n   = ${after}\n`)
    .join('');
}
