/** Types of the parts of algebrite that are used; the package has none. */
declare module 'algebrite' {
  /** An expression inside algebrite; its text is in infix form. */
  export interface AlgebriteExpression {
    toString(): string;
  }
  interface Algebrite {
    /** Evaluates a line of input; an error comes back as text that starts with `Stop:`. */
    run(text: string): string;
    eval(text: string): AlgebriteExpression;
    derivative(of: AlgebriteExpression, by: string): AlgebriteExpression;
    add(a: AlgebriteExpression, b: AlgebriteExpression): AlgebriteExpression;
    multiply(a: AlgebriteExpression | string, b: AlgebriteExpression | string): AlgebriteExpression;
    clearall(): void;
  }
  const algebrite: Algebrite;
  export default algebrite;
}
