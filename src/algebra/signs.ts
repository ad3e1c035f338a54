/**
 * Signs of polynomials in real symbols under assumptions. Sound, not complete: an answer other than `ANY` is proved, by
 * signs of monomials or by a combination, with non-negative weights, of what is assumed (the transposition theorem for
 * linear inequalities, monomials taken as the unknowns; complete when everything is linear). Imports polynomials.
 */
import { symbolsOf } from './collect.js';
import { splitUnit } from './division.js';
import { nonNegativeSolution } from './feasibility.js';
import { primitive } from './linear.js';
import { remember } from './memo.js';
import {
  add,
  constant,
  equals,
  generator,
  isZero,
  monomial,
  multiply,
  negate,
  type Poly,
  power,
  subtract,
  sum,
  termsOf,
} from './poly.js';
import { ONE, type Rational, signOfRational, ZERO } from './rational.js';
import { exponentRange, type Ring } from './ring.js';

/** A set of signs. */
export type Signs = number;
export const NEGATIVE = 1;
export const VANISHING = 2;
export const POSITIVE = 4;
export const ANY = NEGATIVE | VANISHING | POSITIVE;

/** value > 0, value ≥ 0, value = 0 or value ≠ 0. */
export type Relation = '>' | '>=' | '=' | '!=';

/** Something taken for true. */
export interface Assumption {
  readonly value: Poly;
  readonly relation: Relation;
  /** As it is listed where it was used. */
  readonly text: string;
}

/** What may be used to decide signs, and what follows from it for single symbols. */
export interface Knowledge {
  readonly ring: Ring;
  readonly assumptions: readonly Assumption[];
  /** By position in the ring; a symbol that is missing may have any sign. */
  readonly symbols: ReadonlyMap<number, Verdict>;
}

/** The signs that a value may have, and the texts of the assumptions that the proof rests on. */
export interface Verdict {
  readonly signs: Signs;
  readonly used: readonly string[];
}

const UNDECIDED: Verdict = Object.freeze({ signs: ANY, used: Object.freeze([]) });

export const oppositeSigns = (s: Signs): Signs =>
  (s & VANISHING) | (s & NEGATIVE ? POSITIVE : 0) | (s & POSITIVE ? NEGATIVE : 0);

/** Signs of products of values with the given signs. */
export function productSigns(a: Signs, b: Signs): Signs {
  let out = (a | b) & VANISHING;
  if (a & POSITIVE) out |= b & ~VANISHING;
  if (a & NEGATIVE) out |= oppositeSigns(b) & ~VANISHING;
  return out;
}

/** Signs of sums of values with the given signs. */
function sumSigns(a: Signs, b: Signs): Signs {
  if ((a | b) & NEGATIVE && (a | b) & POSITIVE) return ANY;
  if (a === VANISHING) return b;
  if (b === VANISHING) return a;
  return a & VANISHING && b & VANISHING ? a | b : (a | b) & ~VANISHING;
}

const signOfNumber = (r: Rational): Signs => [NEGATIVE, VANISHING, POSITIVE][signOfRational(r) + 1]!;

const merged = (lists: readonly (readonly string[])[]): string[] => [...new Set(lists.flat())];

/** Sign of coefficient · Π g^e. A negative power presupposes that the symbol is not zero. */
function monomialVerdict(
  coefficient: Rational,
  exponents: readonly (readonly [generator: number, exponent: number])[],
  symbols: Knowledge['symbols'],
): Verdict {
  let signs = signOfNumber(coefficient);
  const used: (readonly string[])[] = [];
  for (const [g, e] of exponents) {
    const known = symbols.get(g) ?? UNDECIDED;
    const own = e < 0 ? known.signs & ~VANISHING : known.signs;
    const even = e % 2 === 0;
    const of = even ? (own & VANISHING) | (own & ~VANISHING ? POSITIVE : 0) : own;
    const without = even ? (e < 0 ? POSITIVE : POSITIVE | VANISHING) : ANY;
    if (of !== without) used.push(known.used);
    signs = productSigns(signs, of);
  }
  return { signs, used: merged(used) };
}

/** Sign by the signs of the terms alone. */
function termwise(p: Poly, symbols: Knowledge['symbols']): Verdict {
  let signs: Signs = VANISHING;
  const used: (readonly string[])[] = [];
  for (const { coefficient, exponents } of termsOf(p)) {
    const verdict = monomialVerdict(coefficient, exponents, symbols);
    signs = sumSigns(signs, verdict.signs);
    if (signs === ANY) return UNDECIDED;
    used.push(verdict.used);
  }
  return { signs, used: merged(used) };
}

/** A polynomial that is known to be > 0, ≥ 0 or = 0. */
interface Hypothesis {
  readonly value: Poly;
  readonly relation: '>' | '>=' | '=';
  readonly used: readonly string[];
}

/** Bounds on the search for a proof. */
const MAX_HYPOTHESES = 140;
const MAX_PRODUCTS = 40;
const MAX_SQUARES = 8;
/** Terms of a polynomial beyond which only the signs of its terms are looked at. */
const MAX_TERMS = 60;

/** Weights ≥ 0, one of a strict hypothesis positive, with which the hypotheses add up to zero; the texts that they use. */
function contradictionIn(hypotheses: readonly Hypothesis[]): readonly string[] | undefined {
  const rows = new Map<string, number>();
  const columns: (readonly (readonly [number, Rational])[])[] = [];
  const owners: Hypothesis[] = [];
  for (const h of hypotheses) {
    const entries = termsOf(h.value).map(({ coefficient, exponents }): readonly [number, Rational] => [
      remember(rows, exponents.join(';'), () => rows.size + 1),
      coefficient,
    ]);
    columns.push(h.relation === '>' ? [[0, ONE], ...entries] : entries);
    owners.push(h);
    if (h.relation !== '=') continue;
    columns.push(entries.map(([row, c]) => [row, { num: -c.num, den: c.den }]));
    owners.push(h);
  }
  const right = Array.from({ length: rows.size + 1 }, (_, i) => (i === 0 ? ONE : ZERO));
  const found = nonNegativeSolution(columns, right);
  if (found === undefined || found === 'unknown') return undefined;
  return merged(found.flatMap((weight, j) => (weight.num === 0n ? [] : [owners[j]!.used])));
}

/** The assumptions as they stand, each as one or no hypothesis. */
const given = (assumptions: readonly Assumption[]): Hypothesis[] =>
  assumptions.flatMap(({ value, relation, text }) => (relation === '!=' ? [] : [{ value, relation, used: [text] }]));

/** The monomials that occur in some polynomials, each once, with coefficient 1. */
function monomialsIn(polys: readonly Poly[]): Poly[] {
  const found = new Map<string, Poly>();
  for (const p of polys)
    for (const { exponents } of termsOf(p)) {
      const names = exponents.map(([g, e]) => [p.ring.generators[g]!.name, e] as const);
      remember(found, exponents.join(';'), () => monomial(p.ring, ONE, names));
    }
  return [...found.values()];
}

/** A polynomial of known sign as a hypothesis; none when the sign may be anything. */
function known(value: Poly, { signs, used }: Verdict): Hypothesis[] {
  switch (signs) {
    case POSITIVE:
      return [{ value, relation: '>', used }];
    case NEGATIVE:
      return [{ value: negate(value), relation: '>', used }];
    case POSITIVE | VANISHING:
      return [{ value, relation: '>=', used }];
    case NEGATIVE | VANISHING:
      return [{ value: negate(value), relation: '>=', used }];
    case VANISHING:
      return [{ value, relation: '=', used }];
    default:
      return [];
  }
}

/** What follows from the assumptions and may help to decide a polynomial. */
function hypothesesFor(p: Poly, { ring, assumptions, symbols }: Knowledge): Hypothesis[] {
  const base = given(assumptions);
  const monomials = monomialsIn([p, ...base.map((h) => h.value)]);
  const verdictOf = (m: Poly): Verdict => termwise(m, symbols);
  const out: Hypothesis[] = [{ value: constant(ring, 1), relation: '>', used: [] }, ...base];
  for (const m of monomials) out.push(...known(m, verdictOf(m)));
  // An assumption times a monomial of known sign that makes one of its terms a monomial of p.
  const multiples = new Map<string, Hypothesis>();
  const targets = monomialsIn([p]);
  for (const h of base)
    for (const term of monomialsIn([h.value]))
      for (const target of targets) {
        const factor = multiply(target, power(term, -1));
        if (!mayMultiply(factor, p, symbols)) continue;
        for (const sign of known(factor, verdictOf(factor))) {
          if (multiples.size >= MAX_PRODUCTS || sign.value.keys.every((w) => w === 0)) continue;
          const product = productOf(h, sign);
          multiples.set(product.value.keys.join(), product);
        }
      }
  out.push(...multiples.values());
  if (base.length * base.length <= MAX_PRODUCTS)
    base.forEach((a, i) => {
      for (const b of base.slice(i)) out.push(productOf(a, b));
    });
  out.push(...squares(targets));
  return out.slice(0, MAX_HYPOTHESES);
}

/** Whether a monomial divides only by what is not zero: by assumption, or because p divides by it. */
function mayMultiply(factor: Poly, p: Poly, symbols: Knowledge['symbols']): boolean {
  const { low } = exponentRange(p.ring, p.keys);
  return termsOf(factor)[0]!.exponents.every(
    ([g, e]) => e > 0 || low[g]! < 0 || ((symbols.get(g)?.signs ?? ANY) & VANISHING) === 0,
  );
}

function productOf(a: Hypothesis, b: Hypothesis): Hypothesis {
  const relation =
    a.relation === '=' || b.relation === '=' ? '=' : a.relation === '>' && b.relation === '>' ? '>' : '>=';
  return { value: multiply(a.value, b.value), relation, used: merged([a.used, b.used]) };
}

/** (m ± n)² ≥ 0 for the monomials whose squares are given. */
function squares(monomials: readonly Poly[]): Hypothesis[] {
  const roots = monomials.flatMap((m) => {
    const [term] = termsOf(m);
    if (term!.exponents.some(([, e]) => e % 2 !== 0)) return [];
    return [
      monomial(
        m.ring,
        ONE,
        term!.exponents.map(([g, e]) => [m.ring.generators[g]!.name, e / 2] as const),
      ),
    ];
  });
  if (roots.length > MAX_SQUARES) return [];
  return roots.flatMap((m, i) =>
    roots
      .slice(i + 1)
      .flatMap((n) =>
        [add(m, n), subtract(m, n)].map(
          (root): Hypothesis => ({ value: multiply(root, root), relation: '>=', used: [] }),
        ),
      ),
  );
}

/** The sign of p by combinations of hypotheses. */
function combined(p: Poly, knowledge: Knowledge): Verdict {
  if (p.size > MAX_TERMS) return UNDECIDED;
  const hypotheses = hypothesesFor(p, knowledge);
  const refutes = (value: Poly, relation: '>' | '>='): readonly string[] | undefined =>
    contradictionIn([...hypotheses, { value, relation, used: [] }]);
  for (const [own, sign, other] of [
    [negate(p), POSITIVE, NEGATIVE],
    [p, NEGATIVE, POSITIVE],
  ] as const) {
    const strict = refutes(own, '>=');
    if (strict) return { signs: sign, used: strict };
    const weak = refutes(own, '>');
    if (!weak) continue;
    const opposite = refutes(negate(own), '>');
    if (opposite) return { signs: VANISHING, used: merged([weak, opposite]) };
    return { signs: ANY & ~other, used: weak };
  }
  return UNDECIDED;
}

/** Both verdicts together: what is left when each is true. */
const both = (a: Verdict, b: Verdict): Verdict => {
  if ((a.signs | b.signs) === b.signs) return a;
  if ((a.signs | b.signs) === a.signs) return b;
  return { signs: a.signs & b.signs, used: merged([a.used, b.used]) };
};

/** Signs that p may have under what is known. */
export function signOf(p: Poly, knowledge: Knowledge): Verdict {
  if (isZero(p)) return { signs: VANISHING, used: [] };
  const { unit, reduced } = splitUnit(p);
  const whole = termwise(p, knowledge.symbols);
  if (isSingle(whole.signs)) return whole;
  let verdict = whole;
  if (knowledge.assumptions.length > 0 || reduced.size > 1) {
    const outer = termwise(unit, knowledge.symbols);
    const inner = reduced.size === 1 ? { signs: POSITIVE, used: [] } : signOfSum(reduced, knowledge);
    const signs = productSigns(outer.signs, inner.signs);
    if (signs !== ANY) verdict = both(verdict, { signs, used: merged([outer.used, inner.used]) });
    if (!isSingle(verdict.signs)) verdict = both(verdict, combined(p, knowledge));
  }
  return isUnequal(p, verdict, knowledge);
}

/** Sign of a sum that no generator divides. */
const signOfSum = (p: Poly, knowledge: Knowledge): Verdict => {
  const plain = termwise(p, knowledge.symbols);
  return isUnequal(p, isSingle(plain.signs) ? plain : both(plain, combined(p, knowledge)), knowledge);
};

const isSingle = (s: Signs): boolean => s === NEGATIVE || s === VANISHING || s === POSITIVE;

/** Uses an assumption value ≠ 0 for a value that differs from p by a number only. */
function isUnequal(p: Poly, verdict: Verdict, { assumptions }: Knowledge): Verdict {
  if (!(verdict.signs & VANISHING)) return verdict;
  const same = assumptions.find((a) => a.relation === '!=' && equals(primitive(a.value), primitive(p)));
  return same ? { signs: verdict.signs & ~VANISHING, used: merged([verdict.used, [same.text]]) } : verdict;
}

/**
 * What follows from some assumptions.
 * @param positive names of symbols that are positive by their nature, with the text by which that is listed.
 */
export function knowledgeOf(
  ring: Ring,
  assumptions: readonly Assumption[],
  positive: ReadonlyMap<string, string> = new Map(),
): Knowledge {
  const symbols = new Map<number, Verdict>();
  const knowledge: Knowledge = { ring, assumptions, symbols };
  for (const [name, text] of positive) {
    const g = ring.position.get(name);
    if (g !== undefined) symbols.set(g, { signs: POSITIVE, used: [text] });
  }
  const concerned = new Set(assumptions.flatMap((a) => symbolsOf(a.value)));
  for (const name of concerned) {
    const g = ring.position.get(name)!;
    const p = generator(ring, name);
    const verdict = both(symbols.get(g) ?? UNDECIDED, isUnequal(p, combined(p, knowledge), knowledge));
    if (verdict.signs !== ANY) symbols.set(g, verdict);
  }
  return knowledge;
}

/** The texts of assumptions that exclude each other; undefined when no contradiction was found. */
export function contradictionAmong(knowledge: Knowledge): readonly string[] | undefined {
  const { assumptions, symbols } = knowledge;
  for (const { signs, used } of symbols.values()) if (signs === 0) return used;
  const together = sumOfValues(knowledge);
  const found = contradictionIn(hypothesesFor(together, knowledge));
  if (found) return found;
  for (const { value, relation, text } of assumptions) {
    if (relation !== '!=') continue;
    const { signs, used } = signOf(value, { ...knowledge, assumptions: assumptions.filter((a) => a.text !== text) });
    if (signs === VANISHING) return merged([used, [text]]);
  }
  return undefined;
}

/** A polynomial with every monomial of the assumptions, so that their multiples meet. */
const sumOfValues = ({ ring, assumptions }: Knowledge): Poly => sum(ring, monomialsIn(assumptions.map((a) => a.value)));

/** yes, no, or not decided, with what the answer rests on. */
export interface Answer {
  readonly answer: 'yes' | 'no' | 'unknown';
  readonly used: readonly string[];
}

/** Whether p has one of the wanted signs. */
export function hasSign(p: Poly, wanted: Signs, knowledge: Knowledge): Answer {
  const { signs, used } = signOf(p, knowledge);
  if ((signs & ~wanted) === 0) return { answer: 'yes', used };
  if ((signs & wanted) === 0) return { answer: 'no', used };
  return { answer: 'unknown', used: [] };
}
