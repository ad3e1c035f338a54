/**
 * A module of numerical functions, described independently of any programming language: named functions of couplings and
 * of jets or a state, with exact expressions as outputs. Emitters print whatever the description lists; to emit more,
 * describe more. Plain data; imports types only.
 */
import type { Factor } from '../algebra/fraction.js';
import type { Poly } from '../algebra/poly.js';
import type { Parameter } from './parameters.js';

/** A function of time with its derivatives, as far as they are read. */
export interface FieldJet {
  readonly name: string;
  readonly meaning: string;
  /** Mass dimension; a time derivative adds one. */
  readonly dimension: number;
  /** Highest derivative that is read, at least 0. */
  readonly order: number;
}

/** Fields at one time: value, first derivative, second derivative, … of each. */
export interface JetsInput {
  readonly kind: 'jets';
  readonly name: string;
  readonly about: string;
  readonly fields: readonly FieldJet[];
}

/** A list of numbers, such as the state of a first-order system; each stands for one generator of the functions' ring. */
export interface VectorInput {
  readonly kind: 'vector';
  readonly name: string;
  readonly about: string;
  readonly entries: readonly { readonly symbol: string; readonly meaning: string; readonly dimension: number }[];
}

export type CodeInput = JetsInput | VectorInput;

/** numerator / Π base^power. */
export interface CodeOutput {
  /** Key of a record or label of an entry; of no consequence where the result is a single number. */
  readonly key: string;
  /** A phrase for documentation, with the dimension. */
  readonly meaning: string;
  readonly numerator: Poly;
  readonly denominator?: readonly Factor[];
}

export type CodeResult =
  | { readonly kind: 'number' }
  /** Numbers by key; `type` names the record where a language names it. */
  | { readonly kind: 'record'; readonly type: string; readonly about: string }
  /** Numbers by place, for instance the rates of a state. */
  | { readonly kind: 'vector'; readonly about: string }
  /** Outputs row by row. */
  | {
      readonly kind: 'matrix';
      readonly about: string;
      readonly rows: readonly string[];
      readonly columns: readonly string[];
    };

export interface CodeFunction {
  /** In camel case; languages that write names otherwise change it, always in the same way. */
  readonly name: string;
  readonly doc: readonly string[];
  readonly input: CodeInput;
  readonly result: CodeResult;
  readonly outputs: readonly CodeOutput[];
}

export interface CodeModule {
  /** Letters, digits and hyphens. */
  readonly slug: string;
  readonly theory: string;
  readonly geometry: { readonly id: string; readonly title: string };
  /** Conditions on the couplings that were not used for rewriting. */
  readonly conditions: readonly string[];
  /** Functions of time that are varied. */
  readonly variables: readonly string[];
  readonly parameters: readonly Parameter[];
  /** Names of generators that make up the coefficients by which terms are grouped. */
  readonly couplings: ReadonlySet<string>;
  readonly functions: readonly CodeFunction[];
}

/** The polynomials of an output, numerator first. */
export const polynomialsOf = (o: Pick<CodeOutput, 'numerator' | 'denominator'>): Poly[] => [
  o.numerator,
  ...(o.denominator ?? []).map((f) => f.base),
];

/** The different inputs of a module's functions, in order of first appearance. */
export const inputsOf = (m: CodeModule): CodeInput[] => [
  ...new Map(m.functions.map((f) => [f.input.name, f.input])).values(),
];
