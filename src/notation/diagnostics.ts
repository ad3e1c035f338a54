/**
 * Errors as data: a code, a place, what was expected and a hint. The command line renders them; nothing else prints.
 */
export interface Diagnostic {
  /** Stable kebab-case code, documented in docs/errors.md. */
  readonly code: string;
  readonly severity: 'error' | 'warning';
  /** One sentence without a full stop. */
  readonly message: string;
  /** What to do about it. */
  readonly hint?: string;
  readonly file?: string;
  /** The text in which start and end (UTF-16 offsets) lie; with it the rendering shows line, column and a caret. */
  readonly source?: string;
  readonly start?: number;
  readonly end?: number;
}

/** Thrown for input at fault; carries every diagnostic that was found. The command line turns it into exit code 1. */
export class InputError extends Error {
  readonly diagnostics: readonly Diagnostic[];
  constructor(diagnostics: readonly Diagnostic[]) {
    super(diagnostics.map((d) => d.message).join('; '));
    this.name = 'InputError';
    this.diagnostics = diagnostics;
  }
}
