/** Conditions "polynomial = 0" on couplings, solved for couplings that occur linearly with a number in front. */
import { coefficientOf, involves, substitute, symbolsOf } from '../algebra/collect.js';
import { compareSimplicity, primitive } from '../algebra/linear.js';
import { equals, isZero, leadingCoefficient, type Poly, scale } from '../algebra/poly.js';
import { divideRational, ONE } from '../algebra/rational.js';
import { exponentRange } from '../algebra/ring.js';

export interface SolvedConditions {
  /** Whether some condition says that a number other than zero, or a scale, vanishes. */
  readonly impossible: boolean;
  /** Coupling → its value in the others, none of which is solved for. */
  readonly solved: ReadonlyMap<string, Poly>;
  /** What could not be solved that way. */
  readonly open: readonly Poly[];
}

/** The value of a symbol by a condition that is linear in it with a number in front; undefined when it is not. */
function solvedFor(condition: Poly, name: string): Poly | undefined {
  const { ring } = condition;
  const g = ring.position.get(name);
  if (g === undefined || !involves(condition, name)) return undefined;
  const { low, high } = exponentRange(ring, condition.keys);
  if (low[g]! < 0 || high[g] !== 1) return undefined;
  const slope = coefficientOf(condition, name, 1);
  if (symbolsOf(slope).length > 0) return undefined;
  const rest = coefficientOf(condition, name, 0);
  const number = leadingCoefficient(slope);
  return scale(rest, divideRational({ num: -ONE.num, den: 1n }, number));
}

/**
 * Solves conditions one by one, simple ones first, each for the last coupling in order that allows it.
 * @param couplings those that may be solved for; other symbols, such as scales, count as non-zero.
 */
export function solveConditions(conditions: readonly Poly[], couplings: readonly string[]): SolvedConditions {
  let open = conditions.filter((c) => !isZero(c)).map(primitive);
  const solved = new Map<string, Poly>();
  for (;;) {
    open = distinct(open).sort(compareSimplicity);
    let step: { readonly name: string; readonly value: Poly; readonly from: Poly } | undefined;
    for (const from of open) {
      for (const name of [...couplings].reverse()) {
        const value = solved.has(name) ? undefined : solvedFor(from, name);
        if (value) {
          step = { name, value, from };
          break;
        }
      }
      if (step) break;
    }
    if (!step) break;
    const { name, value, from } = step;
    for (const [other, known] of solved) solved.set(other, substitute(known, new Map([[name, value]])));
    solved.set(name, value);
    open = open.filter((c) => c !== from).flatMap((c) => inserted(c, name, value));
  }
  const impossible = open.some((c) => symbolsOf(c).every((s) => !couplings.includes(s)));
  return { impossible, solved, open };
}

/** A condition with a symbol replaced; none when it became true. A negative power of what vanishes leaves it as it is. */
function inserted(condition: Poly, name: string, value: Poly): Poly[] {
  try {
    const next = primitive(substitute(condition, new Map([[name, value]])));
    return isZero(next) ? [] : [next];
  } catch (error) {
    if (error instanceof RangeError) return [condition];
    throw error;
  }
}

const distinct = (polys: readonly Poly[]): Poly[] => polys.filter((p, i) => polys.findIndex((q) => equals(p, q)) === i);
