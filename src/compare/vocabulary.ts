/**
 * The names that a claim may use and what they mean in a jet space: fields and their rates, couplings, densities, the
 * independent components of torsion and curvature, the totals rho and p, the effective fluid, and the user's definitions.
 * Imports derivations, jet spaces, quotients, the notation.
 */
import { constant, generator, isZero, type Poly, scale, subtract } from '../algebra/poly.js';
import { ExponentLimitError, jetName } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import type { Place } from '../notation/diagnostics.js';
import { errorAt, InputError } from '../notation/diagnostics.js';
import { MAX_EXPONENT } from '../notation/limits.js';
import { isNameText } from '../notation/names.js';
import { parseEquation } from '../notation/parser.js';
import { type Passage, plainPassage } from '../notation/passage.js';
import { polyOfScalar } from '../notation/scalar-poly.js';
import type { Expression } from '../notation/syntax.js';
import { UNIT_SYMBOLS } from '../notation/units.js';
import { boundIn } from './budget.js';
import { withoutDots } from './dots.js';
import { type JetSpace, jetSpace, MAX_ORDER } from './jet-space.js';
import {
  addQuotients,
  cleared,
  divideQuotients,
  multiplyQuotients,
  negateQuotient,
  powerOfQuotient,
  type Quotient,
  quotientOf,
  rateOfQuotient,
} from './quotient.js';

/** An equation that a definition adds, when its symbol could not be solved for. */
export interface DefiningEquation {
  readonly text: string;
  readonly poly: Poly;
}

export interface Vocabulary {
  readonly space: JetSpace;
  /** Name → meaning. */
  readonly meanings: ReadonlyMap<string, Quotient>;
  readonly defining: readonly DefiningEquation[];
}

interface ParsedDefinition {
  readonly passage: Passage;
  readonly text: string;
  readonly left: Expression;
  readonly right: Expression;
}

/**
 * @param where definitions `x = …`, each in terms of earlier ones.
 * @throws InputError for definitions that cannot be read, that use unknown names or define a name twice.
 */
export function vocabularyOf(d: Derivation, where: readonly string[]): Vocabulary {
  // A first space tells which names exist; symbols of definitions that cannot be solved become functions of a second one.
  const first = ownMeanings(d, jetSpace([d]));
  const definitions: ParsedDefinition[] = [];
  const solved = new Set<string>();
  const unsolved: string[] = [];
  for (const text of where) {
    const known = new Set([...first.keys(), ...solved, ...unsolved]);
    const definition = parseDefinition(text, known);
    definitions.push(definition);
    const { symbol, alone } = newSymbol(definition, known);
    if (alone) solved.add(symbol);
    else unsolved.push(symbol);
  }
  const space = unsolved.length === 0 ? undefined : jetSpace([d], { unknowns: unsolved });
  const meanings = space ? ownMeanings(d, space) : first;
  const final = space ?? spaceOf(first);
  for (const name of unsolved) meanings.set(name, quotientOf(generator(final.ring, name)));
  const defining: DefiningEquation[] = [];
  let vocabulary: Vocabulary = { space: final, meanings, defining };
  for (const { passage, text, left, right } of definitions) {
    const name = left.kind === 'symbol' && solved.has(left.name) && !meanings.has(left.name) ? left.name : undefined;
    const value = evaluate(vocabulary, right, passage);
    if (name !== undefined) {
      meanings.set(name, value);
      vocabulary = { ...vocabulary, meanings };
      continue;
    }
    const difference = addQuotients(evaluate(vocabulary, left, passage), negateQuotient(value));
    defining.push({ text, poly: cleared(final, [difference]).polys[0]! });
  }
  return vocabulary;
}

const spaceByMeanings = new WeakMap<ReadonlyMap<string, Quotient>, JetSpace>();
const spaceOf = (meanings: ReadonlyMap<string, Quotient>): JetSpace => spaceByMeanings.get(meanings)!;

/** What the derivation itself gives names to. */
function ownMeanings(d: Derivation, space: JetSpace): Map<string, Quotient> {
  const { ring } = space;
  const out = new Map<string, Quotient>();
  const learn = (name: string, p: Poly): void => {
    if (!out.has(name)) out.set(name, quotientOf(p));
  };
  space.places.forEach(({ field, order }) => {
    if (order === 0) learn(field, generator(ring, field));
  });
  learn(space.lapse, constant(ring, 1));
  for (const { name, value } of UNIT_SYMBOLS[d.theory.conventions.units])
    if (value) out.set(name, quotientOf(polyOfScalar(ring, [value])));
  for (const { name, value } of d.geometry.components) learn(name, space.translate(value));
  if (d.friedmann) {
    learn('rho_T', space.translate(d.friedmann.rhoT));
    learn('p_T', space.translate(d.friedmann.pT));
  }
  for (const [name, value] of d.relations.eliminated) out.set(name, quotientOf(space.translate(value)));
  spaceByMeanings.set(out, space);
  return out;
}

function refuse(place: Place, code: string, message: string, hint: string): InputError {
  return new InputError([errorAt(place, code, message, hint)]);
}

/** Parses `left = right` over names that pass the test. */
export function parseSides(
  passage: Passage,
  isSymbol: (name: string) => boolean,
  names: Iterable<string>,
): { readonly left: Expression; readonly right: Expression } {
  const problems: ConstructorParameters<typeof InputError>[0][number][] = [];
  const sides = parseEquation(passage, { tensors: false, jets: true, isSymbol, names }, problems);
  if (sides) return sides;
  const hint = 'define it with --where, or mend the name';
  throw new InputError(
    problems.map((d) => (d.code === 'unknown-symbol' && d.hint?.startsWith('declare it') ? { ...d, hint } : d)),
  );
}

function parseDefinition(text: string, known: ReadonlySet<string>): ParsedDefinition {
  const passage = withoutDots(plainPassage(text, '--where'));
  const { left, right } = parseSides(passage, isNameText, known);
  return { passage, text: text.trim().replace(/\s+/g, ' '), left, right };
}

/** Names in an expression, jets by their function. */
export function namesIn(node: Expression): string[] {
  switch (node.kind) {
    case 'symbol':
      return [functionOf(node.name).name];
    case 'sum':
      return node.summands.flatMap((s) => namesIn(s.value));
    case 'product':
      return node.factors.flatMap((f) => namesIn(f.value));
    case 'power':
      return namesIn(node.base);
    default:
      return [];
  }
}

/** The one name that a definition introduces, and whether it stands alone on the left. */
function newSymbol(
  { passage, left, right }: ParsedDefinition,
  known: ReadonlySet<string>,
): { readonly symbol: string; readonly alone: boolean } {
  const whole = passage.locate(0, passage.text.length);
  const fresh = [...new Set([...namesIn(left), ...namesIn(right)])].filter((name) => !known.has(name));
  if (fresh.length === 0)
    throw refuse(
      whole,
      'definition',
      'the definition introduces no new symbol',
      'a known name cannot be defined again',
    );
  if (fresh.length > 1)
    throw refuse(
      whole,
      'definition',
      `the definition has ${fresh.length} unknown symbols: ${fresh.join(', ')}`,
      'define one symbol at a time, in the order in which they are used',
    );
  const symbol = fresh[0]!;
  return { symbol, alone: left.kind === 'symbol' && left.name === symbol && !namesIn(right).includes(symbol) };
}

const JET = /^D\((.+),(\d+)\)$/;
function functionOf(name: string): { readonly name: string; readonly order: number } {
  const jet = JET.exec(name);
  return jet ? { name: jet[1]!, order: Number(jet[2]) } : { name, order: 0 };
}

const tooHigh = (place: Place): InputError =>
  refuse(place, 'exponent-limit', `a time derivative beyond the order ${MAX_ORDER}`, 'smaller orders only');

/** Terms that a typed expression may come to when it is multiplied out. */
const MAX_TYPED_TERMS = 20_000;

/** The meaning of an expression. @throws InputError for unknown names, a division by zero, what is too large. */
export function evaluate(vocabulary: Vocabulary, node: Expression, passage: Passage): Quotient {
  try {
    return meaningOf(vocabulary, node, passage);
  } catch (error) {
    if (!(error instanceof ExponentLimitError)) throw error;
    throw refuse(passage.locate(node.start, node.end), 'exponent-limit', error.message, 'smaller powers only');
  }
}

function meaningOf(vocabulary: Vocabulary, node: Expression, passage: Passage): Quotient {
  const { space, meanings } = vocabulary;
  const { ring } = space;
  const place = (): Place => passage.locate(node.start, node.end);
  const checked = (value: Quotient): Quotient => {
    if (value.top.size <= MAX_TYPED_TERMS) return value;
    throw refuse(place(), 'terms-limit', `more than ${MAX_TYPED_TERMS} terms when multiplied out`, 'shorten the sums');
  };
  switch (node.kind) {
    case 'integer':
      return quotientOf(scale(constant(ring, 1), { num: node.value, den: 1n }));
    case 'symbol': {
      const { name, order } = functionOf(node.name);
      if (name !== space.lapse && ring.position.has(jetName(name, order)))
        return quotientOf(generator(ring, jetName(name, order)));
      let value = meanings.get(name);
      if (!value) throw refuse(place(), 'unknown-symbol', `unknown symbol ${name}`, 'define it with --where');
      if (order > MAX_ORDER) throw tooHigh(place());
      try {
        for (let n = 0; n < order; n++) value = checked(rateOfQuotient(space, value));
      } catch (error) {
        if (boundIn(error)) throw tooHigh(place());
        throw error;
      }
      return value;
    }
    case 'sum':
      return node.summands.reduce(
        (total, { negative, value }) => {
          const term = evaluate(vocabulary, value, passage);
          return checked(addQuotients(total, negative ? negateQuotient(term) : term));
        },
        quotientOf(subtract(constant(ring, 1), constant(ring, 1))),
      );
    case 'product':
      return node.factors.reduce(
        (total, { divides, negative, value }) => {
          const factor = evaluate(vocabulary, value, passage);
          if (divides && isZero(factor.top))
            throw refuse(
              passage.locate(value.start, value.end),
              'division-by-zero',
              'division by zero',
              'it vanishes here',
            );
          const next = divides ? divideQuotients(total, factor) : multiplyQuotients(total, factor);
          return checked(negative ? negateQuotient(next) : next);
        },
        quotientOf(constant(ring, 1)),
      );
    case 'power': {
      const base = evaluate(vocabulary, node.base, passage);
      const size = Math.abs(node.exponent);
      if (size > MAX_EXPONENT || Math.max(base.top.size, base.bottom.size) ** Math.min(size, 8) > 1e6)
        throw refuse(place(), 'terms-limit', 'the power is too large to be multiplied out', 'smaller powers only');
      if (node.exponent < 0 && isZero(base.top))
        throw refuse(place(), 'division-by-zero', 'a negative power of zero', 'it vanishes here');
      return checked(powerOfQuotient(base, node.exponent));
    }
    default:
      throw refuse(place(), 'unknown-tensor', 'a claim has no tensors', 'name their components with --where');
  }
}
