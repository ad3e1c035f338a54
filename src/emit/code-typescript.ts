/**
 * A described module as TypeScript or, without its types, as a JavaScript module: no imports, strict-clean, doubles.
 * Text of the user reaches it only as keys, string literals and cleaned comments.
 */
import { type Body, type BodyOptions, functionCode, type Part, type Read } from './code-body.js';
import { type CodeFunction, type CodeInput, type CodeModule, inputsOf } from './code-description.js';
import { type Expression, layout, type Notation } from './code-expression.js';
import {
  COUPLINGS,
  commaLines,
  commentLines,
  EXAMPLE_TEXT,
  headerLines,
  type Language,
  QUARTERS,
  type Sample,
} from './code-language.js';
import { powerText } from './code-model.js';
import { ECMASCRIPT, propertyKey, stringLiteral } from './identifiers.js';

const WIDTH = 90;
/** Names that the module gives to its own things besides functions and inputs. */
const OWN = 'couplings theory geometry variables parameters sources Couplings Math'.split(' ');

const NOTATION: Notation = {
  literal: (digits) => digits,
  element: (list, index) => `${list}[${index}]`,
  root: (argument) => `Math.sqrt(${argument})`,
};

/** Both languages are one; `typed` says whether types are written. */
interface Dialect {
  readonly typed: boolean;
}

const typeName = (name: string): string => `${name.slice(0, 1).toUpperCase()}${name.slice(1)}`;

export const TYPESCRIPT: Language = {
  id: 'typescript',
  title: 'TypeScript',
  extension: '.ts',
  write: (m) => moduleText(m, { typed: true }),
  example: (m, file, sample = QUARTERS) =>
    exampleText(m, file.replace(/\.([mc]?)ts$/, '.$1js'), sample, { typed: true }),
};

export const JAVASCRIPT: Language = {
  id: 'javascript',
  title: 'JavaScript (ES module)',
  extension: '.js',
  write: (m) => moduleText(m, { typed: false }),
  example: (m, file, sample = QUARTERS) => exampleText(m, file, sample, { typed: false }),
};

function moduleText(m: CodeModule, dialect: Dialect): string {
  const blocks = [
    doc(headerLines(m)),
    constants(m, dialect),
    ...(dialect.typed ? [couplingsType(m), ...inputsOf(m).map(inputType)] : [argumentNotes(m)]),
    ...m.functions.map((f) => functionText(m, f, dialect)),
  ];
  return `${blocks.join('\n\n')}\n`;
}

/** A doc comment at an indentation. */
function doc(lines: readonly string[], indent = ''): string {
  const clean = commentLines(lines);
  if (clean.length === 1) return `${indent}/** ${clean[0]} */`;
  return [`${indent}/**`, ...clean.map((l) => `${indent} * ${l}`.trimEnd()), `${indent} */`].join('\n');
}

/** Items between brackets, on one line when they are few. */
function wrapped(items: readonly string[], pad: string, indent: string): string {
  const lines = commaLines(items, WIDTH);
  if (lines.length <= 1) return `${pad}${lines.join('')}${pad}`;
  return `\n${lines.map((l) => `${indent}  ${l}`).join('\n')},\n${indent}`;
}

const strings = (names: readonly string[], { typed }: Dialect): string =>
  `[${wrapped(names.map(stringLiteral), '', '')}]${typed ? ' as const' : ''}`;

function constants(m: CodeModule, dialect: Dialect): string {
  const sources = m.parameters.filter((p) => p.isSource).map((p) => p.name);
  const constant = (about: string, name: string, value: string) => `/** ${about} */\nexport const ${name} = ${value};`;
  const list = (about: string, name: string, names: readonly string[]) =>
    constant(about, name, strings(names, dialect));
  return [
    constant('Name of the theory.', 'theory', stringLiteral(m.theory)),
    constant('Geometry on which it was reduced.', 'geometry', stringLiteral(m.geometry.id)),
    list('Functions of time that are varied, in the order of the equations.', 'variables', m.variables),
    list(
      'Keys of `couplings`.',
      'parameters',
      m.parameters.map((p) => p.name),
    ),
    list('Parameters that are functions of time, to be given by their current value.', 'sources', sources),
    ...m.functions.flatMap(({ name, result, outputs }) => {
      if (result.kind === 'vector')
        return [
          list(
            `What the numbers of \`${name}\` are.`,
            `${name}Keys`,
            outputs.map((o) => o.key),
          ),
        ];
      if (result.kind !== 'matrix') return [];
      return [
        list(`Rows of \`${name}\`.`, `${name}Rows`, result.rows),
        list(`Columns of \`${name}\`; D(q,n) is the n-th derivative.`, `${name}Columns`, result.columns),
      ];
    }),
  ].join('\n');
}

function couplingsType({ parameters }: CodeModule): string {
  const members = parameters.flatMap((p) => [
    doc([`${p.meaning}; ${powerText(p.dimension)}`], '  '),
    `  readonly ${propertyKey(p.name)}: number;`,
  ]);
  return `/** ${COUPLINGS} */\nexport interface Couplings {${['', ...members].join('\n')}\n}`;
}

function inputType(input: CodeInput): string {
  const type = typeName(input.name);
  if (input.kind === 'vector') return `${doc(vectorLines(input))}\nexport type ${type} = ArrayLike<number>;`;
  const members = input.fields.flatMap(({ name, meaning, dimension, order }) => [
    doc([`${meaning} and its time derivatives; ${powerText(dimension)}, one more for each derivative`], '  '),
    `  readonly ${propertyKey(name)}: ${tupleType(order)};`,
  ]);
  return `${doc([input.about])}\nexport interface ${type} {\n${members.join('\n')}\n}`;
}

const vectorLines = (input: Extract<CodeInput, { kind: 'vector' }>): string[] => [
  input.about,
  ...input.entries.map((e, i) => `    ${i}: ${e.symbol}, ${e.meaning}; ${powerText(e.dimension)}`),
];

const LABELS = ['value', 'first', 'second', 'third'];

/** `readonly [value: number, first: number, ...higher: number[]]`: longer jets are accepted, so that one object serves all. */
export function tupleType(order: number): string {
  const entries = Array.from({ length: order + 1 }, (_, n) => `${LABELS[n] ?? `order${n}`}: number`);
  return `readonly [${entries.join(', ')}, ...higher: number[]]`;
}

/** What types say in TypeScript, in words. */
function argumentNotes(m: CodeModule): string {
  const couplings = [
    `Argument \`couplings\`: an object of numbers. ${COUPLINGS}`,
    ...m.parameters.map((p) => `    ${p.name}: ${p.meaning}; ${powerText(p.dimension)}`),
  ];
  const inputs = inputsOf(m).flatMap((input) => {
    if (input.kind === 'vector') return [`Argument \`${input.name}\`: a list of numbers.`, ...vectorLines(input)];
    return [
      `Argument \`${input.name}\`: an object of lists [value, first derivative, …]. ${input.about}`,
      ...input.fields.map(
        (f) =>
          `    ${f.name}: up to order ${f.order}; ${f.meaning}; ${powerText(f.dimension)}, one more for each derivative`,
      ),
    ];
  });
  return doc([...couplings, '', ...inputs]);
}

/** Locals keep clear of everything that the module defines. */
function options(m: CodeModule): BodyOptions {
  const names = m.functions.flatMap((f) => [
    f.name,
    `${f.name}Keys`,
    `${f.name}Rows`,
    `${f.name}Columns`,
    typeName(f.name),
  ]);
  const inputs = inputsOf(m).flatMap((i) => [i.name, typeName(i.name)]);
  // Compilers give up on very long functions.
  return { naming: ECMASCRIPT, taken: [...OWN, ...names, ...inputs], mostTerms: 1200, partTerms: 600 };
}

function signature(name: string, type: string, input: CodeInput, body: Body, { typed }: Dialect): string {
  const first = body.usesCouplings ? 'couplings' : '_couplings';
  const second = body.usesInput ? input.name : `_${input.name}`;
  if (!typed) return `function ${name}(${first}, ${second}) {`;
  return `function ${name}(${first}: Couplings, ${second}: ${typeName(input.name)}): ${type} {`;
}

const RESULT_TYPES = { number: 'number', vector: 'number[]', matrix: 'number[][]' } as const;

function functionText(m: CodeModule, f: CodeFunction, dialect: Dialect): string {
  const { parts, body } = functionCode(m, f, options(m));
  const type = f.result.kind === 'record' ? f.result.type : RESULT_TYPES[f.result.kind];
  const lines = f.result.kind === 'record' && !dialect.typed ? [...f.doc, ...outputLines(f)] : notes(f);
  return [
    ...(f.result.kind === 'record' && dialect.typed ? [recordType(f, f.result)] : []),
    ...parts.map((p) => partText(f.input, p, dialect)),
    `${doc(lines)}\nexport ${signature(f.name, type, f.input, body, dialect)}\n${bodyText(f.input, body, returned(f, body), dialect)}\n}`,
  ].join('\n\n');
}

const outputLines = (f: CodeFunction): string[] => f.outputs.map((o) => `    ${o.key}: ${o.meaning}`);
const notes = (f: CodeFunction): string[] => {
  if (f.result.kind === 'vector') return [...f.doc, f.result.about, ...outputLines(f)];
  return f.result.kind === 'matrix' ? [...f.doc, f.result.about] : [...f.doc];
};

function recordType(f: CodeFunction, result: { readonly type: string; readonly about: string }): string {
  const members = f.outputs.flatMap((o) => [doc([o.meaning], '  '), `  readonly ${propertyKey(o.key)}: number;`]);
  return `${doc([result.about])}\nexport interface ${result.type} {\n${members.join('\n')}\n}`;
}

function partText(input: CodeInput, { name, body }: Part, dialect: Dialect): string {
  const result = `  return [\n${body.results.map((e) => `    ${value(e, '    ')},`).join('\n')}\n  ];`;
  const type = `[${body.results.map(() => 'number').join(', ')}]`;
  return `${signature(name, type, input, body, dialect)}\n${bodyText(input, body, result, dialect)}\n}`;
}

function bodyText(input: CodeInput, body: Body, result: string, dialect: Dialect): string {
  const calls = body.calls.map((c) => `  const ${c.local} = ${c.part}(couplings, ${input.name});`);
  const steps = body.steps.map((s) => `  const ${s.name} =${spaced(s.value)};`);
  return [...calls, ...reads(input, body.reads, dialect), ...steps, result].join('\n');
}

/** Destructures couplings in one statement, each field's jet in another. */
function reads(input: CodeInput, list: readonly Read[], { typed }: Dialect): string[] {
  const constants: string[] = [];
  const fields = new Map<string, string[]>();
  const entries: string[] = [];
  const roots: string[] = [];
  for (const r of list) {
    if (r.kind === 'coupling') constants.push(r.local === r.key ? r.key : `${propertyKey(r.key)}: ${r.local}`);
    else if (r.kind === 'entry') entries.push(`  const ${r.local} = ${input.name}[${r.index}]${typed ? '!' : ''};`);
    else if (r.kind === 'root') roots.push(`  const ${r.local} = ${NOTATION.root(r.of)};`);
    else {
      const places = fields.get(r.field) ?? [];
      places[r.order] = r.local;
      fields.set(r.field, places);
    }
  }
  const lines = constants.length === 0 ? [] : [`  const {${wrapped(constants, ' ', '  ')}} = couplings;`];
  for (const [field, places] of fields) {
    const all = Array.from(places, (name) => name ?? '');
    const object = /^[A-Za-z_]\w*$/.test(field) ? `${input.name}.${field}` : `${input.name}[${stringLiteral(field)}]`;
    lines.push(`  const [${all.join(', ')}] = ${object};`);
  }
  return [...lines, ...entries, ...roots];
}

/** A value behind something on its line; one on several lines is indented below it. */
function value(e: Expression, indent: string): string {
  const lines = layout(e, NOTATION, WIDTH);
  return lines.length === 1 ? lines[0]! : lines.map((l) => `\n${indent}  ${l}`).join('');
}

function spaced(e: Expression): string {
  const text = value(e, '  ');
  return text.startsWith('\n') ? text : ` ${text}`;
}

function returned({ result, outputs }: CodeFunction, { results }: Body): string {
  if (result.kind === 'number') {
    const text = value(results[0]!, '  ');
    // Brackets keep a line break after `return` from ending the statement.
    return `  return ${text.startsWith('\n') ? `(${text}\n  )` : text};`;
  }
  if (result.kind === 'record') {
    const members = outputs.map(({ key }, i) => `    ${propertyKey(key)}: ${value(results[i]!, '    ')},`);
    return `  return {\n${members.join('\n').replaceAll(': \n', ':\n')}\n  };`;
  }
  if (result.kind === 'vector')
    return `  return [\n${results.map((e) => `    ${value(e, '    ').trimStart()},`).join('\n')}\n  ];`;
  const width = result.columns.length;
  const rows = result.rows.map((_, i) => results.slice(i * width, (i + 1) * width));
  const texts = rows.map(
    (row) => `    [\n${row.map((e) => `      ${value(e, '      ').trimStart()},`).join('\n')}\n    ],`,
  );
  return `  return [\n${texts.join('\n')}\n  ];`;
}

function exampleText(m: CodeModule, file: string, sample: Sample, { typed }: Dialect): string {
  const couplings = m.parameters.map((p, i) => `  ${propertyKey(p.name)}: ${sample.coupling(i)},`);
  const inputs = inputsOf(m).map((input) => {
    if (input.kind === 'vector')
      return `const ${input.name} = [${input.entries.map((_, i) => sample.jet(i, 0)).join(', ')}];`;
    const fields = input.fields.map(({ name, order }, i) => {
      const jet = Array.from({ length: order + 1 }, (_, n) => sample.jet(i, n));
      return `  ${propertyKey(name)}: [${jet.join(', ')}],`;
    });
    return `const ${input.name}${typed ? `: theory.${typeName(input.name)}` : ''} = {\n${fields.join('\n')}\n};`;
  });
  const calls = m.functions.map((f) => `show(${stringLiteral(f.name)}, theory.${f.name}(couplings, ${f.input.name}));`);
  return `${[
    `// ${EXAMPLE_TEXT}`,
    `import * as theory from ${stringLiteral(`./${file}`)};`,
    '',
    `const couplings${typed ? ': theory.Couplings' : ''} = {\n${couplings.join('\n')}\n};`,
    ...inputs,
    '',
    typed ? 'const show = (name: string, value: number | object): void => {' : 'const show = (name, value) => {',
    "  if (typeof value === 'number') console.log(name, '=', value);",
    "  else for (const [key, inner] of Object.entries(value)) show(name + '[' + key + ']', inner);",
    '};',
    ...calls,
  ].join('\n')}\n`;
}
