/**
 * Names of local variables and keys in emitted TypeScript. A theory may call a constant by any word of the language or
 * of its libraries; such a name stays as it is where it is a key and gets a suffix where it would be a variable.
 */

/** Words that cannot, or in strict code should not, name a local variable. */
const WORDS = new Set(
  (
    'break case catch class const continue debugger default delete do else enum export extends false finally for ' +
    'function if import in instanceof new null return super switch this throw true try typeof var void while with ' +
    'yield let static implements interface package private protected public await async of get set eval arguments ' +
    'undefined NaN Infinity globalThis Math Number Object as any boolean declare infer is keyof module namespace ' +
    'never number readonly require exports string symbol type unique unknown satisfies abstract asserts constructor'
  ).split(' '),
);

/** A key of an object type or literal: quoted unless it is a plain word without meaning in the language. */
export const propertyKey = (name: string): string =>
  /^[A-Za-z_][A-Za-z0-9_]*$/.test(name) && !WORDS.has(name) ? name : JSON.stringify(name);

/** Gives out names for local variables, each once. */
export interface NameTable {
  /** The name itself when it is free and no word of the language, otherwise with underscores at its end. */
  claim(name: string): string;
}

/** A table in which the given names are taken. */
export function makeNameTable(taken: Iterable<string>): NameTable {
  const used = new Set(taken);
  return {
    claim(name) {
      let candidate = name;
      while (used.has(candidate) || WORDS.has(candidate)) candidate += '_';
      used.add(candidate);
      return candidate;
    },
  };
}

/**
 * Text for the inside of a block comment, on one line: it cannot end the comment, start a tag or a directive, or hide
 * or reverse what follows it on the screen.
 */
export function commentText(text: string): string {
  return text
    .replace(/[\s\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
    .replace(/[\p{Cf}\p{Cs}]/gu, '\ufffd')
    .replaceAll('*/', '* /')
    .replaceAll('/*', '/ *')
    .replaceAll('@', '(at)')
    .replaceAll('//', '/ /')
    .trim();
}

/** A string literal, in double quotes; characters that a screen does not show or that reverse the text are escaped. */
export const stringLiteral = (text: string): string =>
  JSON.stringify(text).replace(/[\p{Cf}\p{Zl}\p{Zp}\p{Cc}]/gu, (c) =>
    [...Array(c.length).keys()].map((i) => `\\u${c.charCodeAt(i).toString(16).padStart(4, '0')}`).join(''),
  );
