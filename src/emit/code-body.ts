/**
 * The inside of an emitted function, independently of the language: what it reads under which local names, the shared
 * steps, the values that it returns. Functions of very many terms are divided into parts that a short one calls.
 */
import { select } from '../algebra/collect.js';
import type { Poly } from '../algebra/poly.js';
import type { Generator, Ring } from '../algebra/ring.js';
import {
  type CodeFunction,
  type CodeInput,
  type CodeModule,
  type CodeOutput,
  polynomialsOf,
} from './code-description.js';
import type { Expression } from './code-expression.js';
import { functionName, joined, makeNameTable, type NameTable, type Naming } from './identifiers.js';
import { generatorsOf, type Operand, type Product, planShared, planSize, type Step } from './shared-subexpressions.js';

/** A local variable that is filled before the steps. */
export type Read =
  | { readonly kind: 'coupling'; readonly local: string; readonly key: string }
  | { readonly kind: 'jet'; readonly local: string; readonly field: string; readonly order: number }
  | { readonly kind: 'entry'; readonly local: string; readonly index: number }
  | { readonly kind: 'root'; readonly local: string; readonly of: string };

/** The list of numbers that a part returns. */
export interface Call {
  readonly local: string;
  readonly part: string;
  readonly count: number;
}

export interface Body {
  readonly calls: readonly Call[];
  readonly reads: readonly Read[];
  readonly steps: readonly { readonly name: string; readonly value: Expression }[];
  /** One for each output. */
  readonly results: readonly Expression[];
  readonly usesCouplings: boolean;
  readonly usesInput: boolean;
}

/** A function of the same arguments that returns a list. */
export interface Part {
  readonly name: string;
  readonly body: Body;
}

export interface FunctionCode {
  readonly parts: readonly Part[];
  readonly body: Body;
}

export interface BodyOptions {
  readonly naming: Naming;
  /** Names that locals keep clear of. */
  readonly taken: readonly string[];
  /** Size of a plan that becomes one function, and of the parts of a larger one. */
  readonly mostTerms: number;
  readonly partTerms: number;
}

/** @throws Error when the function reads a symbol that neither its input nor the parameters provide. */
export function functionCode(m: CodeModule, f: CodeFunction, options: BodyOptions): FunctionCode {
  const polynomials = f.outputs.flatMap(polynomialsOf);
  const isCoupling = couplingTest(m, polynomials[0]?.ring);
  const size = (p: Poly): number => (p.size < options.mostTerms ? p.size : planSize([p], isCoupling));
  const sizes = polynomials.map(size);
  if (sizes.reduce((a, b) => a + b, 0) <= options.mostTerms || planSize(polynomials, isCoupling) <= options.mostTerms)
    return { parts: [], body: wholeBody(m, f.input, f.outputs, options) };
  return inParts(m, f, sizes, options);
}

const couplingTest = (m: CodeModule, ring: Ring | undefined) => (g: number) =>
  m.couplings.has(ring!.generators[g]!.name);

export function wholeBody(
  m: CodeModule,
  input: CodeInput,
  outputs: readonly Pick<CodeOutput, 'numerator' | 'denominator'>[],
  { naming, taken }: Pick<BodyOptions, 'naming' | 'taken'>,
): Body {
  const polynomials = outputs.flatMap(polynomialsOf);
  const ring = polynomials[0]?.ring;
  const plan = planShared(polynomials, couplingTest(m, ring));
  const names = makeNameTable(taken, naming);
  const { reads, locals } = ring ? readsOf(m, input, ring, generatorsOf(plan), names, naming) : NOTHING_READ;
  const writer = new StepWriter(locals, names, naming);
  for (const step of plan.steps) writer.add(step);
  const sums = plan.outputs.map((terms) => writer.sum(terms));
  const results = quotients(outputs, sums, (name, value) => writer.define(name, value));
  return {
    calls: [],
    reads,
    steps: writer.steps,
    results,
    usesCouplings: reads.some((r) => r.kind === 'coupling'),
    usesInput: reads.some((r) => r.kind === 'jet' || r.kind === 'entry'),
  };
}

/** Values of outputs from those of their polynomials; what a quotient consists of gets names first. */
function quotients(
  outputs: readonly Pick<CodeOutput, 'numerator' | 'denominator'>[],
  values: readonly Expression[],
  define: (name: readonly string[], value: Expression) => Expression,
): Expression[] {
  let next = 0;
  return outputs.map(({ denominator = [] }) => {
    const numerator = values[next++]!;
    if (denominator.length === 0) return numerator;
    const top = define(['numerator'], numerator);
    const factors = denominator.flatMap(({ power }) => {
      const factor = define(['denominator'], values[next++]!);
      return Array<Expression>(power).fill(factor);
    });
    return { kind: 'quotient', top, bottom: factors.length === 1 ? factors[0]! : { kind: 'product', factors } };
  });
}

const NOTHING_READ = { reads: [], locals: new Map<number, string>() };

/** Local names of the generators at the given positions of the ring, and where their values come from. */
function readsOf(
  m: CodeModule,
  input: CodeInput,
  ring: Ring,
  positions: readonly number[],
  names: NameTable,
  naming: Naming,
): { reads: Read[]; locals: ReadonlyMap<number, string> } {
  const reads: Read[] = [];
  const locals = new Map<number, string>();
  const read = (position: number): string => {
    const known = locals.get(position);
    if (known !== undefined) return known;
    const generator = ring.generators[position]!;
    const local = names.claim(localName(generator, naming));
    locals.set(position, local);
    reads.push(sourceOf(m, input, generator, local));
    return local;
  };
  const isRoot = (g: number): boolean => ring.generators[g]!.kind === 'radical';
  for (const g of positions) if (!isRoot(g)) read(g);
  for (const g of positions) {
    const generator = ring.generators[g]!;
    if (generator.kind !== 'radical') continue;
    // A square may be read besides its root, and then has a local already.
    const of = read(ring.position.get(generator.square)!);
    const local = names.claim(generator.name);
    locals.set(g, local);
    reads.push({ kind: 'root', local, of });
  }
  return { reads, locals };
}

/** a, aDot, aDdot, aD3; everything else under its own name. */
export function localName(generator: Generator, naming: Naming): string {
  if (generator.kind !== 'jet' || generator.order === 0) return generator.name;
  return joined(naming, [generator.field, ['', 'dot', 'ddot'][generator.order] ?? `d${generator.order}`]);
}

function sourceOf(m: CodeModule, input: CodeInput, generator: Generator, local: string): Read {
  const { name } = generator;
  if (input.kind === 'vector') {
    const index = input.entries.findIndex((e) => e.symbol === name);
    if (index >= 0) return { kind: 'entry', local, index };
  } else if (generator.kind === 'jet') {
    const field = input.fields.find((f) => f.name === generator.field);
    if (field && generator.order <= field.order)
      return { kind: 'jet', local, field: field.name, order: generator.order };
  }
  if (m.parameters.some((p) => p.name === name)) return { kind: 'coupling', local, key: name };
  throw new Error(`emitted code has no value for ${name}`);
}

class StepWriter {
  readonly steps: { name: string; value: Expression }[] = [];
  private readonly made: string[] = [];
  private readonly counts = new Map<string, number>();

  constructor(
    private readonly locals: ReadonlyMap<number, string>,
    private readonly names: NameTable,
    private readonly naming: Naming,
  ) {}

  private text(o: Operand): string {
    return o.kind === 'generator' ? this.locals.get(o.position)! : this.made[o.index]!;
  }

  private name(o: Operand): Expression {
    return { kind: 'name', text: this.text(o) };
  }

  private numbered(prefix: string): string[] {
    const n = (this.counts.get(prefix) ?? 0) + 1;
    this.counts.set(prefix, n);
    return [`${prefix}${n}`];
  }

  add(step: Step): void {
    const made = this.step(step);
    this.made.push(made.text);
  }

  private step(step: Step): { readonly text: string } {
    switch (step.op) {
      case 'reciprocal':
        return this.define([this.text(step.operand), 'inv'], {
          kind: 'quotient',
          top: ONE_EXPRESSION,
          bottom: this.name(step.operand),
        });
      case 'power':
        return this.define([this.text(step.base), `pow${step.exponent}`], this.times(step.left, step.right));
      case 'product':
        return this.define(this.numbered('product'), this.times(step.left, step.right));
      case 'sum':
        return this.define(this.numbered(step.ofCouplings ? 'coupling' : 'sum'), this.sum(step.terms));
    }
  }

  private times(left: Operand, right: Operand): Expression {
    return { kind: 'product', factors: [this.name(left), this.name(right)] };
  }

  define(wish: readonly string[], value: Expression): Expression & { kind: 'name' } {
    const name = this.names.claim(joined(this.naming, wish));
    this.steps.push({ name, value });
    return { kind: 'name', text: name };
  }

  sum(terms: readonly Product[]): Expression {
    return { kind: 'sum', terms: terms.map((t) => this.product(t)) };
  }

  private product({ factor, operands }: Product): { negative: boolean; value: Expression } {
    const negative = factor.num < 0n;
    const size = negative ? { num: -factor.num, den: factor.den } : factor;
    const factors = operands.map((o) => this.name(o));
    if (size.num !== size.den || factors.length === 0) factors.unshift({ kind: 'number', value: size });
    return { negative, value: factors.length === 1 ? factors[0]! : { kind: 'product', factors } };
  }
}

const ONE_EXPRESSION: Expression = { kind: 'number', value: { num: 1n, den: 1n } };

/** A polynomial as a sum of at most `wanted` polynomials of about equal length; neighbouring terms stay together. */
function pieces(p: Poly, wanted: number): Poly[] {
  const count = Math.min(p.size, wanted);
  const start = (i: number) => Math.floor((i * p.size) / count);
  const rows = (from: number, to: number) => Array.from({ length: to - from }, (_, n) => from + n);
  return Array.from({ length: count }, (_, i) => select(p, rows(start(i), start(i + 1))));
}

/** Neighbouring polynomials together while they are small, a large one in pieces. */
function blocks(polynomials: readonly Poly[], sizes: readonly number[], partTerms: number): Poly[][][] {
  const out: Poly[][][] = [];
  let open: Poly[] = [];
  let filled = 0;
  const close = () => {
    if (open.length > 0) out.push([open]);
    open = [];
    filled = 0;
  };
  polynomials.forEach((p, i) => {
    const size = sizes[i]!;
    if (filled + size > partTerms) close();
    if (size > partTerms) out.push(pieces(p, Math.ceil(size / partTerms)).map((piece) => [piece]));
    else {
      open.push(p);
      filled += size;
    }
  });
  close();
  return out;
}

/** The same function, its polynomials computed by functions of some hundred terms each. */
function inParts(m: CodeModule, f: CodeFunction, sizes: readonly number[], options: BodyOptions): FunctionCode {
  const { naming } = options;
  const names = makeNameTable(options.taken, naming);
  const parts: Part[] = [];
  const calls: Call[] = [];
  const steps: { name: string; value: Expression }[] = [];
  const call = (polynomials: readonly Poly[]): string => {
    const outputs = polynomials.map((numerator) => ({ numerator }));
    const part = partName(f, parts.length + 1, naming);
    const local = names.claim(`part${parts.length + 1}`);
    parts.push({ name: part, body: wholeBody(m, f.input, outputs, options) });
    calls.push({ local, part, count: polynomials.length });
    return local;
  };
  const values = blocks(f.outputs.flatMap(polynomialsOf), sizes, options.partTerms).flatMap((block): Expression[] => {
    if (block.length === 1) {
      const of = call(block[0]!);
      return block[0]!.map((_, index) => ({ kind: 'element', of, index }));
    }
    const terms = block.map((piece) => {
      const value: Expression = { kind: 'element', of: call(piece), index: 0 };
      return { negative: false, value };
    });
    return [{ kind: 'sum', terms }];
  });
  const results = quotients(f.outputs, values, (wish, value) => {
    const name = names.claim(joined(naming, wish));
    steps.push({ name, value });
    return { kind: 'name', text: name };
  });
  return { parts, body: { calls, reads: [], steps, results, usesCouplings: true, usesInput: true } };
}

/** Name of the n-th part of a function. */
export const partName = (f: CodeFunction, n: number, naming: Naming): string =>
  joined(naming, [functionName(f.name, naming), `part${n}`]);
