/**
 * The program under test, from the outside: the text of a theory file in, the object of derivation.json out. The only
 * file of the second derivation that touches src/.
 */
import { derivationObject, derive, readTheory } from '../../src/index.js';
import type { Lagrangian, Signature } from './contraction.js';
import type { Q } from './exact.js';
import * as E from './exact.js';
import type { GeometryName, Point } from './geometry.js';
import { atPoint } from './infix.js';
import { showPoint } from './random.js';
import type { BiScalarTexts } from './scalar-tensor.js';
import type { Fluid, OracleTheory } from './variation.js';

/** What a test wants to derive; every default is the one of the theory file. */
export interface Wanted {
  readonly lagrangian: string;
  readonly constants?: readonly string[];
  /** Names of masses. */
  readonly scales?: readonly string[];
  readonly signature?: Signature;
  readonly geometry?: GeometryName;
  readonly impose?: readonly string[];
  readonly matter?: readonly string[];
  readonly constrain?: readonly string[];
  /** Lines `name: { … }`. */
  readonly tensors?: readonly string[];
}

export interface DerivedJson {
  readonly variables: readonly string[];
  readonly parameters: readonly string[];
  readonly lagrangian: string;
  readonly equations: Readonly<Record<string, string>>;
  readonly friedmann: { readonly rho_T: string; readonly p_T: string };
  readonly scalarTensor:
    | ({ readonly form: 'bi-scalar'; readonly validFor: 'every k' | 'k = 0' } & BiScalarTexts)
    | { readonly form: 'none'; readonly reason: string };
  readonly checks: readonly { readonly name: string; readonly holds: boolean }[];
  /** With constraints. */
  readonly multipliers?: readonly MultiplierJson[];
  readonly branches?: readonly BranchJson[];
  /** With spin. */
  readonly spin?: SpinJson;
}

export interface MultiplierJson {
  readonly constraint: string;
  readonly independent: number;
  readonly invariant: number;
  readonly fields: readonly { readonly name: string; readonly vanishes: string }[];
}

export interface BranchJson {
  readonly name: string;
  readonly solution: Readonly<Record<string, string>>;
  readonly conditions: readonly string[];
  readonly remaining: readonly string[];
  readonly undetermined: readonly string[];
  readonly equations: Readonly<Record<string, string>>;
  readonly friedmann: { readonly rho_T: string; readonly p_T: string };
  readonly scalarTensor: DerivedJson['scalarTensor'];
}

export interface SpinJson {
  readonly interaction: string;
  readonly averages: Readonly<Record<string, { readonly rho: string; readonly p: string }>>;
  readonly elimination?: {
    readonly found: boolean;
    readonly reason?: string;
    readonly solution?: Readonly<Record<string, string>>;
    readonly rho?: string;
    readonly p?: string;
  };
}

/** Text of the theory file. */
export function theoryText(wanted: Wanted): string {
  const lines = ['untwist: 1', 'name: Outer mole'];
  if (wanted.signature !== undefined) lines.push(`conventions: { signature: "${wanted.signature}" }`);
  if (wanted.constants !== undefined) lines.push(`constants: [${wanted.constants.join(', ')}]`);
  const scales = (wanted.scales ?? ['M']).map((name) => `${name}: mass`);
  if (scales.length > 0) lines.push(`scales: { ${scales.join(', ')} }`);
  lines.push('lagrangian: |', ...wanted.lagrangian.split('\n').map((line) => `  ${line.trim()}`));
  if (wanted.impose !== undefined) lines.push(`impose: [${wanted.impose.map((r) => `"${r}"`).join(', ')}]`);
  if (wanted.tensors !== undefined) lines.push('tensors:', ...wanted.tensors.map((line) => `  ${line}`));
  if (wanted.constrain !== undefined) lines.push(`constrain: [${wanted.constrain.map((c) => `"${c}"`).join(', ')}]`);
  if (wanted.matter !== undefined) lines.push(`matter: [${wanted.matter.join(', ')}]`);
  if (wanted.geometry !== undefined) lines.push(`geometry: ${wanted.geometry}`);
  return `${lines.join('\n')}\n`;
}

/** derivation.json of a theory; throws what the program refuses. */
export function derived(wanted: Wanted): DerivedJson {
  return derivationObject(derive(readTheory(theoryText(wanted), 'outer-mole.yaml'))) as unknown as DerivedJson;
}

/** Exact values of all Euler–Lagrange expressions. */
export function equationsAt(json: DerivedJson, point: Point): Record<string, Q> {
  return Object.fromEntries(Object.entries(json.equations).map(([name, text]) => [name, atPoint(text, point)]));
}

/** The same numbers as text, to compare with a readable difference. */
export function shown(values: Readonly<Record<string, Q>>): Record<string, string> {
  return Object.fromEntries(Object.entries(values).map(([name, x]) => [name, E.show(x)]));
}

/** What a failing property prints. */
export function circumstances(seed: number, wanted: Wanted, point: Point): string {
  return `seed ${seed}\n${theoryText(wanted)}\nat ${showPoint(point)}`;
}

export type { Fluid, Lagrangian, OracleTheory };
