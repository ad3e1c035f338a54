/**
 * A reader of the few forms of Julia that are emitted. Anything else is an error, so that a text that it accepts is Julia
 * as far as its manual says; then it is evaluated, places counted from 1.
 */
import { type CodeModule, inputsOf } from '../../src/emit/code-description.js';
import type { Sample } from '../../src/emit/code-language.js';

const KEYWORDS = new Set(
  'baremodule begin break catch const continue do else elseif end export false finally for function global if import let local macro module quote return struct true try using while'.split(
    ' ',
  ),
);
const NAME = '[A-Za-z_][A-Za-z0-9_]*';
const STRING = '"(?:[^"\\\\$\\n]|\\\\["\\\\$]|\\\\u[0-9a-f]{4}|\\\\U[0-9a-f]{8})*"';

interface JuliaFunction {
  readonly input: string;
  readonly statements: readonly { readonly name: string; readonly value: string }[];
  readonly result: string;
}

export interface JuliaModule {
  readonly name: string;
  readonly functions: ReadonlyMap<string, JuliaFunction>;
  /** Constants as their text. */
  readonly constants: ReadonlyMap<string, string>;
}

/** @throws Error with the line that is not of a known form. */
export function readJulia(text: string): JuliaModule {
  const lines = text.split('\n');
  let at = 0;
  const fail = (): never => {
    throw new Error(`line ${at + 1} is not of the subset: ${lines[at]}`);
  };
  const blank = () => {
    while (at < lines.length && /^(#.*)?$/.test(lines[at]!)) at++;
  };
  const docstring = () => {
    if (lines[at] !== '"""') return;
    for (at++; lines[at] !== '"""'; at++) if (at >= lines.length || !/^(?:[^"\\$]|\\["\\$])*$/.test(lines[at]!)) fail();
    at++;
    // A docstring belongs to what follows it at once.
    if (!/^(module|function) /.test(lines[at] ?? '')) fail();
  };
  docstring();
  const name = new RegExp(`^module (${NAME})$`).exec(lines[at++]!)?.[1] ?? fail();
  const constants = new Map<string, string>();
  const functions = new Map<string, JuliaFunction>();
  for (blank(); lines[at] !== `end # module ${name}`; blank()) {
    const one = new RegExp(`^const (${NAME}) = (${STRING}|String\\[\\])$`).exec(lines[at]!);
    const several = new RegExp(`^const (${NAME}) = \\[$`).exec(lines[at]!);
    if (one) {
      constants.set(one[1]!, one[2]!);
      at++;
    } else if (several) {
      const items: string[] = [];
      for (at++; lines[at] !== ']'; at++) {
        if (!new RegExp(`^ {4}${STRING}(, ${STRING})*,$`).test(lines[at]!)) fail();
        items.push(lines[at]!.trim());
      }
      constants.set(several[1]!, `[${items.join(' ')}]`);
      at++;
    } else {
      docstring();
      const head = new RegExp(`^function (${NAME})\\(couplings, (${NAME})\\)$`).exec(lines[at]!) ?? fail();
      at++;
      functions.set(head[1]!, { input: head[2]!, ...body() });
    }
  }
  if (lines.slice(at + 1).join('') !== '') fail();
  return { name, functions, constants };

  function body(): Pick<JuliaFunction, 'statements' | 'result'> {
    const statements: { name: string; value: string }[] = [];
    for (;;) {
      const assignment = new RegExp(`^ {4}(${NAME}) =(?: (.+))?$`).exec(lines[at]!);
      const returned = /^ {4}return (.*)$/.exec(lines[at]!);
      if (assignment) {
        if (KEYWORDS.has(assignment[1]!)) fail();
        let value = assignment[2] ?? '';
        at++;
        // A line that ends in an operator goes on in the next one, and no other does.
        while (value === '' || /[-+*/]$/.test(value)) {
          if (!/^ {8}\S/.test(lines[at]!)) fail();
          value = `${value} ${lines[at++]!.trim()}`.trim();
        }
        statements.push({ name: assignment[1]!, value });
      } else if (returned) {
        let result = returned[1]!;
        at++;
        const open = (s: string) =>
          [...s].filter((c) => '(['.includes(c)).length > [...s].filter((c) => ')]'.includes(c)).length;
        while (open(result)) {
          // Between entries of a matrix a line end would begin a new row, so it must stand behind a mark.
          if (!/[(;,]$/.test(result)) fail();
          result += ` ${lines[at++]!.trim()}`;
        }
        if (lines[at] !== 'end') fail();
        at++;
        return { statements, result };
      } else fail();
    }
  }
}

type Value = number | readonly Value[] | { readonly [key: string]: Value };

/** Number, name, float(argument), sqrt(name), list[place]; joined by + − * / with blanks around them, or in brackets. */
const ATOM = `(?:\\d+(?:\\.\\d+)?(?:e[+-]?\\d+)?|float\\(${NAME}(?:\\.${NAME})?(?:\\[\\d+\\])?\\)|sqrt\\(${NAME}\\)|${NAME}(?:\\[\\d+\\])?)`;

function inScript(expression: string): string {
  const flat = expression.replace(/\(([^()]*)\)/g, (whole, inner: string, offset: number) =>
    /[A-Za-z0-9_]/.test(expression[offset - 1] ?? '') ? whole : `(${inner})`,
  );
  const bracketed = `(?:${ATOM}|\\(${ATOM}(?: [-+*/] ${ATOM})*\\))`;
  if (!new RegExp(`^-?${bracketed}(?: [-+*/] ${bracketed})*$`).test(flat))
    throw new Error(`no expression: ${expression}`);
  return flat
    .replace(new RegExp(`(?<![\\w.])(${NAME})(?![\\w(])`, 'g'), (name) => {
      if (KEYWORDS.has(name)) throw new Error(`${name} is a keyword`);
      return `$.${name}`;
    })
    .replace(/\[(\d+)\]/g, (_, n) => `[${Number(n) - 1}]`)
    .replace(/float\(([^()]*)\)/g, '($1)')
    .replace(/sqrt\(/g, 'Math.sqrt(');
}

const evaluator = (expression: string): (($: Record<string, Value>) => Value) =>
  new Function('$', `return ${inScript(expression)};`) as ($: Record<string, Value>) => Value;

/** Values of all functions of the description at a point, in order. */
export function runJulia(text: string, m: CodeModule, sample: Sample): number[] {
  const module = readJulia(text);
  const member = new RegExp(`^ {4}(${NAME}): `);
  const members = text.split('\n').flatMap((l) => member.exec(l)?.[1] ?? []);
  // The docstring lists the members of the arguments in order: couplings, then those of each input.
  let next = 0;
  const couplings = Object.fromEntries(m.parameters.map((_, i) => [members[next++]!, Number(sample.coupling(i))]));
  const inputs: Record<string, Value> = {};
  for (const input of inputsOf(m))
    inputs[input.name] =
      input.kind === 'vector'
        ? input.entries.map((_, i) => Number(sample.jet(i, 0)))
        : Object.fromEntries(
            input.fields.map((f, i) => [
              members[next++]!,
              Array.from({ length: f.order + 1 }, (_, n) => Number(sample.jet(i, n))),
            ]),
          );
  const call = (name: string): Value => {
    const f = module.functions.get(name);
    if (!f) throw new Error(`no function ${name}`);
    const scope: Record<string, Value> = { couplings, [f.input]: inputs[f.input]! };
    for (const s of f.statements) {
      const part = new RegExp(`^(${NAME})\\(couplings, ${f.input}\\)$`).exec(s.value)?.[1];
      if (part !== undefined && module.functions.has(part)) scope[s.name] = call(part);
      else {
        // A name must be given before it is read; an undefined one would show as NaN.
        scope[s.name] = evaluator(s.value)(scope);
        if (typeof scope[s.name] !== 'number' || Number.isNaN(scope[s.name]))
          throw new Error(`${name}: ${s.name} = ${s.value}`);
      }
    }
    return result(f.result, scope);
  };
  return m.functions.flatMap((f) => flattened(call(f.name.replace(/[A-Z]/g, (c) => `_${c.toLowerCase()}`))));
}

function result(text: string, scope: Record<string, Value>): Value {
  const value = (name: string): Value => {
    const found = scope[name];
    if (found === undefined) throw new Error(`no value for ${name}`);
    return found;
  };
  const names = `${NAME}(?:, ${NAME})*`;
  if (new RegExp(`^${NAME}$`).test(text)) return value(text);
  if (new RegExp(`^\\(${names},\\)$|^\\[${names}\\]$`).test(text))
    return text.slice(1, -1).replace(/,$/, '').split(', ').map(value);
  const member = `${NAME} = ${NAME}`;
  if (new RegExp(`^\\( (?:${member}, ?)+\\)$`).test(text))
    return text
      .slice(1, -1)
      .split(',')
      .filter((s) => s.trim() !== '')
      .map((s) => value(s.split('=')[1]!.trim()));
  if (new RegExp(`^\\[${NAME}(?:;? ${NAME})*\\]$`).test(text)) return text.slice(1, -1).split(/;? /).map(value);
  throw new Error(`no result: ${text}`);
}

const flattened = (v: Value): number[] => (typeof v === 'number' ? [v] : Object.values(v).flatMap(flattened));
