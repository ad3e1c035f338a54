// Helpers of the notation tests: what a user would see when reading fails, and short ways to declare symbols.
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { readLagrangian } from '../../src/notation/lagrangian.js';
import { plainPassage } from '../../src/notation/passage.js';
import { readTheory } from '../../src/notation/read-theory.js';
import type { DeclaredTensor, LagrangianTerm, TheorySymbol } from '../../src/notation/theory.js';

/** All errors of a failing call as the command line prints them; throws when the call succeeds. */
export function errorText(call: () => unknown): string {
  try {
    call();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  throw new Error('expected an InputError, but the call succeeded');
}

/** The codes of all errors of a failing call. */
export function errorCodes(call: () => unknown): readonly string[] {
  try {
    call();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => d.code);
    throw error;
  }
  return [];
}

export const symbol = (name: string, role: TheorySymbol['role'] = 'constant', dimension = 0): TheorySymbol => ({
  name,
  role,
  dimension,
  latex: name,
});

/** Constants c0 c1 b1 b2 b3 c x alpha_1 c_1 and the scale M. */
export const SYMBOLS: readonly TheorySymbol[] = [
  ...['c0', 'c1', 'b1', 'b2', 'b3', 'c', 'x', 'alpha_1', 'c_1'].map((name) => symbol(name)),
  symbol('M', 'scale', 1),
];

export const terms = (
  text: string,
  symbols = SYMBOLS,
  tensors: readonly DeclaredTensor[] = [],
): readonly LagrangianTerm[] => readLagrangian(plainPassage(text, 'L'), symbols, tensors).terms;

export const lagrangianErrors = (text: string): string => errorText(() => terms(text));

/** A theory file with the given lines behind its header. */
export const theoryFile = (...lines: string[]): string => ['untwist: 1', 'name: Test', ...lines, ''].join('\n');

export const theory = (text: string, set: readonly string[] = []) => readTheory(text, 'test.yaml', { set });
export const theoryErrors = (text: string, set: readonly string[] = []): string => errorText(() => theory(text, set));
