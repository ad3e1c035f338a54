/**
 * The bound on an elimination: products of terms formed so far and terms of one polynomial. Counted, not timed, so that the
 * same question always has the same answer. Imports polynomials.
 */
import { multiply, type Poly } from '../algebra/poly.js';
import { ExponentLimitError } from '../algebra/ring.js';

/** Thrown when an elimination would go beyond its bound; the answer is then "undecided". */
export class BoundError extends Error {
  constructor(what: string) {
    super(what);
    this.name = 'BoundError';
  }
}

/** The bound that an error says was exceeded, powers beyond those of the kernel included; undefined for any other error. */
export function boundIn(error: unknown): BoundError | undefined {
  if (error instanceof BoundError) return error;
  return error instanceof ExponentLimitError ? new BoundError(error.message) : undefined;
}

export class Budget {
  private products = 0;
  private readonly maxProducts: number;
  private readonly maxTerms: number;

  constructor(maxProducts: number, maxTerms: number) {
    this.maxProducts = maxProducts;
    this.maxTerms = maxTerms;
  }

  /** a · b, counted. @throws BoundError beyond the bound. */
  multiply(a: Poly, b: Poly): Poly {
    this.spend(a.size * b.size);
    const product = multiply(a, b);
    if (product.size > this.maxTerms) throw new BoundError(`a polynomial of more than ${this.maxTerms} terms`);
    return product;
  }

  /** Counts other work in the same unit. @throws BoundError beyond the bound. */
  spend(products: number): void {
    this.products += products;
    if (this.products > this.maxProducts) throw new BoundError(`more than ${this.maxProducts} products of terms`);
  }
}
