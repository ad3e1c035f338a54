import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { refuseExisting, writeFolder } from '../../src/cli/output-folder.js';
import { InputError, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { contentOf, scratch } from './world.js';

function refusal(work: () => void): string {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error.diagnostics.map((d) => renderDiagnostic(d)).join('\n');
    throw error;
  }
  return 'accepted';
}

const FILES = new Map([
  ['one.tex', 'first α\n'],
  ['two.json', '{}'],
]);

describe('writeFolder', () => {
  it('makes the folder and its parents and leaves nothing but the files', () => {
    const folder = join(scratch(), 'a', 'b');
    writeFolder(folder, FILES);
    expect(contentOf(folder)).toEqual(Object.fromEntries(FILES));
  });

  it('replaces files and keeps others', () => {
    const folder = scratch();
    writeFileSync(join(folder, 'one.tex'), 'old and longer than the new text');
    writeFileSync(join(folder, 'mine.txt'), 'mine');
    writeFolder(folder, FILES);
    expect(contentOf(folder)).toEqual({ ...Object.fromEntries(FILES), 'mine.txt': 'mine' });
  });

  it('touches nothing when one file cannot be written', () => {
    const folder = scratch();
    writeFileSync(join(folder, 'one.tex'), 'old');
    const withBadName = new Map([...FILES, ['no/such/folder.txt', 'x']]);
    expect(refusal(() => writeFolder(folder, withBadName))).toContain(`cannot write to ${folder}: ENOENT`);
    expect(contentOf(folder)).toEqual({ 'one.tex': 'old' });
  });

  it('refuses a path that is a file, and keeps the file', () => {
    const path = join(scratch(), 'theory.yaml');
    writeFileSync(path, 'precious');
    expect(refusal(() => writeFolder(path, FILES))).toBe(
      [
        `error: cannot write to ${path}: EEXIST: file already exists, mkdir '${path}'`,
        'hint: choose a folder that can be written with --out',
      ].join('\n'),
    );
    expect(refusal(() => writeFolder(join(path, 'below'), FILES))).toContain('ENOTDIR');
    expect(readFileSync(path, 'utf8')).toBe('precious');
  });

  it.skipIf(!existsSync('/proc/self'))('refuses a folder in which nobody may write', () => {
    expect(refusal(() => writeFolder('/proc/self', FILES))).toMatch(/^error: cannot write to \/proc\/self: E/);
  });

  it('replaces a link instead of writing through it', () => {
    const folder = scratch();
    const target = join(folder, 'elsewhere.txt');
    writeFileSync(target, 'elsewhere');
    symlinkSync(target, join(folder, 'one.tex'));
    writeFolder(folder, FILES);
    expect(readFileSync(target, 'utf8')).toBe('elsewhere');
    expect(readFileSync(join(folder, 'one.tex'), 'utf8')).toBe('first α\n');
  });
});

describe('refuseExisting', () => {
  const names = [...FILES.keys()];

  it('lets an empty or missing folder pass', () => {
    const folder = scratch();
    expect(refusal(() => refuseExisting(folder, names, false))).toBe('accepted');
    expect(refusal(() => refuseExisting(join(folder, 'none'), names, false))).toBe('accepted');
    expect(readdirSync(folder)).toEqual([]);
  });

  it('names the files that are there', () => {
    const folder = scratch();
    writeFileSync(join(folder, 'two.json'), '');
    expect(refusal(() => refuseExisting(folder, names, false))).toBe(
      [
        `error: ${folder} already holds two.json`,
        'hint: give --force to replace them, or another folder with --out',
      ].join('\n'),
    );
    expect(refusal(() => refuseExisting(folder, names, true))).toBe('accepted');
  });

  it('refuses a folder in the place of a file, force or not', () => {
    const folder = scratch();
    mkdirSync(join(folder, 'two.json'));
    for (const force of [false, true])
      expect(refusal(() => refuseExisting(folder, names, force))).toBe(
        [
          `error: ${join(folder, 'two.json')} is there already and is no file`,
          'hint: move it away, or give another folder with --out',
        ].join('\n'),
      );
  });
});
