/** The option `--conventions`: the name of a preset, or a file of conventions. */
import { existsSync } from 'node:fs';
import type { Conventions } from '../notation/conventions.js';
import { InputError } from '../notation/diagnostics.js';
import { presetConventions, readConventionsFile, unknownPreset } from '../notation/read-conventions.js';
import type { Io } from './io.js';
import { readInput } from './read-input.js';

/** @throws InputError `unknown-preset` for what is neither, and every fault of a file. */
export async function conventionsOption(value: string, io: Io): Promise<Conventions> {
  const preset = presetConventions(value);
  if (preset) return preset;
  if (!existsSync(value) && !/[/.]/.test(value)) throw new InputError([unknownPreset(value)]);
  const { text, file } = await readInput(value, io);
  return readConventionsFile(text, file);
}
