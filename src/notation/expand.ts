/**
 * Syntax tree → sum of monomials: brackets multiplied out, powers written out, dummy indices of different factors renamed
 * apart, like terms collected, every stated limit checked. Expects a tree whose indices obey Einstein's rule (indices.ts).
 */
import { addRational, negateRational, rational } from '../algebra/rational.js';
import { errorAt, InputError } from './diagnostics.js';
import { renamedApart } from './dummies.js';
import { MAX_DIGITS, MAX_EXPONENT, MAX_FACTORS, MAX_TERMS } from './limits.js';
import type { Passage } from './passage.js';
import { constantTerm, multiplyScalarTerms, powerScalarTerm, powersKey, symbolTerm, UNIT } from './scalar-term.js';
import type { Expression, Span } from './syntax.js';
import type { LagrangianTerm } from './theory.js';
import { clip } from './tokens.js';

const ONE_TERM: LagrangianTerm = { scalar: UNIT, factors: [] };
/** Products formed in one multiplication before like terms are collected. */
const MAX_PRODUCTS = 10 * MAX_TERMS;
const MAX_MAGNITUDE = 10n ** BigInt(MAX_DIGITS);
const BITS_PER_DIGIT = Math.log2(10);

/**
 * The terms of an expression; like terms are collected, the order is that of first appearance, zero is the empty list.
 * @throws InputError `terms-limit`, `factors-limit`, `exponent-limit`, `digits-limit`, `division-by-zero`,
 * `divisor-not-monomial`, `divisor-tensor`, `negative-power`.
 */
export function expand(expression: Expression, passage: Passage): readonly LagrangianTerm[] {
  return new Expansion(passage).terms(expression);
}

class Expansion {
  private readonly passage: Passage;
  constructor(passage: Passage) {
    this.passage = passage;
  }

  terms(node: Expression): readonly LagrangianTerm[] {
    switch (node.kind) {
      case 'integer':
        return node.value === 0n ? [] : [{ scalar: constantTerm(rational(node.value)), factors: [] }];
      case 'symbol':
        return [{ scalar: symbolTerm(node.name), factors: [] }];
      case 'tensor': {
        const slots = node.slots.map(({ name, up }) => ({ name, up }));
        const part = node.part === undefined ? {} : { part: node.part };
        return [{ scalar: UNIT, factors: [{ head: node.head, ...part, slots }] }];
      }
      case 'sum': {
        const all: LagrangianTerm[] = [];
        for (const { negative, value } of node.summands) {
          for (const term of this.terms(value)) all.push(negative ? negated(term) : term);
          if (all.length > MAX_PRODUCTS) this.tooManyTerms(node);
        }
        return this.collect(all, node);
      }
      case 'product': {
        let product: readonly LagrangianTerm[] = [ONE_TERM];
        for (const { divides, negative, value } of node.factors) {
          let factor = this.terms(value);
          if (divides) factor = [this.reciprocal(factor, value)];
          product = this.multiply(product, negative ? factor.map(negated) : factor, node);
        }
        return product;
      }
      case 'power':
        return this.power(this.terms(node.base), node.exponent, node);
    }
  }

  private power(
    base: readonly LagrangianTerm[],
    exponent: number,
    node: Expression & { kind: 'power' },
  ): readonly LagrangianTerm[] {
    const [only] = base;
    if (exponent < 0) {
      if (only !== undefined && base.length === 1 && only.factors.length === 0)
        return this.monomialPower(only, exponent, node);
      const typed = this.typed(node.base);
      if (base.length === 0) return this.fail('division-by-zero', node, `${typed} is zero and has no negative power`);
      const message = `${typed} is no monomial in constants, so it has no negative power`;
      return this.fail(
        'negative-power',
        node,
        message,
        'a Lagrangian is a polynomial in the tensors; divide by constants only',
      );
    }
    if (base.length === 1 && only!.factors.length === 0) return this.monomialPower(only!, exponent, node);
    let result: readonly LagrangianTerm[] = [ONE_TERM];
    for (let n = 0; n < exponent; n++) result = this.multiply(result, base, node);
    return result;
  }

  private monomialPower(term: LagrangianTerm, exponent: number, node: Span): readonly LagrangianTerm[] {
    const { num, den } = term.scalar.coefficient;
    const bits = Math.max(num.toString(2).length, den.toString(2).length) - 2;
    if (bits * Math.abs(exponent) > MAX_DIGITS * BITS_PER_DIGIT) this.tooManyDigits(node);
    return [this.checked({ scalar: powerScalarTerm(term.scalar, exponent), factors: [] }, node)];
  }

  private reciprocal(divisor: readonly LagrangianTerm[], node: Expression): LagrangianTerm {
    const typed = this.typed(node);
    const [only] = divisor;
    if (only === undefined) return this.fail('division-by-zero', node, `division by ${typed}, which is zero`);
    if (divisor.some((term) => term.factors.length > 0)) {
      const message = `division by ${typed}, which contains a tensor`;
      return this.fail(
        'divisor-tensor',
        node,
        message,
        'a Lagrangian is a polynomial in the tensors; divide by constants only',
      );
    }
    if (divisor.length > 1) {
      const message = `division by ${typed}, which is a sum`;
      return this.fail(
        'divisor-not-monomial',
        node,
        message,
        'a divisor is a number or a product of constants; name the quotient',
      );
    }
    return { scalar: powerScalarTerm(only.scalar, -1), factors: [] };
  }

  private multiply(a: readonly LagrangianTerm[], b: readonly LagrangianTerm[], node: Span): readonly LagrangianTerm[] {
    if (a.length === 1 && a[0] === ONE_TERM) return b;
    if (a.length * b.length > MAX_PRODUCTS) this.tooManyTerms(node);
    const products: LagrangianTerm[] = [];
    for (const x of a) {
      for (const y of b) {
        const count = x.factors.length + y.factors.length;
        if (count > MAX_FACTORS) {
          const message = `a product of ${count} tensors; the limit is ${MAX_FACTORS}`;
          this.fail('factors-limit', node, message, 'lower the degree of the Lagrangian');
        }
        const scalar = multiplyScalarTerms(x.scalar, y.scalar);
        const factors =
          x.factors.length === 0 ? y.factors : y.factors.length === 0 ? x.factors : renamedApart(x.factors, y.factors);
        products.push(this.checked({ scalar, factors }, node));
      }
    }
    return products.length === 1 ? products : this.collect(products, node);
  }

  private checked(term: LagrangianTerm, node: Span): LagrangianTerm {
    const { coefficient, powers } = term.scalar;
    const size = coefficient.num < 0n ? -coefficient.num : coefficient.num;
    if (size >= MAX_MAGNITUDE || coefficient.den >= MAX_MAGNITUDE) this.tooManyDigits(node);
    for (const [name, exponent] of powers) {
      if (Math.abs(exponent) > MAX_EXPONENT) {
        const message = `the exponent ${exponent} of ${name} is beyond the limit of ${MAX_EXPONENT}`;
        this.fail('exponent-limit', node, message, 'smaller exponents only');
      }
    }
    return term;
  }

  private collect(terms: readonly LagrangianTerm[], node: Span): readonly LagrangianTerm[] {
    const collected = collectTerms(terms);
    if (collected.length > MAX_TERMS) this.tooManyTerms(node);
    return collected.length === terms.length ? collected : collected.map((term) => this.checked(term, node));
  }

  private typed(node: Span): string {
    return clip(this.passage.text.slice(node.start, node.end).replace(/\s+/g, ' '));
  }

  private tooManyTerms(node: Span): never {
    const message = `more than ${MAX_TERMS} terms when the brackets are multiplied out`;
    return this.fail('terms-limit', node, message, 'shorten the sums or lower the power');
  }

  private tooManyDigits(node: Span): never {
    return this.fail('digits-limit', node, `a number of more than ${MAX_DIGITS} digits arises here`, 'use a symbol');
  }

  private fail(code: string, node: Span, message: string, hint?: string): never {
    throw new InputError([errorAt(this.passage.locate(node.start, node.end), code, message, hint)]);
  }
}

const negated = (term: LagrangianTerm): LagrangianTerm => ({
  ...term,
  scalar: { ...term.scalar, coefficient: negateRational(term.scalar.coefficient) },
});

/** Like terms added up, in the order of first appearance; no limits are checked. */
export function collectTerms(terms: readonly LagrangianTerm[]): readonly LagrangianTerm[] {
  const byKey = new Map<string, LagrangianTerm>();
  for (const term of terms) {
    const key = termKey(term);
    const before = byKey.get(key);
    const { coefficient, powers } = term.scalar;
    if (before === undefined) byKey.set(key, term);
    else
      byKey.set(key, {
        ...before,
        scalar: { coefficient: addRational(before.scalar.coefficient, coefficient), powers },
      });
  }
  return [...byKey.values()].filter((term) => term.scalar.coefficient.num !== 0n);
}

/** Equal for terms that differ in the coefficient or in the order of factors only. */
function termKey({ scalar, factors }: LagrangianTerm): string {
  const tensors = factors.map(
    ({ head, part, slots }) => `${head} ${part ?? ''} ${slots.map((s) => (s.up ? '^' : '_') + s.name).join('')}`,
  );
  return `${powersKey(scalar.powers)}|${tensors.sort().join('|')}`;
}
