/** Reads the theory file that a command names; `-` is standard input. */
import { readdirSync, readFileSync, statSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import { InputError } from '../notation/diagnostics.js';
import { MAX_TEXT } from '../notation/limits.js';
import { nearest } from '../notation/suggest.js';
import type { Io } from './io.js';

const refuse = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);

export interface InputText {
  readonly file: string;
  readonly text: string;
}

/** @throws InputError `file-missing`, `file-unreadable`, `size-limit`, `not-text`. */
export async function readInput(path: string, io: Io): Promise<InputText> {
  if (path === '-') return { file: '<stdin>', text: await io.stdin() };
  let bytes: Buffer;
  try {
    const { size } = statSync(path);
    // A character takes at most four bytes, so a larger file is beyond the limit on characters anyhow.
    if (size > 4 * MAX_TEXT)
      throw refuse('size-limit', `${path} has ${size} bytes`, `the limit is ${MAX_TEXT} characters`);
    bytes = readFileSync(path);
  } catch (error) {
    if (error instanceof InputError) throw error;
    throw unreadable(path, error as NodeJS.ErrnoException);
  }
  try {
    return { file: path, text: new TextDecoder('utf-8', { fatal: true }).decode(bytes) };
  } catch {
    throw refuse('not-text', `${path} is not UTF-8 text`, 'a theory file is YAML; see docs/notation.md');
  }
}

function unreadable(path: string, { code, message }: NodeJS.ErrnoException): InputError {
  if (code !== 'ENOENT')
    return refuse('file-unreadable', `cannot read ${path}: ${message}`, 'give the path of a theory file');
  const near = nearest(basename(path), neighbours(dirname(path)));
  const hint = near === undefined ? 'give the path of a theory file, or - for standard input' : `did you mean ${near}?`;
  return refuse('file-missing', `there is no file ${path}`, hint);
}

function neighbours(folder: string): string[] {
  try {
    return readdirSync(folder).filter((name) => /\.ya?ml$/.test(name));
  } catch {
    return [];
  }
}
