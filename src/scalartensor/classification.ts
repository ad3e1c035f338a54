/**
 * What each scalar of a bi-scalar form is: canonical, of the wrong sign, a cuscuton, auxiliary or absent, with the sign
 * conditions on which that depends; and the terms of the potential by name. Kinetic terms are judged in the Einstein frame
 * where there is one, since curvature times a function of a scalar gives it a kinetic term too.
 */
import { partial } from '../algebra/calculus.js';
import { collect, involves } from '../algebra/collect.js';
import { fraction } from '../algebra/fraction.js';
import { fractionInFactors, signOfProduct } from '../algebra/known-factors.js';
import { isZero, type Poly } from '../algebra/poly.js';
import { type Knowledge, NEGATIVE, POSITIVE } from '../algebra/signs.js';
import type { BiScalarFunctions } from './biscalar.js';
import { type ConformalFrame, candidatesOf, type SignStatement } from './frames.js';
import { boundOf, type PotentialBound } from './potential-bound.js';

/**
 * canonical, wrong-sign: a kinetic term of its own of known sign. kinetic: one whose sign depends on `sign`.
 * mixed: kinetic terms that mix it with another scalar. quadratic-cuscuton, cuscuton: only a velocity under the root of the
 * current, with a potential at most quadratic in it or not. auxiliary: no velocity at all. absent: it does not occur.
 */
export type ScalarKind =
  | 'canonical'
  | 'wrong-sign'
  | 'kinetic'
  | 'mixed'
  | 'quadratic-cuscuton'
  | 'cuscuton'
  | 'auxiliary'
  | 'absent';

export interface ScalarClass {
  readonly scalar: string;
  readonly kind: ScalarKind;
  /** Its own kinetic coefficient; where there is none, undefined. */
  readonly sign: SignStatement | undefined;
  /** Assumptions on which the kind rests. */
  readonly used: readonly string[];
}

export type TermName = 'constant' | 'linear' | 'mass' | 'cubic' | 'quartic' | 'higher';

/** One monomial of the scalars in the potential. */
export interface PotentialTerm {
  /** `mass`: of second degree, and so on. */
  readonly name: TermName;
  /** Exponent by scalar. */
  readonly powers: ReadonlyMap<string, number>;
  readonly coefficient: Poly;
}

export interface Classification {
  /** Where the kinetic terms were judged. */
  readonly frame: 'einstein' | 'jordan';
  readonly scalars: readonly ScalarClass[];
  readonly potential: readonly PotentialTerm[];
  readonly bound: PotentialBound;
}

const NAMES: readonly TermName[] = ['constant', 'linear', 'mass', 'cubic', 'quartic'];

/** The terms of the potential by degree. */
function potentialTerms(potential: Poly, scalars: readonly string[]): PotentialTerm[] {
  const { ring } = potential;
  const places = scalars.map((q) => ring.position.get(q)!);
  return collect(potential, (g) => places.includes(g))
    .map(({ monomial, coefficient }) => {
      const powers = new Map(monomial.map(([g, e]) => [ring.generators[g]!.name, e]));
      const degree = [...powers.values()].reduce((n, e) => n + e, 0);
      return { name: NAMES[degree] ?? 'higher', powers, coefficient, degree };
    })
    .sort((a, b) => a.degree - b.degree)
    .map(({ name, powers, coefficient }) => ({ name, powers, coefficient }));
}

/** The classes of all scalars. */
export function classify(
  form: BiScalarFunctions,
  frame: ConformalFrame | undefined,
  scalars: readonly string[],
  knowledge: Knowledge,
): Classification {
  return {
    frame: frame ? 'einstein' : 'jordan',
    scalars: scalars.map((q) => classOf(q, form, frame, knowledge)),
    potential: potentialTerms(form.potential, scalars),
    bound: boundOf(form.potential, scalars, knowledge),
  };
}

function classOf(
  q: string,
  form: BiScalarFunctions,
  frame: ConformalFrame | undefined,
  knowledge: Knowledge,
): ScalarClass {
  const entries = [...(frame ? frame.functions.kinetic : new Map([...form.kinetic].map(([k, p]) => [k, fraction(p)])))];
  const row = entries.filter(([key, k]) => key.split(',').includes(q) && !isZero(k.numerator));
  const made = (kind: ScalarKind, sign?: SignStatement, used: readonly string[] = []): ScalarClass => ({
    scalar: q,
    kind,
    sign,
    used,
  });
  const own = row.find(([key]) => key === `${q},${q}`)?.[1];
  if (row.some(([key]) => key !== `${q},${q}`)) return made('mixed', own && statementOf(own, form, frame, knowledge));
  if (own) {
    const sign = statementOf(own, form, frame, knowledge);
    // A sign that only single values of the fields spoil counts as known.
    const side = frame?.side ?? 1;
    if ((sign.sign.signs & (side === 1 ? NEGATIVE : POSITIVE)) === 0) return made('canonical', sign, sign.sign.used);
    if ((sign.sign.signs & (side === 1 ? POSITIVE : NEGATIVE)) === 0) return made('wrong-sign', sign, sign.sign.used);
    return made('kinetic', sign);
  }
  if (!isZero(form.current.get(q)!)) {
    const isQuadratic = isZero(partial(partial(partial(form.potential, q), q), q));
    return made(isQuadratic ? 'quadratic-cuscuton' : 'cuscuton');
  }
  const occurs = [form.g4, ...form.kinetic.values(), ...form.current.values(), form.potential].some((p) =>
    involves(p, q),
  );
  return made(occurs ? 'auxiliary' : 'absent');
}

function statementOf(
  k: ConformalFrame['determinant'],
  form: BiScalarFunctions,
  frame: ConformalFrame | undefined,
  knowledge: Knowledge,
): SignStatement {
  const candidates = candidatesOf(form);
  const value = fractionInFactors(k, candidates);
  return { value, sign: signOfProduct(value, frame?.knowledge ?? knowledge) };
}
