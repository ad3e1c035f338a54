/**
 * Index notation of plain contractions to the oracle's structured data: heads R T A \epsilon \eta \delta with
 * one-letter indices, powers of scalars not included. Only for the check tables, whose rows are written by hand;
 * the reader of theory files is another program and is not used here.
 */
import type { Factor, Head, Slot } from './contraction.js';

const HEADS: Readonly<Record<string, Head>> = {
  R: 'R',
  T: 'T',
  A: 'A',
  '\\epsilon': 'epsilon',
  '\\eta': 'eta',
  '\\delta': 'delta',
};

/** `R_{ab} R^{ab}` → two factors. */
export function factorsOf(text: string): Factor[] {
  const factors: Factor[] = [];
  let rest = text.trim();
  while (rest !== '') {
    const found = /^(R|T|A|\\epsilon|\\eta|\\delta)((?:\s*[_^]\s*(?:\{[a-z]+\}|[a-z])|\{\})*)\s*/.exec(rest);
    if (found === null) throw new Error(`cannot read '${rest}'`);
    const slots: Slot[] = [];
    for (const [, height, names] of found[2]!.matchAll(/([_^])\s*\{?([a-z]+)\}?/g))
      for (const name of names!) slots.push({ name, up: height === '^' });
    factors.push({ head: HEADS[found[1]!]!, slots });
    rest = rest.slice(found[0].length);
  }
  return factors;
}
