/**
 * Irreducible parts of torsion and curvature written out in the tensors themselves, by the rules of rules/parts.
 */
import { InputError } from '../notation/diagnostics.js';
import type { LagrangianTerm } from '../notation/theory.js';
import type { TensorSum } from './expression.js';
import { type KindTable, kindTable } from './kinds.js';
import { lagrangianOf, namesIn, ringOfNames, sumOf } from './lagrangian-sum.js';
import { rewrite, type Step } from './rewrite.js';
import { bundledRules } from './rule-library.js';

export const hasParts = ({ factors }: Pick<LagrangianTerm, 'factors'>): boolean =>
  factors.some((f) => f.part !== undefined);

/**
 * The sum without parts, and the steps that led there.
 * @throws InputError `parts-limit` when it grows beyond the limits of a rewriting.
 */
export function writeOutParts(
  sum: TensorSum,
  kinds: KindTable,
): { readonly value: TensorSum; readonly steps: readonly Step[] } {
  if (!sum.some(hasParts)) return { value: sum, steps: [] };
  const { value, stop, steps } = rewrite(sum, bundledRules('parts'), { kinds });
  if (stop !== 'fixpoint') {
    const message = `the irreducible parts cannot be written out: the limit of ${stop} was reached`;
    throw new InputError([{ code: 'parts-limit', severity: 'error', message, hint: 'lower the powers of the parts' }]);
  }
  return { value, steps };
}

/** The terms of a Lagrangian without parts; terms that have none are left as they are. */
export function expandParts(
  terms: readonly LagrangianTerm[],
  kinds: KindTable = kindTable(),
): { readonly terms: readonly LagrangianTerm[]; readonly steps: readonly Step[] } {
  const withParts = terms.filter(hasParts);
  if (withParts.length === 0) return { terms, steps: [] };
  const { value, steps } = writeOutParts(sumOf(ringOfNames(namesIn(withParts)), withParts, kinds), kinds);
  return { terms: [...terms.filter((t) => !hasParts(t)), ...lagrangianOf(value)], steps };
}
