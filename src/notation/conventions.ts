/**
 * Sign and index conventions as data, and the translation of Lagrangians between them. A choice says what the user's tensor is
 * in terms of the internal one: a rational factor and a permutation of slots, for each head. Derived tensors (Ricci, traces,
 * the axial vector) follow the definitions of docs/conventions.md with the user's tensors put in.
 * Invariant: every translation out of the internal conventions and back in is the identity.
 */
import { divideRational, multiplyRational, ONE, type Rational, rational } from '../algebra/rational.js';
import { CONVENTION_KEYS, type ConventionKey, type Conventions, INTERNAL } from './convention-choices.js';
import { collectTerms } from './expand.js';
import type { LagrangianTerm, ScalarTerm, TensorFactor } from './theory.js';
import { fromMass, toMass } from './units.js';

export {
  CHOICES,
  CONVENTION_KEYS,
  type ConventionKey,
  type Conventions,
  INTERNAL,
  internalWith,
} from './convention-choices.js';

/** The user's tensor = factor · internal tensor, whose slot n is the user's slot places[n]. */
interface Effect {
  readonly factor?: readonly [num: number, den: number];
  readonly places?: readonly number[];
}
/** By head and number of slots. */
type Effects = Readonly<Record<string, Effect>>;

const MINUS: Effect = { factor: [-1, 1] };
const HALF: Effect = { factor: [1, 2] };
const EXCHANGED: Effect = { places: [1, 0] };
/** Effects of every choice that is not the internal one; the signature, the action and the units act on whole terms. */
const EFFECTS: Partial<Record<ConventionKey, Readonly<Record<string, Effects>>>> = {
  torsion: { half: { T3: HALF, T1: HALF, A1: HALF } },
  'torsion-sign': { '-1': { T3: MINUS, T1: MINUS, A1: MINUS } },
  'torsion-index': { last: { T3: { places: [2, 0, 1] } } },
  'torsion-trace': { 'T^b_{ba}': { T1: MINUS } },
  'curvature-sign': { '-1': { R4: MINUS, R2: MINUS, R0: MINUS } },
  'curvature-indices': { 'form-first': { R4: { places: [2, 3, 0, 1] } } },
  ricci: {
    'R^c_{abc}': { R2: MINUS, R0: MINUS },
    'R^c_{bca}': { R2: EXCHANGED },
    'R^c_{bac}': { R2: { ...MINUS, ...EXCHANGED }, R0: MINUS },
  },
  epsilon: { '-1': { epsilon4: MINUS, A1: MINUS } },
};

interface TotalEffect {
  readonly factor: Rational;
  readonly places: readonly number[] | undefined;
}

const kindOf = ({ head, slots }: TensorFactor): string => `${head}${slots.length}`;

/** No two choices permute the slots of one head, so their order does not matter. */
function effectOn(factor: TensorFactor, conventions: Conventions): TotalEffect {
  let total: TotalEffect = { factor: ONE, places: undefined };
  for (const key of CONVENTION_KEYS) {
    const effect = EFFECTS[key]?.[conventions[key]]?.[kindOf(factor)];
    if (effect === undefined) continue;
    const [num, den] = effect.factor ?? [1, 1];
    total = { factor: multiplyRational(total.factor, rational(num, den)), places: effect.places ?? total.places };
  }
  return total;
}

/** The slots of a user's tensor in internal order. */
export const internalSlots = <T>(kind: string, slots: readonly T[], conventions: Conventions): readonly T[] => {
  for (const key of CONVENTION_KEYS) {
    const places = EFFECTS[key]?.[conventions[key]]?.[kind]?.places;
    if (places !== undefined) return places.map((place) => slots[place]!);
  }
  return slots;
};

/** Heights at which the definition of a tensor does not contain η; a declared tensor has all indices down. */
const NATURAL: Readonly<Record<string, string>> = { R4: '^___', T3: '^__', eta2: '^_', delta2: '^_' };

/** (−1) to the number of η in a product when every tensor is written at its natural heights. */
function signatureSign(factors: readonly TensorFactor[]): 1 | -1 {
  let odd = false;
  for (const factor of factors) {
    const natural = NATURAL[kindOf(factor)] ?? '';
    if (kindOf(factor) === 'R0') odd = !odd;
    factor.slots.forEach(({ up }, n) => {
      if (up !== (natural[n] === '^')) odd = !odd;
    });
  }
  return odd ? -1 : 1;
}

const scaled = (scalar: ScalarTerm, by: Rational): ScalarTerm => ({
  coefficient: multiplyRational(scalar.coefficient, by),
  powers: scalar.powers,
});

const signOf = (conventions: Conventions, factors: readonly TensorFactor[]): Rational => {
  const signature = conventions.signature === INTERNAL.signature ? 1 : signatureSign(factors);
  return rational(conventions.action === '-1' ? -signature : signature);
};

function entered(term: LagrangianTerm, conventions: Conventions): LagrangianTerm {
  let number = ONE;
  const factors = term.factors.map((factor) => {
    const effect = effectOn(factor, conventions);
    number = multiplyRational(number, effect.factor);
    return { ...factor, slots: effect.places?.map((place) => factor.slots[place]!) ?? factor.slots };
  });
  const scalar = scaled(toMass(term.scalar, conventions.units), multiplyRational(number, signOf(conventions, factors)));
  return { scalar, factors };
}

function left(term: LagrangianTerm, conventions: Conventions): LagrangianTerm {
  let number = signOf(conventions, term.factors);
  const factors = term.factors.map((factor) => {
    const effect = effectOn(factor, conventions);
    number = divideRational(number, effect.factor);
    if (effect.places === undefined) return factor;
    const slots = [...factor.slots];
    effect.places.forEach((place, n) => {
      slots[place] = factor.slots[n]!;
    });
    return { ...factor, slots };
  });
  return { scalar: scaled(fromMass(term.scalar, conventions.units), number), factors };
}

/** A Lagrangian written in some conventions, in the internal ones; like terms collected. */
export const toInternal = (terms: readonly LagrangianTerm[], conventions: Conventions): readonly LagrangianTerm[] =>
  collectTerms(terms.map((term) => entered(term, conventions)));

/** A Lagrangian in the internal conventions, as it is written in others; like terms collected. */
export const fromInternal = (terms: readonly LagrangianTerm[], conventions: Conventions): readonly LagrangianTerm[] =>
  collectTerms(terms.map((term) => left(term, conventions)));

/**
 * A Lagrangian written in some conventions, as it is written in others. For products of tensors alone, such as the rows of a
 * table of invariants, the sign of the action does not count: give the same `action` in both.
 */
export const translate = (
  terms: readonly LagrangianTerm[],
  from: Conventions,
  to: Conventions,
): readonly LagrangianTerm[] => fromInternal(toInternal(terms, from), to);
