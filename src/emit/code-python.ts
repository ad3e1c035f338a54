/**
 * A described module as a module of Python 3 without imports beyond the standard library: couplings and jets are mappings,
 * values are numbers or whatever else adds and multiplies, arrays included. Text of the user reaches it only as checked
 * identifiers, string literals, escaped docstrings.
 */
import { type Body, type BodyOptions, functionCode, type Part, type Read } from './code-body.js';
import { type CodeFunction, type CodeInput, type CodeModule, inputsOf } from './code-description.js';
import { type Expression, layout, type Notation } from './code-expression.js';
import {
  COUPLINGS,
  commaLines,
  commentLines,
  EXAMPLE_TEXT,
  functionLines,
  headerLines,
  type Language,
  QUARTERS,
} from './code-language.js';
import { powerText } from './code-model.js';
import { codePointLiteral, functionName, type Naming } from './identifiers.js';

const WIDTH = 90;

const WORDS = new Set(
  (
    'False None True and as assert async await break case class continue def del elif else except exec finally for from ' +
    'global if import in is lambda match nonlocal not or pass print raise return try type while with yield ' +
    'float int isinstance math'
  ).split(' '),
);

export const PYTHON_NAMING: Naming = {
  style: 'snake',
  isWord: (name) => WORDS.has(name),
  ignoreCase: false,
  longest: Number.POSITIVE_INFINITY,
};

const NOTATION: Notation = {
  literal: (digits) => digits,
  element: (list, index) => `${list}[${index}]`,
  root: (argument) => `_root(${argument})`,
};

export const PYTHON: Language = {
  id: 'python',
  title: 'Python 3',
  extension: '.py',
  write: moduleText,
  example: exampleText,
  fileFault: (file) => {
    const stem = file.replace(/\.py$/, '');
    if (/^[A-Za-z_]\w*$/.test(stem) && !WORDS.has(stem) && file.endsWith('.py')) return undefined;
    return 'Python imports a module only from a file such as harbour_light.py: letters, digits and underscores';
  },
};

const functionOf = (f: CodeFunction): string => functionName(f.name, PYTHON_NAMING);
const literal = (text: string): string => codePointLiteral(text).replaceAll('\\$', '$');

/** The square root as real arithmetic has it; arrays have their own. */
const ROOT = `def _root(x):
    if isinstance(x, (int, float)):
        return math.sqrt(x) if x >= 0 else math.nan
    return x ** 0.5`;

function moduleText(m: CodeModule): string {
  const functions = m.functions.flatMap((f) => functionTexts(m, f));
  const roots = functions.some((text) => text.includes('= _root('));
  return `${[
    docstring([...headerLines(m), '', ...argumentLines(m)], ''),
    ...(roots ? ['import math'] : []),
    constants(m),
    ...(roots ? [`\n${ROOT}`] : []),
    ...functions.map((text) => `\n${text}`),
  ].join('\n\n')}\n`;
}

function docstring(lines: readonly string[], indent: string): string {
  const clean = commentLines(lines).map((l) => l.replace(/["\\]/g, '\\$&'));
  if (clean.length === 1) return `${indent}"""${clean[0]}"""`;
  return `${indent}"""${clean.map((l, i) => (i === 0 ? l : `${indent}${l}`.trimEnd())).join('\n')}\n${indent}"""`;
}

function argumentLines(m: CodeModule): string[] {
  return [
    `Argument couplings: a mapping. ${COUPLINGS}`,
    ...m.parameters.map((p) => `    ${p.name}: ${p.meaning}; ${powerText(p.dimension)}`),
    ...inputsOf(m).flatMap((input) =>
      input.kind === 'vector'
        ? [
            `Argument ${input.name}: a list. ${input.about}`,
            ...input.entries.map((e, i) => `    ${i}: ${e.symbol}, ${e.meaning}; ${powerText(e.dimension)}`),
          ]
        : [
            `Argument ${input.name}: a mapping to lists [value, first derivative, ...]. ${input.about}`,
            ...input.fields.map(
              (f) =>
                `    ${f.name}: up to order ${f.order}; ${f.meaning}; ${powerText(f.dimension)}, one more for each derivative`,
            ),
          ],
    ),
    'Values are numbers, or arrays of one shape that add and multiply entry by entry.',
  ];
}

function tuple(name: string, texts: readonly string[]): string {
  if (texts.length === 0) return `${name} = ()`;
  const lines = commaLines(texts.map(literal), WIDTH);
  if (lines.length === 1 && texts.length > 1) return `${name} = (${lines[0]})`;
  return `${name} = (\n${lines.map((l) => `    ${l}`).join('\n')},\n)`;
}

/** Lists of what the numbers that a function returns are. */
function labels(f: CodeFunction): [string, readonly string[]][] {
  const name = functionOf(f).toUpperCase();
  if (f.result.kind === 'vector') return [[`${name}_KEYS`, f.outputs.map((o) => o.key)]];
  if (f.result.kind !== 'matrix') return [];
  return [
    [`${name}_ROWS`, f.result.rows],
    [`${name}_COLUMNS`, f.result.columns],
  ];
}

const constants = (m: CodeModule): string =>
  [
    '# Name of the theory, and the geometry on which it was reduced.',
    `THEORY = ${literal(m.theory)}`,
    `GEOMETRY = ${literal(m.geometry.id)}`,
    '# Sources are parameters that are functions of time, to be given by their current value.',
    tuple('VARIABLES', m.variables),
    tuple(
      'PARAMETERS',
      m.parameters.map((p) => p.name),
    ),
    tuple(
      'SOURCES',
      m.parameters.filter((p) => p.isSource).map((p) => p.name),
    ),
    ...m.functions.flatMap((f) => labels(f).map(([name, texts]) => tuple(name, texts))),
  ].join('\n');

function options(m: CodeModule): BodyOptions {
  const own = ['THEORY', 'GEOMETRY', 'VARIABLES', 'PARAMETERS', 'SOURCES', 'couplings'];
  const names = m.functions.flatMap((f) => [functionOf(f), ...labels(f).map(([name]) => name)]);
  return {
    naming: PYTHON_NAMING,
    taken: [...own, ...names, ...inputsOf(m).map((i) => i.name)],
    mostTerms: 4000,
    partTerms: 2000,
  };
}

function functionTexts(m: CodeModule, f: CodeFunction): string[] {
  const { parts, body } = functionCode(m, f, options(m));
  const head = `def ${functionOf(f)}(couplings, ${f.input.name}):\n${docstring(functionLines(f), '    ')}`;
  return [...parts.map((p) => partText(f.input, p)), `${head}\n${bodyText(f.input, body, returned(f, body))}`];
}

function partText(input: CodeInput, { name, body }: Part): string {
  return `def _${name}(couplings, ${input.name}):\n${bodyText(input, body, list(body.results, '    '))}`;
}

function bodyText(input: CodeInput, body: Body, result: string): string {
  return [
    ...body.calls.map((c) => `    ${c.local} = _${c.part}(couplings, ${input.name})`),
    ...body.reads.map((r) => `    ${r.local} = ${source(r, input)}`),
    ...body.steps.map((s) => `    ${s.name} = ${inBrackets(s.value)}`),
    `    return ${result}`,
  ].join('\n');
}

function source(r: Read, input: CodeInput): string {
  if (r.kind === 'coupling') return `couplings[${literal(r.key)}]`;
  if (r.kind === 'jet') return `${input.name}[${literal(r.field)}][${r.order}]`;
  return r.kind === 'entry' ? `${input.name}[${r.index}]` : NOTATION.root(r.of);
}

/** A value on its own; brackets let it go over several lines. */
function inBrackets(e: Expression): string {
  const lines = layout(e, NOTATION, WIDTH);
  return lines.length === 1 ? lines[0]! : `(\n${lines.map((l) => `        ${l}`).join('\n')}\n    )`;
}

/** A value inside brackets that are open already. */
const member = (e: Expression, indent: string): string => layout(e, NOTATION, WIDTH).join(`\n${indent}    `);

const list = (values: readonly Expression[], indent: string): string =>
  `[\n${values.map((e) => `${indent}    ${member(e, `${indent}    `)},`).join('\n')}\n${indent}]`;

function returned({ result, outputs }: CodeFunction, { results }: Body): string {
  if (result.kind === 'number') return inBrackets(results[0]!);
  if (result.kind === 'vector') return list(results, '    ');
  if (result.kind === 'record') {
    const members = outputs.map(({ key }, i) => `        ${literal(key)}: ${member(results[i]!, '        ')},`);
    return `{\n${members.join('\n')}\n    }`;
  }
  const width = result.columns.length;
  const rows = result.rows.map((_, i) => list(results.slice(i * width, (i + 1) * width), '        '));
  return `[\n${rows.map((r) => `        ${r},`).join('\n')}\n    ]`;
}

function exampleText(m: CodeModule, file: string, sample = QUARTERS): string {
  const couplings = m.parameters.map((p, i) => `    ${literal(p.name)}: ${sample.coupling(i)},`);
  const inputs = inputsOf(m).map((input) => {
    if (input.kind === 'vector') return `${input.name} = [${input.entries.map((_, i) => sample.jet(i, 0)).join(', ')}]`;
    const fields = input.fields.map(({ name, order }, i) => {
      const jet = Array.from({ length: order + 1 }, (_, n) => sample.jet(i, n));
      return `    ${literal(name)}: [${jet.join(', ')}],`;
    });
    return `${input.name} = {\n${fields.join('\n')}\n}`;
  });
  const calls = m.functions.map((f) => `show(${literal(f.name)}, theory.${functionOf(f)}(couplings, ${f.input.name}))`);
  return `"""${EXAMPLE_TEXT}"""
import ${file.replace(/\.py$/, '')} as theory

couplings = {
${couplings.join('\n')}
}
${inputs.join('\n')}


def show(name, value):
    if isinstance(value, dict):
        for key, inner in value.items():
            show(f"{name}[{key}]", inner)
    elif isinstance(value, list):
        for place, inner in enumerate(value):
            show(f"{name}[{place}]", inner)
    else:
        print(name, "=", float(value))


${calls.join('\n')}
`;
}
