/**
 * Truncated Taylor series in t with first-order variations: Σ_n (x_n + y_n κ) tⁿ plus nilpotent parts ε_d Σ_n (…) tⁿ,
 * ε_d ε_e = 0, κ² = k. Products and quotients are exact in every retained coefficient, so a derivative of a jet
 * is exact without a symbol in sight. κ may be irrational or imaginary: only its square is used.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';

/** x + yκ. */
interface Surd {
  readonly x: Q;
  readonly y: Q;
}

type Series = readonly Surd[];

const NIL: Surd = { x: E.ZERO, y: E.ZERO };

/** The square of κ; jets of different algebras must not meet. */
export interface Algebra {
  readonly kSquared: Q;
}

export class Jet {
  private constructor(
    private readonly algebra: Algebra,
    private readonly value: Series,
    /** Variations by direction; a missing key is zero. */
    private readonly variations: ReadonlyMap<string, Series>,
  ) {}

  /** A number; `length` retained coefficients of t. */
  static number(algebra: Algebra, x: Q, length: number): Jet {
    return Jet.taylor(algebra, [x, ...Array<Q>(length - 1).fill(E.ZERO)]);
  }

  /** The root κ of k. */
  static kappa(algebra: Algebra, length: number): Jet {
    const value = Array<Surd>(length).fill(NIL);
    value[0] = { x: E.ZERO, y: E.ONE };
    return new Jet(algebra, value, new Map());
  }

  /** Series with the given coefficients of tⁿ (not derivatives), varied along `directions` by tᵐ/m!. */
  static taylor(
    algebra: Algebra,
    coefficients: readonly Q[],
    directions: ReadonlyMap<string, number> = new Map(),
  ): Jet {
    const variations = new Map<string, Series>();
    for (const [direction, m] of directions) {
      let factorial = 1;
      for (let j = 2; j <= m; j++) factorial *= j;
      const series = coefficients.map((_, n) => (n === m ? { x: E.q(1, factorial), y: E.ZERO } : NIL));
      variations.set(direction, series);
    }
    return new Jet(
      algebra,
      coefficients.map((x) => ({ x, y: E.ZERO })),
      variations,
    );
  }

  get length(): number {
    return this.value.length;
  }

  private constant(x: Q): Jet {
    return Jet.number(this.algebra, x, this.length);
  }

  private combine(other: Jet, value: Series, part: (mine: Series | undefined, its: Series | undefined) => Series): Jet {
    const variations = new Map<string, Series>();
    for (const d of new Set([...this.variations.keys(), ...other.variations.keys()])) {
      const series = part(this.variations.get(d), other.variations.get(d));
      if (series.some(nonZero)) variations.set(d, series);
    }
    return new Jet(this.algebra, value, variations);
  }

  plus(other: Jet): Jet {
    const length = Math.min(this.length, other.length);
    return this.combine(other, addSeries(this.value, other.value, length), (x, y) =>
      addSeries(x ?? [], y ?? [], length),
    );
  }

  times(other: Jet): Jet {
    const k = this.algebra.kSquared;
    return this.combine(other, mulSeries(this.value, other.value, k), (x, y) => {
      const first = x === undefined ? undefined : mulSeries(x, other.value, k);
      const second = y === undefined ? undefined : mulSeries(this.value, y, k);
      if (first === undefined || second === undefined) return (first ?? second)!;
      return addSeries(first, second, first.length);
    });
  }

  scaled(x: Q): Jet {
    const scale = (s: Surd): Surd => ({ x: E.mul(s.x, x), y: E.mul(s.y, x) });
    return new Jet(
      this.algebra,
      this.value.map(scale),
      new Map([...this.variations].map(([d, s]) => [d, s.map(scale)] as const)),
    );
  }

  negated(): Jet {
    return this.scaled(E.q(-1));
  }

  minus(other: Jet): Jet {
    return this.plus(other.negated());
  }

  /** 1/x; needs a value at t = 0 that is rational and not zero. */
  inverse(): Jet {
    const head = this.value[0]!;
    if (!E.isZero(head.y)) throw new RangeError('reciprocal of a number with κ in it');
    // Newton's step y → y(2 − xy) doubles the number of right coefficients; the first step also fixes the ε parts.
    let y = this.constant(E.div(E.ONE, head.x));
    const two = this.constant(E.q(2));
    for (let right = 1; right < 2 * this.length + 2; right *= 2) y = y.times(two.minus(this.times(y)));
    return y;
  }

  over(other: Jet): Jet {
    return this.times(other.inverse());
  }

  /** xⁿ for integer n. */
  power(n: number): Jet {
    if (n < 0) return this.inverse().power(-n);
    let y = this.constant(E.ONE);
    for (let j = 0; j < n; j++) y = y.times(this);
    return y;
  }

  /** (x/x₀)^r for rational r, x₀ the unvaried value at t = 0; from the differential equation x y' = r x' y. */
  relativePower(r: Q): Jet {
    const x = this.scaled(E.div(E.ONE, this.rationalAt(0)));
    const c = x.value.map((s) => s.x);
    const y: Q[] = [E.ONE];
    for (let n = 1; n < c.length; n++) {
      let total = E.ZERO;
      for (let j = 1; j <= n; j++)
        total = E.add(total, E.product(E.sub(E.mul(r, E.q(j)), E.q(n - j)), c[j]!, y[n - j]!));
      y.push(E.div(total, E.q(n)));
    }
    const plain = Jet.taylor(this.algebra, y);
    const logarithmic = x.over(Jet.taylor(this.algebra, c)).scaled(r);
    // x/x₀-series over itself is 1 + ε δx/x: scaled by r its ε part is the one of log y.
    return plain.times(logarithmic.plus(this.constant(E.sub(E.ONE, r))));
  }

  /** d/dt; one coefficient is lost. */
  rate(): Jet {
    const shift = (s: Series): Series =>
      s.slice(1).map((c, n) => ({ x: E.mul(c.x, E.q(n + 1)), y: E.mul(c.y, E.q(n + 1)) }));
    return new Jet(
      this.algebra,
      shift(this.value),
      new Map([...this.variations].map(([d, s]) => [d, shift(s)] as const)),
    );
  }

  isZero(): boolean {
    return !this.value.some(nonZero) && ![...this.variations.values()].some((s) => s.some(nonZero));
  }

  equals(other: Jet): boolean {
    return this.minus(other).isZero();
  }

  /** True when no odd power of κ survived, in any coefficient. */
  isRational(): boolean {
    const rational = (s: Series): boolean => s.every((c) => E.isZero(c.y));
    return rational(this.value) && [...this.variations.values()].every(rational);
  }

  /** n-th time derivative at t = 0; throws when κ is in it. */
  rationalAt(n: number): Q {
    return derivative(this.value, n);
  }

  /** All retained time derivatives at t = 0, from order 0 on. */
  derivatives(): Q[] {
    return this.value.map((_, n) => this.rationalAt(n));
  }

  /** n-th time derivative at t = 0 of the variation along a direction. */
  variationAt(direction: string, n: number): Q {
    const series = this.variations.get(direction);
    if (n >= this.length) throw new RangeError(`coefficient ${n} was truncated`);
    return series === undefined ? E.ZERO : derivative(series, n);
  }
}

function derivative(series: Series, n: number): Q {
  const c = series[n];
  if (c === undefined) throw new RangeError(`coefficient ${n} was truncated`);
  if (!E.isZero(c.y)) throw new RangeError('an odd power of κ survived');
  let x = c.x;
  for (let j = 2; j <= n; j++) x = E.mul(x, E.q(j));
  return x;
}

function nonZero(s: Surd): boolean {
  return !E.isZero(s.x) || !E.isZero(s.y);
}

function addSeries(a: Series, b: Series, length: number): Series {
  return Array.from({ length }, (_, n) => {
    const [p, r] = [a[n] ?? NIL, b[n] ?? NIL];
    return { x: E.add(p.x, r.x), y: E.add(p.y, r.y) };
  });
}

function mulSeries(a: Series, b: Series, k: Q): Series {
  const length = Math.min(a.length, b.length);
  const out: Surd[] = Array<Surd>(length).fill(NIL);
  for (let i = 0; i < length; i++) {
    const p = a[i]!;
    if (!nonZero(p)) continue;
    for (let j = 0; i + j < length; j++) {
      const r = b[j]!;
      if (!nonZero(r)) continue;
      const o = out[i + j]!;
      const x = E.add(E.mul(p.x, r.x), E.product(p.y, r.y, k));
      out[i + j] = { x: E.add(o.x, x), y: E.sum(o.y, E.mul(p.x, r.y), E.mul(p.y, r.x)) };
    }
  }
  return out;
}
