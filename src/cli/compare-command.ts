/** `untwist compare`: two theories, or printed equations against one theory. */
import { decideClaims } from '../compare/decide.js';
import { compareTheories } from '../compare/theories.js';
import type { Derivation } from '../derivation.js';
import { derive } from '../derive.js';
import { claimsObject, claimsText } from '../emit/claims.js';
import { areSame, comparisonObject, comparisonText } from '../emit/comparison.js';
import { loadGeometry } from '../geometry/build.js';
import { InputError, renderDiagnostic } from '../notation/diagnostics.js';
import { readTheory } from '../notation/read-theory.js';
import { EXIT, type Io } from './io.js';
import { readInput } from './read-input.js';

export interface CompareOptions {
  readonly claim: readonly string[];
  readonly where: readonly string[];
  readonly branch: readonly string[];
  readonly anyMatter?: boolean;
  readonly redefine: readonly string[];
  readonly set: readonly string[];
  readonly json?: boolean;
}

/**
 * @returns the exit code: 0 when every claim holds or the theories are the same, 1 when not, 3 when it is undecided.
 * @throws InputError for everything that the user can mend.
 */
export async function compareCommand(paths: readonly string[], options: CompareOptions, io: Io): Promise<number> {
  const [path, other] = paths;
  refuseMixture(other !== undefined, options);
  const first = await derived(path!, options.set, io);
  if (other === undefined) return claims(first, options, io);
  return theories(first, await derived(other, [], io), options, io);
}

/** What belongs to claims cannot be combined with a second theory, and the other way round. */
function refuseMixture(two: boolean, options: CompareOptions): void {
  const ofClaims = [
    ...(options.claim.length > 0 ? ['--claim'] : []),
    ...(options.where.length > 0 ? ['--where'] : []),
    ...(options.branch.length > 0 ? ['--branch'] : []),
    ...(options.anyMatter ? ['--any-matter'] : []),
  ];
  if (two && ofClaims.length > 0)
    throw usage(`${ofClaims.join(', ')}: claims are tested against one theory`, 'leave the second theory out');
  if (two) return;
  if (options.redefine.length > 0) throw usage('--redefine compares two theories', 'give a second theory');
  if (options.claim.length === 0)
    throw usage('nothing to compare with', 'give a second theory, or an equation with --claim');
}

const usage = (message: string, hint: string): InputError =>
  new InputError([{ code: 'compare-usage', severity: 'error', message, hint }]);

function claims(d: Derivation, options: CompareOptions, io: Io): number {
  const { claim, where, branch, anyMatter = false } = options;
  const report = decideClaims(d, { claims: claim, where, branch, anyMatter });
  io.stdout(options.json ? `${JSON.stringify(claimsObject(d, report), null, 2)}\n` : claimsText(d, report, io.color));
  const verdicts = report.claims.map((c) => c.verdict);
  if (verdicts.includes('fails')) return EXIT.input;
  return verdicts.includes('undecided') ? EXIT.undecided : EXIT.done;
}

function theories(a: Derivation, b: Derivation, options: CompareOptions, io: Io): number {
  const comparison = compareTheories(a, b, { redefine: options.redefine });
  io.stdout(
    options.json
      ? `${JSON.stringify(comparisonObject(a, b, comparison), null, 2)}\n`
      : comparisonText(a, b, comparison, io.color),
  );
  if (areSame(comparison)) return EXIT.done;
  return comparison.relation === 'undecided' ? EXIT.undecided : EXIT.input;
}

async function derived(path: string, set: readonly string[], io: Io): Promise<Derivation> {
  const { file, text } = await readInput(path, io);
  const theory = readTheory(text, file, { set });
  for (const warning of theory.warnings) io.stderr(`${renderDiagnostic(warning, { color: io.color })}\n`);
  try {
    if (loadGeometry(theory.geometry, theory.signature).traceless) return derive(theory);
    return (await import('../class-b.js')).deriveClassB(theory, false);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    // What is found wrong behind the reader has no place in the text, but still belongs to this file.
    throw new InputError(error.diagnostics.map((d) => ('file' in d ? d : { ...d, file })));
  }
}
