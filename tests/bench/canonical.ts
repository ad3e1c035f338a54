/**
 * Canonical forms per second: random full contractions of two, three and four torsions and curvatures, with and without ε,
 * and growth with the number of indices and with symmetry. Every form is checked to be its own canonical form.
 */
import type { Factor, Kind } from '../../src/tensor/canonical.js';
import { Random } from '../oracle/random.js';
import { median } from './timing.js';

const PRODUCTS = 300;
const ROUNDS = 5;
const WARM_UP_MS = 300;
/** What is contracted; the number of indices follows. */
const CONTENTS: readonly (readonly [shown: string, ...names: string[]])[] = [
  ['T T', 'T/3', 'T/3'],
  ['R R', 'R/4', 'R/4'],
  ['ε T T', 'epsilon/4', 'T/3', 'T/3'],
  ['R T T', 'R/4', 'T/3', 'T/3'],
  ['R R R', 'R/4', 'R/4', 'R/4'],
  ['ε R R', 'epsilon/4', 'R/4', 'R/4'],
  ['T T T T', 'T/3', 'T/3', 'T/3', 'T/3'],
  ['R R T T', 'R/4', 'R/4', 'T/3', 'T/3'],
  ['R R R R', 'R/4', 'R/4', 'R/4', 'R/4'],
  ['six T', 'T/3', 'T/3', 'T/3', 'T/3', 'T/3', 'T/3'],
  ['six R', 'R/4', 'R/4', 'R/4', 'R/4', 'R/4', 'R/4'],
];

const compiled = (name: string): Promise<unknown> =>
  import(new URL(`../../dist/tensor/${name}.js`, import.meta.url).href);

function contraction(random: Random, kinds: readonly Kind[]): Factor[] {
  const slots = kinds.reduce((n, k) => n + k.slots, 0);
  const lines = new Array<number>(slots);
  random.shuffled(Array.from({ length: slots }, (_, i) => i)).forEach((slot, i) => {
    lines[slot] = i >> 1;
  });
  return kinds.map((kind) => ({ kind, lines: lines.splice(0, kind.slots) }));
}

/** Section of docs/benchmarks.md. */
export async function canonicalSection(): Promise<string> {
  const { canonicalForm } = (await compiled('canonical')) as typeof import('../../src/tensor/canonical.js');
  const { kindTable } = (await compiled('kinds')) as typeof import('../../src/tensor/kinds.js');
  const table = kindTable();
  const random = new Random(1);
  const rows = CONTENTS.map(([shown, ...names]) => {
    const kinds = names.map((name) => table.get(name)!);
    const products = Array.from({ length: PRODUCTS }, () => contraction(random, kinds));
    for (const product of products) {
      const form = canonicalForm(product, 0);
      if (form && canonicalForm(form.factors, 0)?.key !== form.key) throw new Error(`${form.key} is not canonical`);
    }
    const warm = performance.now() + WARM_UP_MS;
    while (performance.now() < warm) for (const product of products) canonicalForm(product, 0);
    // The least of several times of one product: what the machine does besides is no property of the product.
    const single = products.map((product) =>
      Math.min(
        ...Array.from({ length: ROUNDS }, () => {
          const start = performance.now();
          canonicalForm(product, 0);
          return performance.now() - start;
        }),
      ),
    );
    const rounds = Array.from({ length: ROUNDS }, () => {
      const start = performance.now();
      for (const product of products) canonicalForm(product, 0);
      return (performance.now() - start) / PRODUCTS;
    });
    const mean = median(rounds);
    const slots = kinds.reduce((n, k) => n + k.slots, 0);
    return `| ${shown} | ${slots} | ${Math.round(1000 / mean)} | ${mean.toFixed(3)} | ${Math.max(...single).toFixed(2)} |`;
  });
  return `## Canonical forms of tensor products

Random full contractions, ${PRODUCTS} of each content, in one process after a warm-up; the median of ${ROUNDS} rounds, and the slowest
product, each at its best. What is timed is one call of \`canonicalForm\` (\`docs/tensors.md\`).

| content | indices | forms per second | mean (ms) | slowest (ms) |
|---|---|---|---|---|
${rows.join('\n')}
`;
}
