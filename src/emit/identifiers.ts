/**
 * Names and texts of a user in emitted code. A theory may call a constant by any word of a language or of its libraries;
 * such a name stays as it is where it is a quoted key and gets a suffix where it would be an identifier. Imports nothing.
 */

/** How a language forms identifiers. */
export interface Naming {
  /** Whether words are joined as aDot or as a_dot. */
  readonly style: 'camel' | 'snake';
  /** Whether a name has a meaning of its own, so that it must not be an identifier. */
  readonly isWord: (name: string) => boolean;
  /** Whether b1 and B1 are one name; words are then asked about in small letters. */
  readonly ignoreCase: boolean;
  /** Most characters of an identifier. */
  readonly longest: number;
}

/** A name made of several. */
export const joined = ({ style }: Naming, parts: readonly string[]): string =>
  style === 'snake'
    ? parts.join('_')
    : parts.map((p, i) => (i === 0 ? p : `${p.slice(0, 1).toUpperCase()}${p.slice(1)}`)).join('');

/** A name of our own, given in camel case: curvatureObstruction is curvature_obstruction in languages that write so. */
export const functionName = (camel: string, { style }: Naming): string =>
  style === 'camel' ? camel : camel.replace(/[A-Z]/g, (c) => `_${c.toLowerCase()}`);

/** Letters, digits and underscores, not beginning with a digit or underscore, out of any text: `phi,psi` is phi_psi. */
export function identifierText(text: string): string {
  const plain = text.replace(/[^A-Za-z0-9]+/g, '_').replace(/^_+|_+$/g, '');
  return /^[A-Za-z]/.test(plain) ? plain : `x${plain}`;
}

/** Words that cannot, or in strict code should not, name a local variable of TypeScript or JavaScript. */
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

export const ECMASCRIPT: Naming = {
  style: 'camel',
  isWord: (name) => WORDS.has(name),
  ignoreCase: false,
  longest: Number.POSITIVE_INFINITY,
};

/** Gives out identifiers, each once. */
export interface NameTable {
  /** The name itself when it is free and no word of the language, otherwise with an underscore and a number at its end. */
  claim(name: string): string;
}

/** A table in which the given names are taken. */
export function makeNameTable(taken: Iterable<string>, naming: Naming = ECMASCRIPT): NameTable {
  const form = (name: string): string => (naming.ignoreCase ? name.toLowerCase() : name);
  const used = new Set([...taken].map(form));
  return {
    claim(name) {
      let candidate = name.slice(0, naming.longest);
      for (let n = 1; used.has(form(candidate)) || naming.isWord(form(candidate)); n++) {
        const suffix = n === 1 ? '_' : `_v${n}`;
        candidate = `${name.slice(0, naming.longest - suffix.length)}${suffix}`;
      }
      used.add(form(candidate));
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

/** The same with the escapes of Python and Julia, which count characters and not UTF-16 units. */
export const codePointLiteral = (text: string): string =>
  `"${[...text].map((c) => (/[\p{Cf}\p{Zl}\p{Zp}\p{Cc}\p{Cs}]/u.test(c) ? codePoint(c) : /["\\$]/.test(c) ? `\\${c}` : c)).join('')}"`;

const codePoint = (c: string): string => {
  const number = c.codePointAt(0)!;
  return number < 0x10000 ? `\\u${number.toString(16).padStart(4, '0')}` : `\\U${number.toString(16).padStart(8, '0')}`;
};
