import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { contentOf, run, scratch, THEORY } from './world.js';

/** A folder with the theory in it. */
function harbour(text = THEORY): { folder: string; file: string; out: string } {
  const folder = scratch();
  const file = join(folder, 'pier.yaml');
  writeFileSync(file, text);
  return { folder, file, out: join(folder, 'results') };
}

const NAMES = ['derivation.json', 'derivation.tex', 'equations.tex', 'old-pier.ts', 'report.html'];

describe('untwist derive', () => {
  it('writes five files and says where', async () => {
    const { file, out } = harbour();
    const result = await run(['derive', file, '--out', out]);
    expect([result.code, result.err]).toEqual([0, '']);
    const files = contentOf(out);
    expect(Object.keys(files)).toEqual(NAMES);
    expect(JSON.parse(files['derivation.json']!)).toMatchObject({ theory: 'Old pier', geometry: 'flrw' });
    expect(files['derivation.tex']).toContain('\\documentclass');
    expect(files['equations.tex']).toContain('\\label{');
    expect(files['old-pier.ts']).toContain('export');
    expect(files['report.html']).toMatch(/^<!doctype html>/i);
    expect(result.out).toContain('Old pier');
    expect(result.out).toMatch(new RegExp(`\nWritten to ${out}\n {2}report\\.html {6}the derivation step by step`));
    for (const name of NAMES) expect(result.out).toContain(`  ${name} `);
  });

  it('prints the JSON alone with --json, the same as the file', async () => {
    const { folder, file, out } = harbour();
    const { code, out: text } = await run(['derive', file, '--json']);
    expect(code).toBe(0);
    expect(Object.keys(contentOf(folder))).toEqual(['pier.yaml']);
    await run(['derive', file, '--out', out]);
    expect(text).toBe(readFileSync(join(out, 'derivation.json'), 'utf8'));
  });

  it('reads standard input', async () => {
    const { code, out } = await run(['derive', '-', '--json'], { stdin: THEORY });
    expect(code).toBe(0);
    expect(JSON.parse(out).theory).toBe('Old pier');
  });

  it('imposes what --set says, after the relations of the file', async () => {
    const stdin = `${THEORY}impose: ["c0 = 2 b3"]\n`;
    const json = async (...set: string[]) =>
      JSON.parse((await run(['derive', '-', '--json', ...set.flatMap((s) => ['--set', s])], { stdin })).out);
    expect((await json()).eliminated).toEqual({ c0: '2*b3' });
    expect((await json('b3=1')).eliminated).toEqual({ c0: '2', b3: '1' });
    expect((await json('b3=c0', 'k = 0')).eliminated).toEqual({ c0: '0', b3: '0', k: '0' });
    const wrong = await run(['derive', '-', '--json', '--set', 'c0 = 1', '--set', 'b3 = 2'], { stdin });
    expect(wrong).toEqual({
      code: 1,
      out: '',
      err: [
        '--set:1:1: error: the relation contradicts what is already imposed',
        '    b3 = 2',
        '    ^^^^^^',
        'hint: drop one of the relations',
        '',
      ].join('\n'),
    });
  });

  it('prints the variables that are asked for, and keeps JSON and code in the fields', async () => {
    const { file, folder } = harbour();
    const results = await Promise.all(
      ['phi,psi', 'u, v', 'h,f'].map(async (pair, i) => {
        const out = join(folder, `out${i}`);
        const { code, out: text } = await run(['derive', file, '--out', out, '--variables', pair]);
        expect(code, pair).toBe(0);
        return { text, files: contentOf(out) };
      }),
    );
    const [plain, torsion, comoving] = results as [(typeof results)[0], (typeof results)[0], (typeof results)[0]];
    expect(torsion.files['derivation.json']).toBe(plain.files['derivation.json']);
    expect(comoving.files['old-pier.ts']).toBe(plain.files['old-pier.ts']);
    expect(torsion.files['equations.tex']).not.toBe(plain.files['equations.tex']);
    expect(new Set(results.map((r) => r.text.replaceAll(/out\d/g, ''))).size).toBe(3);
  });

  it('refuses variables that the geometry does not have, before it writes', async () => {
    const { file, out, folder } = harbour();
    expect(await run(['derive', file, '--out', out, '--variables', 'u,w'])).toEqual({
      code: 1,
      out: '',
      err: 'error: the geometry flrw has no variables u,w\nhint: choose one of "phi,psi", "u,v", "h,f"\n',
    });
    expect(Object.keys(contentOf(folder))).toEqual(['pier.yaml']);
  });

  it('prints an anisotropic geometry in its own variables', async () => {
    const { file, out } = harbour(`${THEORY}geometry: bianchi-i\n`);
    const { code, err } = await run(['derive', file, '--out', out]);
    expect([code, err]).toEqual([0, '']);
    expect((await run(['derive', file, '--out', out, '--force', '--variables', 'u,v'])).err).toBe(
      'error: the geometry bianchi-i has no variables u,v\nhint: leave --variables out\n',
    );
  });

  it('replaces files only with --force', async () => {
    const { file, out } = harbour();
    mkdirSync(out);
    writeFileSync(join(out, 'derivation.tex'), 'written by hand');
    const before = contentOf(out);
    expect(await run(['derive', file, '--out', out])).toEqual({
      code: 1,
      out: '',
      err: [
        `error: ${out} already holds derivation.tex`,
        'hint: give --force to replace them, or another folder with --out',
        '',
      ].join('\n'),
    });
    expect(contentOf(out)).toEqual(before);
    expect((await run(['derive', file, '--out', out, '--force'])).code).toBe(0);
    expect(contentOf(out)['derivation.tex']).toContain('\\documentclass');
  });

  it('loses nothing when the folder cannot be written', async () => {
    const { file } = harbour();
    const result = await run(['derive', file, '--out', file]);
    expect([result.code, result.out]).toEqual([1, '']);
    expect(result.err).toBe(
      `error: cannot write to ${file}: EEXIST: file already exists, mkdir '${file}'\nhint: choose a folder that can be written with --out\n`,
    );
    expect(readFileSync(file, 'utf8')).toBe(THEORY);
  });

  it('loses nothing when a result has the name of a folder', async () => {
    const { file, out } = harbour();
    mkdirSync(join(out, 'report.html'), { recursive: true });
    writeFileSync(join(out, 'derivation.tex'), 'old');
    const result = await run(['derive', file, '--out', out, '--force']);
    expect([result.code, result.out]).toEqual([1, '']);
    expect(result.err).toContain(`${join(out, 'report.html')} is there already and is no file`);
    expect(contentOf(out)).toEqual({ 'derivation.tex': 'old' });
  });

  it('typesets no equations that nobody would read, but prints them as JSON', async () => {
    const { file, out, folder } = harbour(
      'untwist: 1\nname: Old pier\nlagrangian: R^5/M^6\nscales: { M: mass }\ngeometry: bianchi-i\n',
    );
    const { code, err } = await run(['derive', file, '--out', out]);
    expect(code).toBe(1);
    expect(err).toMatch(/error: the equations have \d{5,} terms; more than 50000 are not typeset\nhint: give --json/);
    expect(Object.keys(contentOf(folder))).toEqual(['pier.yaml']);
    expect((await run(['derive', file, '--json'])).code).toBe(0);
  });

  it('names the file for a fault that has no place in it', async () => {
    const { file } = harbour(`${THEORY}geometry: flwr\n`);
    const { code, err } = await run(['derive', file, '--json']);
    expect(code).toBe(1);
    expect(err).toContain(`${file}:`);
    expect(err).toContain('error: there is no geometry flwr\n');
    expect(err).toContain('hint: did you mean flrw?\n');
  });

  it('shows warnings beside the results', async () => {
    const { file, out } = harbour(THEORY.replace('[c0, b3]', '[c0, b3, b7]'));
    const { code, err } = await run(['derive', file, '--out', out]);
    expect(code).toBe(0);
    expect(err).toMatch(/^.*pier\.yaml:3:\d+: warning: .*b7/);
  });

  it('cleans its progress line before an error', async () => {
    const { folder } = harbour();
    const { err } = await run(['derive', join(folder, 'pier.yaml'), '--out', join(folder, 'o'), '--variables', 'x'], {
      interactive: true,
    });
    const drawn = err.lastIndexOf('…');
    if (drawn >= 0) expect(err.slice(drawn + 1).startsWith('\r\u001b[K')).toBe(true);
    expect(err).toContain('error: the geometry flrw has no variables x');
  });

  it('is the same on every run', async () => {
    const { file, folder } = harbour();
    const texts: Record<string, string>[] = [];
    for (const name of ['one', 'two']) {
      await run(['derive', file, '--out', join(folder, name)]);
      texts.push(contentOf(join(folder, name)));
    }
    expect(texts[1]).toEqual(texts[0]);
  });
});
