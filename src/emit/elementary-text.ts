/** Elementary functions found by a computer algebra package, as infix text, Unicode and LaTeX. */
import { PRECEDENCE } from '../algebra/precedence.js';
import type { Expression } from '../cas/reply.js';

interface Piece {
  readonly text: string;
  readonly level: number;
}

interface Style {
  readonly variable: string;
  readonly times: string;
  readonly minus: string;
  readonly fraction?: (top: string, bottom: string) => string;
  readonly call: (name: string, argument: string) => string;
  readonly root: (base: string, halves: number) => string;
  readonly power: (base: string, exponent: number) => string;
}

/** The tree in a style. */
function written(tree: Expression, style: Style): string {
  const at = (e: Expression, level: number): string => {
    const { text, level: own } = visit(e);
    return own < level ? `(${text})` : text;
  };
  const visit = (e: Expression): Piece => {
    switch (e.kind) {
      case 'integer':
        return { text: `${e.value}`, level: PRECEDENCE.atom };
      case 'name':
        return { text: style.variable, level: PRECEDENCE.atom };
      case 'negative':
        return { text: `${style.minus}${at(e.of, PRECEDENCE.product)}`, level: PRECEDENCE.sum };
      case '+':
        return { text: `${at(e.left, PRECEDENCE.sum)} + ${at(e.right, PRECEDENCE.product)}`, level: PRECEDENCE.sum };
      case '-':
        return {
          text: `${at(e.left, PRECEDENCE.sum)} ${style.minus} ${at(e.right, PRECEDENCE.product)}`,
          level: PRECEDENCE.sum,
        };
      case '*':
        return {
          text: `${at(e.left, PRECEDENCE.product)}${style.times}${at(e.right, PRECEDENCE.product)}`,
          level: PRECEDENCE.product,
        };
      case '/':
        if (style.fraction)
          return { text: style.fraction(visit(e.left).text, visit(e.right).text), level: PRECEDENCE.atom };
        return {
          text: `${at(e.left, PRECEDENCE.product)}/${at(e.right, PRECEDENCE.power)}`,
          level: PRECEDENCE.product,
        };
      case 'power':
        return { text: style.power(at(e.base, PRECEDENCE.atom), e.exponent), level: PRECEDENCE.power };
      case 'root':
        return { text: style.root(visit(e.base).text, e.halves), level: PRECEDENCE.atom };
      case 'call':
        return { text: style.call(e.name, visit(e.of).text), level: PRECEDENCE.atom };
    }
  };
  return visit(tree).text;
}

/** Names of papers for those of the package. */
const STANDARD: ReadonlyMap<string, string> = new Map([
  ['arctanh', 'artanh'],
  ['arcsinh', 'arsinh'],
  ['arccosh', 'arcosh'],
]);
const standard = (name: string): string => STANDARD.get(name) ?? name;

/** Infix text with `log`, `arctan`, `artanh`, `arcsin`, `arsinh`, `arcosh` and `sqrt`. */
export const elementaryText = (tree: Expression, variable: string): string =>
  written(tree, {
    variable,
    times: '*',
    minus: '-',
    call: (name, argument) => `${standard(name)}(${argument})`,
    root: (base, halves) => `sqrt(${base})${halves === 1 ? '' : `^${halves < 0 ? `(${halves})` : halves}`}`,
    power: (base, exponent) => `${base}^${exponent < 0 ? `(${exponent})` : exponent}`,
  });

const LATEX_NAMES: ReadonlyMap<string, string> = new Map([
  ['log', '\\ln'],
  ['arctan', '\\arctan'],
  ['arcsin', '\\arcsin'],
]);

export const elementaryTex = (tree: Expression, variable: string): string =>
  written(tree, {
    variable,
    times: ' ',
    minus: '-',
    fraction: (top, bottom) => `\\frac{${top}}{${bottom}}`,
    call: (name, argument) =>
      `${LATEX_NAMES.get(name) ?? `\\operatorname{${standard(name)}}`} \\bigl( ${argument} \\bigr)`,
    root: (base, halves) => `\\sqrt{${base}}${halves === 1 ? '' : `^{\\,${halves}}`}`,
    power: (base, exponent) => `${base}^{${exponent}}`,
  });
