/**
 * Reproducible random numbers and jet points, with small numerators and denominators, biased to 0, ±1.
 * UNTWIST_RUNS multiplies every count, UNTWIST_SEED moves every seed.
 */

import type { Q } from './exact.js';
import * as E from './exact.js';
import { FIELDS, type GeometryName, type Point } from './geometry.js';

export class Random {
  private state: number;

  constructor(readonly seed: number) {
    this.state = (seed ^ 0x9e3779b9) >>> 0;
  }

  /** An integer from 0 to n − 1. */
  below(n: number): number {
    // A Weyl sequence scrambled by two multiply-xorshift rounds.
    this.state = (this.state + 0x6d2b79f5) >>> 0;
    let x = this.state;
    x = Math.imul(x ^ (x >>> 15), x | 1);
    x ^= x + Math.imul(x ^ (x >>> 7), x | 61);
    return ((x ^ (x >>> 14)) >>> 0) % n;
  }

  chance(percent: number): boolean {
    return this.below(100) < percent;
  }

  pick<X>(from: readonly X[]): X {
    return from[this.below(from.length)]!;
  }

  shuffled<X>(from: readonly X[]): X[] {
    const out = [...from];
    for (let i = out.length - 1; i > 0; i--) {
      const j = this.below(i + 1);
      [out[i], out[j]] = [out[j]!, out[i]!];
    }
    return out;
  }

  /** A rational; never 0 when `nonZero`. */
  rational(nonZero = false): Q {
    const n = this.chance(15) ? this.pick([0, 1, -1]) : this.below(19) - 9;
    return n === 0 && nonZero ? this.rational(true) : E.q(n, this.pick([1, 1, 2, 3, 5]));
  }

  positive(): Q {
    return E.q(1 + this.below(9), this.pick([1, 2, 3]));
  }

  /** A jet point with `derivatives` derivatives of every field; N and scale factors positive; k of either sign or 0. */
  point(geometry: GeometryName, constants: readonly string[], derivatives = 2): Point {
    const fields: Record<string, Q[]> = {};
    for (const name of FIELDS[geometry]) {
      const head = name === 'N' || name === 'a' || name.startsWith('a_') ? this.positive() : this.rational();
      fields[name] = [head, ...Array.from({ length: derivatives }, () => this.rational())];
    }
    const values: Record<string, Q> = {};
    for (const name of constants) values[name] = this.rational(true);
    return { k: geometry === 'flrw' ? this.rational() : E.ZERO, fields, constants: values };
  }
}

/** How often a property is tried: `count` times UNTWIST_RUNS. */
export function runs(count: number): number {
  return Math.max(1, Math.round(count * Number(process.env.UNTWIST_RUNS ?? 1)));
}

/** First seed of a property. */
export function firstSeed(own: number): number {
  return own + Number(process.env.UNTWIST_SEED ?? 0);
}

/** A point as text for a failure message. */
export function showPoint(point: Point): string {
  const fields = Object.entries(point.fields).map(([name, jet]) => `${name}: [${jet.map(E.show).join(', ')}]`);
  const constants = Object.entries(point.constants).map(([name, x]) => `${name} = ${E.show(x)}`);
  return [`k = ${E.show(point.k)}`, ...fields, ...constants].join('; ');
}
