/**
 * The Ricci tensor and the trace of torsion as a user defines them, by a formula such as `R^c_{abc}` or `T_{ab}{}^b` with
 * the indices in the user's order: which of the values of `ricci` and `torsion-trace` is meant.
 */
import { type Conventions, internalSlots } from './conventions.js';
import type { Passage } from './passage.js';
import { freeSlots, parseTensorExpression } from './tensor-expression.js';

/** Sign of the contraction of two slots of curvature (frame indices 0 and 1, form indices 2 and 3). */
const CURVATURE_SIGNS: Readonly<Record<string, number>> = { '0,2': 1, '0,3': -1, '1,2': -1, '1,3': 1 };
const TORSION_SIGNS: Readonly<Record<string, number>> = { '0,2': 1, '0,1': -1 };

interface Contraction {
  readonly sign: number;
  /** Names of the free indices in internal order. */
  readonly free: readonly string[];
}

/** The formula as ± a contraction of one tensor; undefined when it is none. @throws InputError when it cannot be read. */
function contraction(
  passage: Passage,
  head: 'R' | 'T',
  count: number,
  signs: Readonly<Record<string, number>>,
  conventions: Conventions,
): Contraction | undefined {
  const terms = parseTensorExpression(passage, { allowFree: true });
  const [term] = terms;
  const [factor] = term?.factors ?? [];
  if (term === undefined || factor === undefined || terms.length > 1 || term.factors.length > 1) return undefined;
  const { num, den } = term.scalar.coefficient;
  const isUnit = den === 1n && (num === 1n || num === -1n);
  if (factor.head !== head || factor.part !== undefined || factor.slots.length !== count || !isUnit) return undefined;
  const names = internalSlots(`${head}${count}`, factor.slots, conventions).map((slot) => slot.name);
  const free = freeSlots(term).map((slot) => slot.name);
  const pair = names.flatMap((name, n) => (free.includes(name) ? [] : [n]));
  const sign = signs[pair.join()];
  if (sign === undefined) return undefined;
  return { sign: sign * Number(num), free: names.filter((name) => free.includes(name)) };
}

/** The value of `ricci`; its first index is the one that comes first in the alphabet. */
export function ricciOf(passage: Passage, conventions: Conventions): Conventions['ricci'] | undefined {
  const found = contraction(passage, 'R', 4, CURVATURE_SIGNS, conventions);
  if (found === undefined) return undefined;
  const [frame, form] = found.free as [string, string];
  if (frame < form) return found.sign > 0 ? 'R^c_{acb}' : 'R^c_{abc}';
  return found.sign > 0 ? 'R^c_{bca}' : 'R^c_{bac}';
}

/** The value of `torsion-trace`. */
export function torsionTraceOf(passage: Passage, conventions: Conventions): Conventions['torsion-trace'] | undefined {
  const found = contraction(passage, 'T', 3, TORSION_SIGNS, conventions);
  if (found === undefined) return undefined;
  return found.sign > 0 ? 'T^b_{ab}' : 'T^b_{ba}';
}
