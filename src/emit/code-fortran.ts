/**
 * A described module as a module of Fortran 2008, free form. Names are one in either case and have at most 63 characters,
 * lines at most 132 columns, statements few enough continuation lines. Text of the user reaches it only as checked
 * identifiers, character constants and cleaned comments.
 */
import { type Body, type BodyOptions, functionCode, type Part, type Read } from './code-body.js';
import { type CodeFunction, type CodeInput, type CodeModule, inputsOf } from './code-description.js';
import { type Expression, filled, layout, type Notation } from './code-expression.js';
import {
  COUPLINGS,
  commaLines,
  commentLines,
  couplingMembers,
  EXAMPLE_TEXT,
  functionLines,
  headerLines,
  inputMembers,
  type Language,
  moduleName,
  QUARTERS,
  standsFor,
} from './code-language.js';
import { powerText } from './code-model.js';
import { functionName, identifierText, makeNameTable, type Naming } from './identifiers.js';

/** Wanted width of an expression, and the widest piece of one that leaves room for indentation and ` &`. */
const WIDTH = 90;
const WIDEST = 118;
/** A sum of more terms is added up in several statements, since a statement has at most 255 continuation lines. */
const MOST_SUMMANDS = 40;

const WORDS = new Set(
  // The language reserves nothing, but statements that begin like another one are hard on readers and compilers.
  (
    'abstract allocatable allocate assign associate asynchronous backspace bind block call case character class close ' +
    'codimension common complex concurrent contains contiguous continue critical cycle data deallocate deferred dimension ' +
    'do double doubleprecision elemental else elseif elsewhere end endblock enddo endfile endforall endfunction endif ' +
    'endinterface endmodule endprogram endselect endsubroutine endtype endwhere entry enum enumerator equivalence error ' +
    'exit extends external final flush forall format function generic go goto if images implicit import impure include ' +
    'inout inquire integer intent interface intrinsic kind len lock logical memory module namelist none nopass ' +
    'non_overridable nullify only open operator optional out parameter pass pause pointer precision print private ' +
    'procedure program protected public pure read real recursive result return rewind rewrite save select sequence stop ' +
    'submodule subroutine sync target then to type unlock use value values volatile wait where while write ' +
    // Used by the module itself.
    'dp real64 sqrt size trim'
  ).split(' '),
);

export const FORTRAN_NAMING: Naming = {
  style: 'snake',
  isWord: (name) => WORDS.has(name),
  ignoreCase: true,
  longest: 63,
};

const NOTATION: Notation = {
  literal: (digits) => (/[.e]/.test(digits) ? `${digits}_dp` : `${digits}.0_dp`),
  element: (list, index) => `${list}(${index + 1})`,
  root: (argument) => `sqrt(${argument})`,
};

export const FORTRAN: Language = {
  id: 'fortran',
  title: 'Fortran 2008',
  extension: '.f90',
  write: moduleText,
  example: exampleText,
};

/** Names of a module's things. */
interface Names {
  readonly module: string;
  readonly couplings: ReadonlyMap<string, string>;
  readonly inputs: ReadonlyMap<CodeInput, ReadonlyMap<string, string>>;
  readonly functionOf: (f: CodeFunction) => string;
  /** Names of places, by function or list and key. */
  readonly places: ReadonlyMap<string, ReadonlyMap<string, string>>;
  /** Everything that is visible in the module. */
  readonly all: readonly string[];
}

const LISTS = ['variables', 'parameters', 'sources'] as const;

/** Lists of what the numbers that a function returns are. */
function labels(f: CodeFunction): [string, readonly string[]][] {
  const name = functionName(f.name, FORTRAN_NAMING);
  if (f.result.kind === 'number') return [];
  if (f.result.kind !== 'matrix') return [[`${name}_keys`, f.outputs.map((o) => o.key)]];
  return [
    [`${name}_rows`, f.result.rows],
    [`${name}_columns`, f.result.columns],
  ];
}

function namesOf(m: CodeModule): Names {
  const functionOf = (f: CodeFunction): string => functionName(f.name, FORTRAN_NAMING);
  const inputs = inputsOf(m);
  const fixed = [
    ...['dp', 'couplings_t', 'theory', 'geometry', 'couplings', 'value', 'values', ...LISTS],
    ...inputs.flatMap((i) => [i.name, `${i.name}_t`]),
    ...m.functions.flatMap((f) => [functionOf(f), ...labels(f).map(([name]) => name)]),
  ];
  const listed = m.functions.filter((f) => f.result.kind === 'record' || f.result.kind === 'vector');
  const keys: [string, string[]][] = [
    ...listed.map((f): [string, string[]] => [functionOf(f), f.outputs.map((o) => o.key)]),
    ...inputs.flatMap((i): [string, string[]][] =>
      i.kind === 'vector' ? [[i.name, i.entries.map((e) => e.symbol)]] : [],
    ),
  ];
  const table = makeNameTable(fixed, FORTRAN_NAMING);
  const places = new Map(
    keys.map(([name, list]) => [
      name,
      new Map(list.map((key) => [key, table.claim(`${name}_${identifierText(key)}`.toLowerCase())])),
    ]),
  );
  const module = table.claim(moduleName(m));
  return {
    module,
    couplings: couplingMembers(m, FORTRAN_NAMING),
    inputs: new Map(inputs.map((i) => [i, inputMembers(i, FORTRAN_NAMING)])),
    functionOf,
    places,
    all: [...fixed, module, ...[...places.values()].flatMap((p) => [...p.values()])],
  };
}

function moduleText(m: CodeModule): string {
  const n = namesOf(m);
  const functions = m.functions.map((f) => functionText(m, f, n)).join('\n\n');
  return `${[
    `${comment(headerLines(m))}
module ${n.module}
  use, intrinsic :: iso_fortran_env, only: dp => real64
  implicit none
  private`,
    `  public :: dp\n${statements('  public :: ', m.functions.map(n.functionOf))}`,
    couplingsType(m, n),
    ...inputsOf(m).map((i) => inputType(i, n)),
    constants(m),
    ...m.functions.flatMap((f) => places(f, n)),
    'contains',
    functions,
    `end module ${n.module}`,
  ].join('\n\n')}\n`;
}

const comment = (lines: readonly string[], indent = ''): string =>
  commentLines(lines)
    .map((l) => `${indent}! ${l}`.trimEnd())
    .join('\n');

/** A list behind the beginning of a statement, in as many statements as it needs. */
const statements = (start: string, items: readonly string[]): string =>
  commaLines(items, 100)
    .map((line) => `${start}${line.replace(/,$/, '')}`)
    .join('\n');

const quoted = (text: string): string => `'${text.replaceAll("'", "''")}'`;

/** A character constant on as many lines as it needs; control characters have no place in one. */
function characters(text: string): string {
  const clean = [...text.replace(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu, ' ')];
  const parts = Array.from({ length: Math.max(1, Math.ceil(clean.length / 25)) }, (_, i) =>
    quoted(clean.slice(25 * i, 25 * (i + 1)).join('')),
  );
  return parts.join(' // &\n    ');
}

function couplingsType({ parameters }: CodeModule, n: Names): string {
  const members = parameters.flatMap((p) => {
    const member = n.couplings.get(p.name)!;
    const text = `${p.meaning}; ${powerText(p.dimension)}${standsFor(member, p.name)}`;
    return [comment([text], '    '), `    real(dp) :: ${member} = 0.0_dp`];
  });
  const type = ['  type, public :: couplings_t', ...members, '  end type couplings_t'].join('\n');
  return `${comment([COUPLINGS], '  ')}\n${type}`;
}

function inputType(input: CodeInput, n: Names): string {
  if (input.kind === 'vector') {
    const items = input.entries.map((e) => ({ key: e.symbol, meaning: `${e.meaning}; ${powerText(e.dimension)}` }));
    return `${comment([`Places in \`${input.name}\`. ${input.about}`], '  ')}\n${placeLines(items, n.places.get(input.name)!)}`;
  }
  const members = input.fields.flatMap(({ name, meaning, dimension, order }) => {
    const member = n.inputs.get(input)!.get(name)!;
    const text = `${meaning} and its time derivatives; ${powerText(dimension)}, one more for each derivative`;
    return [comment([`${text}${standsFor(member, name)}`], '    '), `    real(dp) :: ${member}(0:${order}) = 0.0_dp`];
  });
  const type = [`  type, public :: ${input.name}_t`, ...members, `  end type ${input.name}_t`].join('\n');
  return `${comment([input.about], '  ')}\n${type}`;
}

const placeLines = (
  items: readonly { readonly key: string; readonly meaning: string }[],
  names: ReadonlyMap<string, string>,
): string =>
  items
    .flatMap(({ key, meaning }, i) => [
      comment([meaning], '  '),
      `  integer, parameter, public :: ${names.get(key)} = ${i + 1}`,
    ])
    .join('\n');

function list(name: string, texts: readonly string[]): string {
  const bytes = Math.max(1, ...texts.map((t) => new TextEncoder().encode(t).length));
  const lines = commaLines([`character(len=${bytes}) ::`, ...texts.map(quoted)], 110).map((l) =>
    l.replace('::,', '::'),
  );
  return `  character(len=${bytes}), parameter, public :: ${name}(${texts.length}) = [ &\n    ${lines.join(' &\n    ')} ]`;
}

function constants(m: CodeModule): string {
  const text = (about: string, name: string, value: string) =>
    `${comment([about], '  ')}\n  character(len=*), parameter, public :: ${name} = &\n    ${characters(value)}`;
  const values = {
    variables: m.variables,
    parameters: m.parameters.map((p) => p.name),
    sources: m.parameters.filter((p) => p.isSource).map((p) => p.name),
  };
  const about = 'Names. Sources are parameters that are functions of time, to be given by their current value.';
  return [
    text('Name of the theory.', 'theory', m.theory),
    text('Geometry on which it was reduced.', 'geometry', m.geometry.id),
    comment([about], '  '),
    ...LISTS.map((name) => list(name, values[name])),
    ...m.functions.flatMap((f) => labels(f).map(([name, texts]) => list(name, texts))),
  ].join('\n');
}

/** Names of the places in the result of a function that returns a list. */
function places(f: CodeFunction, n: Names): string[] {
  const names = n.places.get(n.functionOf(f));
  if (names === undefined || f.result.kind === 'number') return [];
  const about = comment([`Places in the result of \`${n.functionOf(f)}\`. ${f.result.about}`], '  ');
  return [`${about}\n${placeLines(f.outputs, names)}`];
}

function options(n: Names): BodyOptions {
  return { naming: FORTRAN_NAMING, taken: n.all, mostTerms: 6000, partTerms: 3000 };
}

function functionText(m: CodeModule, f: CodeFunction, n: Names): string {
  const { parts, body } = functionCode(m, f, options(n));
  const width = f.result.kind === 'matrix' ? f.result.columns.length : 0;
  const [target, shape] =
    f.result.kind === 'number'
      ? ['value', '']
      : ['values', width > 0 ? `(${f.outputs.length / width}, ${width})` : `(${f.outputs.length})`];
  const place = (i: number): string => {
    if (f.result.kind === 'number') return target;
    return width > 0 ? `${target}(${Math.floor(i / width) + 1}, ${(i % width) + 1})` : `${target}(${i + 1})`;
  };
  const whole = procedure(n.functionOf(f), f.input, body, `${target}${shape}`, place, n, functionLines(f));
  return [...parts.map((p) => partText(f.input, p, n)), whole].join('\n\n');
}

const partText = (input: CodeInput, { name, body }: Part, n: Names): string =>
  procedure(name, input, body, `values(${body.results.length})`, (i) => `values(${i + 1})`, n, []);

function procedure(
  name: string,
  input: CodeInput,
  body: Body,
  result: string,
  place: (i: number) => string,
  n: Names,
  doc: readonly string[],
): string {
  const type = input.kind === 'jets' ? `type(${input.name}_t)` : 'real(dp)';
  const shape = input.kind === 'jets' ? '' : `(${input.entries.length})`;
  const unused = [...(body.usesCouplings ? [] : ['couplings']), ...(body.usesInput ? [] : [input.name])];
  const locals = [...body.reads.map((r) => r.local), ...body.steps.map((s) => s.name)];
  return [
    `  pure function ${name}(couplings, ${input.name}) result(${result.replace(/\(.*/, '')})`,
    ...(doc.length > 0 ? [comment(doc, '    ')] : []),
    '    type(couplings_t), intent(in) :: couplings',
    `    ${type}, intent(in) :: ${input.name}${shape}`,
    `    real(dp) :: ${result}`,
    ...body.calls.map((c) => `    real(dp) :: ${c.local}(${c.count})`),
    ...(locals.length > 0 ? [statements('    real(dp) :: ', locals)] : []),
    // A compiler would warn of an argument that nothing mentions.
    ...unused.map((argument) => `    associate (unused => ${argument})\n    end associate`),
    ...body.calls.map((c) => `    ${c.local} = ${c.part}(couplings, ${input.name})`),
    ...body.reads.map((r) => assignment(r.local, [source(r, input, n)])),
    ...body.steps.flatMap((s) => assigned(s.name, s.value)),
    ...body.results.flatMap((e, i) => assigned(place(i), e)),
    `  end function ${name}`,
  ].join('\n');
}

function source(r: Read, input: CodeInput, n: Names): string {
  if (r.kind === 'coupling') return `couplings%${n.couplings.get(r.key)}`;
  if (r.kind === 'jet') return `${input.name}%${n.inputs.get(input)!.get(r.field)}(${r.order})`;
  return r.kind === 'entry' ? `${input.name}(${r.index + 1})` : NOTATION.root(r.of);
}

/** Statements that give a variable the value of an expression. */
function assigned(target: string, e: Expression): string[] {
  if (e.kind !== 'sum' || e.terms.length <= MOST_SUMMANDS)
    return [assignment(target, layout(e, NOTATION, WIDTH, WIDEST))];
  const first: Expression = { kind: 'sum', terms: e.terms.slice(0, MOST_SUMMANDS) };
  const lines = [assignment(target, layout(first, NOTATION, WIDTH, WIDEST))];
  for (let i = MOST_SUMMANDS; i < e.terms.length; i += MOST_SUMMANDS) {
    const soFar = { negative: false, value: { kind: 'name', text: target } as const };
    const sum: Expression = { kind: 'sum', terms: [soFar, ...e.terms.slice(i, i + MOST_SUMMANDS)] };
    lines.push(assignment(target, layout(sum, NOTATION, WIDTH, WIDEST)));
  }
  return lines;
}

function assignment(target: string, lines: readonly string[]): string {
  const flat = `    ${target} = ${lines[0]}`;
  if (lines.length === 1 && flat.length <= 132) return flat;
  return `    ${target} = &\n      ${lines.join(' &\n      ')}`;
}

function exampleText(m: CodeModule, _file: string, sample = QUARTERS): string {
  const n = namesOf(m);
  const inputs = inputsOf(m);
  const declarations = inputs.map((i) =>
    i.kind === 'jets' ? `  type(${i.name}_t) :: ${i.name}` : `  real(dp) :: ${i.name}(${i.entries.length})`,
  );
  const settings = inputs.flatMap((input) => {
    if (input.kind === 'vector')
      return input.entries.map((_, i) => `  ${input.name}(${i + 1}) = ${sample.jet(i, 0)}_dp`);
    return input.fields.map(({ name, order }, i) => {
      const jet = Array.from({ length: order + 1 }, (_, k) => `${sample.jet(i, k)}_dp`);
      return `  ${input.name}%${n.inputs.get(input)!.get(name)}(0:${order}) = &\n    [${filled(
        jet.map((v, k) => (k < order ? `${v},` : v)),
        110,
      ).join(' &\n    ')}]`;
    });
  });
  const calls = m.functions.map((f) => {
    const name = n.functionOf(f);
    const given = `${name}(couplings, ${f.input.name})`;
    if (f.result.kind === 'number') return `  print one, '${f.name}', ${given}`;
    if (f.result.kind === 'matrix')
      return `  block
    real(dp) :: matrix(${f.result.rows.length}, ${f.result.columns.length})
    matrix = ${given}
    do i = 1, size(matrix, 1)
      do j = 1, size(matrix, 2)
        print entry, '${f.name}', i, j, matrix(i, j)
      end do
    end do
  end block`;
    return `  block
    real(dp) :: list(${f.outputs.length})
    list = ${given}
    do i = 1, size(list)
      print keyed, '${f.name}', trim(${name}_keys(i)), list(i)
    end do
  end block`;
  });
  const kinds = new Set(m.functions.map((f) => f.result.kind));
  const format = (name: string, text: string): string =>
    `  character(len=*), parameter :: ${name} = '(${text}es25.16e3)'`;
  const formats = [
    ...(kinds.has('number') ? [format('one', 'a, " = ", ')] : []),
    ...(kinds.has('record') || kinds.has('vector') ? [format('keyed', 'a, "[", a, "] = ", ')] : []),
    ...(kinds.has('matrix') ? [format('entry', 'a, "[", i0, "][", i0, "] = ", ')] : []),
  ];
  const indices = kinds.has('matrix') ? ['i', 'j'] : kinds.has('record') || kinds.has('vector') ? ['i'] : [];
  const couplings = m.parameters.map((p, i) => `  couplings%${n.couplings.get(p.name)} = ${sample.coupling(i)}_dp`);
  return `! ${EXAMPLE_TEXT}
program example
  use ${n.module}
  implicit none
${formats.join('\n')}
  type(couplings_t) :: couplings
${declarations.join('\n')}
${indices.length > 0 ? `  integer :: ${indices.join(', ')}\n` : ''}
${[...couplings, ...settings].join('\n')}

${calls.join('\n')}
end program example
`;
}
