/**
 * Random Lagrangians as structured data, and their text in index notation with harmless variations: spaces, braces,
 * names of dummies, order of factors and terms, powers, brackets, the ways of writing a coefficient.
 */
import { Contraction, type Factor, type Head, type LagrangianTerm, type Slot } from './contraction.js';
import type { Q } from './exact.js';
import * as E from './exact.js';
import { fieldJets, frameOf } from './geometry.js';
import { Random } from './random.js';

/** Tensors a random product may draw, with their numbers of slots; repeated ones are likelier. */
const DRAW: readonly (readonly [Head, number])[] = [
  ['R', 4],
  ['R', 4],
  ['R', 2],
  ['R', 0],
  ['T', 3],
  ['T', 3],
  ['T', 3],
  ['T', 1],
  ['A', 1],
];

const NAMES = [
  ...[...'abcdefghijklmnopqrstuvwxyz'],
  ...['\\mu', '\\nu', '\\rho', '\\sigma', '\\lambda', '\\alpha', '\\beta', '\\gamma', '\\tau', '\\kappa'],
];

export interface Wishes {
  /** Numbers of factors R, T, A in a product, least and most. */
  readonly degree: readonly [least: number, most: number];
  /** Chance in percent of an ε, and of a redundant η or δ. */
  readonly epsilon: number;
  readonly metric: number;
  readonly constants: readonly string[];
}

export const CONSTANTS = ['a1', 'b', 'c0', 'alpha_1', 'q2', 'M', 'mu'] as const;

/** A product of tensors contracted at random; undefined when the drawn slots cannot be paired. */
export function randomProduct(random: Random, wishes: Wishes): Factor[] | undefined {
  const heads: (readonly [Head, number])[] = [];
  const [least, most] = wishes.degree;
  for (let n = least + random.below(most - least + 1); n > 0; n--) heads.push(random.pick(DRAW));
  if (random.chance(wishes.epsilon)) heads.push(['epsilon', 4]);
  if (random.chance(wishes.metric)) heads.push([random.pick(['eta', 'delta'] as const), 2]);
  const owners = heads.flatMap(([, count], i) => Array<number>(count).fill(i));
  if (owners.length % 2 === 1 || owners.length > 2 * NAMES.length) return undefined;
  const slots: Slot[] = owners.map(() => ({ name: '', up: false }));
  const order = random.shuffled(owners.map((_, i) => i));
  const names = random.shuffled(NAMES);
  for (let i = 0; i < order.length; i += 2) {
    const up = random.chance(50);
    slots[order[i]!] = { name: names[i / 2]!, up };
    slots[order[i + 1]!] = { name: names[i / 2]!, up: !up };
  }
  const factors = heads.map(([head], i) => ({ head, slots: slots.filter((_, s) => owners[s] === i) }));
  // δ is written with one index up and one down.
  if (factors.some((f) => f.head === 'delta' && f.slots[0]!.up === f.slots[1]!.up)) return undefined;
  return factors;
}

let sieve: Contraction | undefined;

/** True when the product does not vanish at one fixed isotropic point: most random contractions do. */
function survives(factors: readonly Factor[]): boolean {
  if (sieve === undefined) {
    const point = new Random(5).point('flrw', [], 1);
    const algebra = { kSquared: point.k };
    const still = fieldJets(point, algebra, -1);
    sieve = new Contraction(frameOf('flrw', still, algebra), '-+++');
  }
  return !sieve.value(factors).isZero();
}

/** A term with a random coefficient; one in ten may vanish by symmetry. */
export function randomTerm(random: Random, wishes: Wishes): LagrangianTerm {
  let factors: Factor[] | undefined;
  const careless = random.chance(10);
  do factors = randomProduct(random, wishes);
  while (factors === undefined || !(careless || survives(factors)));
  const symbols = new Map<string, number>();
  for (let n = random.below(3); n > 0 && wishes.constants.length > 0; n--) {
    const name = random.pick(wishes.constants);
    symbols.set(name, (symbols.get(name) ?? 0) + random.pick([1, 1, 2, -1]));
  }
  return { coefficient: random.rational(true), symbols: [...symbols].filter(([, e]) => e !== 0), factors };
}

/** A Lagrangian and a text that means it. */
export interface Written {
  readonly terms: readonly LagrangianTerm[];
  readonly text: string;
}

/** What the writer may do to the meaning: square terms and form brackets, only form brackets, or nothing. */
export type Liberty = 'squares' | 'brackets' | 'none';

/** Text of a Lagrangian; `terms` says what it means, which with liberty `none` is the Lagrangian given. */
export function write(random: Random, lagrangian: readonly LagrangianTerm[], liberty: Liberty = 'squares'): Written {
  const terms: LagrangianTerm[] = [];
  let text = '';
  for (let i = 0; i < lagrangian.length; ) {
    const together = liberty !== 'none' && random.chance(15) ? 1 + random.below(3) : 1;
    const here = lagrangian.slice(i, i + together);
    i += here.length;
    const written =
      here.length > 1
        ? bracket(random, here, liberty)
        : liberty === 'squares' && random.chance(12)
          ? square(random, here[0]!)
          : one(random, here[0]!, liberty);
    terms.push(...written.terms);
    const negative = written.text.startsWith('-');
    const first = text === '';
    const sign = negative ? '' : first ? '' : random.chance(10) ? '+ + ' : '+ ';
    text += `${first ? '' : random.chance(30) ? '\n' : ' '}${sign}${written.text}`;
  }
  return { terms, text };
}

function one(random: Random, term: LagrangianTerm, liberty: Liberty): Written {
  const [negative, front] = frontOf(random, term);
  const [product, terms] = productOf(random, term, liberty !== 'none');
  const pieces = [front, product].filter((x) => x !== '').join(random.chance(10) ? '\n  ' : ' ');
  return {
    terms,
    text: `${negative ? '-' : ''}${negative && random.chance(50) ? ' ' : ''}${pieces === '' ? '1' : pieces}`,
  };
}

/** r M^n (L₁ + L₂ …). */
function bracket(random: Random, terms: readonly LagrangianTerm[], liberty: Liberty): Written {
  const inner = write(random, terms, liberty);
  const coefficient = random.rational(true);
  const exponent = 1 + random.below(2);
  const front = `${show(coefficient)} M${exponent === 1 ? '' : '^2'}`;
  return {
    terms: inner.terms.map((t) => times(t, coefficient, 'M', exponent)),
    text: random.chance(50) ? `${front} (${inner.text})` : `(${inner.text}) ${front.replace('-', '(-1) ')}`,
  };
}

type Symbols = LagrangianTerm['symbols'];

function multiplied(...all: readonly Symbols[]): Symbols {
  const powers = new Map<string, number>();
  for (const [name, exponent] of all.flat()) powers.set(name, (powers.get(name) ?? 0) + exponent);
  return [...powers].filter(([, exponent]) => exponent !== 0);
}

function times(term: LagrangianTerm, by: Q, name: string, exponent: number): LagrangianTerm {
  const symbols = multiplied(term.symbols, [[name, exponent]]);
  return { coefficient: E.mul(term.coefficient, by), symbols, factors: term.factors };
}

/** (L₁)², when it has at most three tensors. */
function square(random: Random, term: LagrangianTerm): Written {
  if (term.factors.length > 3) return one(random, term, 'squares');
  const inner = one(random, term, 'squares');
  const terms = inner.terms.flatMap((x) =>
    inner.terms.map((y) => ({
      coefficient: E.mul(x.coefficient, y.coefficient),
      symbols: multiplied(x.symbols, y.symbols),
      factors: [
        ...x.factors,
        ...y.factors.map((f) => ({ ...f, slots: f.slots.map((s) => ({ ...s, name: `${s.name}'` })) })),
      ],
    })),
  );
  return { terms, text: `(${inner.text})^2` };
}

const GREEK = new Set(['mu', 'alpha_1']);

function symbolText(random: Random, name: string): string {
  return GREEK.has(name) && random.chance(50) ? `\\${name}` : name;
}

function frontOf(random: Random, { coefficient, symbols }: LagrangianTerm): [negative: boolean, text: string] {
  const negative = coefficient.n < 0n;
  const size: Q = negative ? E.neg(coefficient) : coefficient;
  const words: string[] = [];
  const below: string[] = [];
  if (size.d !== 1n && random.chance(40)) {
    words.push(`\\${random.pick(['frac', 'tfrac'])}{${size.n}}{${size.d}}`);
  } else if (size.d !== 1n && random.chance(50)) {
    words.push(`${size.n}/${size.d}`);
  } else {
    if (size.n !== 1n || random.chance(20)) words.push(`${size.n}`);
    if (size.d !== 1n) below.push(`${size.d}`);
  }
  for (const [name, exponent] of random.shuffled(symbols)) {
    const symbol = symbolText(random, name);
    const e = Math.abs(exponent);
    const power = e === 1 ? symbol : random.chance(50) ? `${symbol}^${e}` : `${symbol}^{${e}}`;
    if (exponent > 0) words.push(power);
    else below.push(power);
  }
  if (below.length > 0 && words.length === 0) words.push('1');
  // Division and juxtaposition go left to right: every divisor has its own bar, after all that it divides.
  return [negative, `${words.join(' ')}${below.map((x) => `${random.chance(50) ? '/' : ' / '}${x}`).join('')}`];
}

function productOf(random: Random, term: LagrangianTerm, brackets: boolean): [text: string, terms: LagrangianTerm[]] {
  const { factors } = term;
  const scalars = factors.filter((f) => f.slots.length === 0);
  const tensors = random.shuffled(factors.filter((f) => f.slots.length > 0));
  const words: string[] = [];
  if (scalars.length > 1 && random.chance(60))
    words.push(random.chance(50) ? `R^${scalars.length}` : `R^{${scalars.length}}`);
  else words.push(...scalars.map(() => 'R'));
  let expanded: LagrangianTerm[] = [term];
  if (brackets && tensors.length > 0 && random.chance(20)) {
    // One tensor X becomes the bracket (X − r X' ) with X' the same tensor, two of its indices exchanged.
    const chosen = random.pick(tensors);
    const ratio = random.rational(true);
    const swapped = exchange(random, chosen);
    if (swapped !== undefined) {
      const sign = ratio.n < 0n ? '-' : '+';
      const size = show(ratio.n < 0n ? E.neg(ratio) : ratio);
      const open = random.pick(['(', '[', '\\left(']);
      const close = open === '(' ? ')' : open === '[' ? ']' : '\\right)';
      for (const f of tensors)
        words.push(
          f === chosen
            ? `${open}${factorText(random, f)} ${sign} ${size} ${factorText(random, swapped)}${close}`
            : factorText(random, f),
        );
      expanded = [
        term,
        {
          ...term,
          coefficient: E.mul(term.coefficient, ratio),
          factors: factors.map((f) => (f === chosen ? swapped : f)),
        },
      ];
      return [words.join(' '), expanded];
    }
  }
  words.push(...tensors.map((f) => factorText(random, f)));
  return [words.join(random.chance(20) ? '\n' : ' '), expanded];
}

function show(x: Q): string {
  return x.d === 1n ? `${x.n}` : `${x.n}/${x.d}`;
}

/** The factor with two of its slots exchanged, so that its free indices stay the same. */
function exchange(random: Random, factor: Factor): Factor | undefined {
  if (factor.slots.length < 2 || factor.head === 'delta') return undefined;
  const [i, j] = random.shuffled(factor.slots.map((_, s) => s)) as [number, number];
  const slots = [...factor.slots];
  [slots[i], slots[j]] = [slots[j]!, slots[i]!];
  return { head: factor.head, slots };
}

/** `R^{a}{}_{bcd}` and its likes. */
export function factorText(random: Random, { head, slots }: Factor): string {
  let out = head === 'epsilon' || head === 'eta' || head === 'delta' ? `\\${head}` : head;
  for (let i = 0; i < slots.length; ) {
    let end = i + 1;
    while (end < slots.length && slots[end]!.up === slots[i]!.up) end++;
    const run = slots.slice(i, end).map((s) => s.name);
    const bare = run.length === 1 && random.chance(50);
    const gap = random.chance(20) ? ' ' : '';
    if (i > 0 && (head !== 'delta' || random.chance(50))) out += '{}';
    out += `${slots[i]!.up ? '^' : '_'}${bare ? run[0] : `{${gap}${joined(run)}${gap}}`}`;
    i = end;
  }
  return out;
}

/** Names in a row; a macro needs a space before a letter. */
function joined(names: readonly string[]): string {
  let out = '';
  for (const name of names) out += /\\[a-z]+$/.test(out) && !name.startsWith('\\') ? ` ${name}` : name;
  return out;
}
