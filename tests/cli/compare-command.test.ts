import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { run, scratch } from './world.js';

const theory = (name: string, lagrangian: string, more = ''): string =>
  `untwist: 1\nname: ${name}\nconstants: [c]\nscales: { M: mass }\nlagrangian: ${lagrangian}\nmatter: [dust, radiation]\n${more}`;

function files(...texts: string[]): string[] {
  const folder = scratch();
  return texts.map((text, i) => {
    const file = join(folder, `${i}.yaml`);
    writeFileSync(file, text);
    return file;
  });
}

describe('untwist compare with claims', () => {
  it('exits with 0 when all hold, 1 when one does not', async () => {
    const [file] = files(theory('Breakwater', '1/2 c M^2 R'));
    const good = await run(['compare', file!, '--claim', '3 c M^2 (H^2 + k/a^2) = rho', '--claim', '\\phi = H']);
    expect([good.code, good.err]).toEqual([0, '']);
    expect(good.out).toContain('Breakwater');
    const bad = await run(['compare', file!, '--claim', '3 c M^2 H^2 = rho', '--claim', 'phi = H']);
    expect(bad.code).toBe(1);
    expect(bad.out).toContain('  does not hold\n  left − right comes to -3*k*c*M^2/a^2\n');
  });

  it('takes definitions, branches and matter', async () => {
    const [file] = files(theory('Breakwater', '1/2 M^2 R + c R^2'));
    const args = [
      'compare',
      file!,
      '--claim',
      'x = (rho - 3 p)/(6 M^2)',
      '--where',
      'x = A1 + A4',
      '--branch',
      'psi = 0',
    ];
    expect((await run(args)).code).toBe(0);
    const json = JSON.parse((await run([...args, '--any-matter', '--json'])).out);
    expect(json).toMatchObject({
      branch: ['psi = 0'],
      where: ['x = A1 + A4'],
      claims: [{ verdict: 'holds', anyMatter: true }],
    });
  });

  it('imposes relations on the theory', async () => {
    const [file] = files(theory('Breakwater', '1/2 c M^2 R'));
    const args = ['compare', file!, '--claim', '3 M^2 (H^2 + k/a^2) = rho'];
    expect((await run(args)).code).toBe(1);
    expect((await run([...args, '--set', 'c = 1'])).code).toBe(0);
  });

  it('reads standard input', async () => {
    const { code } = await run(['compare', '-', '--claim', 'psi = 0'], { stdin: theory('Breakwater', '1/2 c M^2 R') });
    expect(code).toBe(0);
  });

  it('says which text is at fault', async () => {
    const [file] = files(theory('Breakwater', '1/2 c M^2 R'));
    const { code, out, err } = await run(['compare', file!, '--claim', '3 M^2 \\dot q = rho']);
    expect([code, out]).toEqual([1, '']);
    expect(err).toBe(
      '--claim:1:7: error: unknown symbol q\n    3 M^2 \\dot q = rho\n          ^^^^^^\nhint: define it with --where, or mend the name\n',
    );
  });

  it('exits with 3 for what is undecided', async () => {
    const [a, b] = files(theory('Breakwater', '1/2 c M^2 R'), theory('Breakwater', '1/2 c M^2 R'));
    const { code, out } = await run(['compare', a!, b!, '--redefine', 'a = 2 a']);
    expect([code, out.includes('undecided')]).toEqual([3, true]);
  });
});

describe('untwist compare with two theories', () => {
  it('exits with 0 when they are the same, 1 when not', async () => {
    const [a, b, c] = files(
      theory('A', '1/2 c M^2 R'),
      theory('B', 'c M^2 R'),
      theory('C', '1/2 c M^2 R', 'impose: ["c = 1"]\n'),
    );
    const same = await run(['compare', a!, b!]);
    expect(same.code).toBe(0);
    expect(same.out).toContain('theory 2 is theory 1 with (2) M^2 for M^2');
    expect((await run(['compare', a!, c!, '--set', 'c = 1'])).out).toContain('the same reduced Lagrangian');
    const other = files(theory('D', '1/2 c M^2 R').replace('dust, ', ''))[0]!;
    const different = await run(['compare', a!, other, '--json']);
    expect(different.code).toBe(1);
    expect(JSON.parse(different.out)).toMatchObject({ first: 'A', second: 'D', relation: 'different', same: false });
  });

  it('redefines fields of the first theory', async () => {
    const [a, b] = files(theory('A', '1/2 M^2 R + c T_a A^a'), theory('B', '1/2 M^2 R - c T_a A^a'));
    expect((await run(['compare', a!, b!, '--redefine', 'psi = -psi'])).out).toContain('the same reduced Lagrangian');
    const { code, err } = await run(['compare', a!, b!, '--redefine', 'psi = D(psi,1)']);
    expect([code, err.includes('--redefine:1:1: error:')]).toEqual([1, true]);
  });
});

describe('wrong use', () => {
  it.each([
    [[], 'nothing to compare with'],
    [['--redefine', 'phi = psi'], '--redefine compares two theories'],
    [['OTHER', '--claim', 'phi = H'], '--claim: claims are tested against one theory'],
    [['OTHER', '--where', 'x = H', '--any-matter'], '--where, --any-matter: claims are tested against one theory'],
  ])('%s', async (args, message) => {
    const [file] = files(theory('Breakwater', '1/2 c M^2 R'));
    const { code, err } = await run(['compare', file!, ...args.map((w) => (w === 'OTHER' ? file! : w))]);
    expect(code).toBe(1);
    expect(err).toContain(`error: ${message}`);
  });

  it('a theory at fault is named', async () => {
    const [file] = files(theory('Breakwater', '1/2 c M^2 R').replace('matter', 'impose: ["c = k"]\nmatter'));
    const missing = await run(['compare', '/nowhere.yaml', '--claim', 'H = 0']);
    expect([missing.code, missing.err.includes('there is no file')]).toEqual([1, true]);
    expect((await run(['compare', file!, '--claim', 'H = 0'])).code).toBe(1);
  });
});
