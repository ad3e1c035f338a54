/** Emitted modules made to run: a theory's text is derived and emitted, the module compiled, loaded and compared. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { transformSync } from 'esbuild';
import { evaluate } from '../../src/algebra/collect.js';
import { type Poly, termsOf } from '../../src/algebra/poly.js';
import { type Rational, rational, toNumber } from '../../src/algebra/rational.js';
import type { Derivation } from '../../src/derivation.js';
import { derive } from '../../src/derive.js';
import { typescriptModule } from '../../src/emit/code.js';
import { readTheory } from '../../src/notation/read-theory.js';

export const deriveText = (text: string): Derivation => derive(readTheory(text, 'theory.yaml'));

// biome-ignore lint/suspicious/noExplicitAny: a module that is only known when it runs
export type Loaded = Record<string, any>;

/** Runs a function with a directory that is gone afterwards. */
export async function inTemporary<T>(use: (directory: string) => Promise<T> | T): Promise<T> {
  const directory = mkdtempSync(join(tmpdir(), 'untwist-emit-'));
  try {
    return await use(directory);
  } finally {
    rmSync(directory, { recursive: true, force: true });
  }
}

/** The module as a user's program sees it. */
export const load = (source: string): Promise<Loaded> =>
  inTemporary((directory) => {
    const file = join(directory, 'module.mjs');
    writeFileSync(file, transformSync(source, { loader: 'ts', format: 'esm', target: 'es2022' }).code);
    return import(/* @vite-ignore */ pathToFileURL(file).href) as Promise<Loaded>;
  });

const STRICT = (
  '--ignoreConfig --noEmit --strict --target es2022 --module nodenext --moduleResolution nodenext --types node ' +
  '--noUnusedLocals --noUnusedParameters --noUncheckedIndexedAccess --exactOptionalPropertyTypes --noImplicitReturns ' +
  '--noImplicitOverride --noFallthroughCasesInSwitch --noPropertyAccessFromIndexSignature --verbatimModuleSyntax ' +
  '--isolatedModules --allowUnreachableCode false --allowUnusedLabels false'
).split(' ');

/** What the compiler complains about under its strictest flags; empty when it is content. */
export const complaints = (files: Readonly<Record<string, string>>): Promise<string> =>
  inTemporary((directory) => {
    const paths = Object.entries(files).map(([name, text]) => {
      const path = join(directory, name);
      writeFileSync(path, text);
      return path;
    });
    const tsc = join(import.meta.dirname, '../../node_modules/typescript/bin/tsc');
    const flags = STRICT.filter((f) => f !== '--types' && f !== 'node');
    try {
      return execFileSync(process.execPath, [tsc, ...flags, ...paths], { encoding: 'utf8', cwd: directory });
    } catch (error) {
      return String((error as { stdout?: string }).stdout ?? error);
    }
  });

/** Small reproducible pseudo-random integers (mulberry32). */
export function integers(seed: number): (below: number) => number {
  let state = seed;
  return (below) => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) % below;
  };
}

export interface Sample {
  readonly exact: ReadonlyMap<string, Rational>;
  readonly couplings: Readonly<Record<string, number>>;
  readonly jets: Readonly<Record<string, readonly number[]>>;
}

/** A random point whose coordinates are doubles, so that the exact value belongs to the very numbers that are passed. */
export function samplePoint(d: Derivation, random: (below: number) => number): Sample {
  const exact = new Map<string, Rational>();
  const couplings: Record<string, number> = {};
  const jets: Record<string, number[]> = {};
  for (const g of d.ring.generators) {
    const size = rational(random(2 ** 20) + 1, 2 ** (10 + random(14)));
    const value = random(2) === 0 ? size : rational(-size.num, size.den);
    exact.set(g.name, value);
    if (g.kind !== 'jet') couplings[g.name] = toNumber(value);
    else {
      const jet = jets[g.field] ?? [];
      jet[g.order] = toNumber(value);
      jets[g.field] = jet;
    }
  }
  return { exact, couplings, jets };
}

/** Σ |term|, the scale against which rounding errors of a sum are measured. */
export function magnitude(p: Poly, point: ReadonlyMap<string, Rational>): number {
  let total = 0;
  for (const { coefficient, exponents } of termsOf(p)) {
    let value = Math.abs(toNumber(coefficient));
    for (const [g, e] of exponents) value *= Math.abs(toNumber(point.get(p.ring.generators[g]!.name)!)) ** e;
    total += value;
  }
  return total;
}

/** Error of a computed value of p in units of its magnitude. */
export function relativeError(computed: number, p: Poly, point: ReadonlyMap<string, Rational>): number {
  const exact = toNumber(evaluate(p, point));
  if (computed === exact) return 0;
  return Math.abs(computed - exact) / magnitude(p, point);
}

/** Every number that the module computes at a point, with the exact expression it stands for. */
export function outputsOf(d: Derivation, module: Loaded, { couplings, jets }: Sample): [string, number, Poly][] {
  const call = (name: string) => module[name](couplings, jets);
  const record = (name: string, values: ReadonlyMap<string, Poly>): [string, number, Poly][] => {
    const result = call(name);
    return [...values].map(([key, p]) => [`${name}.${key}`, result[key], p]);
  };
  const s = d.scalarTensor;
  return [
    ['lagrangian', call('lagrangian'), d.lagrangian],
    ...record('equations', d.equations),
    ...(d.friedmann
      ? ([
          ['rhoT', call('rhoT'), d.friedmann.rhoT],
          ['pT', call('pT'), d.friedmann.pT],
        ] satisfies [string, number, Poly][])
      : []),
    ...(s.form === 'none'
      ? []
      : ([
          ['g4', call('g4'), s.g4],
          ...record('kinetic', s.kinetic),
          ...record('current', s.current),
          ['potential', call('potential'), s.potential],
          ['curvatureObstruction', call('curvatureObstruction'), s.obstruction],
        ] satisfies [string, number, Poly][])),
  ];
}

/** Emits, loads and compares at random points; returns the largest relative error and where it occurred. */
export async function worstError(d: Derivation, points: number, seed: number): Promise<{ error: number; at: string }> {
  const module = await load(typescriptModule(d));
  const random = integers(seed);
  let worst = { error: 0, at: '' };
  for (let i = 0; i < points; i++) {
    const sample = samplePoint(d, random);
    for (const [name, computed, p] of outputsOf(d, module, sample)) {
      const error = relativeError(computed, p, sample.exact);
      if (!(error <= worst.error)) worst = { error, at: `${name}, point ${i} of seed ${seed}` };
    }
  }
  return worst;
}
