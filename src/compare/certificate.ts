/**
 * Certificates: denominator · p = Σ cofactor · (n-th time derivative of an equation), an identity that is multiplied out
 * exactly. Imports what is known, factors.
 */
import { add, constant, equals, isZero, multiply, type Poly, power, scale, subtract, sum } from '../algebra/poly.js';
import type { Budget } from './budget.js';
import {
  divideOut,
  expandFactors,
  type Factor,
  type Factors,
  isUnit,
  joinFactors,
  lackingFactors,
  mergeFactors,
} from './factors.js';
import type { JetSpace } from './jet-space.js';
import type { Known, Step } from './known.js';

/** One term of the sum. */
export interface Cofactor {
  /** Name of the equation. */
  readonly name: string;
  /** The equation itself, before its derivative is taken. */
  readonly poly: Poly;
  /** Order of the time derivative of the equation. */
  readonly order: number;
  readonly value: Poly;
}

export interface Certificate {
  /** Factors that must not vanish; units are not among them. */
  readonly denominator: Factors;
  readonly cofactors: readonly Cofactor[];
}

type Sum = readonly Cofactor[];

/** Makes certificates; remembers those of intermediate polynomials. */
export class Certifier {
  private readonly space: JetSpace;
  private readonly budget: Budget;
  private readonly made = new Map<Known, Certificate>();

  constructor(space: JetSpace, budget: Budget) {
    this.space = space;
    this.budget = budget;
  }

  /**
   * The certificate of a polynomial whose reduction ended with zero: `steps` lead from p to 0.
   * @throws BoundError when it is too large to be multiplied out.
   */
  ofZero(steps: readonly Step[]): Certificate {
    const { scaled, rest } = this.follow(steps);
    return this.simplified({ denominator: mergeFactors(rest.denominator, scaled), cofactors: negated(rest.cofactors) });
  }

  /** Certificate of a known polynomial. */
  of(known: Known): Certificate {
    const before = this.made.get(known);
    if (before) return before;
    const made = this.make(known);
    this.made.set(known, made);
    return made;
  }

  private make(known: Known): Certificate {
    const { ring } = this.space;
    if (known.kind === 'given') {
      const { name, poly } = known;
      return { denominator: [], cofactors: [{ name, poly, order: 0, value: constant(ring, 1) }] };
    }
    if (known.kind === 'rate') return this.simplified(this.derivative(this.of(known.of)));
    // unit Δ · poly = S · base − Σ w q known.
    const { scaled, descended, rest } = this.follow(known.steps);
    const base = this.of(known.base);
    const denominator = joinFactors(base.denominator, rest.denominator);
    const inverse = power(known.unit, -1);
    const fromBase = this.times(
      base.cofactors,
      this.expand([...scaled, ...lackingFactors(base.denominator, denominator)]),
    );
    const fromRest = this.times(rest.cofactors, this.expand(lackingFactors(rest.denominator, denominator)));
    return this.simplified({
      denominator: mergeFactors(denominator, mergeFactors(descended, known.divided)),
      cofactors: this.times(this.collect([...fromBase, ...fromRest]), inverse),
    });
  }

  /** S = Π u, Δ = Π d and −Σ w q known as a certificate, from the steps of a pseudo-division. */
  private follow(steps: readonly Step[]): { scaled: Factors; descended: Factors; rest: Certificate } {
    let denominator: Factors = [];
    for (const step of steps)
      if (!isZero(step.q)) denominator = joinFactors(denominator, this.of(step.known).denominator);
    let descended: Factors = [];
    const later: Factors[] = [[]];
    for (let i = steps.length - 1; i > 0; i--) later.unshift(mergeFactors(steps[i]!.u, later[0]!));
    const parts: Cofactor[] = [];
    steps.forEach(({ q, known, d }, i) => {
      if (!isZero(q)) {
        const { denominator: own, cofactors } = this.of(known);
        const weight = this.expand([...later[i]!, ...descended, ...lackingFactors(own, denominator)]);
        parts.push(...this.times(cofactors, scale(this.budget.multiply(q, weight), -1)));
      }
      descended = mergeFactors(descended, d);
    });
    const scaled = steps.reduce<Factors>((all, { u }) => mergeFactors(all, u), []);
    return { scaled, descended, rest: { denominator, cofactors: this.collect(parts) } };
  }

  /** From D p = Σ c E: r D p' = Σ r (c' E + c E') − (r D'/D) Σ c E with r the product of the bases that move. */
  private derivative({ denominator, cofactors }: Certificate): Certificate {
    const { space } = this;
    const moving = denominator.filter(({ base }) => !isZero(space.rate(base)));
    const bases = moving.map(({ base }) => ({ base, power: 1 }));
    const r = this.expand(bases);
    const slope = sum(
      space.ring,
      moving.map(({ base, power: n }) =>
        scale(multiply(space.rate(base), this.expand(bases.filter((f) => f.base !== base))), n),
      ),
    );
    const own = cofactors.map((c) => ({
      ...c,
      value: subtract(this.product(r, space.rate(c.value)), this.product(slope, c.value)),
    }));
    const up = cofactors.map((c) => ({ ...c, order: c.order + 1, value: this.product(r, c.value) }));
    return { denominator: mergeFactors(denominator, bases), cofactors: this.collect([...own, ...up]) };
  }

  private product(a: Poly, b: Poly): Poly {
    return this.budget.multiply(a, b);
  }

  private expand(factors: Factors): Poly {
    return expandFactors(this.space, factors);
  }

  private times(cofactors: Sum, by: Poly): Sum {
    return cofactors.map((c) => ({ ...c, value: this.product(c.value, by) }));
  }

  private collect(parts: Sum): Sum {
    const out: Cofactor[] = [];
    for (const part of parts) {
      const at = out.findIndex((c) => c.name === part.name && c.order === part.order && equals(c.poly, part.poly));
      if (at < 0) out.push(part);
      else out[at] = { ...part, value: add(out[at]!.value, part.value) };
    }
    return out.filter((c) => !isZero(c.value));
  }

  /** Cancels factors of the denominator that divide every cofactor, and moves units into the cofactors. */
  private simplified({ denominator, cofactors }: Certificate): Certificate {
    let values = cofactors;
    const kept: Factor[] = [];
    for (const { base, power: n } of denominator) {
      let left = n;
      if (isUnit(this.space, base)) {
        values = this.times(values, power(base, -n));
        continue;
      }
      while (left > 0) {
        const quotients: Cofactor[] = [];
        for (const c of values) {
          const { rest, power: times } = divideOut(this.space, this.budget, c.value, base, 1);
          if (times === 0) break;
          quotients.push({ ...c, value: rest });
        }
        if (quotients.length < values.length) break;
        values = quotients;
        left--;
      }
      if (left > 0) kept.push({ base, power: left });
    }
    return { denominator: kept, cofactors: values };
  }
}

const negated = (cofactors: Sum): Sum => cofactors.map((c) => ({ ...c, value: scale(c.value, -1) }));

/** Whether denominator · p = Σ cofactor · equation^(order), everything multiplied out. */
export function certifies(space: JetSpace, { denominator, cofactors }: Certificate, p: Poly): boolean {
  const terms = cofactors.map(({ poly, order, value }) => {
    let derivative = poly;
    for (let n = 0; n < order; n++) derivative = space.rate(derivative);
    return multiply(value, derivative);
  });
  return equals(multiply(expandFactors(space, denominator), p), sum(space.ring, terms));
}
