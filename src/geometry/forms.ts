/**
 * Exterior algebra on four invariant one-forms whose coefficients depend on time only.
 * A form maps a bit mask of basis one-forms (bit i for θ^i, factors in ascending order) to its coefficient.
 * Invariant: no zero coefficient; all masks of one form have the same number of bits.
 */
import { timeDerivative } from '../algebra/calculus.js';
import { add, isZero, multiply, negate, type Poly } from '../algebra/poly.js';

export type Form = ReadonlyMap<number, Poly>;

/** θ^0 is dt: the only basis form that is a differential of what coefficients depend on. */
export const TIME_FORM = 0;

export const maskOf = (indices: readonly number[]): number => indices.reduce((m, i) => m | (1 << i), 0);
export const bitsOf = (mask: number): number[] => [0, 1, 2, 3].filter((i) => (mask >> i) & 1);

/** Sign that sorts θ^a ∧ θ^b, or 0 when they share a factor. */
function wedgeSign(a: number, b: number): number {
  if ((a & b) !== 0) return 0;
  let swaps = 0;
  for (const i of bitsOf(b)) swaps += bitsOf(a >> (i + 1)).length;
  return swaps % 2 === 0 ? 1 : -1;
}

function accumulate(into: Map<number, Poly>, mask: number, value: Poly): void {
  const known = into.get(mask);
  const total = known ? add(known, value) : value;
  if (isZero(total)) into.delete(mask);
  else into.set(mask, total);
}

export function addForms(...forms: readonly Form[]): Form {
  const out = new Map<number, Poly>();
  for (const form of forms) for (const [mask, value] of form) accumulate(out, mask, value);
  return out;
}

export const negateForm = (form: Form): Form => new Map([...form].map(([mask, value]) => [mask, negate(value)]));

export function wedge(a: Form, b: Form): Form {
  const out = new Map<number, Poly>();
  for (const [maskA, x] of a)
    for (const [maskB, y] of b) {
      const sign = wedgeSign(maskA, maskB);
      if (sign === 0) continue;
      const value = multiply(x, y);
      accumulate(out, maskA | maskB, sign > 0 ? value : negate(value));
    }
  return out;
}

/** Exterior derivative, given dθ^i of the basis. Coefficients are functions of time. */
export function exteriorDerivative(form: Form, structure: readonly Form[]): Form {
  const out = new Map<number, Poly>();
  for (const [mask, value] of form) {
    const sign = wedgeSign(1 << TIME_FORM, mask);
    if (sign !== 0) accumulate(out, mask | (1 << TIME_FORM), timeDerivative(value));
    // d(θ^i ∧ θ^j ∧ …) by the graded Leibniz rule.
    bitsOf(mask).forEach((i, place) => {
      const before = new Map([[mask & ((1 << i) - 1), value]]);
      const after = mask & ~((1 << (i + 1)) - 1);
      for (const [rest, c] of wedge(before, structure[i]!)) {
        const s = wedgeSign(rest, after) * (place % 2 === 0 ? 1 : -1);
        if (s !== 0) accumulate(out, rest | after, s > 0 ? c : negate(c));
      }
    });
  }
  return out;
}

export function equalForms(a: Form, b: Form): boolean {
  return addForms(a, negateForm(b)).size === 0;
}

/** Coefficient of θ^i ∧ θ^j with its sign for either order of i and j. */
export function twoFormComponent(form: Form, i: number, j: number): Poly | undefined {
  const value = form.get(maskOf([i, j]));
  if (value === undefined || i === j) return undefined;
  return i < j ? value : negate(value);
}
