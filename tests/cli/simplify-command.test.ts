import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { run, scratch } from './world.js';

const theory = (lagrangian: string, ...lines: string[]): string =>
  [
    'untwist: 1',
    'name: Old pier',
    'constants: [c1, c2]',
    'scales: { M: mass }',
    ...lines,
    `lagrangian: '${lagrangian}'`,
    '',
  ].join('\n');
const simplify = (text: string, ...options: string[]) => run(['simplify', '-', ...options], { stdin: text });

describe('untwist simplify', () => {
  it('prints one product on each line', async () => {
    const { code, out, err } = await simplify(theory('c1 R_{abcd} R^{badc} + c2 R_{efgh} R^{efgh} + R_{ab} R^{ba}'));
    expect([code, err]).toEqual([0, '']);
    expect(out).toBe('R_{ab} R^{ba}\n+ (c1 + c2) R_{abcd} R^{abcd}\n');
  });

  it('applies imposed relations of the file and of --set', async () => {
    const text = theory('c1 R^2 + c2 R_{ab} R^{ab}', 'impose: "c1 = 2 c2"');
    expect((await simplify(text)).out).toBe('2 c2 R²\n+ c2 R_{ab} R^{ab}\n');
    expect((await simplify(text, '--set', 'c2=1')).out).toBe('2 R²\n+ R_{ab} R^{ab}\n');
  });

  it('drops total derivatives when asked', async () => {
    const text = theory('c1 ( R^2 - 4 R_{ab} R^{ba} + R_{abcd} R^{cdab} )');
    expect((await simplify(text)).out).toContain('R_{abcd} R^{cdab}');
    expect((await simplify(text, '--modulo-boundary')).out).toBe('0\n');
    expect((await simplify(theory('R_{ab} R^{ba} + c1 T_a T^a'), '--torsion-free')).out).toBe('R_{ab} R^{ab}\n');
  });

  it('explains every step', async () => {
    const { out } = await simplify(theory('c1 R^{(scalar)}_{abcd} R^{abcd} + R'), '--explain');
    expect(out).toBe(
      [
        '1. curvature-scalar: the scalar part of curvature is built from R, and has the same scalar',
        '     c1 R^{(scalar)}_{abcd} R^{abcd}',
        '   = 1/6 c1 R²',
        '',
        'R',
        '+ 1/6 c1 R²',
        '',
      ].join('\n'),
    );
    expect((await simplify(theory('R + c1 R^2'), '--explain')).out).toMatch(/^No step was needed\./);
  });

  it('prints LaTeX and JSON', async () => {
    const text = theory('c1 \\epsilon^{abcd} R_{abcd} + 1/2 c2 M^2 R');
    expect((await simplify(text, '--latex')).out).toBe(
      '\\tfrac{1}{2} c_{2} M^{2} R\n+ c_{1} \\epsilon_{abcd} R^{abcd}\n',
    );
    const json = JSON.parse((await simplify(text, '--json')).out);
    expect(json).toMatchObject({ lagrangian: '1/2 c2 M^2 R + c1 \\epsilon_{abcd} R^{abcd}', stop: 'fixpoint' });
    expect(json.steps[0]).toMatchObject({ rule: 'canonical-form', before: 'c1 \\epsilon^{abcd} R_{abcd}' });
  });

  it('prints in the conventions of the file, and can be read again', async () => {
    const conventions = 'conventions: { signature: "+---", torsion: half, curvature-sign: -1 }';
    const text = theory('c1 M^2 R + c2 R_{ab} R^{ab} + c1 M^2 T_{abc} T^{bac}', conventions);
    const { lagrangian } = JSON.parse((await simplify(text, '--json')).out);
    expect(lagrangian).toBe('c1 M^2 R + c2 R_{ab} R^{ab} + c1 M^2 T_{abc} T^{bac}');
    expect(JSON.parse((await simplify(theory(lagrangian, conventions), '--json')).out).lagrangian).toBe(lagrangian);
  });

  it('takes declared tensors', async () => {
    const tensors = "tensors: { S: { indices: 2, symmetry: 'S_{ab} = -S_{ba}', dimension: mass^2 } }";
    expect(
      (await simplify(theory('S_{ab} S^{ab} + c1 S_{ab} S^{ba} + c2 S_{ab} R^{(weyl)}{}^{abcd} S_{cd}', tensors))).out,
    ).toContain('(1 - c1) S_{ab} S^{ab}'.replace('-', '−'));
  });

  it('takes rules of the user', async () => {
    const file = join(scratch(), 'own.yaml');
    const rule = (id: string, lhs: string, rhs: string): string =>
      `  - { id: ${id}, lhs: '${lhs}', rhs: '${rhs}', why: mine, source: mine, yes: [{ in: '${lhs}', out: '${rhs}' }], no: [{ in: R }] }\n`;
    const head = 'untwist-rules: 1\ntitle: own\nrules:\n';
    writeFileSync(file, head + rule('flat', 'T_a T^a', '0') + rule('idle', 'A_a A^a T_b T^b', '0'));
    const text = theory('c1 M^2 T_a T^a + c2 R^2');
    const { code, out, err } = await simplify(text, '--rules', file);
    expect([code, out, err]).toEqual([1, '', expect.stringContaining('the left side is a sum')]);
    writeFileSync(file, head + rule('flat', 'T_a T^a', '0') + rule('idle', 'T_a T^a R', '0'));
    expect(await simplify(text, '--rules', file)).toEqual({
      code: 0,
      out: 'c2 R²\n',
      err: 'rules that did not apply: idle\n',
    });
    writeFileSync(file, head + rule('gauss-bonnet', 'T_a T^a', '0'));
    expect((await simplify(text, '--rules', file)).err).toMatch(/there is a rule gauss-bonnet in rules\/identities/);
    writeFileSync(
      file,
      head +
        rule('there', 'T_a T^a', 'R') +
        rule('back', 'R', 'T_a T^a').replace('{ in: R }', "{ in: 'R_{ab} R^{ab}' }"),
    );
    const cycle = await simplify(theory('c1 M^2 T_a T^a'), '--rules', file);
    expect(cycle.code).toBe(1);
    expect(cycle.err).toMatch(/warning: the rules undo each other/);
  });

  it('says what is wrong with the input', async () => {
    const { code, err } = await simplify(theory('c1 R_{ab}'));
    expect(code).toBe(1);
    expect(err).toMatch(/indices a, b are free/);
  });

  it('refuses a product with too many arrangements as the fault of the input', async () => {
    const tensors =
      "tensors: { S: { indices: 6, symmetry: ['S_{abcdef} = S_{bacdef}', 'S_{abcdef} = S_{bcdefa}'], dimension: mass } }";
    const names = ['abcdef', 'ghijkl', 'mnopqr', 'stuvwx', 'yzABCD', 'EFGHIJ'];
    const across = [0, 1, 2, 3, 4, 5].map((i) => names.map((n) => n[i]).join(''));
    const product = [...names.map((n) => `S_{${n}}`), ...across.map((n) => `S^{${n}}`)].join(' ');
    const { code, err } = await simplify(theory(product, tensors));
    expect(code).toBe(1);
    expect(err).toMatch(/error: a product of tensors has too many equivalent arrangements/);
  }, 60_000);
});
