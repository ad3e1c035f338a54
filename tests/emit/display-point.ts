/**
 * Exact points at which a displayed expression and the ring expression behind it can be compared: every displayed field
 * is a random Taylor polynomial of time, and rates, jets and the original fields follow by arithmetic of truncated series,
 * which shares nothing with the kernel's chain rule.
 */
import { type Poly, termsOf } from '../../src/algebra/poly.js';
import {
  addRational,
  divideRational,
  multiplyRational,
  negateRational,
  ONE,
  type Rational,
  rational,
  ZERO,
} from '../../src/algebra/rational.js';
import { jetName } from '../../src/algebra/ring.js';
import type { Derivation } from '../../src/derivation.js';
import type { Viewer } from '../../src/emit/display.js';

type Series = readonly Rational[];
const ORDER = 8;

const times = (x: Series, y: Series): Series =>
  Array.from({ length: Math.min(x.length, y.length) }, (_, n) =>
    x.slice(0, n + 1).reduce((s, c, i) => addRational(s, multiplyRational(c, y[n - i]!)), ZERO),
  );
const plus = (x: Series, y: Series): Series =>
  Array.from({ length: Math.min(x.length, y.length) }, (_, n) => addRational(x[n]!, y[n]!));
const inverse = (x: Series): Series => {
  const out: Rational[] = [divideRational(ONE, x[0]!)];
  for (let n = 1; n < x.length; n++) {
    const s = out.reduce((acc, c, i) => addRational(acc, multiplyRational(c, x[n - i]!)), ZERO);
    out.push(negateRational(multiplyRational(s, out[0]!)));
  }
  return out;
};
const rate = (x: Series): Series => x.slice(1).map((c, n) => multiplyRational(c, rational(n + 1)));
const factorial = (n: number): Rational =>
  rational(Array.from({ length: n }, (_, i) => i + 1).reduce((a, b) => a * b, 1));

function raise(x: Series, n: number): Series {
  const base = n < 0 ? inverse(x) : x;
  let out: Series = [ONE, ...Array.from({ length: x.length - 1 }, () => ZERO)];
  for (let i = 0; i < Math.abs(n); i++) out = times(out, base);
  return out;
}

export interface DisplayPoint {
  /** By generator of the derivation's ring. */
  readonly ring: ReadonlyMap<string, Rational>;
  /** By generator of the display. */
  readonly display: ReadonlyMap<string, Rational>;
}

/** A point of that seed. */
export function displayPoint(derivation: Derivation, viewer: Viewer, seed: number): DisplayPoint {
  let state = seed;
  const random = (): Rational => {
    state = (state * 1103515245 + 12345) % 2147483648;
    return rational((state % 19) - 9 || 7, 1 + ((state >> 8) % 5));
  };
  const { geometry, ring } = derivation;
  const series = new Map<string, Series>();
  for (const { name } of viewer.fields)
    series.set(
      name,
      Array.from({ length: ORDER + 1 }, (_, n) => (name === geometry.lapse ? (n === 0 ? ONE : ZERO) : random())),
    );
  const constants = new Map<string, Rational>();
  for (const g of ring.generators) if (g.kind !== 'jet') constants.set(g.name, random());
  const atSeries = (p: Poly): Series => {
    let total: Series = Array.from({ length: ORDER + 1 }, () => ZERO);
    for (const { coefficient, exponents } of termsOf(p)) {
      let term: Series = [coefficient, ...Array.from({ length: ORDER }, () => ZERO)];
      for (const [g, e] of exponents) {
        const generator = p.ring.generators[g]!;
        if (generator.kind !== 'jet') throw new Error(`a constant in the image of a field: ${generator.name}`);
        let value = series.get(generator.field)!;
        for (let n = 0; n < generator.order; n++) value = rate(value);
        term = times(term, raise(value, e));
      }
      total = plus(total, term);
    }
    return total;
  };
  for (const [name, image] of viewer.variables?.images ?? []) series.set(name, atSeries(image));
  const jets = (target: Map<string, Rational>, name: string, x: Series): void => {
    x.forEach((c, n) => {
      target.set(jetName(name, n), multiplyRational(c, factorial(n)));
    });
  };
  const inRing = new Map(constants);
  for (const { name } of geometry.fields) jets(inRing, name, series.get(name)!);
  const display = new Map(constants);
  for (const { name } of viewer.fields) {
    const x = series.get(name)!;
    if (!geometry.rates.has(name)) jets(display, name, x);
    else {
      display.set(name, x[0]!);
      jets(display, `rate of ${name}`, times(rate(x), inverse(x)));
    }
  }
  return { ring: inRing, display };
}
