/**
 * What a theory assumes about its constants, with the imposed relations applied, as knowledge for deciding signs.
 * Contradictory assumptions are refused; nothing here rewrites an expression.
 */
import { isZero, type Poly, scale, subtract, termsOf } from './algebra/poly.js';
import { signOfRational } from './algebra/rational.js';
import type { Ring } from './algebra/ring.js';
import { type Assumption, contradictionAmong, type Knowledge, knowledgeOf } from './algebra/signs.js';
import { errorAt, InputError } from './notation/diagnostics.js';
import type { Imposed } from './notation/impose.js';
import { polyOfScalar } from './notation/scalar-poly.js';
import type { AssumedInequality, Theory } from './notation/theory.js';

/** value = left − right, turned so that it is > 0, ≥ 0 or ≠ 0. */
function turned(ring: Ring, { left, right, relation }: AssumedInequality): Pick<Assumption, 'value' | 'relation'> {
  const value = subtract(polyOfScalar(ring, left), polyOfScalar(ring, right));
  if (relation === '<' || relation === '<=')
    return { value: scale(value, -1), relation: relation === '<' ? '>' : '>=' };
  return { value, relation };
}

/** The truth of a statement about a number. */
function holds(value: Poly, relation: Assumption['relation']): boolean {
  const sign = isZero(value) ? 0 : signOfRational(termsOf(value)[0]!.coefficient);
  return relation === '>' ? sign > 0 : relation === '>=' ? sign >= 0 : relation === '=' ? sign === 0 : sign !== 0;
}

const isNumber = (p: Poly): boolean => termsOf(p).every((t) => t.exponents.length === 0);

/**
 * The knowledge of a theory: assumptions, conditions that could not be solved (as equalities), and that scales are positive.
 * @param reduce applies the imposed relations, those for geometric parameters too.
 * @throws InputError `contradiction` when the assumptions exclude each other or what is imposed, as far as that is found:
 * always when all are linear.
 */
export function knowledgeFor(theory: Theory, ring: Ring, relations: Imposed, reduce: (p: Poly) => Poly): Knowledge {
  const typed = theory.assumptions ?? [];
  const assumptions: Assumption[] = relations.conditions.map(({ text, value }) => ({ value, relation: '=', text }));
  for (const assumed of typed) {
    const { value: before, relation } = turned(ring, assumed);
    const value = reduce(before);
    if (!isNumber(value)) {
      assumptions.push({ value, relation, text: assumed.text });
      continue;
    }
    if (holds(value, relation)) continue;
    const message = `the assumption "${assumed.text}" contradicts ${isNumber(before) ? 'arithmetic' : 'what is imposed'}`;
    throw new InputError([errorAt(assumed.origin, 'contradiction', message, 'drop the assumption or the relation')]);
  }
  const scales = theory.symbols.filter((s) => s.role === 'scale' && !relations.eliminated.has(s.name));
  const positive = new Map(scales.map(({ name }) => [name, `${name} > 0`]));
  const knowledge = knowledgeOf(ring, assumptions, positive);
  const clash = assumptions.length > 0 ? contradictionAmong(knowledge) : undefined;
  if (clash === undefined) return knowledge;
  const last = typed.findLast((a) => clash.includes(a.text));
  const others = clash.filter((text) => text !== last?.text);
  const message =
    last === undefined
      ? `the conditions ${clash.join(' and ')} contradict each other for positive scales`
      : `the assumption "${last.text}" contradicts ${others.length === 0 ? 'itself' : others.map((t) => `"${t}"`).join(' and ')}`;
  const hint = 'drop one of them';
  throw new InputError([
    last === undefined
      ? { code: 'contradiction', severity: 'error', message, hint }
      : errorAt(last.origin, 'contradiction', message, hint),
  ]);
}
