/** `untwist emit`: one theory file in; its functions in a programming language out. */
import { basename, dirname, extname, join } from 'node:path';
import type { Derivation } from '../derivation.js';
import { derive } from '../derive.js';
import { LANGUAGES } from '../emit/code.js';
import type { Language } from '../emit/code-language.js';
import { codeModel } from '../emit/code-model.js';
import { loadGeometry } from '../geometry/build.js';
import { InputError, renderDiagnostic } from '../notation/diagnostics.js';
import { readTheory } from '../notation/read-theory.js';
import { nearest } from '../notation/suggest.js';
import type { Theory } from '../notation/theory.js';
import { EXIT, type Io } from './io.js';
import { refuseExisting, writeFolder } from './output-folder.js';
import { progressLine } from './progress.js';
import { readInput } from './read-input.js';

export interface EmitOptions {
  readonly to: string;
  readonly out?: string;
  readonly example?: boolean;
  readonly jacobian: boolean;
  readonly set: readonly string[];
  readonly force?: boolean;
}

const refuse = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);

/** @returns the exit code. @throws InputError for everything that the user can mend. */
export async function emitCommand(path: string, options: EmitOptions, io: Io): Promise<number> {
  const language = languageOf(options.to);
  const target = targetOf(language, options);
  if (target) refuseExisting(target.folder, target.names, options.force ?? false);
  const { file, text } = await readInput(path, io);
  const theory = readTheory(text, file, { set: options.set });
  for (const warning of theory.warnings) io.stderr(`${renderDiagnostic(warning, { color: io.color })}\n`);
  const progress = progressLine(io);
  try {
    const derivation = await derived(theory, file, progress.step);
    refuseEndless(derivation, options.jacobian);
    progress.step('writing code');
    const model = codeModel(derivation, { jacobian: options.jacobian });
    const code = language.write(model);
    progress.done();
    if (!target) io.stdout(code);
    else {
      const [name, example] = target.names as [string, string | undefined];
      const files = new Map([[name, code]]);
      if (example !== undefined) files.set(example, language.example(model, name));
      writeFolder(target.folder, files);
      io.stdout(target.names.map((n) => `${join(target.folder, n)}\n`).join(''));
    }
    return EXIT.done;
  } finally {
    progress.done();
  }
}

function languageOf(id: string): Language {
  const found = LANGUAGES.find((l) => l.id === id.toLowerCase());
  if (found) return found;
  const ids = LANGUAGES.map((l) => l.id);
  const near = nearest(id, ids);
  throw refuse(
    'unknown-language',
    `there is no code for ${JSON.stringify(id.slice(0, 40))}`,
    near === undefined ? `choose one of ${ids.join(', ')}` : `did you mean ${near}?`,
  );
}

/** Where the files go; undefined for standard output. The module's name comes first. */
function targetOf(
  language: Language,
  { out, example }: EmitOptions,
): { readonly folder: string; readonly names: readonly string[] } | undefined {
  if (out === undefined || out === '-') {
    if (!example) return undefined;
    throw refuse('example-without-file', 'the example includes the module, so both need files', 'give --out <file>');
  }
  const name = basename(out);
  const fault = language.fileFault?.(name);
  if (fault !== undefined) throw refuse('bad-file-name', `${name} is no name for a module of ${language.title}`, fault);
  if (!example) return { folder: dirname(out), names: [name] };
  if (!/^[\w.+-]+$/.test(name)) {
    const hint = 'use letters, digits, points, hyphens and underscores, or leave --example out';
    throw refuse('bad-file-name', `${JSON.stringify(name)} cannot be named in a program`, hint);
  }
  const ending = extname(name);
  return { folder: dirname(out), names: [name, `${basename(name, ending)}_example${ending}`] };
}

/** Terms of all equations together beyond which planning shared subexpressions takes minutes; fewer with derivatives. */
const MAX_TERMS = 50_000;
const MAX_TERMS_WITH_JACOBIAN = 15_000;

function refuseEndless({ equations }: Derivation, jacobian: boolean): void {
  const terms = [...equations.values()].reduce((n, e) => n + e.size, 0);
  if (terms <= (jacobian ? MAX_TERMS_WITH_JACOBIAN : MAX_TERMS)) return;
  const message = `the equations have ${terms} terms, which makes code${jacobian ? ' with a Jacobian' : ''} too long`;
  const hint =
    jacobian && terms <= MAX_TERMS ? 'give --no-jacobian' : 'use derive --json, which prints any number of terms';
  throw refuse('terms-limit', message, hint);
}

/** Geometries with a trace in their structure constants have no reduced Lagrangian to vary. */
async function derived(theory: Theory, file: string, onStep: (what: string) => void): Promise<Derivation> {
  try {
    if (loadGeometry(theory.geometry, theory.signature, theory.geometryOrigin).traceless) return derive(theory, onStep);
    return (await import('../class-b.js')).deriveClassB(theory, false, onStep);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    // What is found wrong behind the reader has no place in the text, but still belongs to this file.
    throw new InputError(error.diagnostics.map((d) => ('file' in d ? d : { ...d, file })));
  }
}
