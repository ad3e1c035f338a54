/** Text as HTML: escaping, and paragraphs with formulas. */
import type { Prose } from './latex-text.js';

/** What typesets a formula within a line. */
export interface InlineTypesetter {
  inline(tex: string): string;
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/**
 * Text for the content of an element or a quoted attribute. Characters that reverse the direction of what follows, and
 * control characters, become a replacement mark.
 */
export const escapeHtml = (text: string): string =>
  text
    // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is looked for
    .replace(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, '\ufffd')
    .replace(/[&<>"']/g, (c) => ENTITIES[c]!);

/** A paragraph's content: text escaped, formulas typeset. */
export const proseHtml = (paragraph: Prose, typesetter: InlineTypesetter): string =>
  paragraph.map((piece) => (typeof piece === 'string' ? escapeHtml(piece) : typesetter.inline(piece.math))).join('');
