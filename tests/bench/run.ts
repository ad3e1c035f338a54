/**
 * `npm run bench`: times the task of task.ts in this program and in two general-purpose libraries in one run, checks that
 * all of them got the same result, times a whole derivation and canonical forms, prints the ratios and writes docs/benchmarks.md.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { cpus, totalmem } from 'node:os';
import * as E from '../oracle/exact.js';
import { Random } from '../oracle/random.js';
import { kernel } from './kernel.js';
import { DERIVATION, startup } from './startup.js';
import { CONSTANTS, FIELDS, ORDERS, type Subject, TERM_COUNTS } from './task.js';
import { summary, type Timing, times, warmUp } from './timing.js';

const POINTS = 5;
const LIBRARY_BUDGET_MS = 15_000;
const STARTUP_RUNS = 15;

/** Throws unless every subject has the known numbers of terms and the same values at random exact points. */
function compare(subjects: readonly Subject[]): void {
  const results = subjects.map((subject) => subject.run());
  subjects.forEach((subject, i) => {
    const counts = subject.termCounts(results[i]!).join(', ');
    if (counts !== TERM_COUNTS.join(', '))
      throw new Error(`${subject.name}: ${counts} terms, not ${TERM_COUNTS.join(', ')}`);
  });
  for (let seed = 1; seed <= POINTS; seed++) {
    const random = new Random(seed);
    const jets = FIELDS.flatMap((q) => Array.from({ length: ORDERS[q] + 1 }, (_, n) => (n === 0 ? q : `D(${q},${n})`)));
    const point = new Map([...jets, ...CONSTANTS].map((name) => [name, random.rational(true)]));
    const values = subjects.map((subject, i) => subject.values(results[i]!, point).map(E.show).join(', '));
    values.forEach((text, i) => {
      if (text !== values[0])
        throw new Error(`${subjects[i]!.name} differs at point ${seed}: ${text}, not ${values[0]}`);
    });
  }
}

const own = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as { version: string };
const ours = await kernel(own.version);
// Before anything else has warmed up.
const coldStart = performance.now();
ours.run();
const coldMs = performance.now() - coldStart;

const { algebriteSubject, nerdamerSubject } = await import('./libraries.js');
const libraries = [algebriteSubject, nerdamerSubject];
const subjects = [ours, ...libraries];
compare(subjects);
console.log(`All results agree: ${TERM_COUNTS.join(', ')} terms, equal values at ${POINTS} random points.`);

// Our runs come in three blocks around the others, so that a slow spell of the machine meets all.
const block = (): number[] => {
  warmUp(ours);
  return times(ours, 1_000, 20, 2_000);
};
const ourTimes = block();
const theirs: Timing[] = [];
for (const library of libraries) {
  warmUp(library);
  theirs.push(summary(times(library, LIBRARY_BUDGET_MS, 5, 1_000)));
  ourTimes.push(...block());
}
const rows: readonly [Subject, Timing][] = [
  [ours, summary(ourTimes)],
  ...libraries.map((l, i): [Subject, Timing] => [l, theirs[i]!]),
];
const base = rows[0]![1].medianMs;
const { derivation, nothing } = startup(STARTUP_RUNS);

const ms = (x: number): string => (x < 1 ? x.toFixed(3) : x < 100 ? x.toFixed(1) : x.toFixed(0));
const round = (x: number): string => String(Number(x.toPrecision(2)));
const table = [
  '| | version | runs | median (ms) | least (ms) | ratio of medians |',
  '|---|---|---|---|---|---|',
  ...rows.map(
    ([{ name, version }, t]) =>
      `| ${name} | ${version} | ${t.runs} | ${ms(t.medianMs)} | ${ms(t.leastMs)} | ${t.medianMs === base ? '1' : round(t.medianMs / base)} |`,
  ),
];
const whole = [
  '| process | runs | median (ms) | least (ms) |',
  '|---|---|---|---|',
  `| \`node ${DERIVATION.join(' ')}\` | ${derivation.runs} | ${ms(derivation.medianMs)} | ${ms(derivation.leastMs)} |`,
  `| \`node -e 0\` | ${nothing.runs} | ${ms(nothing.medianMs)} | ${ms(nothing.leastMs)} |`,
];
const ratio = (derivation.medianMs / nothing.medianMs).toFixed(1);
const machine = `${cpus().length} × ${cpus()[0]?.model.trim() ?? 'unknown'}, ${Math.round(totalmem() / 2 ** 30)} GB, ${process.platform}, Node ${process.version}`;

const { canonicalSection } = await import('./canonical.js');
const canonical = await canonicalSection();

const page = `# Benchmarks

Written by \`npm run bench\`, which also checks that all results are the same. Times of one machine mean little by
themselves, and vary by up to a factor of two when it is busy; compare the ratios of one run.

Machine: ${machine}.

## Euler–Lagrange expressions of the general reduced Lagrangian

The task is stated at the top of \`tests/bench/task.ts\`: the Lagrangian with all twelve couplings of the quadratic class and k,
built from its symbols, and the Euler–Lagrange expressions of N, a, φ and ψ as sums of distinct Laurent monomials
(${TERM_COUNTS.join(', ')} terms). The clock runs inside one process, after a warm-up of two runs or one second, whichever is
longer. The results of all three are compared at ${POINTS} random rational points, exactly.

${table.join('\n')}

The first run in a fresh process, before anything is compiled to machine code, takes ${ms(coldMs)} ms here.

## A whole derivation as a process

${whole.join('\n')}

Ratio of medians: ${ratio}.

${canonical}`;
writeFileSync(new URL('../../docs/benchmarks.md', import.meta.url), page);
console.log(
  [
    machine,
    ...table,
    '',
    ...whole,
    `ratio: ${ratio}`,
    `first run: ${ms(coldMs)} ms`,
    '',
    canonical,
    'Written: docs/benchmarks.md',
  ].join('\n'),
);
