/** `untwist derive`: one theory file in; a summary on the terminal and a folder of results out. */
import { resolve } from 'node:path';
import type { Derivation, LagrangianElsewhere } from '../derivation.js';
import { derive } from '../derive.js';
import { derivationJson } from '../emit/json.js';
import { loadGeometry } from '../geometry/build.js';
import { type ConventionKey, internalWith } from '../notation/conventions.js';
import { InputError, renderDiagnostic } from '../notation/diagnostics.js';
import { lagrangianIn } from '../notation/output-conventions.js';
import { readTheory } from '../notation/read-theory.js';
import type { Theory } from '../notation/theory.js';
import { EXIT, type Io } from './io.js';
import { refuseExisting, writeFolder } from './output-folder.js';
import { progressLine } from './progress.js';
import { readInput } from './read-input.js';

export interface DeriveOptions {
  readonly out?: string;
  readonly set: readonly string[];
  readonly variables?: string;
  readonly factor?: boolean;
  readonly assume?: readonly string[];
  readonly frame?: 'einstein';
  /** Ω² of a frame of the user. */
  readonly omega?: string;
  readonly canonical?: boolean;
  /** A number, as typed. */
  readonly order?: string;
  /** Scalars whose powers are made linear, as typed. */
  readonly linearise?: readonly string[];
  /** Fields to integrate out, separated by commas. */
  readonly integrate?: string;
  readonly covariant?: boolean;
  readonly momenta?: boolean;
  readonly conventions?: string;
  readonly explain?: boolean;
  readonly everyK?: boolean;
  readonly json?: boolean;
  readonly force?: boolean;
}

/** Names of the files of a derivation, in the order in which a reader wants them. */
const filesOf = (slug: string) => ({
  report: 'report.html',
  equations: 'equations.tex',
  document: 'derivation.tex',
  code: `${slug}.ts`,
  data: 'derivation.json',
});

/** @returns the exit code. @throws InputError for everything that the user can mend. */
export async function deriveCommand(path: string, options: DeriveOptions, io: Io): Promise<number> {
  const { file, text } = await readInput(path, io);
  const theory = readTheory(text, file, { set: options.set, assume: options.assume ?? [] });
  for (const warning of theory.warnings) io.stderr(`${renderDiagnostic(warning, { color: io.color })}\n`);
  try {
    if (options.json) {
      const derivation = await derived(theory, options, io);
      io.stdout(derivationJson(options.everyK ? await atEveryK(derivation) : derivation));
    } else await writeResults(theory, options, io);
    return EXIT.done;
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    // What is found wrong behind the reader has no place in the text, but still belongs to this file.
    throw new InputError(error.diagnostics.map((d) => ('file' in d || isOutput(d.code) ? d : { ...d, file })));
  }
}

/** Terms of all equations together beyond which nobody reads them and typesetting takes minutes. */
const MAX_TYPESET_TERMS = 50_000;

function refuseEndless({ equations }: Derivation): void {
  const terms = [...equations.values()].reduce((n, e) => n + e.size, 0);
  if (terms <= MAX_TYPESET_TERMS) return;
  throw new InputError([
    {
      code: 'terms-limit',
      severity: 'error',
      message: `the equations have ${terms} terms; more than ${MAX_TYPESET_TERMS} are not typeset`,
      hint: 'give --json, which prints all of them and nothing else',
    },
  ]);
}

const isOutput = (code: string): boolean => code.startsWith('output-') || code === 'unknown-variables';

async function writeResults(theory: Theory, options: DeriveOptions, io: Io): Promise<void> {
  const folder = options.out ?? `out/${theory.slug}`;
  const files = filesOf(theory.slug);
  refuseExisting(folder, Object.values(files), options.force ?? false);
  const progress = progressLine(io);
  try {
    const plain = await derived(theory, options, io, progress.step);
    const derivation = await atEveryK(plain, progress.step);
    const variables = chosenVariables(derivation, options.variables);
    refuseEndless(derivation);
    progress.step('typesetting');
    const [{ derivationTex, equationsTex }, { typescriptModule }, { reportHtml }, { summary }] = await Promise.all([
      import('../emit/latex.js'),
      import('../emit/code.js'),
      import('../emit/report.js'),
      import('../emit/summary.js'),
    ]);
    const factored = options.factor ? await (await import('../factored.js')).factorFunctions(derivation) : undefined;
    const results = new Map([
      [files.equations, equationsTex(derivation, { variables })],
      [files.document, derivationTex(derivation, { variables })],
      [files.code, typescriptModule(derivation)],
      // The same text as --json prints with the same options.
      [files.data, derivationJson(options.everyK ? derivation : plain)],
      [files.report, reportHtml(derivation, { variables })],
    ]);
    const text = summary(derivation, { variables, color: io.color, factored });
    writeFolder(folder, results);
    progress.done();
    io.stdout(text);
    if (options.explain) {
      const { explanation } = await import('../emit/explanation.js');
      io.stdout(explanation(derivation, { variables, color: io.color }));
    }
    io.stdout(closing(resolve(folder), files));
  } finally {
    progress.done();
  }
}

async function atEveryK(derivation: Derivation, onStep?: (what: string) => void): Promise<Derivation> {
  return (await import('../every-k.js')).withEveryK(derivation, onStep);
}

async function derived(
  theory: Theory,
  options: DeriveOptions,
  io: Io,
  onStep?: (what: string) => void,
): Promise<Derivation> {
  const elsewhere = await writtenElsewhere(theory, options.conventions, io);
  const plain = await withFields(await reduced(theory, options, onStep), options, onStep);
  const derivation = await withRoute(plain, options, onStep);
  return elsewhere.length > 0 ? { ...derivation, elsewhere } : derivation;
}

/** The Lagrangian as the theory file has it, when that is not the internal form, and as the user wants to see it. */
async function writtenElsewhere(theory: Theory, asked: string | undefined, io: Io): Promise<LagrangianElsewhere[]> {
  const own = Object.entries(internalWith(theory.signature)).some(
    ([k, v]) => theory.conventions[k as ConventionKey] !== v,
  );
  const out = own ? [{ name: 'the theory file', ...lagrangianIn(theory, theory.conventions) }] : [];
  if (asked === undefined) return out;
  const { conventionsOption } = await import('./conventions-option.js');
  return [...out, { name: asked, ...lagrangianIn(theory, await conventionsOption(asked, io)) }];
}

/** Auxiliary fields in and others out, when that was asked for. */
async function withRoute(
  derivation: Derivation,
  { linearise = [], integrate }: DeriveOptions,
  onStep?: (what: string) => void,
): Promise<Derivation> {
  if (linearise.length === 0 && integrate === undefined) return derivation;
  const { withAuxiliaryRoute } = await import('../auxiliary-route.js');
  const fields = integrate?.split(',').map((name) => name.trim());
  return withAuxiliaryRoute(derivation, { linearise, integrate: fields }, onStep);
}

/** Frames, classes and canonical fields, when they were asked for or there are assumptions that they may use. */
async function withFields(
  derivation: Derivation,
  options: DeriveOptions,
  onStep?: (what: string) => void,
): Promise<Derivation> {
  const { frame, omega, canonical = false } = options;
  const order = orderOf(options.order);
  if (!frame && omega === undefined && !canonical && !derivation.knowledge) return derivation;
  const { withScalarFields } = await import('../scalar-fields.js');
  return withScalarFields(derivation, { einstein: frame !== undefined, omega2: omega, canonical, order }, onStep);
}

const DEFAULT_ORDER = 6;
const MAX_ORDER = 24;

function orderOf(text: string | undefined): number {
  if (text === undefined) return DEFAULT_ORDER;
  const order = /^\d{1,3}$/.test(text.trim()) ? Number(text) : 0;
  if (order >= 1 && order <= MAX_ORDER) return order;
  const message = `${JSON.stringify(text.slice(0, 40))} is no order of a series`;
  throw new InputError([
    { code: 'bad-order', severity: 'error', message, hint: `a whole number from 1 to ${MAX_ORDER}`, file: '--order' },
  ]);
}

async function reduced(theory: Theory, options: DeriveOptions, onStep?: (what: string) => void): Promise<Derivation> {
  if (!options.covariant && !options.momenta) return derive(theory, onStep);
  const keepMomenta = options.momenta ?? false;
  if (!loadGeometry(theory.geometry, theory.signature, theory.geometryOrigin).traceless)
    return (await import('../class-b.js')).deriveClassB(theory, keepMomenta, onStep);
  const { withCovariant } = await import('../covariant.js');
  return withCovariant(derive(theory, onStep), keepMomenta, onStep);
}

/** The key of the geometry's variables that the user asked for; the geometry's own when nothing was asked. */
function chosenVariables({ geometry }: Derivation, asked: string | undefined): string {
  const own = geometry.fields.map((f) => f.name).filter((name) => name !== geometry.lapse && !geometry.rates.has(name));
  const keys = [own.join(','), ...geometry.variables.map((v) => v.key)];
  const key = asked?.replace(/\s/g, '') ?? keys[0]!;
  if (keys.includes(key)) return key;
  throw new InputError([
    {
      code: 'unknown-variables',
      severity: 'error',
      message: `the geometry ${geometry.id} has no variables ${asked}`,
      hint: keys.length === 1 ? 'leave --variables out' : `choose one of ${keys.map((k) => `"${k}"`).join(', ')}`,
    },
  ]);
}

function closing(folder: string, files: ReturnType<typeof filesOf>): string {
  const rows = [
    [files.report, 'the derivation step by step; open it in a browser'],
    [files.equations, 'equations with labels, ready to \\input into a manuscript'],
    [files.document, 'the whole derivation as a LaTeX document'],
    [files.code, 'residuals, Friedmann form and scalar-tensor functions for solvers'],
    [files.data, 'every result as exact text for other programs'],
  ] as const;
  const width = Math.max(...rows.map(([name]) => name.length));
  return `\nWritten to ${folder}\n${rows.map(([name, what]) => `  ${name.padEnd(width)}  ${what}\n`).join('')}`;
}
