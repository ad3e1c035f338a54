/** What the commands on Lagrangians read: a theory with its sum of products, imposed relations applied. */
import type { Ring } from '../algebra/ring.js';
import { InputError, renderDiagnostic } from '../notation/diagnostics.js';
import { applyImposed, solveRelations } from '../notation/impose.js';
import { lagrangianIn } from '../notation/output-conventions.js';
import { readTheory } from '../notation/read-theory.js';
import type { Theory } from '../notation/theory.js';
import { CanonicalLimitError } from '../tensor/canonical.js';
import type { TensorTerm } from '../tensor/expression.js';
import type { KindTable } from '../tensor/kinds.js';
import { kindsWith, ringOfNames, tensorTerms } from '../tensor/lagrangian-sum.js';
import type { SumStyle } from '../tensor/print-sum.js';
import { TooLargeError } from '../tensor/random-values.js';
import { RelationLimitError } from '../tensor/relations.js';
import { SymmetryError } from '../tensor/symmetry.js';
import type { Io } from './io.js';
import { readInput } from './read-input.js';

export interface LagrangianInput {
  readonly theory: Theory;
  readonly file: string;
  /** The theory file. */
  readonly text: string;
  readonly kinds: KindTable;
  readonly ring: Ring;
  /** As typed, in the internal conventions. */
  readonly typed: readonly TensorTerm[];
  /** The same with the relations between constants applied. */
  readonly terms: readonly TensorTerm[];
  /** Style in which sums are printed, in the conventions of the file. */
  readonly style: (form: SumStyle['form']) => SumStyle;
  /** That every symbol of the theory is a constant. */
  readonly facts: ReadonlySet<string>;
}

/** @throws InputError for everything that the user can mend; warnings go to standard error. */
export async function lagrangianInput(path: string, set: readonly string[], io: Io): Promise<LagrangianInput> {
  const { file, text } = await readInput(path, io);
  const theory = readTheory(text, file, { set });
  for (const warning of theory.warnings) io.stderr(`${renderDiagnostic(warning, { color: io.color })}\n`);
  const ring = ringOfNames([...theory.symbols.map((s) => s.name), ...theory.matter.map((m) => m.density), 'k']);
  const constants = theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name);
  const { eliminated, origins } = solveRelations(ring, theory.relations, constants);
  const typed = tensorTerms(ring, theory.lagrangian);
  const terms = typed.map((t) => ({
    ...t,
    coefficient: applyImposed(t.coefficient, eliminated, origins),
  }));
  const { symbols } = lagrangianIn(theory, theory.conventions);
  const written: SumStyle['written'] = (lagrangian) =>
    lagrangianIn({ ...theory, lagrangian }, theory.conventions).terms;
  return {
    theory,
    file,
    text,
    kinds: userFault(file, () => kindsWith(theory.tensors)),
    ring,
    typed,
    terms,
    style: (form) => ({ form, symbols, tensors: theory.tensors, written }),
    facts: new Set(theory.symbols.map((s) => `constant ${s.name}`)),
  };
}

/** What is too large or contradictory in the user's tensors is the user's to mend. */
export function userFault<T>(file: string, run: () => T): T {
  try {
    return run();
  } catch (error) {
    const [code, hint] = faultOf(error);
    if (code === undefined) throw error;
    throw new InputError([{ code, severity: 'error', message: (error as Error).message, hint: hint!, file }]);
  }
}

function faultOf(error: unknown): readonly [code?: string, hint?: string] {
  if (error instanceof CanonicalLimitError)
    return ['arrangements-limit', 'use fewer equal tensors in one product, or tensors with less symmetry'];
  if (error instanceof SymmetryError) return ['bad-symmetry', 'declare fewer symmetries'];
  if (error instanceof TooLargeError || error instanceof RelationLimitError)
    return ['relations-limit', 'use products of lower degree, and invariants without large numbers'];
  return [];
}
