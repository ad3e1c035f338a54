/**
 * Laurent polynomials as a schoolbook would do them: a map from the written monomial to its coefficient, one rule at a
 * time, no packing, no common denominator. Slow on purpose; shares nothing with src/ but the values it is compared with.
 */
import { expect } from 'vitest';
import { isCanonical, monomial, type Poly, sum, termsOf } from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import type { Ring } from '../../src/algebra/ring.js';
import type { Q } from '../oracle/exact.js';
import * as E from '../oracle/exact.js';

/** Exponents by name; no zeros. */
export type Powers = Readonly<Record<string, number>>;
/** Coefficients by written monomial, `a^-2 x^1`; no zeros. */
export type Slow = ReadonlyMap<string, Q>;

const write = (powers: Powers): string =>
  Object.entries(powers)
    .filter(([, e]) => e !== 0)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, e]) => `${name}^${e}`)
    .join(' ');

const read = (text: string): Record<string, number> =>
  Object.fromEntries(
    text === ''
      ? []
      : text
          .split(' ')
          .map((word) => [word.slice(0, word.lastIndexOf('^')), Number(word.slice(word.lastIndexOf('^') + 1))]),
  );

export function slow(terms: Iterable<readonly [Powers, Q]>): Slow {
  const out = new Map<string, Q>();
  for (const [powers, c] of terms) {
    const key = write(powers);
    const total = E.add(out.get(key) ?? E.ZERO, c);
    if (E.isZero(total)) out.delete(key);
    else out.set(key, total);
  }
  return out;
}

export const termsOfSlow = (p: Slow): [Record<string, number>, Q][] => [...p].map(([key, c]) => [read(key), c]);
export const number = (c: Q): Slow => slow([[{}, c]]);
export const symbol = (name: string, e = 1): Slow => slow([[{ [name]: e }, E.ONE]]);
export const plus = (...ps: readonly Slow[]): Slow => slow(ps.flatMap(termsOfSlow));
export const times = (p: Slow, q: Slow): Slow =>
  slow(
    termsOfSlow(p).flatMap(([a, x]) =>
      termsOfSlow(q).map(([b, y]): [Powers, Q] => {
        const powers = { ...a };
        for (const [name, e] of Object.entries(b)) powers[name] = (powers[name] ?? 0) + e;
        return [powers, E.mul(x, y)];
      }),
    ),
  );
export const minus = (p: Slow, q: Slow): Slow => plus(p, times(number(E.q(-1)), q));

export function toThe(p: Slow, n: number): Slow {
  if (n < 0) {
    const [[powers, c]] = termsOfSlow(p) as [[Powers, Q]];
    return toThe(slow([[Object.fromEntries(Object.entries(powers).map(([k, e]) => [k, -e])), E.div(E.ONE, c)]]), -n);
  }
  return n === 0 ? number(E.ONE) : times(p, toThe(p, n - 1));
}

/** ∂/∂name, everything else held fixed. */
export const slope = (p: Slow, name: string): Slow =>
  slow(
    termsOfSlow(p).map(([powers, c]): [Powers, Q] => {
      const e = powers[name] ?? 0;
      return [{ ...powers, [name]: e - 1 }, E.mul(c, E.q(e))];
    }),
  );

/** A derivation given by its values on generators: Σ ∂p/∂x · rule(x). */
export const derive = (p: Slow, rules: Readonly<Record<string, Slow>>): Slow =>
  plus(...Object.entries(rules).map(([name, rate]) => times(slope(p, name), rate)));

/** Every pair of factors s replaced by k, one at a time. */
export function reduced(p: Slow, s: string, k: string): Slow {
  let rest = p;
  for (;;) {
    const wrong = termsOfSlow(rest).find(([powers]) => (powers[s] ?? 0) < 0 || (powers[s] ?? 0) > 1);
    if (!wrong) return rest;
    const [powers, c] = wrong;
    const step = powers[s]! < 0 ? -1 : 1;
    const better: Powers = { ...powers, [s]: powers[s]! - 2 * step, [k]: (powers[k] ?? 0) + step };
    rest = plus(minus(rest, slow([[powers, c]])), slow([[better, c]]));
  }
}

export const replace = (p: Slow, images: Readonly<Record<string, Slow>>): Slow =>
  plus(
    ...termsOfSlow(p).map(([powers, c]) =>
      Object.entries(powers).reduce((acc, [name, e]) => times(acc, toThe(images[name] ?? symbol(name), e)), number(c)),
    ),
  );

export const valueAt = (p: Slow, point: Readonly<Record<string, Q>>): Q =>
  E.sum(
    ...termsOfSlow(p).map(([powers, c]) =>
      E.mul(c, E.product(...Object.entries(powers).map(([name, e]) => E.pow(point[name]!, e)))),
    ),
  );

export const toRational = (x: Q) => rational(x.n, x.d);

/** The kernel's own value, term by term. */
export const toKernel = (ring: Ring, p: Slow): Poly =>
  sum(
    ring,
    termsOfSlow(p).map(([powers, c]) => monomial(ring, toRational(c), Object.entries(powers))),
  );

export const fromKernel = (p: Poly): Slow =>
  slow(
    termsOf(p).map(({ coefficient, exponents }): [Powers, Q] => [
      Object.fromEntries(exponents.map(([g, e]) => [p.ring.generators[g]!.name, e])),
      E.q(coefficient.num, coefficient.den),
    ]),
  );

const shown = (p: Slow): string[] => [...p].map(([key, c]) => `${E.show(c)} · ${key}`).sort();

/** The kernel's value is canonical and is the schoolbook's. */
export function expectSame(p: Poly, q: Slow): void {
  expect(isCanonical(p)).toBe(true);
  expect(shown(fromKernel(p))).toEqual(shown(q));
}
