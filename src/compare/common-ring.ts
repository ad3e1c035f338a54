/**
 * One ring for the Lagrangians of two theories, with enough jets for a redefinition of fields. Imports derivations.
 */
import { type Generator, jetsOf, makeRing, type Ring } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { InputError } from '../notation/diagnostics.js';

/** A redefinition may bring one derivative, and the variation doubles the order. */
const MAX_ORDER = 6;

/**
 * @throws InputError `different-geometries`, `different-matter` when a density means two things, `reserved-name` when a field
 * of one theory is a constant of the other.
 */
export function commonRing(a: Derivation, b: Derivation): Ring {
  if (a.geometry.id !== b.geometry.id)
    throw refuse(
      'different-geometries',
      `${a.theory.name} is on the geometry ${a.geometry.id}, ${b.theory.name} on ${b.geometry.id}`,
      'give both theories the same geometry',
    );
  const fields = [...new Set([...a.equations.keys(), ...b.equations.keys()])];
  const jets = fields.flatMap((q) => jetsOf(q, MAX_ORDER));
  const others = new Map<string, Generator>();
  for (const g of [...a.ring.generators, ...b.ring.generators]) {
    if (g.kind === 'jet') continue;
    if (fields.includes(g.name))
      throw refuse(
        'reserved-name',
        `${g.name} is a field of one theory and a constant of the other`,
        'rename one of them',
      );
    const known = others.get(g.name);
    if (known && text(known) !== text(g))
      throw refuse('different-matter', `${g.name} does not mean the same in both theories`, 'rename one of them');
    others.set(g.name, g);
  }
  return makeRing([...jets, ...others.values()]);
}

const text = (g: Generator): string =>
  g.kind === 'source' ? JSON.stringify([...g.exponents].map(([q, e]) => [q, `${e.num}/${e.den}`])) : g.kind;

const refuse = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);
