/**
 * Roots of the stationary equation of an auxiliary field, of degree up to three. A root is a fraction, or a fraction in a new
 * generator r that is bound by an equation: a square root, or the root of a cubic. Each is substituted into the equation and
 * must make it zero exactly. Packages may propose factors; whether they are factors is for the kernel to say.
 */
import { moveTo } from '../algebra/collect.js';
import {
  divideFraction,
  type Factor,
  type Fraction,
  fraction,
  multiplyFraction,
  negateFraction,
} from '../algebra/fraction.js';
import {
  constant,
  generator,
  isZero,
  multiply,
  negate,
  type Poly,
  power,
  scale,
  subtract,
  sum,
  zero,
} from '../algebra/poly.js';
import { rational } from '../algebra/rational.js';
import { makeRing, type Ring } from '../algebra/ring.js';
import { squareRoot } from '../algebra/square-root.js';
import {
  insertInto,
  isZeroFraction,
  productOf,
  type Root,
  ringOf,
  scaleFraction,
  sumFractions,
  termsIn,
} from './vector-form.js';

/** Proposes factors of a polynomial; undefined when nobody knows any. */
export type Splitter = (p: Poly) => Promise<readonly Factor[] | undefined>;

/** One branch, or two that differ by the sign of r only. */
export interface StationaryRoot {
  /** In `ring`. */
  readonly value: Fraction;
  /** The ring of the equation, or one with the generator r besides. */
  readonly ring: Ring;
  readonly root: Root | undefined;
  /** Real where this is not negative; undefined for roots that are always real. */
  readonly radicand: Poly | undefined;
  /** Depressed cubic y³ + p y + w = 0 of r = y − shift, for its closed formula. */
  readonly cubic: { readonly shift: Fraction; readonly p: Fraction; readonly w: Fraction } | undefined;
}

/** Name of the generator of the n-th root; no user can spell it. */
export const rootName = (n: number): string => `root(${n})`;

/** f with powers of a root lowered by its equation; r must not be in a denominator. */
export function reduced(f: Fraction, root: Root): Fraction {
  const degree = root.coefficients.length - 1;
  const top = root.coefficients[degree]!;
  let current = f;
  for (;;) {
    const terms = termsIn(current, [root.name]);
    if (!terms) throw new Error(`${root.name} in a denominator`);
    const ring = ringOf(current);
    const high = terms.filter((t) => (t.powers.get(root.name) ?? 0) >= degree);
    if (high.length === 0) return current;
    const parts = terms.map(({ powers, coefficient }) => {
      const n = powers.get(root.name) ?? 0;
      if (n < degree) return multiplyFraction(coefficient, productOf(ring, powers));
      const lower = root.coefficients.slice(0, degree).map((c, i) => {
        const rest = productOf(ring, new Map([[root.name, n - degree + i]]));
        return multiplyFraction(negateFraction(divideFraction(c, top)), rest);
      });
      return multiplyFraction(coefficient, sumFractions(ring, lower));
    });
    current = sumFractions(ring, parts);
  }
}

/** Σ equation[i] x^i with x inserted, in the ring of x. */
function valueAt(equation: readonly Poly[], x: StationaryRoot): Fraction {
  const { ring } = x;
  const name = 'x';
  const wide = makeRing([...ring.generators, { kind: 'constant', name }]);
  const poly = sum(
    wide,
    equation.map((c, i) => multiply(moveTo(c, wide), generator(wide, name, i))),
  );
  const value = insertInto(poly, new Map([[name, x.value]]), ring);
  return x.root ? reduced(value, x.root) : value;
}

const withRoot = (ring: Ring, name: string): Ring => makeRing([...ring.generators, { kind: 'constant', name }]);

/** p as a fraction in another ring. */
const fractionIn = (p: Poly, ring: Ring): Fraction => fraction(moveTo(p, ring));

/** Roots of a polynomial of first degree: b x + c. */
const linear = (b: Poly, c: Poly): StationaryRoot => ({
  value: fraction(negate(c), [{ base: b, power: 1 }]),
  ring: b.ring,
  root: undefined,
  radicand: undefined,
  cubic: undefined,
});

/** Roots of a x² + b x + c, the one with + in front of the square root first. */
function quadratic(a: Poly, b: Poly, c: Poly, name: string): StationaryRoot[] {
  const own = a.ring;
  const discriminant = subtract(multiply(b, b), scale(multiply(a, c), 4));
  const { root, radicand } = squareRoot(discriminant);
  const half = { base: scale(a, 2), power: 1 };
  if (isZero(discriminant)) return [{ ...linear(scale(a, 2), b) }];
  const isOne = radicand.size === 1 && isZero(subtract(radicand, constant(own, 1)));
  if (isOne)
    return [1, -1].map((sign) => ({
      ...linear(a, a),
      value: fraction(sum(own, [negate(b), scale(root, sign)]), [half]),
    }));
  const ring = withRoot(own, name);
  const bound: Root = {
    name,
    coefficients: [fractionIn(negate(radicand), ring), fraction(zero(ring)), fraction(constant(ring, 1))],
  };
  const inRing = { base: moveTo(half.base, ring), power: 1 };
  return [1, -1].map((sign) => ({
    value: fraction(
      sum(ring, [moveTo(negate(b), ring), scale(multiply(moveTo(root, ring), generator(ring, name)), sign)]),
      [inRing],
    ),
    ring,
    root: bound,
    radicand,
    cubic: undefined,
  }));
}

/** The root r of a cubic that nobody split, with its closed formula. */
function cubic(equation: readonly Poly[], name: string): StationaryRoot {
  const [d, c, b, a] = equation as [Poly, Poly, Poly, Poly];
  const ring = withRoot(a.ring, name);
  const at = (p: Poly): Fraction => fractionIn(p, a.ring);
  const over = (p: Poly): Fraction => divideFraction(at(p), at(a));
  const shift = scaleFraction(over(b), rational(1, 3));
  const square = multiplyFraction(shift, shift);
  // x = y − b/3a turns x³ + B x² + C x + D into y³ + p y + w.
  const p = sumFractions(a.ring, [over(c), scaleFraction(square, rational(-3))]);
  const w = sumFractions(a.ring, [
    scaleFraction(multiplyFraction(square, shift), rational(2)),
    negateFraction(multiplyFraction(over(c), shift)),
    over(d),
  ]);
  verifyCardano();
  verifyDepressed(equation, shift, p, w);
  return {
    value: fraction(generator(ring, name)),
    ring,
    root: { name, coefficients: equation.map((e) => fractionIn(e, ring)) },
    radicand: undefined,
    cubic: { shift, p, w },
  };
}

/** a [(x + shift)³ + p (x + shift) + w] is the cubic. */
function verifyDepressed(equation: readonly Poly[], shift: Fraction, p: Fraction, w: Fraction): void {
  const ring = withRoot(ringOf(shift), 'x');
  const lift = (f: Fraction): Fraction =>
    fraction(
      moveTo(f.numerator, ring),
      f.denominator.map(({ base, power: n }) => ({ base: moveTo(base, ring), power: n })),
    );
  const y = sumFractions(ring, [fraction(generator(ring, 'x')), lift(shift)]);
  const cube = multiplyFraction(y, multiplyFraction(y, y));
  const depressed = sumFractions(ring, [cube, multiplyFraction(lift(p), y), lift(w)]);
  const whole = sum(
    ring,
    equation.map((c, i) => multiply(moveTo(c, ring), generator(ring, 'x', i))),
  );
  const difference = sumFractions(ring, [
    fraction(whole),
    negateFraction(multiplyFraction(fractionIn(equation[3]!, ring), depressed)),
  ]);
  if (!isZeroFraction(difference)) throw new Error('a depressed cubic is not the cubic');
}

let cardanoHolds = false;

/**
 * y = s + t solves y³ + p y + w = 0 when s³ + t³ = −w and 3 s t = −p, for which s³ and t³ are −w/2 ± √(w²/4 + p³/27): tested
 * once as identities of polynomials.
 */
function verifyCardano(): void {
  if (cardanoHolds) return;
  const ring = makeRing(['s', 't'].map((name) => ({ kind: 'constant' as const, name })));
  const [s, t] = [generator(ring, 's'), generator(ring, 't')];
  const y = sum(ring, [s, t]);
  const p = scale(multiply(s, t), -3);
  const w = negate(sum(ring, [power(s, 3), power(t, 3)]));
  const value = sum(ring, [power(y, 3), multiply(p, y), w]);
  const half = sum(ring, [power(s, 3), scale(w, rational(1, 2))]);
  const radicand = sum(ring, [scale(multiply(w, w), rational(1, 4)), scale(power(p, 3), rational(1, 27))]);
  if (!isZero(value) || !isZero(subtract(multiply(half, half), radicand))) throw new Error('the cubic formula fails');
  cardanoHolds = true;
}

/**
 * The roots of Σ equation[i] x^i = 0, of degree one to three, each once.
 * @param name of the generator for a root that is no fraction.
 * @throws Error when a root does not solve the equation: the program would be wrong.
 */
export async function rootsOf(equation: readonly Poly[], name: string, split?: Splitter): Promise<StationaryRoot[]> {
  const found = await candidates(equation, name, split);
  for (const root of found)
    if (!isZeroFraction(valueAt(equation, root))) throw new Error('a root does not solve its equation');
  return found;
}

async function candidates(equation: readonly Poly[], name: string, split?: Splitter): Promise<StationaryRoot[]> {
  const [first] = equation;
  const { ring } = first!;
  const lowest = equation.findIndex((c) => !isZero(c));
  if (lowest > 0)
    return [linear(constant(ring, 1), zero(ring)), ...(await candidates(equation.slice(lowest), name, split))];
  const degree = equation.findLastIndex((c) => !isZero(c));
  const [d, c, b] = equation as [Poly, Poly, Poly];
  if (degree === 0) return [];
  if (degree === 1) return [linear(c, d)];
  if (degree === 2) return quadratic(b, c, d, name);
  return (split && (await splitCubic(equation.slice(0, 4), name, split))) ?? [cubic(equation.slice(0, 4), name)];
}

/** A cubic taken apart by factors that were proposed and multiplied out. */
async function splitCubic(
  equation: readonly Poly[],
  name: string,
  split: Splitter,
): Promise<StationaryRoot[] | undefined> {
  const { ring } = equation[0]!;
  const x = 'x';
  const wide = withRoot(ring, x);
  const whole = sum(
    wide,
    equation.map((c, i) => multiply(moveTo(c, wide), generator(wide, x, i))),
  );
  const factors = (await split(whole)) ?? [];
  const parts = factors.map(({ base }) => {
    const terms = termsIn(fraction(base), [x])!;
    const degree = Math.max(...terms.map((t) => t.powers.get(x) ?? 0));
    return Array.from({ length: degree + 1 }, (_, i) => {
      const term = terms.find((t) => (t.powers.get(x) ?? 0) === i);
      return term ? moveTo(term.coefficient.numerator, ring) : zero(ring);
    });
  });
  if (parts.every((p) => p.length === 1 || p.length === 4)) return undefined;
  const roots: StationaryRoot[] = [];
  for (const part of parts) if (part.length > 1) roots.push(...(await candidates(part, name)));
  return roots;
}
