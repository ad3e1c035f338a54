/**
 * Rules for auxiliary fields as plain data. A pattern is a polynomial in the field and its rate whose coefficients are letters;
 * what a rule makes of the letters is a polynomial in them, with single terms as divisors. Letters are generators that no user
 * can spell. Values only.
 */
import type { Poly } from '../algebra/poly.js';
import { constantsOf, makeRing, type Ring } from '../algebra/ring.js';
import type { Origin } from '../notation/theory.js';

/** Letters of patterns. */
export const LETTERS = ['a', 'b', 'c', 'd', 'e'] as const;
export const letterName = (letter: string): string => `?${letter}`;
export const FIELD = letterName('q');
export const RATE = `rate of ${FIELD}`;

/** The ring of patterns. */
export const PATTERN_RING: Ring = makeRing(constantsOf([RATE, FIELD, ...LETTERS.map(letterName)]));

/**
 * replace: insert the stationary value. branches: insert each root of the stationary equation. constrain: solve the constraint
 * for another field. conserve: note the conserved charge. move-rate: integrate by parts. form: one of metric-form.ts, by the id.
 * linearise: one of linearise.ts.
 */
export type Executor = 'replace' | 'branches' | 'constrain' | 'conserve' | 'move-rate' | 'form' | 'linearise';
export const EXECUTORS: readonly Executor[] = [
  'replace',
  'branches',
  'constrain',
  'conserve',
  'move-rate',
  'form',
  'linearise',
];

/** A predicate of auxiliary-conditions.ts about a letter. */
export interface LetterCondition {
  readonly predicate: string;
  readonly letter: string;
}

/** What an application gives up; `where` is a letter that must not vanish. */
export interface Loss {
  readonly what: string;
  readonly where?: string;
}

export interface AuxiliaryExample {
  /** Texts in the notation of the file. */
  readonly input: string;
  readonly field: string | undefined;
  /** One text for each branch; undefined where the rule must not apply. */
  readonly output: readonly string[] | undefined;
  readonly constraint: string | undefined;
  readonly charge: string | undefined;
}

export interface AuxiliaryRule {
  readonly id: string;
  readonly does: Executor;
  /** The pattern, for rules about one field. */
  readonly enters: Poly | undefined;
  /** What the rule says, as a formula in TeX, for rules about a whole form; divergences are dropped where it says ≃. */
  readonly statement: string;
  /** Results in letters, by key: `field`, `becomes`, `constraint`, `charge`, `stationary`. */
  readonly results: ReadonlyMap<string, Poly>;
  readonly when: readonly LetterCondition[];
  readonly loses: readonly Loss[];
  readonly why: string;
  readonly source: string;
  readonly yes: readonly AuxiliaryExample[];
  readonly no: readonly AuxiliaryExample[];
  readonly origin: Origin;
}

export interface AuxiliaryRuleFile {
  readonly title: string;
  /** Symbols of the examples. */
  readonly constants: readonly string[];
  readonly scalars: readonly string[];
  readonly rules: readonly AuxiliaryRule[];
}
