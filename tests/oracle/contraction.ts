/**
 * Brute-force value of a Lagrangian: every assignment of 0..3 to every dummy index, straight from the definitions
 * R_ab = R^c_acb, R = η^ab R_ab, T_a = T^b_ab, A^a = ε^abcd T_bcd, ε_0123 = +1. Two enumerations: `dense` visits all
 * 4ⁿ assignments; `value` skips an assignment as soon as a factor vanishes and adds equal products once.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';
import { type Frame, levi, RANGE } from './geometry.js';
import { Jet } from './jet.js';

export type Head = 'R' | 'T' | 'A' | 'epsilon' | 'eta' | 'delta';

export interface Slot {
  readonly name: string;
  readonly up: boolean;
}

export interface Factor {
  readonly head: Head;
  readonly slots: readonly Slot[];
}

export interface LagrangianTerm {
  readonly coefficient: Q;
  /** Constants and scales in front, with exponents. */
  readonly symbols: readonly (readonly [name: string, exponent: number])[];
  readonly factors: readonly Factor[];
}

export type Lagrangian = readonly LagrangianTerm[];
export type Signature = '-+++' | '+---';

/** A non-vanishing component at the natural heights of its tensor: indices, and a jet or a plain integer. */
interface Entry {
  readonly indices: readonly number[];
  readonly jet: Jet | undefined;
  readonly sign: number;
}

/** Components of one tensor, with the heights its definition gives. */
interface Components {
  readonly up: readonly boolean[];
  readonly entries: readonly Entry[];
}

/** Everything that a Lagrangian can mention, on one frame. */
export class Contraction {
  private readonly tensors = new Map<string, Components>();
  /** Distinct component values up to sign: products are counted by prime factors before they are multiplied. */
  private readonly classes: Jet[] = [];
  private readonly classOf = new Map<Jet, readonly [index: number, sign: number]>();
  private readonly eta: readonly number[];
  private readonly one: Jet;

  constructor(frame: Frame, signature: Signature) {
    this.eta = signature === '-+++' ? [-1, 1, 1, 1] : [1, -1, -1, -1];
    const { torsion, curvature } = frame;
    this.one = Jet.number(frame.algebra, E.ONE, frame.volume.length);
    const nil = Jet.number(frame.algebra, E.ZERO, frame.volume.length);
    const total = (jets: readonly Jet[]): Jet => jets.reduce((x, y) => x.plus(y), nil);
    const ricci = RANGE.map((a) => RANGE.map((b) => total(RANGE.map((c) => curvature[c]![a]![c]![b]!))));
    const scalar = total(RANGE.map((a) => ricci[a]![a]!.scaled(E.q(this.eta[a]!))));
    const trace = RANGE.map((a) => total(RANGE.map((b) => torsion[b]![a]![b]!)));
    const raised = this.eta.reduce((x, y) => x * y, 1);
    const axial = RANGE.map((a) => {
      const terms: Jet[] = [];
      for (const b of RANGE)
        for (const c of RANGE)
          for (const d of RANGE) {
            const sign = levi(a, b, c, d) * raised * this.eta[b]!;
            if (sign !== 0) terms.push(torsion[b]![c]![d]!.scaled(E.q(sign)));
          }
      return total(terms);
    });
    this.define('R', [], () => scalar);
    this.define('R', [false, false], (a, b) => ricci[a!]![b!]!);
    this.define('R', [true, false, false, false], (a, b, c, d) => curvature[a!]![b!]![c!]![d!]!);
    this.define('T', [false], (a) => trace[a!]!);
    this.define('T', [true, false, false], (a, b, c) => torsion[a!]![b!]![c!]!);
    this.define('A', [true], (a) => axial[a!]!);
    this.define('epsilon', [false, false, false, false], (...i) => levi(...i));
    this.define('eta', [false, false], (a, b) => (a === b ? this.eta[a!]! : 0));
    this.define('delta', [true, false], (a, b) => (a === b ? 1 : 0));
  }

  private define(head: Head, up: readonly boolean[], at: (...indices: readonly number[]) => Jet | number): void {
    const entries: Entry[] = [];
    for (let code = 0; code < 4 ** up.length; code++) {
      const indices = up.map((_, i) => Math.floor(code / 4 ** i) % 4);
      const x = at(...indices);
      if (typeof x === 'number') {
        if (x !== 0) entries.push({ indices, jet: undefined, sign: x });
      } else if (!x.isZero()) {
        const [index, sign] = this.classify(x);
        entries.push({ indices, jet: this.classes[index]!, sign });
      }
    }
    this.tensors.set(`${head}/${up.length}`, { up, entries });
  }

  private classify(x: Jet): readonly [number, number] {
    const known = this.classOf.get(x);
    if (known !== undefined) return known;
    let found: readonly [number, number] | undefined;
    for (let i = 0; i < this.classes.length && found === undefined; i++) {
      if (this.classes[i]!.equals(x)) found = [i, 1];
      else if (this.classes[i]!.equals(x.negated())) found = [i, -1];
    }
    if (found === undefined) found = [this.classes.push(x) - 1, 1];
    this.classOf.set(x, found);
    return found;
  }

  private components({ head, slots }: Factor): Components {
    const found = this.tensors.get(`${head}/${slots.length}`);
    if (found === undefined) throw new Error(`${head} with ${slots.length} indices is not a tensor`);
    return found;
  }

  /** A component at given heights, 0 when it vanishes: for looking at single components. */
  component(head: Head, slots: readonly (readonly [index: number, up: boolean])[]): Jet {
    const { up, entries } = this.components({ head, slots: slots.map(([, u]) => ({ name: '', up: u })) });
    const entry = entries.find((e) => e.indices.every((x, i) => x === slots[i]![0]));
    if (entry === undefined) return this.one.scaled(E.ZERO);
    let sign = entry.sign;
    slots.forEach(([x, u], i) => {
      if (u !== up[i]) sign *= this.eta[x]!;
    });
    return (entry.jet ?? this.one).scaled(E.q(sign));
  }

  /** The product of factors, fully contracted. */
  value(factors: readonly Factor[]): Jet {
    const counts = new Map<number, number>();
    const pending = [...factors];
    const order: Factor[] = [];
    const seen = new Set<string>();
    while (pending.length > 0) {
      const shared = (f: Factor): number => f.slots.filter((s) => seen.has(s.name)).length / (f.slots.length + 0.1);
      const best = pending.reduce((x, y) => (shared(y) > shared(x) ? y : x));
      order.push(...pending.splice(pending.indexOf(best), 1));
      for (const s of best.slots) seen.add(s.name);
    }
    const bound = new Map<string, number>();
    const visit = (depth: number, key: number, sign: number): void => {
      const factor = order[depth];
      if (factor === undefined) {
        if (!Number.isSafeInteger(key)) throw new Error('too many factors for counting by primes');
        counts.set(key, (counts.get(key) ?? 0) + sign);
        return;
      }
      const { up, entries } = this.components(factor);
      for (const entry of entries) {
        const fresh: string[] = [];
        let weight = entry.sign * sign;
        let fits = true;
        for (let i = 0; i < factor.slots.length && fits; i++) {
          const slot = factor.slots[i]!;
          const x = entry.indices[i]!;
          const fixed = bound.get(slot.name);
          if (fixed === undefined) {
            bound.set(slot.name, x);
            fresh.push(slot.name);
          } else if (fixed !== x) fits = false;
          if (slot.up !== up[i]) weight *= this.eta[x]!;
        }
        if (fits) visit(depth + 1, entry.jet === undefined ? key : key * this.prime(entry.jet), weight);
        for (const name of fresh) bound.delete(name);
      }
    };
    visit(0, 1, 1);
    let out = this.one.scaled(E.ZERO);
    for (const [key, count] of counts) {
      if (count === 0) continue;
      let rest = key;
      let product = this.one.scaled(E.q(count));
      this.classes.forEach((jet, i) => {
        for (const p = primeAt(i); rest % p === 0; rest /= p) product = product.times(jet);
      });
      out = out.plus(product);
    }
    return out;
  }

  private prime(jet: Jet): number {
    return primeAt(this.classOf.get(jet)![0]);
  }

  /** The same by all 4ⁿ assignments, without any pruning or counting: slow, for checking `value`. */
  dense(factors: readonly Factor[]): Jet {
    const names = [...new Set(factors.flatMap((f) => f.slots.map((s) => s.name)))];
    let out = this.one.scaled(E.ZERO);
    for (let code = 0; code < 4 ** names.length; code++) {
      const at = new Map(names.map((name, i) => [name, Math.floor(code / 4 ** i) % 4] as const));
      const jets = factors.map((f) =>
        this.component(
          f.head,
          f.slots.map((s) => [at.get(s.name)!, s.up] as const),
        ),
      );
      if (jets.every((jet) => !jet.isZero())) out = out.plus(jets.reduce((x, y) => x.times(y), this.one));
    }
    return out;
  }

  /** Σ coefficient · symbols · contraction, without the volume. */
  lagrangian(lagrangian: Lagrangian, constants: Readonly<Record<string, Q>>): Jet {
    let out = this.one.scaled(E.ZERO);
    for (const term of lagrangian) {
      let front = term.coefficient;
      for (const [name, exponent] of term.symbols) {
        const x = constants[name];
        if (x === undefined) throw new Error(`the point has no value for ${name}`);
        front = E.mul(front, E.pow(x, exponent));
      }
      out = out.plus(this.value(term.factors).scaled(front));
    }
    return out;
  }
}

const PRIMES: number[] = [2];

function primeAt(i: number): number {
  for (let n = PRIMES.at(-1)! + 1; PRIMES.length <= i; n++) if (PRIMES.every((p) => n % p !== 0)) PRIMES.push(n);
  return PRIMES[i]!;
}
