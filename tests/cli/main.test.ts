import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { main } from '../../src/cli/main.js';
import { run, scratch, THEORY, world } from './world.js';

describe('main', () => {
  it('prints help and the version to standard output', async () => {
    const help = await run(['--help']);
    expect([help.code, help.err]).toEqual([0, '']);
    expect(help.out).toContain('Usage: untwist [options] [command]');
    expect(help.out).toContain('derive [options] <theory>');
    expect(await run(['--version'])).toEqual({ code: 0, out: '0.1.0\n', err: '' });
    expect((await run(['derive', '--help'])).out).toContain('--set <relation>');
  });

  const faults: readonly (readonly [args: readonly string[], text: string])[] = [
    [['frobnicate'], "error: unknown command 'frobnicate'\n(untwist --help lists the commands)\n"],
    [['derive'], "error: missing required argument 'theory'\n(untwist --help lists the commands)\n"],
    [['derive', 'x.yaml', '--bogus'], "error: unknown option '--bogus'\n(untwist --help lists the commands)\n"],
    [
      ['derive', 'x.yaml', '--out'],
      "error: option '--out <folder>' argument missing\n(untwist --help lists the commands)\n",
    ],
  ];
  for (const [args, text] of faults)
    it(`ends with 1 and a hint for ${args.join(' ')}`, async () => {
      expect(await run(args)).toEqual({ code: 1, out: '', err: text });
    });

  it('ends with 1 and the usage when nothing is asked', async () => {
    const { code, out, err } = await run([]);
    expect([code, out]).toEqual([1, '']);
    expect(err).toContain('Usage: untwist');
  });

  it('shows every fault of the input with its place', async () => {
    const text = THEORY.replace('b3 M^2', 'b4 M^2').replace('1/2 c0', '1/2 co');
    expect(await run(['derive', '-', '--json'], { stdin: text })).toEqual({
      code: 1,
      out: '',
      err: [
        '<stdin>:5:17: error: unknown symbol co',
        '    lagrangian: 1/2 co M^2 R + b4 M^2 T_a T^a',
        '                    ^^',
        'hint: did you mean c0?',
        '<stdin>:5:28: error: unknown symbol b4',
        '    lagrangian: 1/2 co M^2 R + b4 M^2 T_a T^a',
        '                               ^^',
        'hint: did you mean b3?',
        '',
      ].join('\n'),
    });
  });

  it('colours only where the world takes colours and --no-color is not given', async () => {
    const wrong = { stdin: 'untwist: 1\n' };
    const colour = '\u001b[';
    expect((await run(['derive', '-'], { ...wrong, color: true })).err).toContain(colour);
    expect((await run(['derive', '-'], { ...wrong, color: false })).err).not.toContain(colour);
    expect((await run(['derive', '-', '--no-color'], { ...wrong, color: true })).err).not.toContain(colour);
  });

  it('ends with 2 and says whose fault it is when the program fails', async () => {
    const io = { ...world(), stdin: () => Promise.reject(new Error('the stream broke')) };
    const code = await main(['derive', '-'], io);
    expect(code).toBe(2);
    expect(io.err()).toMatch(/^error: untwist itself is at fault; no result was written\nError: the stream broke\n/);
    expect(io.out()).toBe('');
  });

  it('keeps results and diagnostics on their own streams', async () => {
    const file = join(scratch(), 'pier.yaml');
    writeFileSync(file, THEORY.replace('1/2 c0 M^2 R', '1/2 c0 R'));
    const { code, out, err } = await run(['derive', file, '--json']);
    expect(code).toBe(0);
    expect(JSON.parse(out)).toMatchObject({ theory: 'Old pier' });
    expect(err).toMatch(/warning: the term 1\/2 c0 R has mass dimension 2, a Lagrangian has 4\n/);
  });
});
