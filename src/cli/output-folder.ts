/**
 * Writes result files so that a reader, or a crash, sees either the old file or the new one: temporary name, sync, rename.
 */
import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { InputError } from '../notation/diagnostics.js';

const refuse = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);

/** @throws InputError `output-exists` when a file is already there and may not be replaced, or is no file. */
export function refuseExisting(folder: string, names: readonly string[], force: boolean): void {
  const there = names.filter((name) => existsSync(join(folder, name)));
  // Renaming onto a folder fails half-way through the files, so it is refused before anything is done.
  const other = there.filter((name) => !statSync(join(folder, name)).isFile());
  if (other.length > 0)
    throw refuse(
      'output-exists',
      `${other.map((name) => join(folder, name)).join(', ')} is there already and is no file`,
      'move it away, or give another folder with --out',
    );
  if (there.length === 0 || force) return;
  const message = `${folder} already holds ${there.join(', ')}`;
  throw refuse('output-exists', message, 'give --force to replace them, or another folder with --out');
}

/**
 * Writes all files into a folder, which is made when missing. Nothing is renamed into place before all of them are on
 * disk under temporary names.
 * @throws InputError `output-failed` when the folder cannot be written; old files are then untouched.
 */
export function writeFolder(folder: string, files: ReadonlyMap<string, string>): void {
  const pending: [string, string][] = [];
  try {
    mkdirSync(folder, { recursive: true });
    for (const [name, text] of files) {
      const final = join(folder, name);
      const temporary = join(folder, `.${name}.tmp-${process.pid}`);
      pending.push([temporary, final]);
      const handle = openSync(temporary, 'w');
      try {
        writeFileSync(handle, text);
        fsyncSync(handle);
      } finally {
        closeSync(handle);
      }
    }
    for (const [temporary, final] of pending) renameSync(temporary, final);
  } catch (error) {
    for (const [temporary] of pending) rmSync(temporary, { force: true });
    const reason = error instanceof Error ? error.message : String(error);
    throw refuse(
      'output-failed',
      `cannot write to ${folder}: ${reason}`,
      'choose a folder that can be written with --out',
    );
  }
}
