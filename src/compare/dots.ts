/**
 * Time derivatives as people type them, brought to the one form D(q,n) of the notation: \dot{\phi}, \ddot a, dot(phi).
 * The passage that comes out still knows where everything stood. Imports passages only.
 */
import type { Passage } from '../notation/passage.js';

const NAME = String.raw`\\?[A-Za-z][A-Za-z0-9_]*(?:\{[A-Za-z0-9]+\})?`;
const DOTS = new RegExp(
  String.raw`\\(d{0,3})dot\s*(?:\{\s*(${NAME})\s*\}|(${NAME}))|(?<![A-Za-z0-9_\\])(d{0,3})dot\s*\(\s*(${NAME})\s*\)`,
  'g',
);

/** The passage with dotted names written D(q,n); everything else is untouched, mistakes included. */
export function withoutDots({ text, locate }: Passage): Passage {
  const starts: number[] = [];
  const ends: number[] = [];
  let out = '';
  let done = 0;
  const copy = (to: number): void => {
    for (; done < to; done++) {
      starts.push(done);
      ends.push(done + 1);
      out += text[done]!;
    }
  };
  for (const match of text.matchAll(DOTS)) {
    const [whole, dots, braced, bare, typed, inside] = match;
    copy(match.index);
    const order = (dots ?? typed ?? '').length + 1;
    for (const letter of `D(${braced ?? bare ?? inside},${order})`) {
      starts.push(match.index);
      ends.push(match.index + whole.length);
      out += letter;
    }
    done = match.index + whole.length;
  }
  copy(text.length);
  return {
    text: out,
    locate: (start, end) => {
      const from = starts[start] ?? text.length;
      return locate(from, Math.max(from, end === 0 ? 0 : (ends[end - 1] ?? text.length)));
    },
  };
}
