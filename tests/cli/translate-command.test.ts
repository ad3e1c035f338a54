import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { derivationObject, derive, readTheory } from '../../src/index.js';
import { basisNames } from '../../src/tensor/basis-file.js';
import { run, scratch } from './world.js';

const theory = (lagrangian: string, ...lines: string[]): string =>
  [
    'untwist: 1',
    'name: Old pier',
    'constants: [c1, c2] # both small',
    ...lines,
    `lagrangian: ${lagrangian}`,
    'matter: [dust]',
    '',
  ].join('\n');
const translate = (text: string, ...options: string[]) => run(['translate', '-', ...options], { stdin: text });
const HARBOUR = 'rules/examples/harbour-light.yaml';

describe('untwist translate', () => {
  it('prints the dictionary as a table', async () => {
    const { code, out, err } = await translate(theory("'c1 R_{ab} R^{ab} + R T_a T^a'"), '--to', 'irreducible');
    expect(code).toBe(0);
    expect(err).toMatch(/^(?:<stdin>.*warning[\s\S]*)?$/);
    expect(out).toContain('Old pier in the basis irreducible: irreducible parts\n');
    expect(out).toMatch(/│ r4 +│ 1\/2 c1 +│ R\^\{\(ricci\)\}_\{abcd\} R\^\{\(ricci\)\}\{\}\^\{abcd\} +│/);
    expect(out).toMatch(/│ r6 +│ 3\/2 c1 +│/);
    expect(out).toMatch(/zero: c0, r1, r2, r3, t1/);
    expect(out).toContain('not in the basis: R T_a T^a\n');
  });

  it('prints a LaTeX array and JSON', async () => {
    const text = theory("'c1 T_a T^a + R T_a T^a'");
    const { out } = await translate(text, '--to', 'irreducible', '--latex');
    expect(out).toBe(
      [
        '\\begin{array}{rll}',
        '  t_{2} &= \\tfrac{3}{2} c_{1} & {}^{(\\mathrm{vector})}T_{abc} {}^{(\\mathrm{vector})}T^{abc} \\\\',
        '\\end{array}',
        '% not in the basis: R T_a T^a',
        '',
      ].join('\n'),
    );
    const json = JSON.parse((await translate(text, '--to', 'monomials', '--json')).out);
    expect(json.basis).toBe('monomials');
    expect(json.couplings.find((c: { coupling: string }) => c.coupling === 'b3')).toEqual({
      coupling: 'b3',
      value: 'c1',
      invariant: 'T_a T^a',
    });
    expect(json.outside).toBe('R T_a T^a');
    expect(json.theory).toContain('lagrangian: |\n  c1 T_a T^a\n  + R T_a T^a\n');
  });

  it('rewrites the theory and leaves the rest of the file alone', async () => {
    const text = theory("'c1 R_{ab} R^{ba} + c2 T_a T^a'");
    const { out } = await translate(text, '--to', 'yang-mills', '--write', '-');
    expect(out).toBe(theory('|\n  c1 R_{ab} R^{ba}\n  + c2 T_a T^a'));
    const flow = "{ untwist: 1, name: x, constants: [c1], lagrangian: 'c1 R_{ab} R^{ba}', matter: [dust] }\n";
    expect((await translate(flow, '--to', 'monomials', '--write', '-')).out).toBe(flow);
  });

  it.each([
    ['a comment behind it', 'untwist: 1\nname: x\nlagrangian: R_{ab} R^{ba} # why\nmatter: [dust]\n'],
    ['no line end', 'untwist: 1\nname: x\nlagrangian: R_{ab} R^{ba}'],
    [
      'a folded block in the middle',
      'untwist: 1\nname: x\nlagrangian: >-\n  R_{ab}\n  R^{ba}\n\n\n# note\nmatter: [dust]\n',
    ],
    ['quotes over two lines', "untwist: 1\nname: x\nlagrangian:\n  'R_{ab}\n   R^{ba}'\nmatter: [dust]\n"],
    ['indentation', '  untwist: 1\n  name: x\n  lagrangian: R_{ab} R^{ba}\n  matter: [dust]\n'],
    ['carriage returns', 'untwist: 1\r\nname: x\r\nlagrangian: |\r\n  R_{ab}\r\n  R^{ba}\r\nmatter: [dust]\r\n'],
  ])('keeps a file with %s readable', async (_, text) => {
    const { code, out } = await translate(text, '--to', 'monomials', '--write', '-');
    expect(code).toBe(0);
    const [before, after] = [readTheory(text, 'a.yaml'), readTheory(out, 'b.yaml')];
    expect(after.lagrangian).toEqual(before.lagrangian);
    expect(after.matter).toEqual(before.matter);
  });

  it('says when nothing is left to write', async () => {
    const text = theory("'c1 R^2 - 4 c1 R_{ab} R^{ba} + c1 R_{abcd} R^{cdab}'");
    const dropped = await translate(text, '--to', 'monomials', '--modulo-boundary', '--write', '-');
    expect([dropped.code, dropped.out]).toEqual([1, '']);
    expect(dropped.err).toMatch(/the Lagrangian vanishes in this basis/);
    expect(JSON.parse((await translate(text, '--to', 'monomials', '--modulo-boundary', '--json')).out).theory).toBe(
      null,
    );
  });

  it('with imposed relations: the table uses them, the file keeps them', async () => {
    const text = theory("'c1 R_{abcd} R^{cdab} + c2 R^2'", 'impose: "c2 = 3 c1"');
    const { out } = await translate(text, '--to', 'monomials', '--modulo-boundary');
    expect(out).toMatch(/│ a1 +│ 2 c1 +│/);
    const written = (await translate(text, '--to', 'monomials', '--modulo-boundary', '--write', '-')).out;
    expect(written).toContain('(-c1 + c2) R^2');
    expect(written).toContain('impose: "c2 = 3 c1"');
  });

  it('writes a file, and only replaces one when told to', async () => {
    const file = join(scratch(), 'new.yaml');
    const args = ['translate', HARBOUR, '--to', 'irreducible', '--write', file];
    const first = await run(args);
    expect([first.code, first.err]).toEqual([0, `Written: ${file}\n`]);
    expect((await run(args)).err).toMatch(/already holds new\.yaml/);
    expect((await run([...args, '--force'])).code).toBe(0);
    expect(readFileSync(file, 'utf8')).toContain('R^{(weyl)}_{abcd}');
  });

  it('a rewritten theory is the same theory: equal reduced equations', async () => {
    const equations = (text: string): unknown => derivationObject(derive(readTheory(text, 'x.yaml'))).equations;
    const conventions = 'conventions: { signature: "+---", curvature-sign: -1, torsion: half, torsion-index: last }';
    const texts = [
      readFileSync(HARBOUR, 'utf8'),
      theory(
        "'c1 R_{abcd} R^{acbd} + c2 T_{abc} T^{bca} + c2 \\epsilon^{abcd} R_{ab}{}^{ef} R_{efcd} + R^2 T_a T^a'",
        conventions,
      ),
    ];
    for (const text of texts)
      for (const basis of basisNames()) {
        const rewritten = (await translate(text, '--to', basis, '--write', '-')).out;
        expect(equations(rewritten), basis).toEqual(equations(text));
      }
    // Modulo total derivatives the Lagrangian changes, the equations do not.
    const dropped = (await translate(texts[1]!, '--to', 'monomials', '--modulo-boundary', '--write', '-')).out;
    expect(equations(dropped)).toEqual(equations(texts[1]!));
  }, 60_000);

  it('takes a basis of the user', async () => {
    const file = join(scratch(), 'own.yaml');
    writeFileSync(
      file,
      "untwist-basis: 1\ntitle: own\nwhy: test\nsource: test\ncouplings: { g1: 'R_{abcd} R^{abcd}', g2: 'R_{ab} R^{ab} - R_{ab} R^{ba}' }\n",
    );
    const { out } = await translate(theory("'c1 R_{ab} R^{ab} - c1 R_{ab} R^{ba}'"), '--to', file);
    expect(out).toContain('in the basis own: own');
    expect(out).toMatch(/│ g2 +│ c1 +│/);
  });

  it('says what is wrong', async () => {
    expect((await translate(theory('R'), '--to', 'monomial')).err).toMatch(
      /no coupling basis monomial[\s\S]*did you mean monomials/,
    );
    expect((await translate(theory('R'))).err).toMatch(/required option '--to <basis>'/);
    expect((await translate(theory('R'), '--to', './none.yaml')).err).toMatch(/there is no file/);
  });
});
