/**
 * A stretch of text to parse, with the way back to the place where the user wrote it. The two differ when the text came
 * out of a YAML scalar: indentation, folds, quotes and escapes are gone from it. Imports only types.
 */
import type { Origin } from './theory.js';

export interface Passage {
  readonly text: string;
  /** The place of text.slice(start, end) in the user's file. */
  readonly locate: (start: number, end: number) => Origin;
}

/** A passage that is the whole of a text, for instance of a command-line option. */
export const plainPassage = (text: string, file: string): Passage => ({
  text,
  locate: (start, end) => ({ file, source: text, start, end }),
});
