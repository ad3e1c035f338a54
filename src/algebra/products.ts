/**
 * Products of two lists of packed monomials with coefficients in doubles, by two methods besides the hash table of
 * terms.ts: merging sorted runs when one factor is short, and an array over the box of all exponents when most of that box
 * is filled. The caller has bounded every sum below 2^53. Lists in and out are descending; sums that vanish are dropped.
 */
import { exponentRange, type Ring, unpackMonomial, weightOf, wordOf } from './ring.js';

export interface TermList {
  readonly keys: Float64Array;
  readonly coefficients: Float64Array;
}

/** Terms of one factor that are multiplied in one pass. */
const BLOCK = 128;
/** A factor with at most this many terms is multiplied by merging. */
export const FEW_TERMS = 32;
/** Largest box, in numbers of doubles. */
const MAX_BOX = 1 << 22;
/** Products of fewer pairs than this are not worth the set-up of a box. */
const MIN_PAIRS = 1 << 12;

/** a · b with few terms in b: one sorted run for each term of b, merged pairwise. */
export function mergedProduct(words: number, a: TermList, b: TermList): TermList {
  const n = a.coefficients.length;
  const m = b.coefficients.length;
  let keys = new Float64Array(n * m * words);
  let coefficients = new Float64Array(n * m);
  let spareKeys = new Float64Array(n * m * words);
  let spare = new Float64Array(n * m);
  for (let j = 0, t = 0, c = 0; j < m; j++) {
    const by = b.coefficients[j]!;
    for (let i = 0, s = 0; i < n; i++) {
      for (let w = 0; w < words; w++) keys[t++] = a.keys[s++]! + b.keys[j * words + w]!;
      coefficients[c++] = a.coefficients[i]! * by;
    }
  }
  let ends = Int32Array.from({ length: m }, (_, j) => (j + 1) * n);
  while (ends.length > 1) {
    const merged = new Int32Array((ends.length + 1) >> 1);
    let out = 0;
    for (let r = 0, from = 0; r < ends.length; r += 2) {
      const middle = ends[r]!;
      const end = r + 1 < ends.length ? ends[r + 1]! : middle;
      out = mergeRuns(words, keys, coefficients, from, middle, end, spareKeys, spare, out);
      merged[r >> 1] = out;
      from = end;
    }
    [keys, spareKeys] = [spareKeys, keys];
    [coefficients, spare] = [spare, coefficients];
    ends = merged;
  }
  const size = ends[0]!;
  return { keys: keys.slice(0, size * words), coefficients: coefficients.slice(0, size) };
}

/** Merges the runs [from, middle) and [middle, end) to the place `out`; returns where the result ends. */
function mergeRuns(
  words: number,
  keys: Float64Array,
  coefficients: Float64Array,
  from: number,
  middle: number,
  end: number,
  toKeys: Float64Array,
  to: Float64Array,
  out: number,
): number {
  let i = from;
  let j = middle;
  let n = out;
  while (i < middle && j < end) {
    let d = 0;
    for (let w = 0, p = i * words, q = j * words; w < words; w++) {
      d = keys[p + w]! - keys[q + w]!;
      if (d !== 0) break;
    }
    let source: number;
    if (d > 0) {
      to[n] = coefficients[i]!;
      source = i++ * words;
    } else if (d < 0) {
      to[n] = coefficients[j]!;
      source = j++ * words;
    } else {
      const s = coefficients[i]! + coefficients[j++]!;
      source = i++ * words;
      if (s === 0) continue;
      to[n] = s;
    }
    for (let w = 0, t = n * words; w < words; w++) toKeys[t + w] = keys[source + w]!;
    n++;
  }
  const rest = i < middle ? i : j;
  const last = i < middle ? middle : end;
  for (let t = n * words, s = rest * words; s < last * words; s++, t++) toKeys[t] = keys[s]!;
  for (let s = rest; s < last; s++) to[n++] = coefficients[s]!;
  return n;
}

/** box[p + q] += x[p] y[q] for all pairs: the loop in which a large product spends its time. */
function accumulate(box: Float64Array, pa: Int32Array, x: Float64Array, pb: Int32Array, y: Float64Array): void {
  // In blocks, so that the part of the box that one pass touches stays in the cache.
  for (let start = 0; start < pa.length; start += BLOCK) {
    const end = Math.min(start + BLOCK, pa.length);
    for (let j = 0; j < pb.length; j++) {
      const at = pb[j]!;
      const by = y[j]!;
      for (let i = start; i < end; i++) box[at + pa[i]!]! += x[i]! * by;
    }
  }
}

/** a · b over the box of exponents, or undefined when the box is too large or too empty for that. */
export function boxProduct(ring: Ring, a: TermList, b: TermList): TermList | undefined {
  const pairs = a.coefficients.length * b.coefficients.length;
  if (pairs < MIN_PAIRS) return undefined;
  const ra = exponentRange(ring, a.keys);
  const rb = exponentRange(ring, b.keys);
  const count = ring.generators.length;
  const strides = new Float64Array(count);
  let volume = 1;
  // The first generator is the most significant one, so that descending index is descending order of monomials.
  for (let g = count - 1; g >= 0; g--) {
    strides[g] = volume;
    volume *= ra.high[g]! - ra.low[g]! + rb.high[g]! - rb.low[g]! + 1;
    if (volume > MAX_BOX || volume > 2 * pairs) return undefined;
  }
  const places = (list: TermList, low: ArrayLike<number>): Int32Array =>
    Int32Array.from(list.coefficients, (_, i) => {
      const exponents = unpackMonomial(ring, list.keys, i * ring.words);
      let place = 0;
      for (let g = 0; g < count; g++) place += (exponents[g]! - low[g]!) * strides[g]!;
      return place;
    });
  const pa = places(a, ra.low);
  const pb = places(b, rb.low);
  const box = new Float64Array(volume);
  accumulate(box, pa, a.coefficients, pb, b.coefficients);
  let size = 0;
  for (let v = 0; v < volume; v++) if (box[v] !== 0) size++;
  const keys = new Float64Array(size * ring.words);
  const coefficients = new Float64Array(size);
  const active = ring.generators.flatMap((_, g) =>
    ra.high[g]! - ra.low[g]! + rb.high[g]! - rb.low[g]! > 0 || ra.low[g]! + rb.low[g]! !== 0 ? [g] : [],
  );
  for (let v = volume - 1, n = 0; v >= 0; v--) {
    if (box[v] === 0) continue;
    let rest = v;
    for (const g of active) {
      const digit = Math.floor(rest / strides[g]!);
      rest -= digit * strides[g]!;
      keys[n * ring.words + wordOf(g)]! += (digit + ra.low[g]! + rb.low[g]!) * weightOf(g);
    }
    coefficients[n++] = box[v]!;
  }
  return { keys, coefficients };
}
