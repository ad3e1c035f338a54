/**
 * How large an input may be. Beyond a limit the input is refused by an error that names the limit; the numbers are
 * repeated for users in docs/notation.md, and a test compares the two. Imports nothing.
 */

/** UTF-16 units of a theory or geometry file, and of one relation. */
export const MAX_TEXT = 1_000_000;
/** Brackets inside brackets in an expression. */
export const MAX_NESTING = 60;
/** Collections inside collections in a YAML file. */
export const MAX_YAML_DEPTH = 20;
/** Decimal digits of one integer, typed or computed. */
export const MAX_DIGITS = 200;
/** Absolute value of an exponent, typed or computed; also the largest n of a jet D(q,n). */
export const MAX_EXPONENT = 64;
/** Tensors in one product, powers of scalars counted out. */
export const MAX_FACTORS = 12;
/** Terms of an expression after its brackets are multiplied out. */
export const MAX_TERMS = 20_000;
/** Indices of a declared tensor. */
export const MAX_SLOTS = 6;
/** Declared constants, scales and tensors together. */
export const MAX_SYMBOLS = 400;
/** Letters of one name. */
export const MAX_NAME = 64;
/** Errors shown of one file; the rest is counted. */
export const MAX_DIAGNOSTICS = 20;
