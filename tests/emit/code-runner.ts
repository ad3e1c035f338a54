/** Emitted code made to run: compiled without warnings, called by its own example program, compared with exact values. */
import { execFileSync, spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { transformSync } from 'esbuild';
import { evaluate } from '../../src/algebra/collect.js';
import {
  divideRational,
  multiplyRational,
  ONE,
  type Rational,
  rational,
  toNumber,
} from '../../src/algebra/rational.js';
import { LANGUAGES } from '../../src/emit/code.js';
import { type CodeModule, type CodeOutput, inputsOf } from '../../src/emit/code-description.js';
import type { Language, Sample } from '../../src/emit/code-language.js';
import { magnitude } from './emitted-module.js';
import { runJulia } from './julia-subset.js';

/** Exact values by generator, and the same numbers as texts for an example program. */
export interface Point {
  readonly exact: ReadonlyMap<string, Rational>;
  /** Of every output, in order: the double nearest to its exact value, and the scale of rounding errors. */
  readonly expected: readonly Expected[];
  readonly sample: Sample;
}

export interface Expected {
  readonly value: number;
  readonly scale: number;
}

/**
 * A random point of doubles for everything that a module reads; radicals get the roots of square numbers.
 * @param bits of a coordinate; with few of them exact values of long expressions take less time.
 */
export function randomPoint(m: CodeModule, random: (below: number) => number, bits = 20): Point {
  const exact = new Map<string, Rational>();
  const value = (): Rational => {
    const size = rational(random(2 ** bits) + 1, 2 ** (bits / 2 + random(bits / 2 + 4)));
    return random(2) === 0 ? size : rational(-size.num, size.den);
  };
  for (const ring of new Set(m.functions.flatMap((f) => f.outputs.map((o) => o.numerator.ring))))
    for (const g of ring.generators) {
      if (exact.has(g.name)) continue;
      if (g.kind !== 'radical') exact.set(g.name, value());
      else {
        const root = rational(random(2 ** 12) + 1, 2 ** random(8));
        exact.set(g.name, root);
        exact.set(g.square, multiplyRational(root, root));
      }
    }
  const text = (name: string): string => {
    const x = String(toNumber(exact.get(name) ?? rational(1)));
    return /[.e]/.test(x) ? x : `${x}.0`;
  };
  const [input] = inputsOf(m);
  return {
    exact,
    expected: outputsOf(m).map(({ output }) => expectation(output, exact)),
    sample: {
      coupling: (i) => text(m.parameters[i]!.name),
      jet: (i, order) => {
        if (input!.kind === 'vector') return text(input!.entries[i]!.symbol);
        const field = input!.fields[i]!.name;
        return text(order === 0 ? field : `D(${field},${order})`);
      },
    },
  };
}

/** Every number that the module computes, in order of functions and outputs. */
export const outputsOf = (m: CodeModule): { readonly name: string; readonly output: CodeOutput }[] =>
  m.functions.flatMap((f) => f.outputs.map((output) => ({ name: `${f.name}.${output.key}`, output })));

/** Sums are measured by the sum of their absolute terms; in a quotient relative errors add up. */
function expectation({ numerator, denominator = [] }: CodeOutput, exact: Point['exact']): Expected {
  const bases = denominator.map((f) => ({ ...f, value: evaluate(f.base, exact) }));
  const bottom = bases.reduce((d, { value, power }) => {
    let product = d;
    for (let i = 0; i < power; i++) product = multiplyRational(product, value);
    return product;
  }, ONE);
  const value = toNumber(divideRational(evaluate(numerator, exact), bottom));
  const relative = bases.reduce((n, f) => n + (f.power * magnitude(f.base, exact)) / Math.abs(toNumber(f.value)), 0);
  return { value, scale: magnitude(numerator, exact) / Math.abs(toNumber(bottom)) + Math.abs(value) * relative };
}

/** The largest error of the values that a language's program printed, and where. */
export function worst(m: CodeModule, points: readonly Point[], values: readonly (readonly number[])[]) {
  let found = { error: 0, at: '' };
  const outputs = outputsOf(m);
  points.forEach((point, i) => {
    if (values[i]!.length !== outputs.length)
      throw new Error(`${values[i]!.length} numbers printed, ${outputs.length} expected`);
    outputs.forEach(({ name }, j) => {
      const { value, scale } = point.expected[j]!;
      const computed = values[i]![j]!;
      const error = computed === value ? 0 : Math.abs(computed - value) / scale;
      if (!(error <= found.error)) found = { error, at: `${name} at point ${i}: ${values[i]![j]}` };
    });
  });
  return found;
}

export const languageOf = (id: string): Language => LANGUAGES.find((l) => l.id === id)!;

const numbers = (text: string): number[] =>
  text
    .trimEnd()
    .split('\n')
    .map((line) => Number(line.slice(line.lastIndexOf('=') + 1)));

/** Runs a program; what it complains of becomes the error. */
export function run(program: string, args: readonly string[], directory: string): string {
  return execFileSync(program, args, { cwd: directory, encoding: 'utf8', maxBuffer: 2 ** 26 });
}

/** Whether tests that need a program are skipped: elsewhere than in CI, where it is missing. */
export const isMissing = (program: string): boolean =>
  !process.env.CI && spawnSync(program, ['--version']).status !== 0;

const COMPILERS: Readonly<Record<string, string>> = { c: 'gcc', fortran: 'gfortran', python: 'python3' };

/** Languages whose code can be run here. */
export const runnable = (): string[] =>
  LANGUAGES.map((l) => l.id).filter((id) => COMPILERS[id] === undefined || !isMissing(COMPILERS[id]));

export const C_FLAGS = ['-std=c99', '-Wall', '-Wextra', '-pedantic', '-Werror'];
export const FORTRAN_FLAGS = ['-std=f2008', '-Wall', '-Wextra', '-Werror'];

/** Writes the module and, for each point, an example; returns what each example printed. */
type Runner = (m: CodeModule, points: readonly Point[], directory: string, optimise: string) => number[][];

const write = (directory: string, name: string, text: string): void => writeFileSync(join(directory, name), text);

function compiled(
  id: string,
  ending: string,
  compile: (file: string, directory: string, optimise: string) => void,
  link: (file: string, program: string, directory: string) => void,
): Runner {
  return (m, points, directory, optimise) => {
    const language = languageOf(id);
    write(directory, `model${ending}`, language.write(m));
    compile(`model${ending}`, directory, optimise);
    return points.map((point, i) => {
      write(directory, `example${i}${ending}`, language.example(m, `model${ending}`, point.sample));
      link(`example${i}${ending}`, `./${id}${i}`, directory);
      return numbers(run(`./${id}${i}`, [], directory));
    });
  };
}

function ecmascript(id: string): Runner {
  return (m, points, directory) => {
    const language = languageOf(id);
    const plain = (text: string): string =>
      id === 'typescript' ? transformSync(text, { loader: 'ts', format: 'esm' }).code : text;
    const module = id === 'typescript' ? 'ts-model.mts' : 'model.mjs';
    write(directory, module.replace('.mts', '.mjs'), plain(language.write(m)));
    return points.map((point, i) => {
      write(directory, `${id}${i}.mjs`, plain(language.example(m, module, point.sample)));
      return numbers(run(process.execPath, [`${id}${i}.mjs`], directory));
    });
  };
}

export const RUNNERS: Readonly<Record<string, Runner>> = {
  typescript: ecmascript('typescript'),
  javascript: ecmascript('javascript'),
  c: compiled(
    'c',
    '.c',
    (file, directory, optimise) => run('gcc', [...C_FLAGS, optimise, '-c', file, '-o', 'c-model.o'], directory),
    (file, program, directory) => run('gcc', [...C_FLAGS, file, 'c-model.o', '-o', program, '-lm'], directory),
  ),
  fortran: compiled(
    'fortran',
    '.f90',
    (file, directory, optimise) =>
      run('gfortran', [...FORTRAN_FLAGS, optimise, '-c', file, '-o', 'fortran-model.o'], directory),
    (file, program, directory) =>
      run('gfortran', [...FORTRAN_FLAGS, file, 'fortran-model.o', '-o', program], directory),
  ),
  python: (m, points, directory) => {
    const language = languageOf('python');
    write(directory, 'model.py', language.write(m));
    return points.map((point, i) => {
      write(directory, `example${i}.py`, language.example(m, 'model.py', point.sample));
      return numbers(run('python3', ['-B', '-W', 'error', `example${i}.py`], directory));
    });
  },
  // No Julia is asked for: its text is read by a grammar that admits nothing but the forms that are surely Julia.
  julia: (m, points) => {
    const text = languageOf('julia').write(m);
    return points.map(({ sample }) => runJulia(text, m, sample));
  },
};
