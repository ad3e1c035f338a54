/** The inside of an emitted function: locals for what it reads, the shared steps, the returned value. */
import type { Factor } from '../algebra/fraction.js';
import type { Poly } from '../algebra/poly.js';
import type { Ring } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import { FRAME_NAMES } from './code-frames.js';
import { doubleLiteral } from './double-literal.js';
import { makeNameTable, type NameTable, propertyKey } from './identifiers.js';
import { generatorsOf, type Operand, type Plan, type Product, planShared, type Step } from './shared-subexpressions.js';
import { jetLocal } from './typescript-jets.js';

/** numerator / Π base^power, under a key of the returned object; without a key it is the returned number. */
export interface Output {
  readonly key?: string;
  readonly numerator: Poly;
  readonly denominator?: readonly Factor[];
}

export interface Body {
  /** Statements, indented by two spaces. */
  readonly text: string;
  readonly usesCouplings: boolean;
  readonly usesJets: boolean;
}

/** Names that the emitted module gives to its own things; locals keep clear of them. */
const OWN = (
  'couplings jets theory geometry variables parameters sources lagrangian equations rhoT pT wT g4 kinetic current ' +
  'potential curvatureObstruction rhoSpin pSpin connection Connection Couplings Jets Equations Kinetic Current'
)
  .split(' ')
  .concat(FRAME_NAMES);
const WIDTH = 110;

/** Which generators are couplings: the constants of the theory. Scales, curvature and densities stand with the fields. */
export function couplingTest(d: Derivation): (generator: number) => boolean {
  const couplings = new Set(d.theory.symbols.filter((s) => s.role === 'constant').map((s) => s.name));
  return (g) => couplings.has(d.ring.generators[g]!.name);
}

export function functionBody(d: Derivation, outputs: readonly Output[]): Body {
  const polynomials = outputs.flatMap((o) => [o.numerator, ...(o.denominator ?? []).map((f) => f.base)]);
  const plan = planShared(polynomials, couplingTest(d));
  const names = makeNameTable(OWN);
  const { lines, locals, usesCouplings, usesJets } = readLocals(d.ring, plan, names);
  const steps = new StepPrinter(locals, names);
  for (const step of plan.steps) lines.push(steps.statement(step));
  const sums = plan.outputs.map((terms) => steps.sum(terms, 4));
  return { text: [...lines, returned(outputs, sums)].join('\n'), usesCouplings, usesJets };
}

interface Locals {
  readonly lines: string[];
  /** Name by position in the ring. */
  readonly locals: ReadonlyMap<number, string>;
  readonly usesCouplings: boolean;
  readonly usesJets: boolean;
}

/** Destructures what the plan reads: couplings in one statement, each field's jet in another. */
function readLocals(ring: Ring, plan: Plan, names: NameTable): Locals {
  const locals = new Map<number, string>();
  const constants: string[] = [];
  const roots: string[] = [];
  const fields = new Map<string, string[]>();
  const constant = (key: string): string => {
    const name = names.claim(key);
    constants.push(name === key ? key : `${propertyKey(key)}: ${name}`);
    return name;
  };
  const read = generatorsOf(plan);
  // A square may be read besides its root, and then has a local already.
  for (const g of read) {
    const { kind, name } = ring.generators[g]!;
    if (kind === 'constant' || kind === 'source') locals.set(g, constant(name));
  }
  for (const g of read) {
    const generator = ring.generators[g]!;
    if (generator.kind === 'jet') {
      const name = names.claim(jetLocal(generator.field, generator.order));
      const entries = fields.get(generator.field) ?? [];
      entries[generator.order] = name;
      fields.set(generator.field, entries);
      locals.set(g, name);
    } else if (generator.kind === 'radical') {
      const square = locals.get(ring.position.get(generator.square)!) ?? constant(generator.square);
      const name = names.claim(generator.name);
      roots.push(`  const ${name} = Math.sqrt(${square});`);
      locals.set(g, name);
    }
  }
  const lines = constants.length === 0 ? [] : [`  const {${wrapped(constants, ' ', '  ')}} = couplings;`];
  for (const [field, entries] of fields) {
    const places = Array.from(entries, (name) => name ?? '');
    const object = /^[A-Za-z_]\w*$/.test(field) ? `jets.${field}` : `jets[${JSON.stringify(field)}]`;
    lines.push(`  const [${places.join(', ')}] = ${object};`);
  }
  return { lines: [...lines, ...roots], locals, usesCouplings: constants.length > 0, usesJets: fields.size > 0 };
}

/** A comma list on one line when it is short, else on several. */
export function wrapped(items: readonly string[], pad: string, indent: string): string {
  const flat = items.join(', ');
  if (flat.length < WIDTH - 20) return `${pad}${flat}${pad}`;
  const lines: string[] = [];
  for (const item of items) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + item.length < WIDTH - 8) lines[lines.length - 1] = `${last} ${item},`;
    else lines.push(`${item},`);
  }
  return `\n${lines.map((l) => `${indent}  ${l}`).join('\n')}\n${indent}`;
}

class StepPrinter {
  private readonly made: string[] = [];
  private readonly counts = new Map<string, number>();

  constructor(
    private readonly locals: ReadonlyMap<number, string>,
    private readonly names: NameTable,
  ) {}

  private name(operand: Operand): string {
    return operand.kind === 'generator' ? this.locals.get(operand.position)! : this.made[operand.index]!;
  }

  private numbered(prefix: string): string {
    const n = (this.counts.get(prefix) ?? 0) + 1;
    this.counts.set(prefix, n);
    return `${prefix}${n}`;
  }

  statement(step: Step): string {
    switch (step.op) {
      case 'reciprocal':
        return this.define(`${this.name(step.operand)}Inv`, `1 / ${this.name(step.operand)}`);
      case 'power': {
        const value = `${this.name(step.left)} * ${this.name(step.right)}`;
        return this.define(`${this.name(step.base)}Pow${step.exponent}`, value);
      }
      case 'product':
        return this.define(this.numbered('product'), `${this.name(step.left)} * ${this.name(step.right)}`);
      case 'sum':
        return this.define(this.numbered(step.ofCouplings ? 'coupling' : 'sum'), this.sum(step.terms, 4));
    }
  }

  private define(wish: string, value: string): string {
    const name = this.names.claim(wish);
    this.made.push(name);
    return `  const ${name} =${spaced(value)};`;
  }

  private product({ factor, operands }: Product): { negative: boolean; text: string } {
    const negative = factor.num < 0n;
    const size = negative ? { num: -factor.num, den: factor.den } : factor;
    const literal = doubleLiteral(size);
    const factors = operands.map((o) => this.name(o));
    if (literal !== '1' || factors.length === 0) factors.unshift(literal);
    return { negative, text: factors.join(' * ') };
  }

  /** A sum on one line, or on one line per term, indented. */
  sum(terms: readonly Product[], indent: number): string {
    if (terms.length === 0) return '0';
    const parts = terms.map((t) => this.product(t));
    const flat = parts
      .map(({ negative, text }, i) => (i === 0 ? `${negative ? '-' : ''}${text}` : `${negative ? '- ' : '+ '}${text}`))
      .join(' ');
    if (flat.length <= WIDTH - 20) return flat;
    const pad = `\n${' '.repeat(indent)}`;
    const first = parts[0]!;
    const rest = parts.slice(1).map(({ negative, text }) => ` ${negative ? '-' : '+'}${pad}${text}`);
    return `${pad}${first.negative ? '-' : ''}${first.text}${rest.join('')}`;
  }
}

/** A value after `=` or `:`; one on several lines starts on a line of its own. */
const spaced = (value: string): string => (value.startsWith('\n') ? value : ` ${value}`);

/** A value in brackets, which also keep a line break after `return` from ending the statement. */
const inBrackets = (value: string): string => (value.startsWith('\n') ? `(${value}\n  )` : `(${value})`);

/** The return statement; each output takes its own sum and those of its denominators from the list. */
function returned(outputs: readonly Output[], sums: readonly string[]): string {
  let next = 0;
  const values = outputs.map(({ denominator = [] }) => {
    const numerator = sums[next++]!;
    if (denominator.length === 0) return numerator;
    const factors = denominator.flatMap(({ power }) => Array<string>(power).fill(inBrackets(sums[next++]!)));
    return `${inBrackets(numerator)} / ${factors.length === 1 ? factors[0] : `(${factors.join(' * ')})`}`;
  });
  if (outputs.length === 1 && outputs[0]!.key === undefined) {
    const [value] = values;
    return `  return ${value!.startsWith('\n') ? inBrackets(value!) : value};`;
  }
  const members = outputs.map(
    ({ key }, i) => `    ${propertyKey(key!)}:${spaced(values[i]!).replaceAll('\n', '\n  ')},`,
  );
  return `  return {\n${members.join('\n')}\n  };`;
}
