/**
 * A described module as a Julia module without dependencies: couplings and jets are named tuples or anything else with
 * such properties, of any number type. Text of the user reaches it only as checked identifiers, escaped string literals and
 * escaped docstrings.
 */
import { type Body, type BodyOptions, functionCode, type Part, type Read } from './code-body.js';
import { type CodeFunction, type CodeInput, type CodeModule, inputsOf } from './code-description.js';
import { type Expression, layout, type Notation } from './code-expression.js';
import {
  COUPLINGS,
  commaLines,
  commentLines,
  couplingMembers,
  EXAMPLE_TEXT,
  functionLines,
  headerLines,
  identifiersFor,
  inputMembers,
  type Language,
  moduleName,
  QUARTERS,
  standsFor,
} from './code-language.js';
import { powerText } from './code-model.js';
import { codePointLiteral, functionName, type Naming } from './identifiers.js';

const WIDTH = 90;

const WORDS = new Set(
  (
    'abstract baremodule begin break catch const continue do else elseif end export false finally for function global if ' +
    'import in isa let local macro module mutable new outer primitive public quote return struct true try type using var ' +
    'where while ans ccall cglobal eval float include sqrt Base Core Main'
  ).split(' '),
);

export const JULIA_NAMING: Naming = {
  style: 'snake',
  isWord: (name) => WORDS.has(name),
  ignoreCase: false,
  longest: Number.POSITIVE_INFINITY,
};

const NOTATION: Notation = {
  literal: (digits) => digits,
  element: (list, index) => `${list}[${index + 1}]`,
  root: (argument) => `sqrt(${argument})`,
};

export const JULIA: Language = {
  id: 'julia',
  title: 'Julia',
  extension: '.jl',
  write: moduleText,
  example: exampleText,
};

interface Names {
  readonly module: string;
  readonly couplings: ReadonlyMap<string, string>;
  readonly inputs: ReadonlyMap<CodeInput, ReadonlyMap<string, string>>;
}

const functionOf = (f: CodeFunction): string => functionName(f.name, JULIA_NAMING);

const namesOf = (m: CodeModule): Names => ({
  module: moduleName(m)
    .split('_')
    .map((w) => `${w.slice(0, 1).toUpperCase()}${w.slice(1)}`)
    .join(''),
  couplings: couplingMembers(m, JULIA_NAMING),
  inputs: new Map(inputsOf(m).map((i) => [i, inputMembers(i, JULIA_NAMING)])),
});

function moduleText(m: CodeModule): string {
  const n = namesOf(m);
  return `${[
    docstring([...headerLines(m), '', ...argumentLines(m, n)]),
    `module ${n.module}\n`,
    `${constants(m)}\n`,
    m.functions.flatMap((f) => functionTexts(m, f, n)).join('\n\n'),
    `\nend # module ${n.module}`,
  ].join('\n')}\n`;
}

/** A docstring, in which nothing is interpolated. */
const docstring = (lines: readonly string[], head: readonly string[] = []): string =>
  ['"""', ...head, ...commentLines(lines).map((l) => l.replace(/["\\$]/g, '\\$&')), '"""'].join('\n');

function argumentLines(m: CodeModule, n: Names): string[] {
  return [
    `Argument \`couplings\`: a named tuple. ${COUPLINGS}`,
    ...m.parameters.map((p) => {
      const member = n.couplings.get(p.name)!;
      return `    ${member}: ${p.meaning}; ${powerText(p.dimension)}${standsFor(member, p.name)}`;
    }),
    ...inputsOf(m).flatMap((input) => {
      const members = n.inputs.get(input)!;
      if (input.kind === 'vector')
        return [
          `Argument \`${input.name}\`: a vector. ${input.about}`,
          ...input.entries.map((e, i) => `    ${i + 1}: ${e.symbol}, ${e.meaning}; ${powerText(e.dimension)}`),
        ];
      return [
        `Argument \`${input.name}\`: a named tuple of vectors [value, first derivative, ...]. ${input.about}`,
        ...input.fields.map((f) => {
          const member = members.get(f.name)!;
          const dimension = `${powerText(f.dimension)}, one more for each derivative`;
          return `    ${member}: up to order ${f.order}; ${f.meaning}; ${dimension}${standsFor(member, f.name)}`;
        }),
      ];
    }),
  ];
}

function vector(name: string, texts: readonly string[]): string {
  if (texts.length === 0) return `const ${name} = String[]`;
  return `const ${name} = [\n${commaLines(texts.map(codePointLiteral), WIDTH)
    .map((l) => `    ${l}`)
    .join('\n')},\n]`;
}

/** Lists of what the numbers that a function returns are. */
function labels(f: CodeFunction): [string, readonly string[]][] {
  const name = functionOf(f).toUpperCase();
  if (f.result.kind === 'number') return [];
  if (f.result.kind !== 'matrix') return [[`${name}_KEYS`, f.outputs.map((o) => o.key)]];
  return [
    [`${name}_ROWS`, f.result.rows],
    [`${name}_COLUMNS`, f.result.columns],
  ];
}

const constants = (m: CodeModule): string =>
  [
    '# Name of the theory, and the geometry on which it was reduced.',
    `const THEORY = ${codePointLiteral(m.theory)}`,
    `const GEOMETRY = ${codePointLiteral(m.geometry.id)}`,
    '# Sources are parameters that are functions of time, to be given by their current value.',
    vector('VARIABLES', m.variables),
    vector(
      'PARAMETERS',
      m.parameters.map((p) => p.name),
    ),
    vector(
      'SOURCES',
      m.parameters.filter((p) => p.isSource).map((p) => p.name),
    ),
    ...m.functions.flatMap((f) => labels(f).map(([name, texts]) => vector(name, texts))),
  ].join('\n');

function options(m: CodeModule, n: Names): BodyOptions {
  const own = ['THEORY', 'GEOMETRY', 'VARIABLES', 'PARAMETERS', 'SOURCES', 'couplings', n.module];
  const names = m.functions.flatMap((f) => [functionOf(f), ...labels(f).map(([name]) => name)]);
  // The compiler's time grows faster than the length of a function.
  return {
    naming: JULIA_NAMING,
    taken: [...own, ...names, ...inputsOf(m).map((i) => i.name)],
    mostTerms: 1500,
    partTerms: 750,
  };
}

function functionTexts(m: CodeModule, f: CodeFunction, n: Names): string[] {
  const { parts, body } = functionCode(m, f, options(m, n));
  const call = `${functionOf(f)}(couplings, ${f.input.name})`;
  const doc = docstring(functionLines(f), [`    ${call}`, '']);
  return [
    ...parts.map((p) => partText(f.input, p, n)),
    `${doc}\nfunction ${call}\n${bodyText(f.input, body, returned(f), n)}\nend`,
  ];
}

const partText = (input: CodeInput, { name, body }: Part, n: Names): string =>
  `function _${name}(couplings, ${input.name})\n${bodyText(input, body, tupleOf(body.results.length), n)}\nend`;

/** Values get names before they are returned, so that no layout can part or join the entries of a matrix. */
const valueName = (i: number): string => `_value${i + 1}`;
const valueNames = (count: number): string[] => Array.from({ length: count }, (_, i) => valueName(i));
const tupleOf = (count: number): string => `(${valueNames(count).join(', ')},)`;

function bodyText(input: CodeInput, body: Body, result: string, n: Names): string {
  return [
    ...body.calls.map((c) => `    ${c.local} = _${c.part}(couplings, ${input.name})`),
    ...body.reads.map((r) => `    ${r.local} = ${source(r, input, n)}`),
    ...body.steps.map((s) => `    ${s.name} =${spaced(s.value)}`),
    ...body.results.map((e, i) => `    ${valueName(i)} =${spaced(e)}`),
    `    return ${result}`,
  ].join('\n');
}

/** Integers would overflow without a word, so numbers are made floating. */
function source(r: Read, input: CodeInput, n: Names): string {
  if (r.kind === 'coupling') return `float(couplings.${n.couplings.get(r.key)})`;
  if (r.kind === 'jet') return `float(${input.name}.${n.inputs.get(input)!.get(r.field)}[${r.order + 1}])`;
  return r.kind === 'entry' ? `float(${input.name}[${r.index + 1}])` : NOTATION.root(r.of);
}

/** A value behind `=`; one on several lines is indented below it, each line but the last ending in an operator. */
function spaced(e: Expression): string {
  const lines = layout(e, NOTATION, WIDTH);
  return lines.length === 1 ? ` ${lines[0]}` : lines.map((l) => `\n        ${l}`).join('');
}

function returned({ result, outputs }: CodeFunction): string {
  if (result.kind === 'number') return valueName(0);
  if (result.kind === 'vector') return `[${valueNames(outputs.length).join(', ')}]`;
  if (result.kind === 'record') {
    const keys = identifiersFor(
      outputs.map((o) => o.key),
      JULIA_NAMING,
    );
    const members = outputs.map((o, i) => `        ${keys.get(o.key)} = ${valueName(i)},`);
    return `(\n${members.join('\n')}\n    )`;
  }
  const width = result.columns.length;
  const names = valueNames(outputs.length);
  const rows = result.rows.map((_, i) => names.slice(i * width, (i + 1) * width).join(' '));
  return `[${rows.join(';\n        ')}]`;
}

function exampleText(m: CodeModule, file: string, sample = QUARTERS): string {
  const n = namesOf(m);
  const couplings = m.parameters.map((p, i) => `    ${n.couplings.get(p.name)} = ${sample.coupling(i)},`);
  const inputs = inputsOf(m).map((input) => {
    if (input.kind === 'vector') return `${input.name} = [${input.entries.map((_, i) => sample.jet(i, 0)).join(', ')}]`;
    const fields = input.fields.map(({ name, order }, i) => {
      const jet = Array.from({ length: order + 1 }, (_, k) => sample.jet(i, k));
      return `    ${n.inputs.get(input)!.get(name)} = [${jet.join(', ')}],`;
    });
    return `${input.name} = (\n${fields.join('\n')}\n)`;
  });
  const calls = m.functions.map(
    (f) => `show_value(${codePointLiteral(f.name)}, ${n.module}.${functionOf(f)}(couplings, ${f.input.name}))`,
  );
  const given = couplings.length === 0 ? 'couplings = NamedTuple()' : `couplings = (\n${couplings.join('\n')}\n)`;
  return `# ${EXAMPLE_TEXT}
include(${codePointLiteral(file)})

${given}
${inputs.join('\n')}

show_value(name, value::Number) = println(name, " = ", value)
function show_value(name, values)
    for (key, value) in pairs(values)
        show_value(string(name, "[", key, "]"), value)
    end
end

${calls.join('\n')}
`;
}
