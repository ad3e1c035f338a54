import { describe, expect, it } from 'vitest';
import { LANGUAGES, typescriptModule } from '../../src/emit/code.js';
import type { CodeModule } from '../../src/emit/code-description.js';
import {
  EIGHTEEN,
  example,
  firstOrderModule,
  HOSTILE_NAMES,
  HOSTILE_THEORY,
  HOSTILE_TITLES,
  modelOf,
  named,
  QUARTIC,
  THEORIES,
} from './code-fixtures.js';
import { languageOf, RUNNERS, randomPoint, runnable, worst } from './code-runner.js';
import { deriveText, inTemporary, integers } from './emitted-module.js';

const IDS = LANGUAGES.map((l) => l.id);

/** Emits, compiles, runs and compares in every language. */
async function compare(
  m: CodeModule,
  points: number,
  seed: number,
  { bits = 8, optimise = '-O1' } = {},
): Promise<void> {
  const random = integers(seed);
  const where = Array.from({ length: points }, () => randomPoint(m, random, bits));
  for (const id of runnable()) {
    const values = await inTemporary((directory) => RUNNERS[id]!(m, where, directory, optimise));
    const { error, at } = worst(m, where, values);
    expect(error, `${id}, seed ${seed}: ${at}`).toBeLessThan(1e-12);
  }
}

describe('emitted code', { timeout: 240_000 }, () => {
  it('has a runner for every language', () => {
    expect(Object.keys(RUNNERS).sort()).toEqual([...IDS].sort());
    expect(IDS).toEqual(['typescript', 'javascript', 'c', 'fortran', 'python', 'julia']);
  });

  for (const [name, text] of Object.entries(THEORIES)) {
    const isLong = name === 'Bianchi I';
    it(`compiles without warnings and agrees with the exact expressions: ${name}`, () =>
      compare(modelOf(text), isLong ? 1 : 3, 77, isLong ? { optimise: '-O0' } : { bits: 20 }));
  }

  it('knows multipliers and spin', async () => {
    await compare(modelOf(example('narrow-sound')), 2, 5);
    await compare(modelOf(example('still-water')), 2, 6);
  });

  it('takes a state, rates that are fractions, their Jacobian and roots as it takes jets', () =>
    compare(firstOrderModule(), 4, 20260801));

  it('cuts functions of thousands of terms into parts', async () => {
    const m = modelOf(QUARTIC);
    for (const id of IDS) expect(languageOf(id).write(m), id).toMatch(/jacobian_?[pP]art2/);
    await compare(m, 1, 3, { bits: 4, optimise: '-O0' });
  });

  it('keeps names that are words or macros of any language, or one name in another case', () =>
    compare(modelOf(HOSTILE_THEORY), 2, 9, { optimise: '-O0' }));

  it('lets no name of a theory out of its comment or string', async () => {
    const plain = modelOf('untwist: 1\nname: x\nconstants: [g]\nlagrangian: g R + T_a T^a\n');
    for (const title of HOSTILE_TITLES) {
      const m = { ...named(plain, title), conditions: [title] };
      for (const { id, write } of LANGUAGES)
        expect(write(m).replaceAll('\n', ''), id).not.toMatch(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/u);
      await compare(m, 1, 1);
    }
  });

  it('is the same text every time, and documents every parameter with its dimension', () => {
    const m = modelOf(EIGHTEEN);
    for (const { id, write } of LANGUAGES) {
      expect(write(modelOf(EIGHTEEN)), id).toBe(write(m));
      const text = write(m).replace(/\s*\n[ *!#]*/g, ' ');
      for (const p of m.parameters) expect(text, `${id} ${p.name}`).toContain(p.meaning);
      expect(text, id).toContain('spatial curvature; mass dimension 2');
      expect(text, id).toContain('∂L/∂phi − d/dt ∂L/∂(dphi/dt); mass dimension 3');
    }
  });

  it('leaves the Jacobian out of the module that derive writes', () => {
    expect(typescriptModule(deriveText(EIGHTEEN))).not.toContain('jacobian');
    expect(languageOf('typescript').write(modelOf(EIGHTEEN))).toContain('export function jacobian(');
  });

  it('tries names that the reader of theories admits', () => {
    expect(HOSTILE_NAMES.length).toBeGreaterThan(120);
  });
});
