/**
 * A plan for computing several polynomials at a point with few multiplications: coefficient sums, sums of products,
 * powers and products of two are computed once and used wherever they occur. Language-neutral; printers name the steps.
 * Invariant: a step refers to earlier steps only, and every step is referred to.
 */
import { type Collected, collect } from '../algebra/collect.js';
import { remember } from '../algebra/memo.js';
import { type Poly, type Term, termsOf } from '../algebra/poly.js';
import {
  divideRational,
  gcd,
  multiplyRational,
  ONE,
  printRational,
  type Rational,
  rational,
} from '../algebra/rational.js';

/** A value at hand: a generator of the ring by position, or the result of a step by its place in the plan. */
export type Operand =
  | { readonly kind: 'generator'; readonly position: number }
  | { readonly kind: 'step'; readonly index: number };

/** factor · Π operands; no operands for a pure number. */
export interface Product {
  readonly factor: Rational;
  readonly operands: readonly Operand[];
}

export type Step =
  /** 1/operand. */
  | { readonly op: 'reciprocal'; readonly operand: Operand }
  /** base^exponent as left · right; exponent ≥ 2. `base` is for naming. */
  | {
      readonly op: 'power';
      readonly base: Operand;
      readonly exponent: number;
      readonly left: Operand;
      readonly right: Operand;
    }
  | { readonly op: 'product'; readonly left: Operand; readonly right: Operand }
  /** A sum; `ofCouplings` when it is a coefficient: nothing but couplings enters it. */
  | { readonly op: 'sum'; readonly ofCouplings: boolean; readonly terms: readonly Product[] };

export interface Plan {
  readonly steps: readonly Step[];
  /** One sum for each polynomial, in the order given; empty for zero. */
  readonly outputs: readonly (readonly Product[])[];
}

/** Atom of a product before powers are spelt out: a generator, or a sum with an index. */
type Atom = `g${number}` | `s${number}`;

interface Row {
  factor: Rational;
  readonly powers: ReadonlyMap<Atom, number>;
}

interface Sum {
  readonly ofCouplings: boolean;
  readonly rows: readonly Row[];
}

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);
const powersOf = (exponents: Term['exponents']): Map<Atom, number> =>
  new Map(exponents.map(([g, e]) => [`g${g}` as Atom, e]));

function timesPowers(...parts: Iterable<readonly [Atom, number]>[]): Map<Atom, number> {
  const total = new Map<Atom, number>();
  for (const part of parts) for (const [atom, e] of part) total.set(atom, (total.get(atom) ?? 0) + e);
  return total;
}

/** content · Π common · rest, where the factors of rest are coprime integers (unless they would leave the exact doubles). */
function splitRows(rows: readonly Row[]): { content: Rational; common: Map<Atom, number>; rest: Row[] } {
  let num = 0n;
  let den = 1n;
  for (const { factor } of rows) {
    num = gcd(num, factor.num);
    den = (den / gcd(den, factor.den)) * factor.den;
  }
  let content = rational(rows[0]!.factor.num < 0n ? -num : num, den);
  const over = (f: Rational): Rational => rational(f.num * content.den, f.den * content.num);
  if (rows.some(({ factor }) => over(factor).num > SAFE || over(factor).num < -SAFE)) content = ONE;
  const common = new Map<Atom, number>();
  for (const [atom, e] of rows[0]!.powers) {
    let least = e;
    for (const { powers } of rows) {
      const other = powers.get(atom) ?? 0;
      // A power is common only when it occurs everywhere with one sign: no division that was not there already.
      least = other * least <= 0 ? 0 : Math.abs(other) < Math.abs(least) ? other : least;
    }
    if (least !== 0) common.set(atom, least);
  }
  const rest = rows.map(({ factor, powers }) => ({
    factor: over(factor),
    powers: new Map([...powers].map(([atom, e]) => [atom, e - (common.get(atom) ?? 0)] as const).filter(([, e]) => e)),
  }));
  return { content, common, rest };
}

/** Longest sum in one expression: compilers descend into long ones recursively. */
const LONGEST_SUM = 100;

const keyOf = (powers: Row['powers']): string => [...powers].map(([a, e]) => `${a}^${e}`).join('*');

/** Collects sums, equal ones once. */
class SumTable {
  readonly sums: Sum[] = [];
  private readonly known = new Map<string, Atom>();

  private atom(rows: readonly Row[], ofCouplings: boolean): Atom {
    const short = this.shortened(rows, ofCouplings);
    const key = short.map(({ factor, powers }) => `${printRational(factor)}*${keyOf(powers)}`).join('+');
    const found = this.known.get(key);
    if (found) return found;
    const atom: Atom = `s${this.sums.push({ ofCouplings, rows: short }) - 1}`;
    this.known.set(key, atom);
    return atom;
  }

  /** The same sum with at most `LONGEST_SUM` rows, by partial sums. */
  shortened(rows: readonly Row[], ofCouplings: boolean): readonly Row[] {
    if (rows.length <= LONGEST_SUM) return rows;
    const parts: Row[] = [];
    for (let i = 0; i < rows.length; i += LONGEST_SUM) {
      const part = rows.slice(i, i + LONGEST_SUM);
      parts.push({ factor: ONE, powers: new Map([[this.atom(part, ofCouplings), 1]]) });
    }
    return this.shortened(parts, ofCouplings);
  }

  /** A sum as content · powers, where a proper sum becomes an atom. */
  factored(rows: readonly Row[], ofCouplings: boolean): Row {
    if (rows.length === 1) return rows[0]!;
    const { content, common, rest } = splitRows(rows);
    return { factor: content, powers: timesPowers(common, [[this.atom(rest, ofCouplings), 1]]) };
  }

  /** The rows of one polynomial as a sum over its coefficients: Σ coefficient · (sum over monomials in the rest). */
  output(rows: readonly CollectedRow[]): readonly Row[] {
    const groups = new Map<string, { coefficient: Row; rows: Row[] }>();
    for (const { monomial, coefficient } of rows) {
      const whole = this.factored(coefficient, true);
      const group = remember(groups, keyOf(whole.powers), () => ({ coefficient: whole, rows: [] as Row[] }));
      group.rows.push({ factor: whole.factor, powers: monomial });
    }
    const terms = [...groups.values()].flatMap(({ coefficient, rows: parts }) => {
      if (coefficient.powers.size === 0) return parts;
      const { factor, powers } = this.factored(parts, false);
      return [{ factor, powers: timesPowers(coefficient.powers, powers) }];
    });
    return this.shortened(terms, false);
  }
}

/** A monomial in everything but couplings, and its coefficient as a sum. */
interface CollectedRow {
  readonly monomial: Row['powers'];
  readonly coefficient: readonly Row[];
}

/** A monomial in couplings and the rows in which it occurs, with its factor there. */
interface Column {
  readonly powers: Row['powers'];
  readonly entries: (readonly [row: number, factor: Rational])[];
}

/**
 * Couplings that occur in all rows in one proportion, together: Σ over classes of parallel columns. Many invariants
 * reduce to one and the same function, so there are far fewer classes than couplings, and nothing cancels inside one.
 */
function parallelColumns(collected: readonly (readonly Collected[])[]): Column[][] {
  const columns = new Map<string, Column>();
  collected.flat().forEach(({ coefficient }, row) => {
    for (const { coefficient: factor, exponents } of termsOf(coefficient)) {
      const powers = powersOf(exponents);
      remember(columns, keyOf(powers), (): Column => ({ powers, entries: [] })).entries.push([row, factor]);
    }
  });
  const classes = new Map<string, Column[]>();
  for (const column of columns.values()) {
    const first = column.entries[0]![1];
    const key = column.entries.map(([row, f]) => `${row}:${printRational(divideRational(f, first))}`).join(';');
    remember(classes, key, (): Column[] => []).push(column);
  }
  return [...classes.values()];
}

/** Coefficients of the rows in terms of classes of parallel columns. */
function collectedRows(table: SumTable, collected: readonly (readonly Collected[])[]): CollectedRow[][] {
  const coefficients: Row[][] = collected.flat().map(() => []);
  for (const members of parallelColumns(collected)) {
    const { entries } = members[0]!;
    const [, first] = entries[0]!;
    const whole = table.factored(
      members.map((m): Row => ({ factor: m.entries[0]![1], powers: m.powers })),
      true,
    );
    for (const [row, factor] of entries) {
      const ratio = multiplyRational(whole.factor, divideRational(factor, first));
      coefficients[row]!.push({ factor: ratio, powers: whole.powers });
    }
  }
  let row = 0;
  return collected.map((rows) =>
    rows.map(({ monomial }) => ({ monomial: powersOf(monomial), coefficient: coefficients[row++]! })),
  );
}

/** Size of the plan of some polynomials, up to a small factor, without making it. */
export function planSize(polynomials: readonly Poly[], isCoupling: (generator: number) => boolean): number {
  const classes = parallelColumns(polynomials.map((p) => collect(p, (g) => !isCoupling(g))));
  return classes.reduce((n, members) => n + members.length + members[0]!.entries.length, 0);
}

/**
 * A plan for the values of polynomials of one ring. Deterministic: the same polynomials give the same plan.
 * Sharing is greedy, so the number of multiplications is small, not least.
 * @param isCoupling which generators (by position) make up the coefficients that terms are grouped by.
 */
export function planShared(polynomials: readonly Poly[], isCoupling: (generator: number) => boolean): Plan {
  const table = new SumTable();
  const collected = polynomials.map((p) => collect(p, (g) => !isCoupling(g)));
  const outputs = collectedRows(table, collected).map((rows) => table.output(rows));
  const lists = [...table.sums.map((s) => s.rows), ...outputs];
  const tokens = new TokenTable();
  const products = lists.map((rows) => rows.map(({ powers }) => tokens.ofPowers(powers)));
  tokens.pairUp(products.flat());
  const scheduler = new Scheduler(table.sums, tokens, products);
  const planned = outputs.map((rows, i) => scheduler.products(rows, products[table.sums.length + i]!));
  return { steps: scheduler.steps, outputs: planned };
}

type Token = { readonly atom: Atom; readonly exponent: number } | { readonly left: number; readonly right: number };

/** Powers and products of two, numbered: what a product consists of. */
class TokenTable {
  readonly tokens: Token[] = [];
  private readonly known = new Map<string, number>();

  private number(key: string, token: Token): number {
    const found = this.known.get(key);
    if (found !== undefined) return found;
    const n = this.tokens.push(token) - 1;
    this.known.set(key, n);
    return n;
  }

  ofPowers(powers: ReadonlyMap<Atom, number>): number[] {
    const list = [...powers].map(([atom, exponent]) => this.number(`${atom}^${exponent}`, { atom, exponent }));
    return list.sort((a, b) => a - b);
  }

  /** Replaces the pair of factors that occurs in most products by one token, until none occurs twice. */
  pairUp(products: number[][]): void {
    const places = new Map<string, Set<number[]>>();
    const pairsOf = (list: readonly number[]) => list.flatMap((a, i) => list.slice(i + 1).map((b) => `${a},${b}`));
    const enter = (list: number[]) => {
      for (const pair of pairsOf(list)) {
        const set = places.get(pair);
        if (set) set.add(list);
        else places.set(pair, new Set([list]));
      }
    };
    const leave = (list: number[]) => {
      for (const pair of pairsOf(list)) {
        const set = places.get(pair)!;
        set.delete(list);
        if (set.size === 0) places.delete(pair);
      }
    };
    products.forEach(enter);
    for (;;) {
      let best: string | undefined;
      let most = 1;
      for (const [pair, set] of places)
        if (set.size > most) {
          most = set.size;
          best = pair;
        }
      if (best === undefined) return;
      const [left, right] = best.split(',').map(Number) as [number, number];
      const made = this.number(best, { left, right });
      for (const list of [...places.get(best)!]) {
        leave(list);
        list.splice(list.indexOf(left), 1);
        list.splice(list.indexOf(right), 1, made);
        list.sort((a, b) => a - b);
        enter(list);
      }
    }
  }
}

/** Puts steps in an order in which each one finds its operands made. */
class Scheduler {
  readonly steps: Step[] = [];
  private readonly made = new Map<string, Operand>();

  constructor(
    private readonly sums: readonly Sum[],
    private readonly tokens: TokenTable,
    private readonly lists: readonly (readonly (readonly number[])[])[],
  ) {}

  products(rows: readonly Row[], lists: readonly (readonly number[])[]): Product[] {
    return rows.map(({ factor }, i) => ({ factor, operands: lists[i]!.map((t) => this.token(t)) }));
  }

  private once(key: string, make: () => Step): Operand {
    const known = this.made.get(key);
    if (known) return known;
    const step = make();
    const operand: Operand = { kind: 'step', index: this.steps.push(step) - 1 };
    this.made.set(key, operand);
    return operand;
  }

  private token(t: number): Operand {
    const token = this.tokens.tokens[t]!;
    if ('atom' in token) return this.power(token.atom, token.exponent);
    return this.once(`t${t}`, () => ({ op: 'product', left: this.token(token.left), right: this.token(token.right) }));
  }

  private power(atom: Atom, exponent: number): Operand {
    if (exponent === 1) return this.atom(atom);
    if (exponent === -1) return this.once(`${atom}^-1`, () => ({ op: 'reciprocal', operand: this.atom(atom) }));
    const sign = Math.sign(exponent);
    const size = Math.abs(exponent);
    const half = size >> 1;
    return this.once(`${atom}^${exponent}`, () => ({
      op: 'power',
      base: this.power(atom, sign),
      exponent: size,
      left: this.power(atom, sign * (size - half)),
      right: this.power(atom, sign * half),
    }));
  }

  private atom(atom: Atom): Operand {
    const n = Number(atom.slice(1));
    if (atom.startsWith('g')) return { kind: 'generator', position: n };
    return this.once(atom, () => {
      const { rows, ofCouplings } = this.sums[n]!;
      return { op: 'sum', ofCouplings, terms: this.products(rows, this.lists[n]!) };
    });
  }
}

/** Positions of the generators that a plan reads, ascending. */
export function generatorsOf(plan: Plan): number[] {
  const inside = (s: Step): readonly Operand[] => {
    if (s.op === 'sum') return s.terms.flatMap((t) => t.operands);
    return s.op === 'reciprocal' ? [s.operand] : [s.left, s.right];
  };
  const operands = [...plan.steps.flatMap(inside), ...plan.outputs.flat().flatMap((t) => t.operands)];
  const found = new Set(operands.flatMap((o) => (o.kind === 'generator' ? [o.position] : [])));
  return [...found].sort((a, b) => a - b);
}
