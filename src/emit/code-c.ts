/**
 * A described module as C99. One file is both: compiled it defines everything; included behind `#define …_DECLARATIONS` it
 * declares. Everything with external linkage begins with the module's name. Text of the user reaches it only as checked
 * identifiers, ASCII string literals and cleaned comments.
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
import { functionName, type Naming } from './identifiers.js';

const WIDTH = 90;

const WORDS = new Set(
  (
    'auto break case char const continue default do double else enum extern float for goto if inline int long register ' +
    'restrict return short signed sizeof static struct switch typedef union unsigned void volatile while main sqrt ' +
    // Words of C++ and of later C, so that the declarations can be included there too.
    'alignas alignof and and_eq asm atomic_cancel atomic_commit atomic_noexcept bitand bitor bool catch char8_t char16_t ' +
    'char32_t class compl concept consteval constexpr constinit const_cast co_await co_return co_yield decltype delete ' +
    'dynamic_cast explicit export false friend mutable namespace new noexcept not not_eq nullptr operator or or_eq private ' +
    'protected public reflexpr reinterpret_cast requires static_assert static_cast synchronized template this ' +
    'thread_local throw true try typeid typename typeof typeof_unqual using virtual wchar_t xor xor_eq fortran ' +
    // Macros in small letters: of standard headers, and of compilers for their system.
    'alloca assert complex errno fpclassify i386 imaginary isfinite isgreater isgreaterequal isinf isless islessequal ' +
    'islessgreater isnan isnormal isunordered linux math_errhandling noreturn offsetof setjmp sigmask signbit stderr ' +
    'stdin stdout unix va_arg va_copy va_end va_start I L_tmpnam L_ctermid P_tmpdir'
  ).split(' '),
);

/** Capitals alone are how headers call their macros: NAN, EOF, M_E; one letter among digits is none, nor a last underscore. */
const isMacro = (name: string): boolean =>
  /^[A-Z][A-Z0-9_]*[A-Z0-9]$/.test(name) && name.replace(/[^A-Z]/g, '').length > 1;
const isHeaderMacro = (name: string): boolean => /^(?:si|sa|sigev)_|^(?:be|le)(?:16|32|64)toh$|^hto[bl]e/.test(name);

export const C_NAMING: Naming = {
  style: 'snake',
  isWord: (name) => WORDS.has(name) || isMacro(name) || isHeaderMacro(name),
  ignoreCase: false,
  longest: 63,
};

const NOTATION: Notation = {
  literal: (digits) => (/[.e]/.test(digits) ? digits : `${digits}.0`),
  element: (list, index) => `${list}[${index}]`,
  root: (argument) => `sqrt(${argument})`,
};

export const C: Language = { id: 'c', title: 'C99', extension: '.c', write: moduleText, example: exampleText };

/** Names of a module's things. */
interface Names {
  readonly prefix: string;
  readonly capitals: string;
  readonly couplings: ReadonlyMap<string, string>;
  readonly inputs: ReadonlyMap<CodeInput, ReadonlyMap<string, string>>;
  readonly functionOf: (f: CodeFunction) => string;
}

function namesOf(m: CodeModule): Names {
  const prefix = moduleName(m);
  return {
    prefix,
    capitals: prefix.toUpperCase(),
    couplings: couplingMembers(m, C_NAMING),
    inputs: new Map(inputsOf(m).map((i) => [i, inputMembers(i, C_NAMING)])),
    functionOf: (f) => `${prefix}_${functionName(f.name, C_NAMING)}`,
  };
}

function moduleText(m: CodeModule): string {
  const n = namesOf(m);
  const codes = m.functions.map((f) => ({ f, code: functionCode(m, f, options(m, n)) }));
  const bodies = codes.flatMap(({ code }) => [code.body, ...code.parts.map((p) => p.body)]);
  const roots = bodies.some((b) => b.reads.some((r) => r.kind === 'root'));
  return `${[
    comment([...headerLines(m), '', ...usage(n)]),
    `#ifndef ${n.capitals}_INCLUDED\n#define ${n.capitals}_INCLUDED`,
    '#ifdef __cplusplus\nextern "C" {\n#endif',
    couplingsType(m, n),
    ...inputsOf(m).map((i) => inputType(i, n)),
    textDeclarations(n),
    ...m.functions.map((f) => declaration(f, n)),
    '#ifdef __cplusplus\n}\n#endif',
    `#endif`,
    `#ifndef ${n.capitals}_DECLARATIONS`,
    ...(roots ? ['#include <math.h>'] : []),
    textDefinitions(m, n),
    ...codes.flatMap(({ f, code }) => [
      ...code.parts.map((p) => partText(f.input, p, n)),
      `${prototype(f, n)}\n{\n${bodyText(f.input, code.body, stored(f, code.body), n)}\n}`,
    ]),
    '#endif',
  ].join('\n\n')}\n`;
}

const usage = ({ capitals }: Names): string[] => [
  `Compile this file once. Where its functions are called, define ${capitals}_DECLARATIONS and then include it, which ` +
    'declares them and defines nothing.',
];

/** A comment on its own lines, or on one. `??` would begin a trigraph. */
function comment(lines: readonly string[], indent = ''): string {
  const clean = commentLines(lines).map((l) => l.replace(/\?(?=\?)/g, '? '));
  if (clean.length === 1) return `${indent}/** ${clean[0]} */`;
  return [`${indent}/**`, ...clean.map((l) => `${indent} * ${l}`.trimEnd()), `${indent} */`].join('\n');
}

/** A string literal in ASCII: everything else as the octal codes of its UTF-8 bytes. */
export function cString(text: string): string {
  const bytes = [...new TextEncoder().encode(text)];
  const plain = (b: number): boolean => b >= 32 && b < 127 && !'"\\?'.includes(String.fromCharCode(b));
  return `"${bytes.map((b) => (plain(b) ? String.fromCharCode(b) : `\\${b.toString(8).padStart(3, '0')}`)).join('')}"`;
}

function couplingsType({ parameters }: CodeModule, n: Names): string {
  const members = parameters.flatMap((p) => {
    const member = n.couplings.get(p.name)!;
    return [
      comment([`${p.meaning}; ${powerText(p.dimension)}${standsFor(member, p.name)}`], '  '),
      `  double ${member};`,
    ];
  });
  // A structure without members is not C.
  if (members.length === 0) members.push('  /** The theory has no parameters. */', '  double unused;');
  return `${comment([COUPLINGS])}
typedef struct {\n${members.join('\n')}\n} ${n.prefix}_couplings;`;
}

function inputType(input: CodeInput, n: Names): string {
  const names = n.inputs.get(input)!;
  if (input.kind === 'vector') {
    const symbols = input.entries.map((e) => ({ name: e.symbol, meaning: `${e.meaning}; ${powerText(e.dimension)}` }));
    return `${comment([`Places in \`${input.name}\`. ${input.about}`])}\n${enumeration(`${n.capitals}_${input.name}`, symbols)}`;
  }
  const members = input.fields.flatMap(({ name, meaning, dimension, order }) => {
    const member = names.get(name)!;
    const text = `${meaning} and its time derivatives; ${powerText(dimension)}, one more for each derivative`;
    return [comment([`${text}${standsFor(member, name)}`], '  '), `  double ${member}[${order + 1}];`];
  });
  return `${comment([input.about])}\ntypedef struct {\n${members.join('\n')}\n} ${n.prefix}_${input.name};`;
}

/** Constants 0, 1, 2, … under names made of a prefix and each key, and their number. */
function enumeration(prefix: string, items: readonly { readonly name: string; readonly meaning: string }[]): string {
  const naming: Naming = { ...C_NAMING, isWord: (w) => w.toUpperCase() === 'COUNT', ignoreCase: true };
  const names = identifiersFor(
    items.map((i) => i.name),
    naming,
  );
  const lines = items.flatMap(({ name, meaning }) => [
    comment([meaning], '  '),
    `  ${`${prefix}_${names.get(name)}`.toUpperCase()},`,
  ]);
  return `enum {\n${lines.join('\n')}\n  ${prefix.toUpperCase()}_COUNT\n};`;
}

const LISTS = ['variables', 'parameters', 'sources'] as const;

const textDeclarations = ({ prefix }: Names): string =>
  [
    '/** Name of the theory, and the geometry on which it was reduced; UTF-8. */',
    `extern const char ${prefix}_theory[];\nextern const char ${prefix}_geometry[];`,
    '/** Names; each list ends in a null pointer. Sources are parameters to be given by their current value. */',
    ...LISTS.map((list) => `extern const char *const ${prefix}_${list}[];`),
  ].join('\n');

function list(name: string, texts: readonly string[]): string {
  const lines = commaLines([...texts.map(cString), '0'], WIDTH);
  return `const char *const ${name}[] = {\n${lines.map((l) => `  ${l}`).join('\n')}\n};`;
}

function textDefinitions(m: CodeModule, n: Names): string {
  const values = {
    variables: m.variables,
    parameters: m.parameters.map((p) => p.name),
    sources: m.parameters.filter((p) => p.isSource).map((p) => p.name),
  };
  return [
    `const char ${n.prefix}_theory[] = ${cString(m.theory)};`,
    `const char ${n.prefix}_geometry[] = ${cString(m.geometry.id)};`,
    ...LISTS.map((name) => list(`${n.prefix}_${name}`, values[name])),
    ...m.functions.flatMap((f) => labels(f, n).map(([name, texts]) => list(name, texts))),
  ].join('\n');
}

/** Lists of what the numbers that a function stores are. */
function labels(f: CodeFunction, n: Names): [string, readonly string[]][] {
  const name = n.functionOf(f);
  if (f.result.kind === 'number') return [];
  if (f.result.kind !== 'matrix') return [[`${name}_keys`, f.outputs.map((o) => o.key)]];
  return [
    [`${name}_rows`, f.result.rows],
    [`${name}_columns`, f.result.columns],
  ];
}

function declaration(f: CodeFunction, n: Names): string {
  const name = n.functionOf(f);
  const { result } = f;
  const keys = labels(f, n).map(([list]) => `extern const char *const ${list}[];`);
  if (result.kind === 'number') return `${comment(f.doc)}\n${prototype(f, n)};`;
  if (result.kind === 'matrix') {
    const text = [...functionLines(f), 'Stored row by row. The lists of names end in a null pointer.'];
    const sizes = `enum { ${name.toUpperCase()}_ROWS = ${result.rows.length}, ${name.toUpperCase()}_COLUMNS = ${result.columns.length} };`;
    return [comment(text), sizes, ...keys, `${prototype(f, n)};`].join('\n');
  }
  const items = f.outputs.map((o) => ({ name: o.key, meaning: o.meaning }));
  const text = [...f.doc, result.about, 'Stored at the places named above; the list of keys ends in a null pointer.'];
  return [enumeration(name, items), comment(text), ...keys, `${prototype(f, n)};`].join('\n');
}

function argumentsOf(input: CodeInput, n: Names): string {
  const second =
    input.kind === 'jets' ? `const ${n.prefix}_${input.name} *${input.name}` : `const double *${input.name}`;
  return `const ${n.prefix}_couplings *couplings, ${second}`;
}

function prototype(f: CodeFunction, n: Names): string {
  const inputs = argumentsOf(f.input, n);
  if (f.result.kind === 'number') return `double ${n.functionOf(f)}(${inputs})`;
  return `void ${n.functionOf(f)}(${inputs}, double *values)`;
}

/** Compilers of C take long functions. */
function options(m: CodeModule, n: Names): BodyOptions {
  const functions = m.functions.flatMap((f) => [n.functionOf(f), ...labels(f, n).map(([name]) => name)]);
  const lists = ['theory', 'geometry', 'couplings', ...LISTS, ...inputsOf(m).map((i) => i.name)];
  const own = ['couplings', 'values', 'sqrt', ...inputsOf(m).map((i) => i.name)];
  const taken = [...own, ...functions, ...lists.map((l) => `${n.prefix}_${l}`)];
  return { naming: C_NAMING, taken, mostTerms: 6000, partTerms: 3000 };
}

const partFunction = (part: string, { prefix }: Names): string => `${prefix}_${part}`;

function partText(input: CodeInput, { name, body }: Part, n: Names): string {
  const stores = body.results.map((e, i) => `  values[${i}] =${spaced(e)};`);
  const head = `static void ${partFunction(name, n)}(${argumentsOf(input, n)}, double *values)`;
  return `${head}\n{\n${bodyText(input, body, stores, n)}\n}`;
}

function bodyText(input: CodeInput, body: Body, end: readonly string[], n: Names): string {
  const unused = [...(body.usesCouplings ? [] : ['couplings']), ...(body.usesInput ? [] : [input.name])];
  return [
    ...body.calls.map((c) => `  double ${c.local}[${c.count}];`),
    ...body.reads.map((r) => `  const double ${r.local} = ${source(r, input, n)};`),
    ...unused.map((name) => `  (void)${name};`),
    ...body.calls.map((c) => `  ${partFunction(c.part, n)}(couplings, ${input.name}, ${c.local});`),
    ...body.steps.map((s) => `  const double ${s.name} =${spaced(s.value)};`),
    ...end,
  ].join('\n');
}

function source(r: Read, input: CodeInput, n: Names): string {
  if (r.kind === 'coupling') return `couplings->${n.couplings.get(r.key)}`;
  if (r.kind === 'jet') return `${input.name}->${n.inputs.get(input)!.get(r.field)}[${r.order}]`;
  return r.kind === 'entry' ? `${input.name}[${r.index}]` : NOTATION.root(r.of);
}

/** A value behind `=` or `return`; one on several lines is indented below it. */
function spaced(e: Expression): string {
  const lines = layout(e, NOTATION, WIDTH);
  return lines.length === 1 ? ` ${lines[0]}` : lines.map((l) => `\n    ${l}`).join('');
}

function stored(f: CodeFunction, { results }: Body): string[] {
  if (f.result.kind === 'number') return [`  return${spaced(results[0]!)};`];
  return results.map((e, i) => `  values[${i}] =${spaced(e)};`);
}

function exampleText(m: CodeModule, file: string, sample = QUARTERS): string {
  const n = namesOf(m);
  const variable = (i: CodeInput): string => (i.kind === 'jets' ? `&${i.name}` : i.name);
  const inputs = inputsOf(m).map((input) => {
    if (input.kind === 'vector')
      return `  const double ${input.name}[] = { ${input.entries.map((_, i) => sample.jet(i, 0)).join(', ')} };`;
    const members = input.fields.map(({ name, order }, i) => {
      const jet = Array.from({ length: order + 1 }, (_, k) => sample.jet(i, k)).join(', ');
      return `    .${n.inputs.get(input)!.get(name)} = { ${jet} },`;
    });
    return `  const ${n.prefix}_${input.name} ${input.name} = {\n${members.join('\n')}\n  };`;
  });
  const members = m.parameters.map((p, i) => `    .${n.couplings.get(p.name)} = ${sample.coupling(i)},`);
  if (members.length === 0) members.push('    .unused = 0.0,');
  const calls = m.functions.map((f) => {
    const name = n.functionOf(f);
    const given = `&couplings, ${variable(f.input)}`;
    if (f.result.kind === 'number') return `  printf("%s = %.17g\\n", ${cString(f.name)}, ${name}(${given}));`;
    if (f.result.kind === 'matrix')
      return `  {
    double values[${name.toUpperCase()}_ROWS * ${name.toUpperCase()}_COLUMNS];
    int i, j;
    ${name}(${given}, values);
    for (i = 0; i < ${name.toUpperCase()}_ROWS; i++)
      for (j = 0; j < ${name.toUpperCase()}_COLUMNS; j++)
        printf("%s[%d][%d] = %.17g\\n", ${cString(f.name)}, i, j, values[i * ${name.toUpperCase()}_COLUMNS + j]);
  }`;
    return `  {
    double values[${name.toUpperCase()}_COUNT];
    int i;
    ${name}(${given}, values);
    for (i = 0; i < ${name.toUpperCase()}_COUNT; i++)
      printf("%s[%s] = %.17g\\n", ${cString(f.name)}, ${name}_keys[i], values[i]);
  }`;
  });
  return `/* ${EXAMPLE_TEXT} */
#include <stdio.h>
#define ${n.capitals}_DECLARATIONS
#include ${cInclude(file)}

int main(void)
{
  const ${n.prefix}_couplings couplings = {\n${members.join('\n')}\n  };
${inputs.join('\n')}

${calls.join('\n')}
  return 0;
}
`;
}

const cInclude = (file: string): string => `"${file.replace(/[^\w.+ -]/g, '_')}"`;
