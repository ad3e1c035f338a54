/**
 * Lists of packed monomials with their coefficients: a table that collects them, and the merging of two sorted lists.
 * Coefficients are doubles (the caller has bounded every sum below 2^53) or BigInts. Imports nothing.
 */

const EMPTY = -1;

/**
 * Accumulates coefficients by monomial, by open addressing over packed exponent words.
 * Fill `key`, call `slot()`, then add to `numbers[slot]` or `bigs[slot]`.
 */
export class TermTable {
  readonly words: number;
  /** Scratch: the monomial that the next `slot()` looks up. */
  readonly key: Float64Array;
  /** Coefficients when the table counts in doubles. Growing replaces the array: read it after `slot()`. */
  numbers: Float64Array;
  /** Coefficients when the table counts in BigInts. */
  readonly bigs: bigint[] | undefined;
  count = 0;
  private keys: Float64Array;
  private buckets: Int32Array;
  private mask: number;

  constructor(words: number, expected: number, big: boolean) {
    this.words = words;
    this.key = new Float64Array(words);
    let size = 16;
    while (size < 2 * expected) size *= 2;
    this.buckets = new Int32Array(size).fill(EMPTY);
    this.mask = size - 1;
    this.keys = new Float64Array((size >> 1) * words);
    this.numbers = new Float64Array(big ? 0 : size >> 1);
    this.bigs = big ? [] : undefined;
  }

  private hash(source: Float64Array, offset: number): number {
    let h = 0;
    for (let w = 0; w < this.words; w++) {
      const x = source[offset + w]!;
      h = (Math.imul(h ^ x, 0x9e3779b1) + x / 0x100000000) | 0;
    }
    h ^= h >>> 15;
    h = Math.imul(h, 0x85ebca6b);
    return (h ^ (h >>> 13)) & this.mask;
  }

  /** Index of the monomial in `key`, new with coefficient 0 when it was not there. */
  slot(): number {
    const { key, words } = this;
    let b = this.hash(key, 0);
    for (;;) {
      const s = this.buckets[b]!;
      if (s === EMPTY) break;
      const keys = this.keys;
      let w = 0;
      const base = s * words;
      while (w < words && keys[base + w] === key[w]) w++;
      if (w === words) return s;
      b = (b + 1) & this.mask;
    }
    const s = this.count++;
    if (s * words >= this.keys.length) {
      this.grow();
      return this.insert(s);
    }
    this.buckets[b] = s;
    this.keys.set(key, s * words);
    if (this.bigs) this.bigs.push(0n);
    return s;
  }

  private insert(s: number): number {
    let b = this.hash(this.key, 0);
    while (this.buckets[b] !== EMPTY) b = (b + 1) & this.mask;
    this.buckets[b] = s;
    this.keys.set(this.key, s * this.words);
    if (this.bigs) this.bigs.push(0n);
    return s;
  }

  private grow(): void {
    const capacity = (this.keys.length / this.words) * 2;
    const keys = new Float64Array(capacity * this.words);
    keys.set(this.keys);
    this.keys = keys;
    if (!this.bigs) {
      const numbers = new Float64Array(capacity);
      numbers.set(this.numbers);
      this.numbers = numbers;
    }
    this.buckets = new Int32Array(capacity * 2).fill(EMPTY);
    this.mask = capacity * 2 - 1;
    for (let s = 0; s < this.count - 1; s++) {
      let b = this.hash(keys, s * this.words);
      while (this.buckets[b] !== EMPTY) b = (b + 1) & this.mask;
      this.buckets[b] = s;
    }
  }

  /** The non-zero terms, monomials in descending order. */
  sorted(): { keys: Float64Array; coefficients: Float64Array | bigint[] } {
    const { words, keys, bigs, numbers } = this;
    const order: number[] = [];
    for (let s = 0; s < this.count; s++) if (bigs ? bigs[s] !== 0n : numbers[s] !== 0) order.push(s);
    order.sort((a, b) => compareKeys(keys, b * words, keys, a * words, words));
    const sortedKeys = new Float64Array(order.length * words);
    const coefficients = bigs ? order.map((s) => bigs[s]!) : new Float64Array(order.length);
    for (let i = 0; i < order.length; i++) {
      const s = order[i]!;
      for (let w = 0; w < words; w++) sortedKeys[i * words + w] = keys[s * words + w]!;
      if (!bigs) (coefficients as Float64Array)[i] = numbers[s]!;
    }
    return { keys: sortedKeys, coefficients };
  }
}

/** Lexicographic order of two packed monomials: negative, zero or positive. */
export function compareKeys(a: Float64Array, i: number, b: Float64Array, j: number, words: number): number {
  for (let w = 0; w < words; w++) {
    const d = a[i + w]! - b[j + w]!;
    if (d !== 0) return d;
  }
  return 0;
}

/**
 * Merges a + sign·b from two descending lists and drops sums that vanish. Monomials are written to `out`, the sums returned;
 * undefined when a sum leaves the range of safe integers.
 */
export function mergeDoubles(
  words: number,
  ka: Float64Array,
  a: Float64Array,
  kb: Float64Array,
  b: Float64Array,
  sign: 1 | -1,
  out: Float64Array,
): Float64Array | undefined {
  const la = a.length;
  const lb = b.length;
  const sums = new Float64Array(la + lb);
  let n = 0;
  let i = 0;
  let j = 0;
  while (i < la && j < lb) {
    const p = i * words;
    const q = j * words;
    let d = 0;
    for (let w = 0; w < words && d === 0; w++) d = ka[p + w]! - kb[q + w]!;
    const s = d > 0 ? a[i]! : d < 0 ? sign * b[j]! : a[i]! + sign * b[j]!;
    if (d >= 0) i++;
    if (d <= 0) j++;
    if (s === 0) continue;
    // A sum of two safe integers that rounds to a safe integer was exact.
    if (s > Number.MAX_SAFE_INTEGER || s < -Number.MAX_SAFE_INTEGER) return undefined;
    const t = n * words;
    if (d >= 0) for (let w = 0; w < words; w++) out[t + w] = ka[p + w]!;
    else for (let w = 0; w < words; w++) out[t + w] = kb[q + w]!;
    sums[n++] = s;
  }
  let t = n * words;
  for (let s = i * words; s < la * words; s++) out[t++] = ka[s]!;
  for (let s = j * words; s < lb * words; s++) out[t++] = kb[s]!;
  for (; i < la; i++) sums[n++] = a[i]!;
  for (; j < lb; j++) sums[n++] = sign * b[j]!;
  return n === sums.length ? sums : sums.slice(0, n);
}

/** As `mergeDoubles`, for any size of coefficient. */
export function mergeBigs(
  words: number,
  ka: Float64Array,
  a: readonly bigint[],
  kb: Float64Array,
  b: readonly bigint[],
  sign: 1 | -1,
  out: Float64Array,
): bigint[] {
  const sums: bigint[] = [];
  let i = 0;
  let j = 0;
  while (i < a.length || j < b.length) {
    const c = i >= a.length ? -1 : j >= b.length ? 1 : compareKeys(ka, i * words, kb, j * words, words);
    const source = c >= 0 ? ka : kb;
    const base = (c >= 0 ? i : j) * words;
    const right = c > 0 ? 0n : sign < 0 ? -b[j++]! : b[j++]!;
    const s = c < 0 ? right : a[i++]! + right;
    if (s === 0n) continue;
    out.set(source.subarray(base, base + words), sums.length * words);
    sums.push(s);
  }
  return sums;
}
