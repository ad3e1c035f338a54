/** Reads the theory file that a command names; `-` is standard input. */
import { closeSync, openSync, readdirSync, readSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import { InputError } from '../notation/diagnostics.js';
import { MAX_TEXT } from '../notation/limits.js';
import { nearest } from '../notation/suggest.js';
import type { Io } from './io.js';

const refuse = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);

const notText = (what: string): InputError =>
  refuse('not-text', `${what} is not UTF-8 text`, 'a theory file is YAML; see docs/notation.md');

export interface InputText {
  readonly file: string;
  readonly text: string;
}

/** A character takes at most four bytes, so a larger file is beyond the limit on characters anyhow. */
const MAX_BYTES = 4 * MAX_TEXT;

/** Up to `most` bytes of a file. Pipes and devices have no size to ask for, and some never end. */
function beginning(path: string, most: number): Buffer {
  const handle = openSync(path, 'r');
  try {
    const chunks: Buffer[] = [];
    for (let total = 0; total < most; ) {
      const chunk = Buffer.alloc(Math.min(65_536, most - total));
      const read = readSync(handle, chunk);
      if (read === 0) break;
      chunks.push(chunk.subarray(0, read));
      total += read;
    }
    return Buffer.concat(chunks);
  } finally {
    closeSync(handle);
  }
}

/** @throws InputError `file-missing`, `file-unreadable`, `size-limit`, `not-text`. */
export async function readInput(path: string, io: Io): Promise<InputText> {
  if (path === '-') {
    const text = await io.stdin();
    // What was no UTF-8 arrives as the replacement mark, which no theory contains.
    if (text.includes('\ufffd')) throw notText('standard input');
    return { file: '<stdin>', text };
  }
  let bytes: Buffer;
  try {
    bytes = beginning(path, MAX_BYTES + 1);
  } catch (error) {
    throw unreadable(path, error as NodeJS.ErrnoException);
  }
  if (bytes.length > MAX_BYTES)
    throw refuse('size-limit', `${path} has more than ${MAX_BYTES} bytes`, `the limit is ${MAX_TEXT} characters`);
  try {
    return { file: path, text: new TextDecoder('utf-8', { fatal: true }).decode(bytes) };
  } catch {
    throw notText(path);
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
