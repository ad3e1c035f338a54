/** Repeated timing of a task, by a monotonic clock inside the process, after a warm-up. */
import type { Subject } from './task.js';

export interface Timing {
  readonly runs: number;
  readonly medianMs: number;
  readonly leastMs: number;
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

export const summary = (times: readonly number[]): Timing => ({
  runs: times.length,
  medianMs: median(times),
  leastMs: Math.min(...times),
});

function once(subject: Subject): number {
  subject.reset();
  const start = performance.now();
  subject.run();
  return performance.now() - start;
}

/** Two runs or one second, whichever is longer, so that every subject is timed as compiled code. */
export function warmUp(subject: Subject): void {
  const start = performance.now();
  for (let i = 0; i < 2 || performance.now() - start < 1_000; i++) once(subject);
}

/** Times of as many runs as fit in the budget, but no fewer than `least` and no more than `most`. */
export function times(subject: Subject, budgetMs: number, least: number, most: number): number[] {
  const out: number[] = [];
  const start = performance.now();
  while (out.length < least || (out.length < most && performance.now() - start < budgetMs)) out.push(once(subject));
  return out;
}
