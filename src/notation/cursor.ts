/**
 * A position in a list of tokens, with the error reporting that the parsers share. A syntax fault stops the parsing of
 * the passage (by an InputError); faults of meaning, such as an unknown symbol, are collected and parsing goes on.
 */
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { MAX_DIAGNOSTICS, MAX_NESTING } from './limits.js';
import type { Passage } from './passage.js';
import type { Span } from './syntax.js';
import { clip, type Token } from './tokens.js';

export class Cursor {
  readonly passage: Passage;
  private readonly tokens: readonly Token[];
  private readonly problems: Diagnostic[];
  private position = 0;
  private depth = 0;
  private readonly reported = new Set<string>();

  constructor(passage: Passage, tokens: readonly Token[], problems: Diagnostic[]) {
    this.passage = passage;
    this.tokens = tokens;
    this.problems = problems;
  }

  get token(): Token {
    return this.tokens[this.position]!;
  }

  /** The token `ahead` places further on; beyond the end it is the end. */
  peek(ahead: number): Token {
    return this.tokens[Math.min(this.position + ahead, this.tokens.length - 1)]!;
  }

  /** End of the token before the current one. */
  get lastEnd(): number {
    return this.position === 0 ? 0 : this.tokens[this.position - 1]!.end;
  }

  next(): Token {
    const token = this.token;
    if (token.kind !== 'end') this.position++;
    return token;
  }

  skip(count: number): void {
    this.position = Math.min(this.position + count, this.tokens.length - 1);
  }

  /** Whether the token `ahead` places further on is this mark. */
  isMark(mark: string, ahead = 0): boolean {
    const token = this.peek(ahead);
    return token.kind === 'mark' && token.text === mark;
  }

  accept(mark: string): boolean {
    if (!this.isMark(mark)) return false;
    this.position++;
    return true;
  }

  /** Runs a parser one bracket deeper. */
  nested<T>(opening: Span, parse: () => T): T {
    if (this.depth >= MAX_NESTING) {
      this.fail(
        'nesting-limit',
        opening,
        `brackets are nested more than ${MAX_NESTING} deep`,
        'multiply some of them out',
      );
    }
    this.depth++;
    const value = parse();
    this.depth--;
    return value;
  }

  /** The token as it was typed, for a message. */
  describe(token: Token): string {
    if (token.kind === 'end') return 'the end of the expression';
    return clip(this.passage.text.slice(token.start, token.end));
  }

  typed(span: Span): string {
    return clip(this.passage.text.slice(span.start, span.end).replace(/\s+/g, ' '));
  }

  /** Whether this is the first time that the passage is asked about a name; an unknown name is reported once. */
  isNews(name: string): boolean {
    const news = !this.reported.has(name);
    this.reported.add(name);
    return news;
  }

  /** Whether the bracket that opens `ahead` places further on has no closing mark behind it. */
  isOpenForGood(ahead: number, closing: string): boolean {
    for (let n = ahead; this.peek(n).kind !== 'end'; n++) if (this.isMark(closing, n)) return false;
    return true;
  }

  /** Adds an error and goes on. */
  report(code: string, span: Span, message: string, hint?: string): void {
    this.problems.push(errorAt(this.passage.locate(span.start, span.end), code, message, hint));
    // More would not be shown, and looking for suggestions takes time.
    if (this.problems.length > MAX_DIAGNOSTICS) throw new InputError([]);
  }

  /** Stops the parsing of this passage. */
  fail(code: string, span: Span, message: string, hint?: string): never {
    throw new InputError([errorAt(this.passage.locate(span.start, span.end), code, message, hint)]);
  }
}
