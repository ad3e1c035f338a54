/** Types of the parts of nerdamer that are used, for its files as they are loaded one by one. */
declare module 'nerdamer/nerdamer.core.js' {
  /** An expression inside nerdamer; its text is in infix form. */
  export interface NerdamerExpression {
    toString(): string;
    expand(): NerdamerExpression;
    add(other: NerdamerExpression): NerdamerExpression;
    subtract(other: NerdamerExpression): NerdamerExpression;
    multiply(other: NerdamerExpression): NerdamerExpression;
  }
  interface Nerdamer {
    /** Parses and evaluates; throws on errors. Every expression is also stored until `flush`. */
    (text: string): NerdamerExpression;
    diff(of: NerdamerExpression, by: string): NerdamerExpression;
    flush(): void;
  }
  const nerdamer: Nerdamer;
  export default nerdamer;
}
/** Adds factoring to the core. */
declare module 'nerdamer/Algebra.js';
/** Adds differentiation to the core. */
declare module 'nerdamer/Calculus.js';
