/**
 * Redefinitions of fields and couplings given by the user: `phi = phi + psi` puts the right side for phi everywhere, its
 * derivatives for the jets of phi. Only invertible ones are accepted: a redefined field must not be replaced by its own
 * derivatives, and the Jacobian must not vanish identically. Imports algebra and the notation.
 */
import { orderIn, partial, timeDerivative } from '../algebra/calculus.js';
import { substitute, symbolsOf } from '../algebra/collect.js';
import { infix } from '../algebra/infix.js';
import { add, constant, isZero, monomial, multiply, type Poly, subtract, zero } from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { ExponentLimitError, jetName, type Ring } from '../algebra/ring.js';
import type { Geometry } from '../geometry/geometry.js';
import { errorAt, InputError } from '../notation/diagnostics.js';
import { plainPassage } from '../notation/passage.js';
import { parseRelation } from '../notation/scalar.js';
import { polyOfScalar } from '../notation/scalar-poly.js';
import { withoutDots } from './dots.js';

export interface Redefinition {
  readonly texts: readonly string[];
  /** What is replaced. */
  readonly names: readonly string[];
  /** p with fields, their jets and couplings replaced. */
  readonly apply: (p: Poly) => Poly;
  /** What must not vanish for the redefinition to be invertible; texts. */
  readonly conditions: readonly string[];
}

/** @throws InputError for texts that cannot be read and redefinitions that are not invertible. */
export function readRedefinition(ring: Ring, geometry: Geometry, texts: readonly string[]): Redefinition {
  const images = new Map<string, Poly>();
  for (const text of texts) {
    const [name, image] = readOne(ring, geometry, text);
    if (images.has(name))
      throw fault(text, 'redefinition', `${name} is redefined twice`, 'give one redefinition of each field');
    images.set(name, image);
  }
  const fields = [...images.keys()].filter((name) => isField(ring, name));
  for (const q of fields) {
    const late = fields.find((f) => orderIn(images.get(q)!, f) > 0);
    if (late !== undefined)
      throw fault(
        texts[[...images.keys()].indexOf(q)]!,
        'redefinition',
        `${q} would be replaced by derivatives of ${late}, which is redefined too`,
        'such a redefinition cannot be inverted without integrating',
      );
  }
  const jacobian = determinant(
    ring,
    fields.map((q) => fields.map((f) => partial(images.get(q)!, f))),
  );
  if (isZero(jacobian))
    throw fault(texts.join('; '), 'redefinition', 'the redefinition cannot be inverted', 'its Jacobian vanishes');
  const all = withJets(ring, images);
  return {
    texts,
    names: [...images.keys()],
    apply: (p) => put(p, all, texts.join('; ')),
    conditions: symbolsOf(jacobian).length === 0 ? [] : [`${infix(jacobian)} != 0`],
  };
}

const isField = (ring: Ring, name: string): boolean => ring.generators[ring.position.get(name)!]!.kind === 'jet';

function readOne(ring: Ring, geometry: Geometry, text: string): readonly [string, Poly] {
  const rates = new Map([...geometry.rates].map(([q, rate]) => [rate, q]));
  const names = new Set(ring.generators.flatMap((g) => (g.kind === 'jet' ? [g.field] : [g.name])));
  const relation = parseRelation(withoutDots(plainPassage(text, '--redefine')), {
    isSymbol: (name) => names.has(name) || rates.has(name),
    names: [...names, ...rates.keys()],
    allowJets: true,
  });
  const { subject } = relation;
  const form = 'write a field or a constant of the first theory on the left, as in phi = phi + psi';
  if (subject === undefined || !names.has(subject))
    throw fault(text, 'redefinition', 'the left side is no symbol', form);
  if (subject === geometry.lapse)
    throw fault(text, 'redefinition', `the lapse ${subject} is not redefined`, 'equations are compared for any lapse');
  const source = ring.generators.find((g) => g.kind === 'source' && g.exponents.has(subject));
  if (source || ring.generators.some((g) => g.kind === 'source' && g.name === subject))
    throw fault(
      text,
      'redefinition',
      `the density ${source?.name ?? subject} follows its own law`,
      'leave it as it is',
    );
  const beyond = relation.right
    .flatMap((t) => t.powers.map(([name]) => name))
    .find((name) => !ring.position.has(name) && !rates.has(name));
  if (beyond !== undefined)
    throw fault(text, 'redefinition', `${beyond} is of too high an order`, 'use lower derivatives');
  const wide = polyOfRates(ring, geometry, relation.right, rates);
  if (
    !isField(ring, subject) &&
    symbolsOf(wide).some((name) => ring.generators[ring.position.get(name)!]!.kind !== 'constant')
  )
    throw fault(text, 'redefinition', `${subject} is a constant`, 'replace it by constants');
  return [subject, wide];
}

/** The right side with H = ȧ/(aN). */
function polyOfRates(
  ring: Ring,
  { lapse }: Geometry,
  right: Parameters<typeof polyOfScalar>[1],
  rates: ReadonlyMap<string, string>,
): Poly {
  let total = zero(ring);
  for (const term of right) {
    let value = polyOfScalar(ring, [{ ...term, powers: term.powers.filter(([name]) => !rates.has(name)) }]);
    for (const [name, n] of term.powers) {
      const q = rates.get(name);
      if (q === undefined) continue;
      const rate = monomial(ring, rational(1), [
        [jetName(q, 1), n],
        [q, -n],
        [lapse, -n],
      ]);
      value = multiply(value, rate);
    }
    total = add(total, value);
  }
  return total;
}

/** Images of all jets that the ring has room for. */
function withJets(ring: Ring, images: ReadonlyMap<string, Poly>): ReadonlyMap<string, Poly> {
  const out = new Map(images);
  for (const [name, image] of images) {
    if (!isField(ring, name)) continue;
    let value = image;
    for (let n = 1; ring.position.has(jetName(name, n)); n++) {
      if (!canDifferentiate(value)) break;
      value = timeDerivative(value);
      out.set(jetName(name, n), value);
    }
  }
  return out;
}

const canDifferentiate = (p: Poly): boolean =>
  symbolsOf(p).every((name) => {
    const g = p.ring.position.get(name)!;
    return p.ring.generators[g]!.kind !== 'jet' || p.ring.next[g]! >= 0;
  });

function put(p: Poly, images: ReadonlyMap<string, Poly>, texts: string): Poly {
  try {
    return substitute(p, images);
  } catch (error) {
    if (!(error instanceof RangeError || error instanceof ExponentLimitError)) throw error;
    throw fault(texts, 'redefinition', `with it ${error.message}`, 'what is divided by must be replaced by one term');
  }
}

/** By cofactors: redefinitions are few. */
function determinant(ring: Ring, rows: readonly (readonly Poly[])[]): Poly {
  const [first, ...rest] = rows;
  if (!first) return constant(ring, 1);
  let total = zero(ring);
  first.forEach((entry, j) => {
    if (isZero(entry)) return;
    const minor = determinant(
      ring,
      rest.map((row) => row.filter((_, i) => i !== j)),
    );
    const term = multiply(entry, minor);
    total = j % 2 === 0 ? add(total, term) : subtract(total, term);
  });
  return total;
}

function fault(text: string, code: string, message: string, hint: string): InputError {
  return new InputError([
    errorAt({ file: '--redefine', source: text, start: 0, end: text.length }, code, message, hint),
  ]);
}
