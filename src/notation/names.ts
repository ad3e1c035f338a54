/**
 * Which names a user may declare, and what the reserved ones mean. Names are only ever compared or kept in Map and Set:
 * `constructor` is a legal one. Imports nothing but limits.
 */
import { MAX_NAME } from './limits.js';

const RESERVED: ReadonlyMap<string, string> = new Map([
  ['R', 'the curvature'],
  ['T', 'the torsion'],
  ['A', 'the axial torsion vector'],
  ['D', 'the time derivative D(q,n)'],
  ['N', 'the lapse'],
  ['a', 'the scale factor'],
  ['k', 'the spatial curvature'],
  ['t', 'cosmic time'],
  ['H', 'the expansion rate'],
  ['h', 'the variable a φ'],
  ['f', 'the variable a ψ'],
  ['u', 'the scalar torsion'],
  ['v', 'the pseudoscalar torsion'],
  ['phi', 'a connection function'],
  ['psi', 'a connection function'],
  ['sqrt', 'the square root'],
  ['abs', 'the absolute value'],
]);

/** What a reserved name stands for; undefined for a name that is free. */
export function reservedMeaning(name: string): string | undefined {
  return RESERVED.get(name) ?? (name.startsWith('rho_') ? 'an energy density' : undefined);
}

/** Whether the text has the form of a name: a letter, then letters, digits and underscores. */
export const isNameText = (text: string): boolean => text.length <= MAX_NAME && /^[A-Za-z][A-Za-z0-9_]*$/.test(text);

/** `T_eff`, `delta_ab`: with braces it would read as a tensor with indices. */
const LIKE_A_TENSOR = /^(?:[RTA]|epsilon|varepsilon|eta|delta)_[A-Za-z]+$/;

/** Why the text cannot be declared as a name, with what to do about it; undefined when it can. */
export function nameFault(
  text: string,
): { readonly code: string; readonly message: string; readonly hint: string } | undefined {
  if (!isNameText(text)) {
    const shown = text.length > 40 ? `${text.slice(0, 37)}…` : text;
    const hint =
      text.length > MAX_NAME && /^[A-Za-z0-9_]*$/.test(text)
        ? `a name has at most ${MAX_NAME} characters`
        : 'a name is a letter followed by letters, digits and underscores, such as b1 or alpha_1';
    return { code: 'bad-name', message: `${JSON.stringify(shown)} is not a name`, hint };
  }
  const meaning = reservedMeaning(text);
  if (meaning !== undefined) {
    return {
      code: 'reserved-name',
      message: `the name ${text} is reserved for ${meaning}`,
      hint: `choose another, such as ${text.replace(/_.*/, '')}1`,
    };
  }
  if (LIKE_A_TENSOR.test(text)) {
    const hint = `choose another name; a digit in it is enough, such as ${text.replace(/_.*/, '_1')}`;
    return { code: 'reserved-name', message: `the name ${text} reads as a tensor with indices`, hint };
  }
  return undefined;
}
