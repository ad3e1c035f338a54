import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readInput } from '../../src/cli/read-input.js';
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { MAX_TEXT } from '../../src/notation/limits.js';
import { scratch, world } from './world.js';

async function refusal(path: string): Promise<string> {
  try {
    await readInput(path, world());
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  return 'accepted';
}

describe('readInput', () => {
  it('reads a file whole', async () => {
    const file = join(scratch(), 'pier.yaml');
    // Longer than one chunk, with characters of several bytes across its border.
    const text = `${'ψ'.repeat(40_000)}\nend\n`;
    writeFileSync(file, text);
    expect(await readInput(file, world())).toEqual({ file, text });
    writeFileSync(file, '');
    expect(await readInput(file, world())).toEqual({ file, text: '' });
  });

  it('reads standard input for -', async () => {
    expect(await readInput('-', world({ stdin: 'name: x' }))).toEqual({ file: '<stdin>', text: 'name: x' });
  });

  it('suggests a neighbour of a file that is missing', async () => {
    const folder = scratch();
    writeFileSync(join(folder, 'harbour.yaml'), '');
    writeFileSync(join(folder, 'harbor.txt'), '');
    const wrong = join(folder, 'harbor.yaml');
    expect(await refusal(wrong)).toBe(`error: there is no file ${wrong}\nhint: did you mean harbour.yaml?`);
    expect(await refusal(join(folder, 'zzz.yaml'))).toContain(
      'hint: give the path of a theory file, or - for standard input',
    );
    expect(await refusal(join(folder, 'no', 'folder.yaml'))).toContain('there is no file');
  });

  it('refuses a folder', async () => {
    const folder = scratch();
    expect(await refusal(folder)).toBe(
      `error: cannot read ${folder}: EISDIR: illegal operation on a directory, read\nhint: give the path of a theory file`,
    );
  });

  it('refuses what is not UTF-8', async () => {
    const file = join(scratch(), 'latin.yaml');
    writeFileSync(file, Buffer.from([0x6e, 0x61, 0x6d, 0x65, 0x3a, 0x20, 0xe9]));
    expect(await refusal(file)).toBe(
      `error: ${file} is not UTF-8 text\nhint: a theory file is YAML; see docs/notation.md`,
    );
    const stdin = Buffer.from([0x6e, 0x3a, 0xe9]).toString('utf8');
    await expect(readInput('-', world({ stdin }))).rejects.toThrow('standard input is not UTF-8 text');
  });

  it('refuses a file that is too long, and one that never ends', async () => {
    const file = join(scratch(), 'long.yaml');
    writeFileSync(file, 'x'.repeat(4 * MAX_TEXT + 1));
    expect(await refusal(file)).toBe(
      `error: ${file} has more than ${4 * MAX_TEXT} bytes\nhint: the limit is ${MAX_TEXT} characters`,
    );
    if (existsSync('/dev/zero')) expect(await refusal('/dev/zero')).toContain('/dev/zero has more than');
  });
});
