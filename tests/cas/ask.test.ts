import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { ask } from '../../src/cas/ask.js';

const GENEROUS_MS = 60_000;
const question = (library: 'nerdamer' | 'algebrite', polynomial: string) => ({
  library,
  polynomial,
  symbols: ['v1', 'v2'],
});

describe('a question to a package', () => {
  it(
    'is answered in its own thread',
    async () => {
      for (const library of ['nerdamer', 'algebrite'] as const) {
        const answer = await ask(question(library, 'v1^2-v2^2'), GENEROUS_MS);
        expect('reply' in answer && answer.reply, JSON.stringify(answer)).toMatch(/^-?\(.*v.*\)\*\(.*v.*\)$/);
      }
      const loaded = Object.keys(createRequire(import.meta.url).cache);
      expect(loaded.filter((path) => /nerdamer|algebrite/.test(path))).toEqual([]);
    },
    2 * GENEROUS_MS,
  );

  it(
    'comes back as a fault when the package reports an error',
    async () => {
      expect(
        await ask(question('algebrite', 'v1^2*100000000000000000000000000000000000000001+v2^2'), GENEROUS_MS),
      ).toEqual({
        fault: expect.stringMatching(/^Stop:/),
      });
      expect(await ask(question('nerdamer', 'v1^2+('), GENEROUS_MS)).toEqual({ fault: expect.any(String) });
    },
    2 * GENEROUS_MS,
  );

  it(
    'is given up at its time limit',
    async () => {
      const start = performance.now();
      // Far more than either package can do in a second; see the kernel's own benchmark.
      expect(await ask(question('algebrite', '(v1^31-1)*(v2^29+v1^7+3)^9*(v1^5*v2-7)^9'), 1_000)).toEqual({
        fault: 'time limit',
      });
      expect(performance.now() - start).toBeLessThan(10_000);
      expect(await ask(question('nerdamer', 'v1^2-v2^2'), 1)).toEqual({ fault: 'time limit' });
    },
    GENEROUS_MS,
  );
});
