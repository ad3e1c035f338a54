import { execFileSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { isMissing } from '../emit/code-runner.js';
import { contentOf, run, scratch, THEORY } from './world.js';

const emit = (...args: string[]) => run(['emit', '-', ...args], { stdin: THEORY });

describe('untwist emit', () => {
  it('prints the code of each language', async () => {
    for (const [language, mark] of [
      ['typescript', 'export interface Couplings {'],
      ['javascript', 'export function equations(couplings, jets) {'],
      ['c', 'void old_pier_equations(const old_pier_couplings *couplings'],
      ['fortran', 'pure function equations(couplings, jets) result(values)'],
      ['python', 'def equations(couplings, jets):'],
      ['julia', 'function equations(couplings, jets)'],
      ['Python', 'def jacobian(couplings, jets):'],
    ] as const) {
      const { code, out, err } = await emit('--to', language);
      expect([code, err]).toEqual([0, '']);
      expect(out).toContain(mark);
      expect(out.endsWith('\n') && !out.endsWith('\n\n')).toBe(true);
    }
  });

  it('writes files, and replaces them only when told', async () => {
    const folder = scratch();
    const file = join(folder, 'deep', 'pier.mjs');
    const first = await emit('--to', 'javascript', '--out', file, '--example');
    expect(first).toEqual({ code: 0, err: '', out: `${file}\n${join(folder, 'deep', 'pier_example.mjs')}\n` });
    expect(Object.keys(contentOf(folder))).toEqual(['deep/pier.mjs', 'deep/pier_example.mjs']);
    const printed = execFileSync(process.execPath, [join(folder, 'deep', 'pier_example.mjs')], { encoding: 'utf8' });
    expect(printed).toMatch(/^equations\[phi\] = -?[\d.]+$/m);
    expect((await emit('--to', 'javascript', '--out', file)).err).toContain('already holds pier.mjs');
    expect((await emit('--to', 'javascript', '--out', file, '--force')).code).toBe(0);
  });

  it.skipIf(isMissing('python3'))('writes an example that runs in Python', async () => {
    const folder = scratch();
    expect((await emit('--to', 'python', '--out', join(folder, 'pier.py'), '--example')).code).toBe(0);
    const printed = execFileSync('python3', ['-B', join(folder, 'pier_example.py')], { encoding: 'utf8' });
    expect(printed).toMatch(/^jacobian\[3\]\[\d+\] = -?[\d.]+$/m);
  });

  it('leaves out the Jacobian, and imposes relations', async () => {
    expect((await emit('--to', 'c')).out).toContain('old_pier_jacobian');
    expect((await emit('--to', 'c', '--no-jacobian')).out).not.toContain('jacobian');
    expect((await emit('--to', 'python', '--set', 'b3=0')).out).not.toContain('"b3"');
  });

  it('takes a geometry whose equations come from the covariant ones', async () => {
    const text = THEORY.replace('[dust]', '[dust]\ngeometry: bianchi-v');
    const { code, out } = await run(['emit', '-', '--to', 'python', '--no-jacobian'], { stdin: text });
    expect(code).toBe(0);
    expect(out).toContain('def constraints(couplings, jets):');
  });

  it('says what to mend', async () => {
    const folder = scratch();
    for (const [args, text] of [
      [['--to', 'fortan'], 'error: there is no code for "fortan"\nhint: did you mean fortran?\n'],
      [['--to', 'cobol'], 'choose one of typescript, javascript, c, fortran, python, julia'],
      [['--to', 'c', '--example'], 'hint: give --out <file>\n'],
      [['--to', 'python', '--out', join(folder, 'old-pier.py')], 'old-pier.py is no name for a module of Python 3'],
      [['--to', 'c', '--out', join(folder, 'old "pier".c'), '--example'], 'cannot be named in a program'],
      [['--to', 'c', '--set', 'b3='], 'error'],
      [[], "required option '--to <language>' not specified"],
    ] as const) {
      const { code, out, err } = await emit(...args);
      expect([code, out]).toEqual([1, '']);
      expect(err).toContain(text);
    }
    expect(contentOf(folder)).toEqual({});
  });

  it('names the file of a fault that the reader does not see', async () => {
    const file = join(scratch(), 'theory.yaml');
    writeFileSync(file, THEORY.replace('[dust]', '[dust]\ngeometry: nowhere'));
    const { code, err } = await run(['emit', file, '--to', 'c']);
    expect(code).toBe(1);
    expect(err).toContain(file);
  });

  it('refuses what would take minutes before it begins', async () => {
    const factors = ['R', 'T_a T^a', 'R_{abcd} R^{abcd}', 'T_{abc} T^{abc}', 'T_a A^a'];
    const constants = Array.from({ length: 60 }, (_, i) => `g${i}`);
    const sum = constants.map((c, i) => `+ ${c} ${factors[i % 5]} R^${1 + (i % 3)}`).join('\n  ');
    const text = `untwist: 1\nname: x\nconstants: [${constants}]\nlagrangian: |\n  ${sum}\n`;
    const { code, err } = await run(['emit', '-', '--to', 'c'], { stdin: text });
    expect(err).toMatch(/the equations have \d+ terms.*\nhint: give --no-jacobian\n/);
    expect(code).toBe(1);
  }, 60_000);
});
