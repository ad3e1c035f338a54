/**
 * What a person reads instead of an exact ring expression: cosmic time (N = 1), rates H instead of ȧ/a, an overall power of
 * the scale factor divided out, terms grouped by their monomial in fields with the couplings as coefficient, in the order
 * of display-order.ts. Shared by LaTeX, report and terminal; JSON and code do not use it.
 * Invariant: (divided factors) · Σ content · common · (bracket) · monomial equals the expression at N = 1.
 */
import { timeDerivative } from '../algebra/calculus.js';
import { collect, substitute } from '../algebra/collect.js';
import { add, constant, generator, multiply, type Poly, monomial as ringMonomial, termsOf } from '../algebra/poly.js';
import { gcd, type Rational, rational } from '../algebra/rational.js';
import { constantsOf, exponentAt, jetName, jetsOf, makeRing, type Ring } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import type { AlternativeVariables, GeometrySymbol } from '../geometry/geometry.js';
import { compareBracketTerms, compareMonomials, inReadingOrder } from './display-order.js';
import { type DisplaySymbol, MAX_ORDER, type SymbolTable, symbolTable } from './display-symbols.js';
import type { BracketTerm, DisplaySum, DisplayTerm, Factor } from './display-terms.js';

export type { BracketTerm, DisplaySum, DisplayTerm, Factor } from './display-terms.js';

export interface ViewOptions {
  /** Whether overall powers of the scale factors are divided out; by default they are. */
  readonly divide?: boolean;
}

/** Turns expressions of one derivation into sums for display, in the variables that were asked for. */
export interface Viewer {
  /** Fields as displayed, the lapse included. */
  readonly fields: readonly GeometrySymbol[];
  /** The alternative variables; undefined for those of the geometry. */
  readonly variables: AlternativeVariables | undefined;
  readonly symbols: SymbolTable;
  /** A polynomial over the jets of the geometry's fields, in any ring with their names. */
  sum(p: Poly, options?: ViewOptions): DisplaySum;
  /** A field of the geometry, and what it is in the variables displayed. */
  readonly replaced: ReadonlyMap<string, DisplaySum>;
}

/** Generator of a rate's jets; no name of a user can be spelled so. */
export const rateField = (scale: string): string => `rate of ${scale}`;

/**
 * A viewer of a derivation.
 * @param key variables such as `u,v`, as listed in the geometry; the geometry's own when left out.
 * @throws RangeError for variables that the geometry does not offer.
 */
export function viewerOf(derivation: Derivation, key?: string): Viewer {
  const { geometry } = derivation;
  const own = geometry.fields.filter((f) => !geometry.rates.has(f.name) && f.name !== geometry.lapse);
  const normal = key?.replace(/\s+/g, '');
  const isOwn = normal === undefined || normal === own.map((f) => f.name).join(',');
  const variables = isOwn ? undefined : geometry.variables.find((v) => v.key === normal);
  if (!isOwn && variables === undefined) {
    const offered = [own.map((f) => f.name).join(','), ...geometry.variables.map((v) => v.key)];
    throw new RangeError(`no variables ${JSON.stringify(key)} in this geometry; it offers ${offered.join(' and ')}`);
  }
  const further = derivation.fields.filter((f) => !geometry.fields.some((g) => g.name === f.name));
  const fields = [...(variables?.fields ?? geometry.fields), ...further];
  const ring = displayRing(derivation, fields);
  const images = imagesIn(ring, derivation, variables);
  const symbols = symbolTable(derivation, fields, rateField);
  const sum = (p: Poly, options: ViewOptions = {}): DisplaySum =>
    sumOf(substitute(p, images, ring), symbols, options.divide ?? true);
  const replaced = new Map(
    [...(variables?.images.keys() ?? [])].map((name) => [name, sumOf(images.get(name)!, symbols, false)]),
  );
  return { fields, variables, symbols, sum, replaced };
}

/** Rates and their jets, jets of the other fields, then everything without a time derivative of its own. */
function displayRing({ ring, geometry }: Derivation, fields: readonly GeometrySymbol[]): Ring {
  const scales = fields.filter((f) => geometry.rates.has(f.name)).map((f) => f.name);
  const others = fields.filter((f) => !geometry.rates.has(f.name) && f.name !== geometry.lapse).map((f) => f.name);
  const still = ring.generators.filter((g) => g.kind !== 'jet').map((g) => g.name);
  return makeRing([
    ...scales.flatMap((name) => jetsOf(rateField(name), MAX_ORDER)),
    ...others.flatMap((name) => jetsOf(name, MAX_ORDER)),
    ...constantsOf([...scales, ...still]),
  ]);
}

/** What each jet of the geometry's fields becomes in the display ring. */
function imagesIn(ring: Ring, derivation: Derivation, variables: AlternativeVariables | undefined): Map<string, Poly> {
  const { geometry } = derivation;
  const images = new Map<string, Poly>();
  for (let n = 0; n <= MAX_ORDER; n++) images.set(jetName(geometry.lapse, n), constant(ring, n === 0 ? 1 : 0));
  for (const scale of geometry.rates.keys()) {
    const h = generator(ring, rateField(scale));
    let logarithmic = h;
    // D(a,n+1)/a = d/dt (D(a,n)/a) + H D(a,n)/a.
    for (let n = 1; n < MAX_ORDER; n++) {
      images.set(jetName(scale, n), multiply(generator(ring, scale), logarithmic));
      logarithmic = add(timeDerivative(logarithmic), multiply(h, logarithmic));
    }
  }
  if (!variables) return images;
  const cosmic = new Map([[geometry.lapse, constant(variables.ring, 1)]]);
  for (const [name, image] of variables.images) {
    let derivative = substitute(image, cosmic);
    for (let n = 0; ; n++) {
      images.set(jetName(name, n), substitute(derivative, images, ring));
      if (!derivation.ring.position.has(jetName(name, n + 1))) break;
      derivative = timeDerivative(derivative);
    }
  }
  return images;
}

/** Groups, orders and factors a polynomial of any ring whose generators the table knows. */
export function sumOf(p: Poly, symbols: SymbolTable, divide: boolean): DisplaySum {
  const { ring } = p;
  const divided = divide ? overallScale(p, symbols) : [];
  const rest = multiply(
    p,
    ringMonomial(
      ring,
      rational(1),
      divided.map(({ symbol, exponent }) => [symbol.generator, -exponent] as const),
    ),
  );
  const symbolAt = ring.generators.map((g) => symbols.get(g.name));
  const isCoupling = (g: number): boolean => symbolAt[g]?.role === 'constant' || symbolAt[g]?.role === 'scale';
  const terms = collect(rest, (g) => !isCoupling(g)).map(({ monomial, coefficient }): DisplayTerm => {
    const factors = monomial.map(([g, exponent]) => ({ symbol: symbolAt[g]!, exponent }));
    return { ...factored(coefficient, symbolAt), monomial: inReadingOrder(factors) };
  });
  return { divided, terms: terms.sort((a, b) => compareMonomials(a.monomial, b.monomial)) };
}

/**
 * The greatest power of each scale factor among the terms without matter: dividing by it leaves H², k/a² and ρ/a³ as
 * they are written in a text.
 */
function overallScale(p: Poly, symbols: SymbolTable): Factor[] {
  const { ring } = p;
  const densities = ring.generators.flatMap((g, i) => (symbols.get(g.name)?.role === 'density' ? [i] : []));
  const rows = Array.from({ length: p.size }, (_, i) => i * ring.words);
  const bare = rows.filter((row) => densities.every((g) => exponentAt(p.keys, row, g) === 0));
  const counted = bare.length > 0 ? bare : rows;
  if (counted.length === 0) return [];
  return ring.generators.flatMap((g, i) => {
    const symbol = symbols.get(g.name);
    if (symbol?.role !== 'length') return [];
    const exponent = Math.max(...counted.map((row) => exponentAt(p.keys, row, i)));
    return exponent === 0 ? [] : [{ symbol, exponent }];
  });
}

/** content · common · bracket of a non-zero polynomial in couplings. */
function factored(coefficient: Poly, symbolAt: readonly (DisplaySymbol | undefined)[]): Omit<DisplayTerm, 'monomial'> {
  const terms = termsOf(coefficient).map(({ coefficient: c, exponents }) => ({
    coefficient: c,
    factors: new Map(exponents.map(([g, e]) => [symbolAt[g]!, e] as const)),
  }));
  const common = new Map<DisplaySymbol, number>();
  for (const symbol of terms[0]!.factors.keys()) {
    const all = terms.map((t) => t.factors.get(symbol) ?? 0);
    const exponent = all.every((e) => e > 0) ? Math.min(...all) : all.every((e) => e < 0) ? Math.max(...all) : 0;
    if (exponent !== 0) common.set(symbol, exponent);
  }
  const reduced = terms.map(
    ({ coefficient: c, factors }): BracketTerm => ({
      coefficient: c,
      factors: inReadingOrder(
        [...factors]
          .map(([symbol, e]) => ({ symbol, exponent: e - (common.get(symbol) ?? 0) }))
          .filter(({ exponent }) => exponent !== 0),
      ),
    }),
  );
  reduced.sort(compareBracketTerms);
  const content = contentOf(reduced.map((t) => t.coefficient));
  const shared = inReadingOrder([...common].map(([symbol, exponent]) => ({ symbol, exponent })));
  if (reduced.length === 1) return { content, common: shared, bracket: [] };
  const bracket = reduced.map((t) => ({
    ...t,
    coefficient: rational(t.coefficient.num * content.den, t.coefficient.den * content.num),
  }));
  return { content, common: shared, bracket };
}

/** A common denominator beyond this would make the numbers in the bracket longer than the fractions it saves. */
const MAX_COMMON_DENOMINATOR = 1000n;

/**
 * The rational number that leaves coprime integers, the first of them positive; where the denominators have nothing
 * reasonable in common, only what numerators and denominators share, and fractions stay in the bracket.
 */
function contentOf(coefficients: readonly Rational[]): Rational {
  let num = 0n;
  let least = 1n;
  let shared = 0n;
  for (const c of coefficients) {
    num = gcd(num, c.num);
    least = (least / gcd(least, c.den)) * c.den;
    shared = gcd(shared, c.den);
  }
  const den = coefficients.length > 1 && least > MAX_COMMON_DENOMINATOR ? shared : least;
  return rational(coefficients[0]!.num < 0n ? -num : num, den);
}

/**
 * The same sum with the rational number that its terms share pulled out in front, the first term left positive:
 * 12 A1² − 12 A2² becomes 12 times (A1² − A2²).
 */
export function pulledOut(sum: DisplaySum): { readonly content: Rational; readonly terms: readonly DisplayTerm[] } {
  if (sum.terms.length === 0) return { content: rational(1), terms: [] };
  const content = contentOf(sum.terms.map((t) => t.content));
  const terms = sum.terms.map((t) => ({
    ...t,
    content: rational(t.content.num * content.den, t.content.den * content.num),
  }));
  return { content, terms };
}
