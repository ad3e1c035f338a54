/** Wall time of a whole derivation as a process of its own, next to that of a process that does nothing. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { summary, type Timing } from './timing.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));
export const DERIVATION = ['dist/bin.js', 'derive', 'rules/examples/harbour-light.yaml', '--json'];

function wall(args: readonly string[]): number {
  const start = performance.now();
  const { status, stdout, stderr } = spawnSync(process.execPath, args, { cwd: ROOT, encoding: 'utf8' });
  const time = performance.now() - start;
  if (status !== 0) throw new Error(`node ${args.join(' ')} ended with ${status}: ${stderr.trim()}`);
  if (args.length > 2) {
    const { equations } = JSON.parse(stdout) as { equations: Record<string, string> };
    if (!Object.values(equations).some((text) => text !== '0')) throw new Error('the derivation gave no equations');
  }
  return time;
}

/** Both kinds of process in turn, so that a slow spell of the machine meets both. */
export function startup(runs: number): { derivation: Timing; nothing: Timing } {
  const derivation: number[] = [];
  const nothing: number[] = [];
  for (let i = 0; i <= runs; i++) {
    const [a, b] = [wall(DERIVATION), wall(['-e', '0'])];
    // The first of each fills the caches of the file system.
    if (i === 0) continue;
    derivation.push(a);
    nothing.push(b);
  }
  return { derivation: summary(derivation), nothing: summary(nothing) };
}
