/** Conditions of rules for auxiliary fields: predicates about what a letter is bound to, with three answers. Only `yes` lets a rule fire. */
import { involves } from '../algebra/collect.js';
import type { Fraction } from '../algebra/fraction.js';
import { movingNames } from './form-rules.js';
import { integralOver, isZeroFraction, occurs, SPATIAL_CURVATURE } from './vector-form.js';

export type Answer = 'yes' | 'no' | 'unknown';

export interface LetterPredicate {
  /** For docs/rules. */
  readonly meaning: string;
  readonly ask: (value: Fraction, field: string, scalars: readonly string[]) => Answer;
}

const answer = (holds: boolean): Answer => (holds ? 'yes' : 'no');

export const LETTER_PREDICATES: ReadonlyMap<string, LetterPredicate> = new Map<string, LetterPredicate>([
  [
    'nonzero',
    {
      meaning: 'it is not zero as an expression; where it vanishes is listed among the losses',
      ask: (value) => answer(!isZeroFraction(value)),
    },
  ],
  [
    'still',
    {
      meaning: 'it contains no velocity and not the expansion of n: a function of the scalars and of ³R',
      ask: (value, _field, scalars) =>
        answer(movingNames(scalars).every((name) => name === SPATIAL_CURVATURE || !occurs(value, name))),
    },
  ],
  [
    'integrable',
    {
      meaning: 'its integral over the field is a function of the same kind, without a logarithm',
      // A denominator with the field in it may have such an integral; nothing here finds it.
      ask: (value, field) =>
        integralOver(value, field)
          ? 'yes'
          : value.denominator.some(({ base }) => involves(base, field))
            ? 'unknown'
            : 'no',
    },
  ],
]);
